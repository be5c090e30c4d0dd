/**
 * Debian's nec2c (NEC-2, a thin-wire moment-method solver) as a reference. Time factor e^(+jωt); voltages, currents and
 * fields are peak phasors (power = ½ Re V I*): test/support/nec2c.test.ts checks both against closed forms.
 * Accuracy: five printed digits; the model itself is as good as its segmentation, so double the segments and compare.
 */
import { execFile, spawnSync } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { type NecDeck, necDeckText } from './nec2c-deck.ts';
import { type NecComplex, type NecFrequencyResult, parseNecOutput } from './nec2c-output.ts';

export {
  type NecDeck,
  type NecGrid,
  type NecPointM,
  type NecWire,
  necColumn,
  necPoint,
} from './nec2c-deck.ts';
export type { NecComplex, NecFrequencyResult } from './nec2c-output.ts';

const run = promisify(execFile);

/** Whether the solver can be started. */
export const hasNec2c = (): boolean => spawnSync('nec2c', ['-v']).error === undefined;

/** Solves the deck in a directory of its own. One result a frequency, in the deck's order. */
export async function runNec2c(deck: NecDeck): Promise<NecFrequencyResult[]> {
  const text = necDeckText(deck);
  const directory = await mkdtemp(join(tmpdir(), 'quietboard-nec-'));
  try {
    const input = join(directory, 'model.nec');
    const output = join(directory, 'model.out');
    await writeFile(input, text);
    try {
      await run('nec2c', [`-i${input}`, `-o${output}`]);
    } catch (cause) {
      throw await explain(cause, output);
    }
    return parseNecOutput(await readFile(output, 'utf8'), deck);
  } finally {
    await rm(directory, { recursive: true, force: true });
  }
}

async function explain(cause: unknown, output: string): Promise<Error> {
  if ((cause as NodeJS.ErrnoException).code === 'ENOENT') {
    return new Error('nec2c is not installed (Debian package nec2c)', { cause });
  }
  const listing = await readFile(output, 'utf8').catch(() => '(no listing)');
  return new Error(`nec2c refused the model:\n${listing.slice(-2000)}`, { cause });
}

/** Current in a segment (counted from 1 within its tag); positive towards the wire's `toM`. */
export function necCurrentA(result: NecFrequencyResult, tag: number, segment: number): NecComplex {
  const found = result.currents.find((current) => current.tag === tag && current.segment === segment);
  if (found === undefined) throw new Error(`the NEC model has no segment ${segment} of tag ${tag}`);
  return found.currentA;
}
