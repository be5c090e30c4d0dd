import type { Command } from 'commander';
import type { RunSummary } from '../../../../app/project/stored-run.ts';
import { fixed, trimmed } from '../../../../app/report/format.ts';
import { visibleText } from '../../../../app/report/safe-text.ts';
import { wrapText } from '../../../../app/report/wrap.ts';
import { hzToMhz } from '../../../../app/units/convert.ts';
import { jsonText } from '../../../files/json-text.ts';
import { type Column, table } from '../../columns.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../../outputs.ts';
import { addProjectOption, type ProjectOption, withProject } from '../../project-file.ts';

const HELP = `
Examples:
  quietboard runs --project valve.quietboard
  quietboard runs --project valve.quietboard --revision C --json -
`;

interface RunsOptions extends ProjectOption {
  readonly revision?: string;
  readonly json?: string;
}

export function addRuns(program: Command): void {
  const command = program
    .command('runs')
    .summary('the runs kept in a project')
    .description('Lists the runs kept in a project, newest first.');
  addProjectOption(command)
    .option('--revision <name>', 'only runs of this revision')
    .option('--json <file>', 'write the list as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(listRuns);
}

async function listRuns({ project: file, revision, json }: RunsOptions): Promise<void> {
  await checkOutputs({ '--json': json }, [file]);
  const { name, runs, revisions } = await withProject(file, 'read', (project) => ({
    name: project.info().name,
    runs: project.runs(revision === undefined ? {} : { revision }),
    revisions: project.revisions().map((each) => each.revision),
  }));
  await writeOutput(json, () => jsonText({ runs: runs.map(listed) }));
  if (json === STDOUT) return;
  const lines = runs.length === 0 ? noRunLines(revisions, outputWidth()) : runLines(name, runs, outputWidth());
  process.stdout.write(`${lines.join('\n')}\n`);
}

/** A run as the JSON contract lists it. */
const listed = ({ layoutSha256, sourcesSha256, ...summary }: RunSummary) => ({
  ...summary,
  layoutSha256,
  sourcesSha256,
});

function noRunLines(revisions: readonly string[], width: number): string[] {
  if (revisions.length === 0) return ['No runs yet. Keep one with: quietboard estimate BOARD --project FILE'];
  const names = [...new Set(revisions.map((revision) => (revision === '' ? '(none)' : revision)))];
  return wrapText(visibleText(`No runs of this revision. There are runs of: ${names.join(', ')}.`), width);
}

function runLines(name: string, runs: readonly RunSummary[], width: number): string[] {
  const notes = runs.filter(({ note }) => note !== '');
  const boards = new Set(runs.map(({ board }) => board));
  const columns = COLUMNS.filter(({ head }) => head !== 'board' || boards.size > 1);
  const counted = `${runs.length} ${runs.length === 1 ? 'run' : 'runs'}${boards.size === 1 ? ` of ${[...boards][0]}` : ''}`;
  return [
    ...wrapText(visibleText(`${name}: ${counted}`), width),
    '',
    ...table(runs, columns, width),
    ...(notes.length === 0 ? [] : ['']),
    ...notes.flatMap(({ run, note }) => wrapText(visibleText(`#${run}: ${note}`), width, '', '    ')),
  ];
}

const VERDICT_WORDS: Readonly<Record<RunSummary['verdict'], string>> = {
  meets: 'meets',
  exceeds: 'exceeds',
  'falls-short': 'falls short',
  'within-uncertainty': 'within uncertainty',
};

const COLUMNS: readonly Column<RunSummary>[] = [
  { head: 'run', text: ({ run }) => `#${run}`, align: 'right' },
  { head: 'when (UTC)', text: ({ startedAt }) => `${startedAt.slice(0, 10)} ${startedAt.slice(11, 16)}` },
  { head: 'board', text: ({ board }) => board, minWidth: 6 },
  { head: 'rev', text: ({ revision }) => revision, minWidth: 3 },
  {
    head: 'limit',
    text: (run) => `${run.standard} ${run.class} ${trimmed(run.distanceM, 2)} m`,
    minWidth: 8,
  },
  { head: 'worst dB', text: ({ worst }) => (worst ? fixed(worst.marginDb, 1) : '–'), align: 'right' },
  { head: 'at MHz', text: ({ worst }) => (worst ? trimmed(hzToMhz(worst.frequencyHz), 3) : ''), align: 'right' },
  { head: 'verdict', text: ({ verdict }) => VERDICT_WORDS[verdict], minWidth: 8 },
];
