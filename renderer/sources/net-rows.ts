import type { Net } from '../../app/board/board.ts';
import { matchNames } from '../../app/board/net-pattern.ts';
import { type Proposal, proposeNet } from '../../app/board/propose-nets.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';

export interface NetRow {
  readonly name: string;
  readonly lengthM: number;
  readonly pinCount: number;
  readonly proposal: Proposal | undefined;
  /** Waveforms of its drivers; empty: not driven. */
  readonly waveforms: readonly string[];
  readonly loadCount: number;
}

export type NetFilter = 'all' | 'driven' | 'proposed';

const lengthOf = ({ traces }: Net): number =>
  traces.reduce(
    (sum, { pointsM }) =>
      sum +
      pointsM.slice(1).reduce((part, [xM, yM], i) => part + Math.hypot(xM - pointsM[i]![0], yM - pointsM[i]![1]), 0),
    0,
  );

/** Nets with copper: driven ones first, then those whose names suggest that they switch, then by length. */
export function netRows(nets: readonly Net[], sources: SourcesPart): NetRow[] {
  const waveforms = new Map<string, string[]>();
  for (const { net, waveform } of sources.drives ?? []) waveforms.set(net, [...(waveforms.get(net) ?? []), waveform]);
  const loads = new Map<string, number>();
  for (const { net } of sources.loads ?? []) loads.set(net, (loads.get(net) ?? 0) + 1);
  const rank = (row: NetRow) => (row.waveforms.length > 0 ? 0 : row.proposal === undefined ? 2 : 1);
  return nets
    .filter(({ traces }) => traces.length > 0)
    .map(
      (net): NetRow => ({
        name: net.name,
        lengthM: lengthOf(net),
        pinCount: net.pins.length,
        proposal: proposeNet(net),
        waveforms: waveforms.get(net.name) ?? [],
        loadCount: loads.get(net.name) ?? 0,
      }),
    )
    .sort((one, other) => rank(one) - rank(other) || other.lengthM - one.lengthM);
}

/** Rows whose name holds the text, or fits it as a pattern with `*`. */
export function filterRows(rows: readonly NetRow[], text: string, filter: NetFilter): NetRow[] {
  const wanted = text.trim();
  const fitting = wanted.includes('*')
    ? new Set(
        matchNames(
          wanted,
          rows.map(({ name }) => name),
        ),
      )
    : null;
  const part = wanted.toLowerCase();
  return rows.filter(
    ({ name, waveforms, proposal }) =>
      (fitting === null ? name.toLowerCase().includes(part) : fitting.has(name)) &&
      (filter !== 'driven' || waveforms.length > 0) &&
      (filter !== 'proposed' || (proposal !== undefined && waveforms.length === 0)),
  );
}
