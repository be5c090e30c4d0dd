import type { ReactElement } from 'react';
import { canEstimate } from '../commands/core-commands.ts';
import { keysOf, runCommand } from '../commands/run-command.ts';
import { Button } from '../components/button.tsx';
import { Progress } from '../components/progress.tsx';
import { useApp } from '../state/app-store.ts';
import { useIsOutdated, useProblems } from '../state/hooks.ts';
import { stopJob } from '../state/jobs.ts';
import { attempt } from '../state/notices.ts';
import css from './estimate-button.module.css';
import { commandNamed } from './use-commands.ts';

/** Starts the estimate; while anything long runs, how far it is and the way to stop it. */
export function EstimateButton(): ReactElement | null {
  const hasDocument = useApp(({ history }) => history !== null);
  const isPossible = useApp(canEstimate);
  const isFirst = useApp(({ result }) => result === null);
  const job = useApp(({ jobs }) => jobs.find(({ kind }) => kind === 'estimate') ?? jobs.at(-1));
  const isOutdated = useIsOutdated();
  const problemCount = useProblems().length;
  const command = commandNamed('estimate.run');
  return (
    <>
      {job !== undefined && (
        <div className={css.progress}>
          <Progress
            label={job.stage}
            done={job.done}
            total={job.total}
            isStopping={job.isStopping}
            onStop={() => void attempt('Stop', () => stopJob(job.id))}
          />
        </div>
      )}
      {hasDocument && job?.kind !== 'estimate' && (
        <Button
          look={isFirst || isOutdated ? 'primary' : 'plain'}
          isDisabled={!isPossible}
          onPress={() => runCommand(command)}
          aria-describedby={problemCount > 0 ? 'problem-count' : undefined}
        >
          {isFirst ? 'Estimate' : 'Estimate again'}
          <kbd className={css.keys}>{keysOf(command)}</kbd>
        </Button>
      )}
    </>
  );
}
