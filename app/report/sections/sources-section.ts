import type { Board } from '../../board/board.ts';
import { type Block, heading, name, note, type Section, type Text, table } from '../blocks.ts';
import { quantityText } from '../format.ts';
import { cableLengthText, commonModeText, farEndText, loopText, seriesText, waveformText } from '../source-text.ts';

/** Rows of one table before it stops: a board may have a thousand drives. */
const MOST_ROWS = 120;
const CHOSEN = 'chosen by the program';

type Heads = readonly (readonly [head: string, width: number])[];

/** What drives the board: waveforms, drives, loads, loops, cables. */
export function sourcesSection(board: Board, mostRows = MOST_ROWS): Section {
  const listed = <Row>(title: string, heads: Heads, rows: readonly Row[], cells: (row: Row) => Text[]): Block[] =>
    sourceTable(title, heads, rows, cells, mostRows);
  return {
    title: 'Sources',
    blocks: [
      ...listed('Waveforms', WAVEFORM_HEADS, board.waveforms, (waveform) => [
        name(waveform.name, 30),
        waveformText(waveform),
        waveform.clockDomain !== undefined
          ? name(waveform.clockDomain, 30)
          : waveform.kind === 'random-data'
            ? 'each drive its own'
            : 'its own',
      ]),
      ...listed('Drives', DRIVE_HEADS, board.drives, (drive) => [
        name(drive.net, 30),
        name(drive.pin, 24),
        name(drive.waveform, 24),
        quantityText(drive.sourceOhm, 'Ω'),
        quantityText(drive.seriesOhm, 'Ω'),
        quantityText(drive.delayS, 's'),
        [drive.isInverted && 'inverted', drive.isPinChosen && `pin ${CHOSEN}`]
          .filter((part) => part !== false)
          .join(', '),
      ]),
      ...listed('Loads', LOAD_HEADS, board.loads, (load) => [
        name(load.net, 30),
        name(load.pin, 24),
        load.resistanceOhm === undefined ? 'open' : quantityText(load.resistanceOhm, 'Ω'),
        quantityText(load.capacitanceF, 'F'),
        load.isPinChosen && `pin ${CHOSEN}`,
      ]),
      ...listed('Current loops', LOOP_HEADS, board.loops, (loop) => [
        name(loop.name, 30),
        loopText(loop.pointsM),
        name(loop.waveform, 24),
        quantityText(loop.delayS, 's'),
        loop.isInverted && 'inverted',
      ]),
      ...listed('Cables', CABLE_HEADS, board.cables, (cable) => [
        name(cable.name, 30),
        cableLengthText(cable.pointsM),
        quantityText(cable.radiusM, 'm'),
        farEndText(cable.farEnd),
        seriesText(cable),
        commonModeText(cable),
      ]),
    ],
  };
}

const WAVEFORM_HEADS: Heads = [
  ['Name', 20],
  ['Shape', 60],
  ['Clock domain', 20],
];
const DRIVE_HEADS: Heads = [
  ['Net', 22],
  ['Pin', 12],
  ['Waveform', 18],
  ['Source', 10],
  ['Series', 10],
  ['Delay', 10],
  ['', 18],
];
const LOAD_HEADS: Heads = [
  ['Net', 22],
  ['Pin', 12],
  ['Resistance', 14],
  ['Capacitance', 14],
  ['', 38],
];
const LOOP_HEADS: Heads = [
  ['Name', 22],
  ['Size', 36],
  ['Waveform', 20],
  ['Delay', 10],
  ['', 12],
];
const CABLE_HEADS: Heads = [
  ['Name', 20],
  ['Length', 10],
  ['Radius', 10],
  ['Far end', 18],
  ['At the connector', 20],
  ['Common-mode current', 22],
];

function sourceTable<Row>(
  title: string,
  heads: Heads,
  rows: readonly Row[],
  cells: (row: Row) => Text[],
  mostRows: number,
): Block[] {
  if (rows.length === 0) return [note(`${title}: none.`)];
  const left = rows.length - mostRows;
  const columns = heads.map(([head, width]) => ({ head, width }));
  return [
    heading(title),
    table(columns, rows.slice(0, mostRows).map(cells)),
    ...(left > 0 ? [note(`${left} more in the board file.`)] : []),
  ];
}
