import type { ReactElement } from 'react';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { CAUTIONS_SHORT } from '../../app/report/cautions.ts';
import { limitName, standingOf, VERDICT_STANDING, verdictText } from '../../app/report/verdict.ts';
import { showOverlay } from '../commands/overlays.ts';
import { Button } from '../components/button.tsx';
import { StandingBadge } from '../components/marks/standing-badge.tsx';
import { frequencyText, inLocale, levelText, numberText } from '../i18n/format.ts';
import { type DraftState, useApp } from '../state/app-store.ts';
import { useSelectedPoint, useShown } from '../state/hooks.ts';
import type { Shown } from '../state/result.ts';
import css from './status-bar.module.css';
import { CaveatList, ProblemList } from './status-lists.tsx';

/** The verdict and what must be known beside it: always in view. */
export function StatusBar(): ReactElement {
  const hasDocument = useApp(({ history }) => history !== null);
  return (
    <footer className={css.bar}>
      {hasDocument && (
        <>
          <VerdictText />
          <ChosenLine />
          <ProblemList />
          <CaveatList />
        </>
      )}
      <span className={css.caution}>
        <Button look="quiet" onPress={() => showOverlay('cautions')}>
          <span className={css.cut}>{CAUTIONS_SHORT}</span>
        </Button>
      </span>
      {hasDocument && <DraftText />}
    </footer>
  );
}

function VerdictText(): ReactElement {
  const shown = useShown();
  const result = useApp((state) => state.result?.result ?? null);
  if (shown?.source === 'partial')
    return <span role="status">Estimating: {numberText(shown.points.length)} readings so far</span>;
  if (shown === null || shown.verdict === null || result === null) return <span role="status">Not estimated yet</span>;
  const { worst, verdict } = shown;
  const { limit } = result;
  return (
    <span className={css.verdict} role="status">
      {shown.isOutdated && <strong className={css.outdated}>Out of date</strong>}
      <span className={shown.isOutdated ? css.old : undefined}>
        {limitName(result)}:{' '}
        <StandingBadge standing={worst === null ? 'fine' : VERDICT_STANDING[verdict]}>
          {inLocale(verdictText({ worst, verdict, limit }))}
        </StandingBadge>
        <Counts shown={shown} limit={limit} />
      </span>
    </span>
  );
}

function Counts({ shown, limit }: { readonly shown: Shown; readonly limit: EstimateResult['limit'] }): ReactElement {
  const standings = shown.points.map((point) => standingOf(point, limit.requiredMarginDb));
  const count = (wanted: string) => standings.filter((standing) => standing === wanted).length;
  const [over, short] = [count('over'), count('short')];
  return (
    <>
      {over > 0 && <StandingBadge standing="over">{numberText(over)} over</StandingBadge>}
      {short > 0 && <StandingBadge standing="short">{numberText(short)} short</StandingBadge>}
    </>
  );
}

/** The chosen line in words; said aloud as the keys step through the lines. */
function ChosenLine(): ReactElement {
  const point = useSelectedPoint();
  if (point === null) return <span role="status" />;
  const { frequencyHz, levelDbuvPerM, marginDb } = point;
  const margin = marginDb < 0 ? `${levelText(-marginDb)} dB over` : `${levelText(marginDb)} dB under`;
  return (
    <span className={css.line} role="status">
      {frequencyText(frequencyHz)}: {levelText(levelDbuvPerM)} dBµV/m, {margin}
    </span>
  );
}

const DRAFT_WORDS: Readonly<Record<DraftState['kind'], string>> = {
  saved: 'Saved',
  waiting: 'Not saved yet',
  saving: 'Saving',
  incomplete: 'Not saved: something is incomplete',
  failed: 'Not saved',
  conflict: 'Changed in two windows',
};

function DraftText(): ReactElement {
  const draft = useApp((state) => state.draft.kind);
  const isReadOnly = useApp(({ project }) => project?.isReadOnly ?? false);
  return <span className={css.quiet}>{isReadOnly ? 'Read only' : DRAFT_WORDS[draft]}</span>;
}
