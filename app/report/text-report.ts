import type { EstimateResult } from '../estimate/result.ts';
import { CAUTIONS_SHORT, DEFERENCE } from './cautions.ts';
import { byCode, groupCaveats } from './caveat-groups.ts';
import { countText, fixed, frequencyText, levelText, placeText, rangeText, trimmed } from './format.ts';
import { radiationOf } from './radiation.ts';
import { bandsText, unsolvedText } from './rules-text.ts';
import { rulingBands } from './ruling-bands.ts';
import { safeTerminalText, terminalWidth, visibleText } from './safe-text.ts';
import { pointTable, TABLE_UNITS } from './text-table.ts';
import { limitName, readingsText, standingsText, verdictText, worstText } from './verdict.ts';
import { padEnd, wrapText } from './wrap.ts';

export interface TextReportOptions {
  /** Rows of the table of worst lines. */
  readonly top: number;
  /** Columns of the terminal; more than 80 are not used, less than 40 are not respected. */
  readonly width: number;
}

/** Places named per caveat, findings listed: the rest is counted. */
const PLACES_SHOWN = 4;
const FINDINGS_SHOWN = 8;
/** Bands of the spectrum named. */
const BANDS_SHOWN = 5;
const NAME_WIDTH = 24;

/** The result for a terminal: at most 80 columns, no control characters, rounded to 0.1 dB. Ends with a line feed. */
export function textReport(result: EstimateResult, options: TextReportOptions): string {
  const width = Math.min(80, Math.max(40, options.width));
  const sections = [
    headline(result, width),
    setup(result, width),
    table(result, options.top, width),
    caveats(result, width),
    findings(result, width),
    notes(result, width),
    closing(width),
  ];
  return `${sections
    .filter((lines) => lines.length > 0)
    .map((lines) => lines.join('\n'))
    .join('\n\n')}\n`;
}

function headline(result: EstimateResult, width: number): string[] {
  const { name, revision } = result.board;
  const program = `quietboard ${safeTerminalText(result.program.version, 12)}`;
  const room = width - terminalWidth(program) - 2;
  const title = safeTerminalText(revision === '' ? name : `${name}, revision ${revision}`, room);
  return [
    `${padEnd(title, room)}  ${program}`,
    ...wrapText(visibleText(`${limitName(result)}: ${verdictText(result)}`), width),
    ...wrapText(worstText(result), width),
  ];
}

function setup({ site, limit, structure }: EstimateResult, width: number): string[] {
  const ground = site.kind === 'ground-plane' ? 'ground plane' : 'free space';
  const from =
    site.measuredFrom === 'boundary'
      ? `the boundary (radius ${fixed(site.boundaryRadiusM, 2)} m)`
      : 'the turntable axis';
  const place = `${ground}, ${trimmed(site.distanceM, 2)} m from ${from}, board ${site.orientation} at ${trimmed(site.tableHeightM, 2)} m; planes and cables ${structure === 'solved' ? 'solved' : 'not solved (pair only)'}`;
  const line = [
    `${safeTerminalText(limit.edition, 120)} (${safeTerminalText(limit.sourceStatus, 60)})`,
    `to ${frequencyText(limit.maxHz)} (${safeTerminalText(limit.maxRule, 200)})`,
    `required margin ${trimmed(limit.requiredMarginDb, 1)} dB`,
    `laboratory ±${levelText(limit.labUncertaintyDb)} dB`,
    ...(limit.conversion === undefined ? [] : [safeTerminalText(limit.conversion, 200)]),
  ].join('; ');
  return [...labelled('Set-up', place, width), ...labelled('Limit', line, width)];
}

function table(result: EstimateResult, top: number, width: number): string[] {
  if (result.points.length === 0) return [];
  const shown = result.points.slice(0, Math.max(0, top));
  const left = result.points.length - shown.length;
  return [
    ...wrapText(`${readingsText(result.points)}: ${standingsText(result)}.`, width),
    ...rules(result, width),
    ...(shown.length > 0 ? [...wrapText(TABLE_UNITS, width), '', ...pointTable(shown, result, width)] : []),
    ...(left > 0 && shown.length > 0 ? [`${left} more, with larger margins`] : []),
  ];
}

/** Which mechanism is the strongest in which band. */
function rules(result: EstimateResult, width: number): string[] {
  const radiation = radiationOf(result);
  const bands = rulingBands(radiation);
  if (bands.length === 0) return [];
  const unsolved = unsolvedText(radiation);
  const text = bandsText(bands, BANDS_SHOWN, (name) => safeTerminalText(name, NAME_WIDTH));
  return wrapText(`What rules: ${text}${unsolved === '' ? '' : ` (${unsolved})`}`, width, '', '  ');
}

function caveats(result: EstimateResult, width: number): string[] {
  if (result.caveats.length === 0) return ['No caveats.'];
  const groups = groupCaveats(result.caveats, byCode);
  const count = countText(result.caveats.length, 'caveat');
  return [
    groups.length === result.caveats.length ? count : `${count} of ${countText(groups.length, 'kind')}`,
    ...groups.flatMap((group) => {
      const places = group.where.slice(0, PLACES_SHOWN).map((place) => safeTerminalText(place, NAME_WIDTH));
      const more = group.where.length - places.length;
      const where = places.length === 0 ? '' : ` [${places.join(', ')}${more > 0 ? ` and ${more} more` : ''}]`;
      const times = group.count > 1 ? ` ×${group.count}` : '';
      const text = `${safeTerminalText(group.code, 40)}${times}: ${safeTerminalText(group.message, 400)}${where} (${rangeText(group.fromHz, group.toHz)})`;
      return wrapText(text, width, '  - ', '    ');
    }),
  ];
}

function findings(result: EstimateResult, width: number): string[] {
  if (result.findings.length === 0) return [];
  const left = result.findings.length - FINDINGS_SHOWN;
  return [
    countText(result.findings.length, 'finding'),
    ...result.findings.slice(0, FINDINGS_SHOWN).flatMap(({ net, layer, atM, message }) => {
      const place = `${safeTerminalText(net, NAME_WIDTH)} at ${placeText(atM)} mm on ${safeTerminalText(layer, NAME_WIDTH)}`;
      return wrapText(`${place}: ${safeTerminalText(message, 400)}`, width, '  - ', '    ');
    }),
    ...(left > 0 ? [`    and ${left} more`] : []),
  ];
}

function notes(result: EstimateResult, width: number): string[] {
  if (result.notes.length === 0) return [];
  return ['Notes', ...result.notes.flatMap((note) => wrapText(safeTerminalText(note, 400), width, '  - ', '    '))];
}

const closing = (width: number): string[] => [...wrapText(CAUTIONS_SHORT, width), ...wrapText(DEFERENCE, width)];

function labelled(label: string, text: string, width: number): string[] {
  return wrapText(text, width, padEnd(label, 8), ' '.repeat(8));
}
