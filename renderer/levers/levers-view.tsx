import { type ReactElement, useEffect } from 'react';
import { Button } from '../components/button.tsx';
import { Disclosure } from '../components/disclosure.tsx';
import { EmptyState } from '../components/notes.tsx';
import { useApp } from '../state/app-store.ts';
import { useJob, useProblems, useSources } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import { estimate, keepForComparison } from '../state/result.ts';
import { sameWork } from '../state/work.ts';
import { CableLevers } from './cable-levers.tsx';
import { CopperLevers } from './copper-levers.tsx';
import { prepare, startFollowing, useLevers } from './follow.ts';
import { KeepBar } from './keep-bar.tsx';
import css from './levers.module.css';
import { LoopLevers } from './loop-levers.tsx';
import { PreparedNotice } from './prepared-notice.tsx';
import { QuickLevers } from './quick-levers.tsx';
import { Readout } from './readout.tsx';

/** Once a lever was looked at, what is shown follows the document wherever it is changed. */
let isFollowing = false;

/** What can be changed, and what it gives. */
export function LeversView(): ReactElement {
  const hasResult = useApp((state) => state.result !== null);
  const canEstimate = useProblems().length === 0;
  const isEstimating = useJob('estimate') !== undefined;
  usePrepared();
  if (!hasResult) {
    return (
      <EmptyState title="Nothing to compare a change with yet">
        <p>Levers show what a change gives. First the board has to be estimated as it is.</p>
        <Button
          look="primary"
          isDisabled={!canEstimate || isEstimating}
          onPress={() => void attempt('Estimate', () => estimate())}
        >
          Estimate
        </Button>
      </EmptyState>
    );
  }
  return (
    <div className={css.view}>
      <div className={css.top}>
        <Readout />
        <PreparedNotice />
      </div>
      <div className={css.scroll}>
        <QuickLevers />
        <SlowLevers />
      </div>
      <KeepBar />
    </div>
  );
}

function SlowLevers(): ReactElement {
  const { cables = [], loops = [] } = useSources() ?? {};
  return (
    <section className={css.slow} aria-label="Changes that are solved again">
      <h3>Solved again</h3>
      <p className={css.quiet}>These move currents on planes and cables: change them, then estimate.</p>
      <Disclosure title={`Cables (${cables.length})`}>
        <CableLevers />
      </Disclosure>
      <Disclosure title="Height to the plane, layer">
        <CopperLevers />
      </Disclosure>
      {loops.length > 0 && (
        <Disclosure title={`Current loops (${loops.length})`}>
          <LoopLevers loops={loops} />
        </Disclosure>
      )}
    </section>
  );
}

/** Prepares the levers for what was estimated, once the levers are looked at, and keeps it for comparison. */
function usePrepared(): void {
  const hasResult = useApp((state) => state.result !== null);
  const isCurrent = useApp(
    ({ result, history }) => result !== null && history !== null && sameWork(result.work, history.present),
  );
  const hasKept = useApp((state) => state.kept !== null);
  const canEstimate = useProblems().length === 0;
  const isWorking = useApp(({ jobs }) => jobs.some(({ kind }) => kind === 'estimate' || kind === 'levers'));
  const isPreparing = useLevers((state) => state.isPreparing);
  const isPrepared = useLevers(({ prepared }) => prepared !== null);
  const isOfAnother = useLevers(({ needsSolve }) => needsSolve !== null);
  const hasFailed = useLevers(({ failure }) => failure !== null);
  useEffect(() => {
    if (!isFollowing) startFollowing();
    isFollowing = true;
  }, []);
  const isWanted =
    hasResult && canEstimate && !isWorking && !isPreparing && !hasFailed && (!isPrepared || (isOfAnother && isCurrent));
  useEffect(() => {
    if (isWanted) void prepare();
  }, [isWanted]);
  useEffect(() => {
    if (isPrepared && hasResult && !hasKept) keepForComparison();
  }, [isPrepared, hasResult, hasKept]);
}
