import type { Received } from '../../app/contract/procedures.ts';
import type { AppState } from '../state/app-state.ts';
import type { Bases } from './bases.ts';
import type { EventBus } from './event-bus.ts';
import type { KeptLevers } from './kept-levers.ts';
import type { OpenProjects } from './open-projects.ts';
import type { RunningJobs } from './running-jobs.ts';
import type { Uploads } from './uploads.ts';

/** The system's own dialogs, where a host has them. null: the user backed out. */
export interface Dialogs {
  openProject(): Promise<string | null>;
  saveProject(name: string): Promise<string | null>;
  saveFile(name: string): Promise<string | null>;
}

/** The window's commands, as a system's menu shows them. */
export type MenuCommands = Received<'window.menu'>['commands'];

/** What the handlers work on: one for each host. */
export interface HostContext {
  readonly kind: 'window' | 'loopback';
  readonly version: string;
  readonly dialogs: Dialogs | null;
  /** null: the host has no menu of its own. */
  readonly showMenu: ((commands: MenuCommands) => void) | null;
  /** Where projects stand that were given no place. */
  readonly projectsFolder: string;
  readonly state: AppState;
  readonly events: EventBus;
  readonly projects: OpenProjects;
  readonly bases: Bases;
  readonly uploads: Uploads;
  readonly jobs: RunningJobs;
  readonly levers: KeptLevers;
  /** Given with the command; opened once. */
  readonly startFile: string | null;
}
