import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { trimmed } from '../format.ts';
import { type Markup, markup, nameMarkup } from '../markup.ts';
import { limitName } from '../verdict.ts';

/** Title block: what was judged, against what, by which program. `dateText` only when the caller has a date. */
export function titleSection(result: EstimateResult, board: Board, dateText: string | undefined): Markup {
  const { site, limit } = result;
  const facts: readonly (readonly [term: string, value: Markup | string, width?: 'wide' | undefined])[] = [
    ['Board', nameMarkup(result.board.name, 80)],
    ['Revision', result.board.revision === '' ? '—' : nameMarkup(result.board.revision)],
    ['Limit', limitName(result)],
    ['Required margin', `${trimmed(limit.requiredMarginDb, 1)} dB`],
    ['Site', `${site.kind === 'ground-plane' ? 'ground plane' : 'free space'}, board ${site.orientation}`],
    ['Structure', result.structure === 'solved' ? 'planes and cables solved' : 'trace pairs only'],
    ['Program', `quietboard ${result.program.version}`, dateText === undefined ? 'wide' : undefined],
    ...(dateText === undefined ? [] : [['Date', dateText] as const]),
    ['Board file', markup`<span class="code">sha256 ${result.board.sha256.slice(0, 64)}</span>`, 'wide'],
    ...(board.notes === '' ? [] : [['Board notes', nameMarkup(board.notes, 300), 'wide'] as const]),
  ];
  return markup`<header><h1>Estimate of radiated emission</h1>
<dl class="facts">${facts.map(([term, value, width]) => markup`<div class="${width ?? 'half'}"><dt>${term}</dt><dd>${value}</dd></div>`)}</dl></header>`;
}
