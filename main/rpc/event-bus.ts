import type { EventName, EventOf } from '../../app/contract/events.ts';
import type { DeepReadonly } from '../../app/contract/procedures.ts';

export type EventListener = (name: EventName, payload: unknown) => void;

/** What the host tells all its windows. */
export class EventBus {
  readonly #listeners = new Set<EventListener>();

  publish<N extends EventName>(name: N, payload: DeepReadonly<EventOf<N>>): void {
    for (const listener of this.#listeners) listener(name, payload);
  }

  /** The returned function ends it. */
  subscribe(listener: EventListener): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }
}
