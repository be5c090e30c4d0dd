import type { Board } from '../../app/board/board.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { sampleResult } from './sample-result.ts';
import { sampleResultBoard } from './sample-result-board.ts';

/** Names a file may carry to break out of a page, a terminal or a spreadsheet. */
export const HOSTILE_NAMES: readonly string[] = [
  '</text></svg><script>alert(1)</script>',
  '"><img src=x onerror=alert(1)>',
  "' onload='alert(1)",
  ']]><![CDATA[<b>&amp;&lt;',
  '\u202egnp\u2066.exe\u2069',
  '\x1b[2J\x1b]0;title\x07\r\n',
  '=HYPERLINK("http://x.invalid","y")',
  '@SUM(1+1),2',
  '__proto__',
  'N'.repeat(10_000),
  '\u0301'.repeat(3_000),
  '</style><style>*{display:none}',
  '-->\ud800<!--',
];

const nameAt = (i: number): string => HOSTILE_NAMES[i % HOSTILE_NAMES.length]!;

/** The sample with every text a file may supply replaced by a hostile one. */
export function hostileResult(): EstimateResult {
  const sample = sampleResult();
  const all = HOSTILE_NAMES.join(' ');
  return {
    ...sample,
    board: { name: all, revision: nameAt(1), sha256: nameAt(0) },
    program: { version: nameAt(5) },
    limit: { ...sample.limit, edition: nameAt(4), source: nameAt(5), maxRule: nameAt(3), conversion: nameAt(12) },
    points: sample.points.map((point, p) => ({
      ...point,
      contributors: point.contributors.map((contributor, c) => ({
        ...contributor,
        name: nameAt(p + c),
        viaDbuvPerM: Object.fromEntries(
          Object.values(contributor.viaDbuvPerM).map((levelDbuvPerM, v) => [nameAt(p + c + v + 1), levelDbuvPerM]),
        ),
      })),
    })),
    caveats: HOSTILE_NAMES.map((name) => ({ code: name, message: name, where: name, fromHz: 0, toHz: 0 })),
    findings: HOSTILE_NAMES.map((name, i) => ({
      code: 'plane-gap',
      net: name,
      message: name,
      layer: name,
      atM: [0.01 * (i % 7), 0.005 * i],
    })),
    notes: HOSTILE_NAMES,
    currentMaps: sample.currentMaps!.map((map, m) => ({
      ...map,
      cables: HOSTILE_NAMES.map((name, i) => ({ ...map.cables[(i + m) % map.cables.length]!, name })),
    })),
  };
}

export function hostileBoard(): Board {
  const board = sampleResultBoard();
  const renamed = <Item extends { readonly name: string }>(items: readonly Item[], shift: number): Item[] =>
    items.map((item, i) => ({ ...item, name: nameAt(i + shift) }));
  return {
    ...board,
    name: HOSTILE_NAMES.join(''),
    notes: HOSTILE_NAMES.join('\n'),
    stackup: renamed(board.stackup, 0),
    nets: board.nets.map((net, i) => ({ ...net, name: nameAt(i), pins: renamed(net.pins, i) })),
    waveforms: renamed(board.waveforms, 3),
    drives: board.drives.map((drive, i) => ({ ...drive, net: nameAt(i), pin: nameAt(i), waveform: nameAt(i) })),
    loads: board.loads.map((load, i) => ({ ...load, net: nameAt(i), pin: nameAt(i + 1) })),
    loops: board.loops.map((loop, i) => ({ ...loop, name: nameAt(i), waveform: nameAt(i + 4) })),
    cables: renamed(board.cables, 5),
  };
}
