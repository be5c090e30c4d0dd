import { type ReactElement, useState } from 'react';
import type { BandChange, Change, Comparison, Crossing, LineChange } from '../../app/compare/types.ts';
import { DETECTOR_SHORT } from '../../app/report/text-table.ts';
import { call } from '../api/api.ts';
import { Button } from '../components/button.tsx';
import { EmptyState, ErrorNotice, InfoNotice } from '../components/notes.tsx';
import { Select } from '../components/select.tsx';
import { Cell, HeadCell, Row, Table } from '../components/table.tsx';
import { frequencyText, inLocale, levelText, marginText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelection } from '../state/hooks.ts';
import { selectLine } from '../state/selection.ts';
import css from './ledger.module.css';
import { completePair, type RunPair } from './pair.ts';
import { useAsked } from './use-asked.ts';

export interface ComparisonViewProps {
  readonly pair: RunPair;
  readonly onChange: (pair: RunPair) => void;
}

/** One run against another: what changed in words, what that did to the bands and to every line. */
export function ComparisonView({ pair, onChange }: ComparisonViewProps): ReactElement {
  const runs = useApp((state) => state.runs);
  const projectId = useApp((state) => state.project?.projectId);
  const { before, after } = completePair(pair, runs);
  const isWhole = projectId !== undefined && before !== null && after !== null;
  const asked = useAsked(isWhole ? `${projectId} ${before} ${after}` : null, async () => {
    const answer = await call('runs.compare', { projectId: projectId!, before: before!, after: after! });
    return answer.comparison as Comparison;
  });
  const choices = runs.map(({ run, revision, note }) => ({
    value: String(run),
    label: `Run ${run}, revision ${revision || '–'}`,
    ...(note !== '' && { note }),
  }));
  if (asked === null) {
    return (
      <EmptyState title="Nothing to compare yet">
        <p>A comparison needs two runs. Change the board, the sources or the set-up, and estimate again.</p>
      </EmptyState>
    );
  }
  return (
    <div className={css.scroll}>
      <div className={css.pair}>
        <Select
          label="Before"
          value={String(before)}
          choices={choices}
          onChange={(value) => onChange({ before: Number(value), after })}
        />
        <Select
          label="After"
          value={String(after)}
          choices={choices}
          onChange={(value) => onChange({ before, after: Number(value) })}
        />
        <Button onPress={() => onChange({ before: after, after: before })}>Swap</Button>
      </div>
      {asked.state === 'loading' && <p className={css.wait}>Comparing…</p>}
      {asked.state === 'failed' && <ErrorNotice title="These runs cannot be compared">{asked.message}</ErrorNotice>}
      {asked.state === 'ready' && <ComparisonText comparison={asked.answer} />}
    </div>
  );
}

const FIRST_LINES = 40;

function ComparisonText({ comparison }: { readonly comparison: Comparison }): ReactElement {
  const [isWhole, setWhole] = useState(false);
  const { changes, bands, lines, counts } = comparison;
  const shown = isWhole ? lines : lines.slice(0, FIRST_LINES);
  return (
    <>
      <p className={css.headline}>{inLocale(comparison.headline)}</p>
      {comparison.warnings.map(({ code, message }) => (
        <InfoNotice key={code} title={message} />
      ))}
      <h3>What changed, strongest first</h3>
      {changes.length === 0 ? <p>Nothing that this program can see.</p> : <ChangeList changes={changes} />}
      <h3>Worst margins by band</h3>
      <BandTable bands={bands} />
      <h3>Lines, worst margin first</h3>
      <p>
        {counts.better} better, {counts.worse} worse, {counts.unchanged} unchanged, {counts.new} new, {counts.gone}{' '}
        gone. Over the limit: {counts.newlyOver} newly, {counts.newlyUnder} no longer, {counts.stillOver} still.
      </p>
      <LineTable lines={shown} comparison={comparison} />
      {shown.length < lines.length && <Button onPress={() => setWhole(true)}>Show all {lines.length} lines</Button>}
    </>
  );
}

