import type { ReactElement } from 'react';
import { Button } from '../components/button.tsx';
import { ErrorNotice, InfoNotice } from '../components/notes.tsx';
import { Progress } from '../components/progress.tsx';
import { useIsOutdated, useJob, useProblems } from '../state/hooks.ts';
import { stopJob } from '../state/jobs.ts';
import { attempt } from '../state/notices.ts';
import { estimate } from '../state/result.ts';
import { prepare, useLevers } from './follow.ts';

/** How the quick answers stand: being prepared, not wanted, failed, or unable to tell about the present document. */
export function PreparedNotice(): ReactElement | null {
  const job = useJob('levers');
  const estimateJob = useJob('estimate');
  const isOutdated = useIsOutdated();
  const problems = useProblems();
  const { prepared, needsSolve, failure } = useLevers();
  if (problems.length > 0) return <ErrorNotice title="This cannot be estimated">{problems[0]!.text}</ErrorNotice>;
  if (estimateJob !== undefined) {
    const { stage, done, total, isStopping, id } = estimateJob;
    return <Progress label={stage} done={done} total={total} isStopping={isStopping} onStop={() => stop(id)} />;
  }
  if (job !== undefined) {
    const { stage, done, total, isStopping, id } = job;
    return <Progress label={stage} done={done} total={total} isStopping={isStopping} onStop={() => stop(id)} />;
  }
  if (failure?.kind === 'failed') {
    return (
      <ErrorNotice
        title={prepared === null ? 'The levers could not be prepared' : 'This change has no quick answer'}
        actions={prepared === null && <Button onPress={() => void prepare()}>Prepare again</Button>}
      >
        {failure.message}
      </ErrorNotice>
    );
  }
  if (needsSolve !== null && isOutdated) {
    return (
      <InfoNotice
        title="This change needs to be estimated again"
        actions={
          <Button look="primary" onPress={() => void attempt('Estimate', () => estimate())}>
            Estimate the change
          </Button>
        }
      >
        {needsSolve.reason[0]!.toUpperCase() + needsSolve.reason.slice(1)}.
      </InfoNotice>
    );
  }
  if (prepared === null) {
    return (
      <InfoNotice
        title="The quick levers are not prepared"
        actions={<Button onPress={() => void prepare()}>Prepare</Button>}
      >
        What stays the same while a driver changes is solved once; every change is then answered at once.
      </InfoNotice>
    );
  }
  return null;
}

const stop = (id: string): void => void attempt('Stop', () => stopJob(id));
