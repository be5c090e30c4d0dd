import type { Command } from 'commander';
import { type NetSummary, summarizeNets } from '../../../app/board/net-summary.ts';
import { csvText } from '../../../app/report/csv-text.ts';
import { fixed } from '../../../app/report/format.ts';
import { mToMm } from '../../../app/units/convert.ts';
import { jsonText } from '../../files/json-text.ts';
import { loadBoard } from '../../files/load-board.ts';
import { table } from '../columns.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';

interface NetsOptions {
  readonly sources?: string;
  readonly json?: string;
  readonly csv?: string;
}

const HELP = `
Columns: length of all traces, vias, layers with traces, planes that carry the
return (none: the net needs a "returnPath"), drive, pins. Signals come first,
the longest on top; nets with a plane (ground, supplies) come last.

A sources file to start from (save as board.sources.json and put in net and pin
names of the list):
  { "format": "quietboard-sources", "version": 1,
    "waveforms": [
      { "name": "clk", "kind": "trapezoid", "frequencyMhz": 25,
        "lowV": 0, "highV": 3.3, "riseNs": 1, "fallNs": 1 },
      { "name": "bus", "kind": "random-data", "bitRateMbps": 50,
        "lowV": 0, "highV": 3.3, "riseNs": 1, "fallNs": 1 }],
    "drives": [
      { "net": "CLK", "pin": "U1.3", "waveform": "clk", "sourceOhm": 25 },
      { "net": "DATA*", "waveform": "bus", "sourceOhm": 25 }],
    "loads": [
      { "net": "*", "capacitancePf": 5 }] }
In net names * stands for any characters; it passes over nets with a plane,
nets named in full and, for loads, nets that nothing drives. A pin that is left
out is chosen and reported.

Examples:
  quietboard nets layout.xml
  quietboard nets my.board.json --sources my.sources.json
  quietboard nets my.board.json --csv nets.csv
`;

export function addNets(program: Command): void {
  program
    .command('nets')
    .summary('the nets: what one needs to write the sources')
    .description('Lists the nets of a board with length, layers, pins, drive and reference planes.')
    .argument('<board>', 'board file, or a layout in an open format')
    .option('--sources <file>', 'sources file: waveforms, drives, loads, loops, cables')
    .option('--json <file>', 'write the list as JSON; - for standard output')
    .option('--csv <file>', 'write the list as CSV')
    .addHelpText('after', HELP)
    .action(runNets);
}

async function runNets(file: string, options: NetsOptions): Promise<void> {
  await checkOutputs({ '--json': options.json, '--csv': options.csv }, [file, options.sources]);
  const { board } = await loadBoard(file, options.sources);
  const nets = summarizeNets(board);
  await writeOutput(options.csv, () => csvText([CSV_HEAD, ...nets.map(csvRow)]));
  await writeOutput(options.json, () => jsonText({ nets: nets.map(jsonRow) }));
  if (options.json !== STDOUT) process.stdout.write(`${netLines(nets, outputWidth()).join('\n')}\n`);
}

const netLines = (nets: readonly NetSummary[], width: number): string[] =>
  table(
    nets,
    [
      { head: 'net', text: (net) => net.name, minWidth: 10 },
      { head: 'mm', text: (net) => fixed(mToMm(net.lengthM), 1), align: 'right' },
      { head: 'vias', text: (net) => `${net.viaCount}`, align: 'right' },
      { head: 'layers', text: (net) => net.layers, minWidth: 6 },
      { head: 'return', text: returnText, minWidth: 6 },
      { head: 'drive', text: (net) => net.drives.map((drive) => drive.waveform), minWidth: 5 },
      { head: 'pins', text: (net) => net.pins.map((pin) => pin.name), minWidth: 10 },
    ],
    width,
  );

function returnText(net: NetSummary): string | string[] {
  if (net.references.length > 0) return [...new Set(net.references.map(({ layer }) => layer))];
  if (net.hasReturnPath) return 'own path';
  return net.hasPlane || net.lengthM === 0 ? '' : 'none';
}

const CSV_HEAD = [
  'net',
  'length (mm)',
  'vias',
  'layers',
  'return planes',
  'without plane (mm)',
  'drives',
  'loads',
  'pins',
  'has plane',
];

const csvRow = (net: NetSummary): (string | number)[] => [
  net.name,
  mToMm(net.lengthM),
  net.viaCount,
  net.layers.join(' '),
  net.references.map((plane) => `${plane.layer}:${plane.net}`).join(' '),
  mToMm(net.withoutReferenceM),
  net.drives.map((drive) => `${drive.pin}:${drive.waveform}`).join(' '),
  net.loads.map((load) => load.pin).join(' '),
  net.pins.map((pin) => pin.name).join(' '),
  net.hasPlane ? 'yes' : 'no',
];

const jsonRow = (net: NetSummary) => ({
  name: net.name,
  lengthMm: mToMm(net.lengthM),
  layers: net.layers,
  vias: net.viaCount,
  pins: net.pins.map(({ name, layer, atM }) => ({ name, layer, atMm: atM.map(mToMm) })),
  drives: net.drives.map(({ pin, waveform, isPinChosen }) => ({ pin, waveform, isPinChosen })),
  loads: net.loads.map(({ pin, isPinChosen }) => ({ pin, isPinChosen })),
  references: net.references.map(({ layer, net: planeNet, lengthM }) => ({
    layer,
    net: planeNet,
    lengthMm: mToMm(lengthM),
  })),
  withoutReferenceMm: mToMm(net.withoutReferenceM),
  hasReturnPath: net.hasReturnPath,
  hasPlane: net.hasPlane,
});