const ChangeList = ({ changes }: { readonly changes: readonly Change[] }): ReactElement => (
  <ul className={css.changes}>
    {changes.map(({ text, effect }) => (
      <li key={text}>
        {inLocale(text)}
        {effect !== null && effect.changeDb !== null && (
          <span className={css.effect}>
            {effect.isAlone ? '' : 'with the other changes: '}
            level of {effect.name} {signed(effect.changeDb)} dB at {frequencyText(effect.frequencyHz)}
          </span>
        )}
      </li>
    ))}
  </ul>
);

const BandTable = ({ bands }: { readonly bands: readonly BandChange[] }): ReactElement => (
  <Table label="Worst margins by band, dB">
    <thead>
      <tr>
        <HeadCell>Band</HeadCell>
        <HeadCell isNumber>Before</HeadCell>
        <HeadCell isNumber>After</HeadCell>
        <HeadCell isNumber>Change</HeadCell>
        <HeadCell isNumber>Over</HeadCell>
      </tr>
    </thead>
    <tbody>
      {bands.map((band) => (
        <Row key={`${band.detector} ${band.fromHz}`}>
          <Cell>
            {DETECTOR_SHORT[band.detector]} {frequencyText(band.fromHz)} to {frequencyText(band.toHz)}
          </Cell>
          <Cell isNumber>{band.before.worst === null ? '–' : marginText(band.before.worst.marginDb)}</Cell>
          <Cell isNumber>{band.after.worst === null ? '–' : marginText(band.after.worst.marginDb)}</Cell>
          <Cell isNumber>{band.marginChangeDb === null ? '–' : signed(band.marginChangeDb)}</Cell>
          <Cell isNumber>
            {band.before.over} → {band.after.over}
          </Cell>
        </Row>
      ))}
    </tbody>
  </Table>
);

const CROSSING_WORDS: Readonly<Record<Crossing, string>> = {
  'newly-over': 'now over',
  'still-over': 'still over',
  'newly-under': 'now under',
  under: '',
};

function LineTable({
  lines,
  comparison,
}: {
  readonly lines: readonly LineChange[];
  readonly comparison: Comparison;
}): ReactElement {
  const { lineHz, detector } = useSelection();
  return (
    <Table label="Lines of both runs">
      <thead>
        <tr>
          <HeadCell isNumber>Frequency</HeadCell>
          <HeadCell>By</HeadCell>
          <HeadCell isNumber>Before</HeadCell>
          <HeadCell isNumber>After</HeadCell>
          <HeadCell isNumber>Change</HeadCell>
          <HeadCell isNumber>Margin</HeadCell>
          <HeadCell>Limit</HeadCell>
          <HeadCell>Mainly</HeadCell>
        </tr>
      </thead>
      <tbody>
        {lines.map((line) => (
          <Row
            key={`${line.frequencyHz} ${line.detector}`}
            isChosen={line.frequencyHz === lineHz && line.detector === detector}
          >
            <Cell isNumber>
              <Button look="quiet" onPress={() => selectLine(line.frequencyHz, line.detector)}>
                {frequencyText(line.frequencyHz)}
              </Button>
            </Cell>
            <Cell>{DETECTOR_SHORT[line.detector]}</Cell>
            <Cell isNumber>{line.before === null ? 'new' : levelText(line.before.levelDbuvPerM)}</Cell>
            <Cell isNumber>{line.after === null ? 'gone' : levelText(line.after.levelDbuvPerM)}</Cell>
            <Cell isNumber>{line.levelChangeDb === null ? '–' : signed(line.levelChangeDb)}</Cell>
            <Cell isNumber>{line.after === null ? '–' : marginText(line.after.marginDb)}</Cell>
            <Cell>{CROSSING_WORDS[line.crossing]}</Cell>
            <Cell>{mainCause(line, comparison)}</Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}

/** What made the change, with the level that contributor makes by itself. */
function mainCause({ contributors }: LineChange, { before, after }: Comparison): string {
  const [first] = contributors;
  if (first === undefined) return '';
  const path = first.path === 'pair' ? 'trace pair' : first.path;
  const name = `${first.name} via ${path}`;
  if (first.changeDb !== null) return `${name} ${signed(first.changeDb)} dB`;
  return `${name} only in run ${first.beforeDbuvPerM === null ? after.run : before.run}`;
}

const signed = (changeDb: number): string => `${changeDb > 0 ? '+' : ''}${levelText(changeDb)}`;
