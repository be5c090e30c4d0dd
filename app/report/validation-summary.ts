import type { Check } from '../validate/check.ts';

/** How the program's own checks came out, by what they look at. */
export interface ValidationSummary {
  readonly programVersion: string;
  readonly groups: readonly ValidationGroup[];
}

export interface ValidationGroup {
  readonly topic: string;
  /** How well the outside values are known, each once, in order of appearance. */
  readonly statuses: readonly Check['sourceStatus'][];
  readonly pass: number;
  readonly fail: number;
  /** Shown beside the program's answer; cannot fail. */
  readonly info: number;
}

/** What the first word of a check's id stands for. */
const TOPICS = new Map([
  ['nsa', 'Normalised site attenuation'],
  ['handbook', 'Handbook formulas and examples of radiation'],
  ['source', 'Spectra of waveforms'],
  ['line', 'Transmission lines: impedance, delay, losses'],
  ['copper', 'Skin effect in copper'],
  ['nec', 'General field solver: thin wires over ground'],
  ['structure', 'General field solver and closed forms: boards with planes and cables'],
  ['limit', 'Limit lines'],
  ['upper', 'Upper frequency of the judged range'],
]);

/** Counts the rows of `quietboard validate` by topic, in their order; a row without a known topic is its own. */
export function summarizeChecks(checks: readonly Check[], programVersion: string): ValidationSummary {
  const groups = new Map<string, { statuses: Set<Check['sourceStatus']> } & Record<Check['status'], number>>();
  for (const { id, sourceStatus, status } of checks) {
    const word = id.split('-')[0]!;
    const topic = TOPICS.get(word) ?? word;
    const group = groups.get(topic) ?? { statuses: new Set(), pass: 0, fail: 0, info: 0 };
    group[status]++;
    group.statuses.add(sourceStatus);
    groups.set(topic, group);
  }
  return {
    programVersion,
    groups: [...groups].map(([topic, { statuses, ...counts }]) => ({ topic, statuses: [...statuses], ...counts })),
  };
}
