import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { code, type Fact, name, type Text } from '../blocks.ts';
import { trimmed } from '../format.ts';
import type { ReportTitle } from '../report-title.ts';
import { limitName } from '../verdict.ts';

export const REPORT_TITLE = 'Estimate of radiated emission';

/** Title block: what was judged, against what, by which program. `dateText` only when the caller has a date. */
export function titleFacts(result: EstimateResult, board: Board, dateText: string | undefined): Fact[] {
  const { site, limit } = result;
  return [
    { term: 'Board', value: name(result.board.name, 80) },
    { term: 'Revision', value: result.board.revision === '' ? '—' : name(result.board.revision) },
    { term: 'Limit', value: limitName(result) },
    { term: 'Required margin', value: `${trimmed(limit.requiredMarginDb, 1)} dB` },
    {
      term: 'Site',
      value: `${site.kind === 'ground-plane' ? 'ground plane' : 'free space'}, board ${site.orientation}`,
    },
    { term: 'Structure', value: result.structure === 'solved' ? 'planes and cables solved' : 'trace pairs only' },
    { term: 'Program', value: `quietboard ${result.program.version}`, isWide: dateText === undefined },
    ...(dateText === undefined ? [] : [{ term: 'Date', value: dateText }]),
    { term: 'Board file', value: code(`sha256 ${result.board.sha256.slice(0, 64)}`), isWide: true },
    ...(board.notes === '' ? [] : [{ term: 'Board notes', value: name(board.notes, 300), isWide: true }]),
  ];
}

/** The same for a printed report, which belongs to a project and has an author, a date, perhaps a run's number. */
export const runTitleFacts = (result: EstimateResult, board: Board, title: ReportTitle): Fact[] => [
  { term: 'Project', value: said(title.project, 60) },
  { term: 'Run', value: title.runNumber === null ? 'not stored' : String(title.runNumber) },
  { term: 'Author', value: said(title.author, 60) },
  { term: 'Date', value: said(title.dateText, 40) },
  ...titleFacts(result, board, undefined),
  ...noteFact(title),
];

/** Whose report it is, for those about several runs. */
export const projectFacts = (title: ReportTitle): Fact[] => [
  { term: 'Project', value: said(title.project, 60) },
  { term: 'Author', value: said(title.author, 60) },
  { term: 'Date', value: said(title.dateText, 40) },
  ...noteFact(title),
];

const said = (text: string, length: number): Text => (text === '' ? '—' : name(text, length));

const noteFact = ({ note }: ReportTitle): Fact[] =>
  note === '' ? [] : [{ term: 'Note', value: name(note, 300), isWide: true }];
