import type { Ipc2581Document, Step } from './document.ts';
import type { ShapeContext } from './shapes.ts';

/** Where the parts of one step go while they are read. */
export interface StepContext extends ShapeContext {
  readonly document: Ipc2581Document;
  readonly step: Step;
}
