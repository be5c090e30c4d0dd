import type { ReactElement } from 'react';
import type { Trend, TrendGroup } from '../../app/compare/types.ts';
import { standingOfMargin } from '../../app/report/verdict.ts';
import { call } from '../api/api.ts';
import { StandingBadge } from '../components/marks/standing-badge.tsx';
import { EmptyState, ErrorNotice } from '../components/notes.tsx';
import { Cell, HeadCell, Row, Table } from '../components/table.tsx';
import { frequencyText, inLocale, marginText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import css from './ledger.module.css';
import { TrendChart } from './trend-chart.tsx';
import { useAsked } from './use-asked.ts';

/** How the worst margin moved from revision to revision, one chart for every set-up. */
export function TrendView(): ReactElement {
  const runs = useApp((state) => state.runs);
  const projectId = useApp((state) => state.project?.projectId);
  const key = runs.length === 0 ? null : `${projectId} ${runs.map(({ run }) => run).join(' ')}`;
  const asked = useAsked(key, async () => {
    const answer = await call('runs.trend', { projectId: projectId! });
    return answer.trend as Trend;
  });
  if (asked === null) {
    return (
      <EmptyState title="No trend yet">
        <p>It begins with the first run, and shows something with the second revision.</p>
      </EmptyState>
    );
  }
  if (asked.state === 'loading') return <p className={css.wait}>Putting the runs in a row…</p>;
  if (asked.state === 'failed') return <ErrorNotice title="No trend">{asked.message}</ErrorNotice>;
  return (
    <div className={css.scroll}>
      {asked.answer.groups.map((group, index) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: groups have no name of their own and keep their order
        <GroupView key={index} group={group} />
      ))}
    </div>
  );
}

function GroupView({ group }: { readonly group: TrendGroup }): ReactElement {
  const { board, limit, setup, requiredMarginDb, points, headline } = group;
  return (
    <section className={css.group}>
      <h3>
        {board}, {limit}
      </h3>
      <p>
        {setup.site === 'ground-plane' ? 'Over a ground plane' : 'Room without reflections'}, board {setup.orientation},{' '}
        {setup.structure === 'solved' ? 'planes and cables solved' : 'trace pairs alone'}.
        {headline !== '' && ` ${inLocale(headline)}.`}
      </p>
      <TrendChart group={group} />
      <Table label={`Worst margins of ${board}`}>
        <thead>
          <tr>
            <HeadCell>Rev.</HeadCell>
            <HeadCell isNumber>Run</HeadCell>
            <HeadCell>Worst margin</HeadCell>
            <HeadCell>Against the one before</HeadCell>
          </tr>
        </thead>
        <tbody>
          {points.map((point) => (
            <Row key={point.revision}>
              <Cell>{point.revision || '–'}</Cell>
              <Cell isNumber>{point.run}</Cell>
              <Cell>
                {point.worst === null ? (
                  'no line in range'
                ) : (
                  <StandingBadge standing={standingOfMargin(point.worst.marginDb, requiredMarginDb)}>
                    {marginText(point.worst.marginDb)} dB at {frequencyText(point.worst.frequencyHz)}
                  </StandingBadge>
                )}
              </Cell>
              <Cell>
                {inLocale(point.text)}
                {point.isOtherProgram && ' (another program version)'}
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
    </section>
  );
}
