import { join } from 'node:path';
import { programVersion } from '../cli/version.ts';
import { AppState } from '../state/app-state.ts';
import { FailureLog } from '../state/failure-log.ts';
import { homeFolder, makeFolder } from '../state/home.ts';
import { Bases } from './bases.ts';
import type { Dialogs, HostContext, MenuCommands } from './context.ts';
import { createDispatch, type Dispatch } from './dispatch.ts';
import { EventBus } from './event-bus.ts';
import { createHandlers } from './handlers.ts';
import { KeptLevers } from './kept-levers.ts';
import { OpenProjects } from './open-projects.ts';
import { RunningJobs } from './running-jobs.ts';
import { Uploads } from './uploads.ts';

export interface HostOptions {
  readonly kind: 'window' | 'loopback';
  readonly dialogs?: Dialogs;
  readonly showMenu?: (commands: MenuCommands) => void;
  /** Project to show first. */
  readonly startFile?: string;
}

/** All that stands behind the windows of one program, whatever carries their calls. */
export interface Host {
  readonly dispatch: Dispatch;
  readonly events: EventBus;
  /** What the program remembers beside its projects. */
  readonly state: AppState;
  /** Ends a job whose caller went away. */
  stopJob(jobId: string): void;
  /** Whether long work is under way. */
  isBusy(): boolean;
  /** Keeps an unexpected failure; answers with its number. */
  logFailure(where: string, error: unknown): number;
  /** Stops jobs, closes projects, removes uploads. */
  close(): Promise<void>;
}

export function createHost(options: HostOptions): Host {
  const home = makeFolder(homeFolder());
  const events = new EventBus();
  const log = new FailureLog(home);
  const context: HostContext = {
    kind: options.kind,
    version: programVersion(),
    dialogs: options.dialogs ?? null,
    showMenu: options.showMenu ?? null,
    projectsFolder: join(home, 'projects'),
    state: new AppState(home),
    events,
    projects: new OpenProjects(events),
    bases: new Bases(),
    uploads: new Uploads(),
    jobs: new RunningJobs(events),
    levers: new KeptLevers(),
    startFile: options.startFile ?? null,
  };
  const logFailure = (where: string, error: unknown) => log.add(where, error);
  return {
    dispatch: createDispatch(createHandlers(context), logFailure),
    events,
    state: context.state,
    stopJob: (jobId) => void context.jobs.stop(jobId),
    isBusy: () => context.jobs.count > 0,
    logFailure,
    close: async () => {
      await context.jobs.stopAll();
      context.levers.releaseAll();
      context.projects.closeAll();
      await context.uploads.removeAll();
      await context.state.settled();
    },
  };
}
