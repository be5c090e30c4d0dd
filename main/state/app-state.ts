import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { z } from 'zod';
import { writeText } from '../files/write-text.ts';
import { makeFolder } from './home.ts';

const MOST_RECENT = 20;

const recentSchema = z.object({ file: z.string(), name: z.string(), openedAt: z.string() });
export type RecentProject = z.output<typeof recentSchema>;

const stateSchema = z.object({
  recent: z.array(recentSchema).catch([]),
  settings: z.array(z.tuple([z.string(), z.unknown()])).catch([]),
});
type State = z.output<typeof stateSchema>;

/** What the program remembers beside its projects, in one small file. A file that is damaged counts as empty. */
export class AppState {
  readonly #file: string;
  /** Writes go one after another: each reads what the last one wrote. */
  #last: Promise<unknown> = Promise.resolve();

  constructor(folder: string) {
    this.#file = join(makeFolder(folder), 'state.json');
  }

  async recent(): Promise<RecentProject[]> {
    return (await this.#read()).recent;
  }

  /** Puts a project at the head of the list. */
  addRecent(project: RecentProject): Promise<void> {
    return this.#change((state) => ({
      ...state,
      recent: [project, ...state.recent.filter(({ file }) => file !== project.file)].slice(0, MOST_RECENT),
    }));
  }

  removeRecent(file: string): Promise<void> {
    return this.#change((state) => ({ ...state, recent: state.recent.filter((project) => project.file !== file) }));
  }

  /** undefined: never put. */
  async setting(key: string): Promise<unknown> {
    return new Map((await this.#read()).settings).get(key);
  }

  putSetting(key: string, value: unknown): Promise<void> {
    return this.#change((state) => {
      const settings = new Map(state.settings).set(key, value);
      return { ...state, settings: [...settings] };
    });
  }

  /** Resolves once all that was put is written. */
  async settled(): Promise<void> {
    await this.#last;
  }

  #change(change: (state: State) => State): Promise<void> {
    const next = this.#last.then(async () => {
      await writeText(this.#file, `${JSON.stringify(change(await this.#read()), null, 2)}\n`);
    });
    this.#last = next.catch(() => undefined);
    return next;
  }

  async #read(): Promise<State> {
    const text = await readFile(this.#file, 'utf8').catch(() => '{}');
    return stateSchema.parse(parseOrEmpty(text));
  }
}

function parseOrEmpty(text: string): unknown {
  try {
    const json: unknown = JSON.parse(text);
    return typeof json === 'object' && json !== null ? json : {};
  } catch {
    return {};
  }
}
