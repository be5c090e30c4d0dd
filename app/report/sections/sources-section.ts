import type { Board } from '../../board/board.ts';
import { quantityText } from '../format.ts';
import { type Insert, type Markup, markup, nameMarkup } from '../markup.ts';
import { cableLengthText, commonModeText, farEndText, loopText, seriesText, waveformText } from '../source-text.ts';

/** Rows of one table before it stops: a board may have a thousand drives. */
const MOST_ROWS = 120;
const CHOSEN = 'chosen by the program';

/** What drives the board: waveforms, drives, loads, loops, cables. */
export function sourcesSection(board: Board): Markup {
  return markup`<section><h2>Sources</h2>
${table('Waveforms', ['Name', 'Shape', 'Clock domain'], board.waveforms, (waveform) => [
  nameMarkup(waveform.name, 30),
  waveformText(waveform),
  waveform.clockDomain !== undefined
    ? nameMarkup(waveform.clockDomain, 30)
    : waveform.kind === 'random-data'
      ? 'each drive its own'
      : 'its own',
])}
${table('Drives', ['Net', 'Pin', 'Waveform', 'Source', 'Series', 'Delay', ''], board.drives, (drive) => [
  nameMarkup(drive.net, 30),
  nameMarkup(drive.pin, 24),
  nameMarkup(drive.waveform, 24),
  quantityText(drive.sourceOhm, 'Ω'),
  quantityText(drive.seriesOhm, 'Ω'),
  quantityText(drive.delayS, 's'),
  [drive.isInverted && 'inverted', drive.isPinChosen && `pin ${CHOSEN}`].filter((part) => part !== false).join(', '),
])}
${table('Loads', ['Net', 'Pin', 'Resistance', 'Capacitance', ''], board.loads, (load) => [
  nameMarkup(load.net, 30),
  nameMarkup(load.pin, 24),
  load.resistanceOhm === undefined ? 'open' : quantityText(load.resistanceOhm, 'Ω'),
  quantityText(load.capacitanceF, 'F'),
  load.isPinChosen && `pin ${CHOSEN}`,
])}
${table('Current loops', ['Name', 'Size', 'Waveform', 'Delay', ''], board.loops, (loop) => [
  nameMarkup(loop.name, 30),
  loopText(loop.pointsM),
  nameMarkup(loop.waveform, 24),
  quantityText(loop.delayS, 's'),
  loop.isInverted && 'inverted',
])}
${table(
  'Cables',
  ['Name', 'Length', 'Radius', 'Far end', 'At the connector', 'Common-mode current'],
  board.cables,
  (cable) => [
    nameMarkup(cable.name, 30),
    cableLengthText(cable.pointsM),
    quantityText(cable.radiusM, 'm'),
    farEndText(cable.farEnd),
    seriesText(cable),
    commonModeText(cable),
  ],
)}</section>`;
}

function table<Row>(
  title: string,
  heads: readonly string[],
  rows: readonly Row[],
  cells: (row: Row) => readonly Insert[],
): Markup {
  if (rows.length === 0) return markup`<p class="note">${title}: none.</p>`;
  const shown = rows.slice(0, MOST_ROWS);
  const left = rows.length - shown.length;
  return markup`<h3>${title}</h3><table><thead><tr>${heads.map((head) => markup`<th>${head}</th>`)}</tr></thead><tbody>${shown.map(
    (row) => markup`<tr>${cells(row).map((cell) => markup`<td>${cell}</td>`)}</tr>`,
  )}</tbody></table>${left > 0 && markup`<p class="note">${left} more in the board file.</p>`}`;
}
