import { type MouseEvent, type ReactElement, useState } from 'react';
import type { RunSummary } from '../../app/project/stored-run.ts';
import { standingOfMargin } from '../../app/report/verdict.ts';
import { Button } from '../components/button.tsx';
import { StandingBadge } from '../components/marks/standing-badge.tsx';
import { ContextMenu, MenuButton, type MenuGroup } from '../components/menu.tsx';
import { EmptyState } from '../components/notes.tsx';
import { Cell, HeadCell, Row, Table } from '../components/table.tsx';
import { TextField } from '../components/text-field.tsx';
import { dateTimeText, frequencyText, marginText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { attempt } from '../state/notices.ts';
import { loadRun } from '../state/result.ts';
import { deleteRun, setNote } from '../state/runs.ts';
import css from './ledger.module.css';
import { completePair, type RunPair } from './pair.ts';

export interface RunTableProps {
  readonly onCompare: (pair: RunPair) => void;
}

/** Every kept run, newest first. */
export function RunTable({ onCompare }: RunTableProps): ReactElement {
  const runs = useApp((state) => state.runs);
  const shown = useApp((state) => state.result?.run ?? null);
  const [marked, setMarked] = useState<number | null>(null);
  const [menu, setMenu] = useState<{ readonly run: RunSummary; readonly x: number; readonly y: number } | null>(null);
  if (runs.length === 0) {
    return (
      <EmptyState title="No runs yet">
        <p>Every estimate is kept here, with the board and the sources it was made of. Press Estimate.</p>
      </EmptyState>
    );
  }
  const groupsOf = (run: RunSummary): readonly MenuGroup[] => [
    {
      label: `Run ${run.run}`,
      entries: [
        {
          name: 'open',
          label: 'Open with its board and sources',
          run: () => void attempt(`Run ${run.run}`, () => loadRun(run.run)),
        },
        {
          name: 'compare',
          label: marked === null || marked === run.run ? 'Compare with the run before' : `Compare with run ${marked}`,
          isDisabled: runs.length < 2,
          run: () => onCompare(marked === null || marked === run.run ? before(run, runs) : inOrder(marked, run.run)),
        },
        {
          name: 'mark',
          label: marked === run.run ? 'Do not keep in mind for comparing' : 'Keep in mind for comparing',
          run: () => setMarked(marked === run.run ? null : run.run),
        },
        { name: 'delete', label: 'Delete', run: () => deleteRun(run.run) },
      ],
    },
  ];
  const openMenu = (run: RunSummary) => (event: MouseEvent) => {
    event.preventDefault();
    setMenu({ run, x: event.clientX, y: event.clientY });
  };
  return (
    <div className={css.scroll}>
      <Table label="Runs, newest first">
        <thead>
          <tr>
            <HeadCell isNumber>Run</HeadCell>
            <HeadCell>Rev.</HeadCell>
            <HeadCell>Worst margin</HeadCell>
            <HeadCell>Note</HeadCell>
            <HeadCell>
              <span className={css.hidden}>What to do</span>
            </HeadCell>
          </tr>
        </thead>
        <tbody>
          {runs.map((run) => (
            <Row key={run.run} isChosen={run.run === shown} onContextMenu={openMenu(run)}>
              <Cell isNumber>
                <Button
                  look="quiet"
                  aria-label={`Open run ${run.run}`}
                  onPress={() => void attempt(`Run ${run.run}`, () => loadRun(run.run))}
                >
                  {run.run}
                  {marked === run.run && ' •'}
                </Button>
              </Cell>
              <Cell>{run.revision || '–'}</Cell>
              <Cell>
                <MarginText run={run} />
                <span className={css.about}>
                  {run.standard} {run.class}, {run.distanceM} m · {dateTimeText(run.startedAt)}
                </span>
              </Cell>
              <Cell className={css.note}>
                <TextField
                  label={`Note to run ${run.run}`}
                  isLabelHidden
                  value={run.note}
                  maxLength={10_000}
                  onCommit={(note) => void attempt(`Note to run ${run.run}`, () => setNote(run.run, note))}
                />
              </Cell>
              <Cell>
                <MenuButton label={`Run ${run.run}: what to do`} groups={() => groupsOf(run)}>
                  ⋯
                </MenuButton>
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
      <ContextMenu
        at={menu}
        onClose={() => setMenu(null)}
        label="What to do with the run"
        groups={menu === null ? [] : groupsOf(menu.run)}
      />
    </div>
  );
}

function MarginText({ run }: { readonly run: RunSummary }): ReactElement {
  if (run.worst === null) return <>no line in range</>;
  const { marginDb, frequencyHz } = run.worst;
  return (
    <StandingBadge standing={standingOfMargin(marginDb, run.requiredMarginDb)}>
      {marginText(marginDb)} dB at {frequencyText(frequencyHz)}
    </StandingBadge>
  );
}

const inOrder = (one: number, other: number): RunPair => ({
  before: Math.min(one, other),
  after: Math.max(one, other),
});

/** A run against the one before it; the first run against the next. */
function before({ run }: RunSummary, runs: readonly RunSummary[]): RunPair {
  const pair = completePair({ before: null, after: run }, runs);
  const next = Math.min(...runs.map((row) => row.run).filter((number) => number > run));
  return pair.before === null ? { before: run, after: next } : pair;
}
