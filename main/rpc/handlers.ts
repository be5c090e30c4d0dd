import type { Handlers } from '../../app/contract/procedures.ts';
import type { HostContext } from './context.ts';
import { appHandlers } from './handlers/app.ts';
import { boardHandlers } from './handlers/board.ts';
import { dialogHandlers } from './handlers/dialog.ts';
import { draftHandlers } from './handlers/draft.ts';
import { estimateHandlers } from './handlers/estimate.ts';
import { leverHandlers } from './handlers/levers.ts';
import { measurementHandlers } from './handlers/measurements.ts';
import { projectHandlers } from './handlers/project.ts';
import { reportHandlers } from './handlers/reports.ts';
import { runHandlers } from './handlers/runs.ts';

/** A procedure without a handler does not compile. */
export const createHandlers = (context: HostContext): Handlers => ({
  ...appHandlers(context),
  ...projectHandlers(context),
  ...dialogHandlers(context),
  ...boardHandlers(context),
  ...draftHandlers(context),
  ...estimateHandlers(context),
  ...leverHandlers(context),
  ...runHandlers(context),
  ...measurementHandlers(context),
  ...reportHandlers(context),
});
