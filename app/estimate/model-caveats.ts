import type { Board } from '../board/board.ts';
import type { Caveat } from '../errors.ts';
import { coarseSlot } from '../structure/cell-grid.ts';
import { largestParts } from '../structure/copper-parts.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { hzToMhz } from '../units/convert.ts';
import type { EstimateRequest } from './estimate-request.ts';
import type { Finding } from './result.ts';
import { type Scene, SOLVED_TO_HZ } from './scene.ts';

/** A trace loop counts as small up to a tenth of a wavelength around. */
const SMALL_LOOP_WAVELENGTHS = 0.1;

/** Everything of the model that does not fit this board, said by name and frequency range (physics 10). */
export function modelCaveats(
  scene: Scene,
  request: EstimateRequest,
  fromHz: number,
  toHz: number,
  findings: readonly Finding[],
  sharedHz: readonly number[],
  roughHz: readonly number[],
): Caveat[] {
  const { board } = scene;
  const everywhere = { fromHz: 0, toHz: 0 };
  const caveats: Caveat[] = [];
  if (request.structure === 'pair-only') {
    caveats.push({
      code: 'structure-not-solved',
      message:
        'traces radiate with their return only: the common-mode current on planes and cables is left out. It rules above a few hundred megahertz and, with a cable attached, from 30 MHz on (tens of dB)',
      where: '',
      ...everywhere,
    });
  }
  if (scene.structure) caveats.push(...structureCaveats(scene, toHz, roughHz));
  caveats.push(...sizeCaveats(scene, toHz), ...cableCaveats(board, scene, fromHz, toHz), ...stackupCaveats(board));
  caveats.push(...lineCaveats(scene, fromHz, toHz), ...undrivenCaveats(board));
  caveats.push(...findingCaveats(findings, scene.structure !== null));
  if (sharedHz.length > 0) {
    caveats.push({
      code: 'several-lines-in-bandwidth',
      message: `${sharedHz.length} lines share the receiver's bandwidth with others: average is their rms sum, peak and quasi-peak their linear sum (an upper bound)`,
      where: '',
      fromHz: sharedHz[0]!,
      toHz: sharedHz.at(-1)!,
    });
  }
  return caveats;
}

/** What the solved planes and cables leave out (physics 11, limits). */
function structureCaveats(scene: Scene, toHz: number, roughHz: readonly number[]): Caveat[] {
  const everywhere = { fromHz: 0, toHz: 0 };
  const caveats: Caveat[] = [
    {
      code: 'structure-idealised',
      message:
        'all planes count as one thin sheet (no resonance between power and ground), cables as straight wires ideally joined to it; enclosure and connectors are absent',
      where: '',
      ...everywhere,
    },
  ];
  if (toHz > SOLVED_TO_HZ) {
    caveats.push({
      code: 'structure-not-solved',
      message: 'above 1 GHz planes and cables are not solved: traces radiate with their return only',
      where: '',
      fromHz: SOLVED_TO_HZ,
      toHz,
    });
  }
  const partCount = largestParts(scene.structure!.mesh.sheet);
  if (partCount > 1) {
    caveats.push({
      code: 'planes-apart',
      message: `the planes fall into ${partCount} parts that no copper joins; capacitors and other parts across the gap are not known: a trace that crosses it radiates here as if nothing joined them`,
      where: '',
      ...everywhere,
    });
  }
  const coarse = coarseSlot(scene.board.planes, scene.structure!.mesh.sheet.grid);
  if (coarse) {
    caveats.push({
      code: 'structure-cells-coarse',
      message: `a slot of ${(coarse.lengthM * 1e3).toFixed(0)} mm in the planes is only ${coarse.cells.toFixed(0)} cells long (ten are wanted): with smaller cells (cellMm) levels may change by more than 0.5 dB, mostly above 400 MHz and where a trace crosses it`,
      where: '',
      ...everywhere,
    });
  }
  const enclosed = [...scene.nets.values()].filter(({ sections }) => sections.some(({ planeCount }) => planeCount > 1));
  if (enclosed.length > 0) {
    caveats.push({
      code: 'pair-between-planes',
      message: 'sections between two planes drive nothing on the structure; where a plane ends they would',
      where: listed(enclosed.map(({ name }) => name)),
      ...everywhere,
    });
  }
  const uncoupled = [...scene.nets.values()].filter(({ coupling }) => coupling === null);
  if (uncoupled.length > 0) {
    caveats.push({
      code: 'named-return-not-coupled',
      message: 'a net with a named return path radiates by itself; it drives no current on planes and cables here',
      where: listed(uncoupled.map(({ name }) => name)),
      ...everywhere,
    });
  }
  if (roughHz.length > 0) {
    caveats.push({
      code: 'structure-interpolation-rough',
      message:
        'the currents of planes and cables are interpolated over frequency with more than 0.1 dB of error in places',
      where: '',
      fromHz: roughHz[0]!,
      toHz: roughHz.at(-1)!,
    });
  }
  return caveats;
}

const listed = (names: readonly string[]): string => names.slice(0, 6).join(', ') + (names.length > 6 ? ', …' : '');

function sizeCaveats(scene: Scene, toHz: number): Caveat[] {
  const caveats: Caveat[] = [];
  const boardM = diagonalM(scene.board);
  const halfWaveHz = Math.max(SPEED_OF_LIGHT_M_PER_S / (2 * boardM), scene.structure ? SOLVED_TO_HZ : 0);
  if (halfWaveHz < toHz) {
    caveats.push({
      code: 'board-larger-than-half-wave',
      message: `the board's diagonal of ${(boardM * 1e3).toFixed(0)} mm is more than half a wave: plane resonances are not in the trace pairs`,
      where: '',
      fromHz: halfWaveHz,
      toHz,
    });
  }
  for (const { name, perimeterM } of scene.loops.values()) {
    const fromHz = (SMALL_LOOP_WAVELENGTHS * SPEED_OF_LIGHT_M_PER_S) / perimeterM;
    if (fromHz < toHz) {
      caveats.push({
        code: 'loop-not-small',
        message: 'the loop is longer than a tenth of a wave around: one current all the way is no longer right',
        where: `loop ${name}`,
        fromHz,
        toHz,
      });
    }
  }
  return caveats;
}

function diagonalM(board: Board): number {
  const xs = board.outlineM.flatMap((ring) => ring.map(([x]) => x));
  const ys = board.outlineM.flatMap((ring) => ring.map(([, y]) => y));
  const span = (values: readonly number[]) =>
    values.reduce((a, b) => Math.max(a, b)) - values.reduce((a, b) => Math.min(a, b));
  return Math.hypot(span(xs), span(ys));
}

/** References that name a connector by common practice: J, P, X, CN, CON, K with a number. */
const CONNECTOR_PIN = /^(J|P|X|CN|CON|USB|K)\d+\b/i;

function cableCaveats(board: Board, scene: Scene, fromHz: number, toHz: number): Caveat[] {
  const connectors = new Set(
    board.nets.flatMap(({ pins }) =>
      pins.map(({ name }) => name.split('.')[0]!).filter((ref) => CONNECTOR_PIN.test(ref)),
    ),
  );
  if (board.cables.length === 0) {
    if (connectors.size === 0) return [];
    return [
      {
        code: 'no-cable-modelled',
        message: `the board seems to have connectors (${[...connectors].slice(0, 5).join(', ')}) but no cable is modelled: cables usually decide`,
        where: '',
        fromHz: 0,
        toHz: 0,
      },
    ];
  }
  const caveats: Caveat[] = board.cables
    .filter(({ commonModeRms }) => commonModeRms === undefined && scene.structure === null)
    .map(({ name }) => ({
      code: 'cable-not-solved',
      message: 'no current is stated for this cable and planes and cables are not solved: it radiates nothing here',
      where: `cable ${name}`,
      fromHz: 0,
      toHz: 0,
    }));
  for (const { name, table } of scene.cables) {
    const lowHz = table[0]!.frequencyHz;
    const highHz = table.at(-1)!.frequencyHz;
    if (lowHz > fromHz * 1.001 || highHz < toHz / 1.001) {
      caveats.push({
        code: 'cable-current-range',
        message: `its current is stated from ${hzToMhz(lowHz)} to ${hzToMhz(highHz)} MHz only; outside it is taken as none`,
        where: `cable ${name}`,
        fromHz,
        toHz,
      });
    }
  }
  return caveats;
}

function stackupCaveats(board: Board): Caveat[] {
  const guessed = board.stackup.filter(({ isGuessed }) => isGuessed).map(({ name }) => name);
  if (guessed.length === 0) return [];
  return [
    {
      code: 'permittivity-guessed',
      message: 'the layout file states no permittivity; a typical value was put in: check it with the board maker',
      where: guessed.slice(0, 6).join(', '),
      fromHz: 0,
      toHz: 0,
    },
  ];
}

/** One row for each line caveat of a net, however many segments share it, over all their frequencies. */
function lineCaveats(scene: Scene, fromHz: number, toHz: number): Caveat[] {
  const merged = new Map<string, Caveat>();
  for (const model of scene.nets.values()) {
    for (const caveat of model.caveats) {
      if (caveat.toHz > 0 && (caveat.fromHz > toHz || caveat.toHz < fromHz)) continue;
      const key = JSON.stringify([caveat.code, caveat.message, model.name]);
      const known = merged.get(key);
      merged.set(key, known ? { ...known, ...unionOf(known, caveat) } : caveat);
    }
  }
  return [...merged.values()];
}

/** Smallest range that holds both; 0 as the upper end of either means every frequency. */
const unionOf = (one: Caveat, other: Caveat): Pick<Caveat, 'fromHz' | 'toHz'> =>
  one.toHz === 0 || other.toHz === 0
    ? { fromHz: 0, toHz: 0 }
    : { fromHz: Math.min(one.fromHz, other.fromHz), toHz: Math.max(one.toHz, other.toHz) };

function undrivenCaveats(board: Board): Caveat[] {
  const driven = new Set(board.drives.map(({ net }) => net));
  const open = board.nets.filter(({ name, traces }) => traces.length > 0 && !driven.has(name)).map(({ name }) => name);
  if (open.length === 0) return [];
  return [
    {
      code: 'nets-without-drive',
      message: `${open.length} ${open.length === 1 ? 'net has' : 'nets have'} traces but no drive and radiate nothing here`,
      where: listed(open),
      fromHz: 0,
      toHz: 0,
    },
  ];
}

/** Message with planes left out, and with planes solved. */
const FINDING_CAVEATS: readonly (readonly [code: string, pairOnly: string, solved: string])[] = [
  [
    'plane-gap',
    'a trace runs where its reference plane is missing; its return is taken straight on, though it must go around',
    'a trace runs where its reference plane is missing; the solved plane finds the way around on cells, which take a narrow slot up to one cell too long: levels come out up to 2 dB high',
  ],
  [
    'return-changes-plane',
    'a trace goes over to another plane and its return has no near way there (or one through capacitors that are not known); it is taken to cross beside the trace',
    'a trace goes over to another plane and its return has no near way there (or one through capacitors that are not known); it is taken to cross beside the trace',
  ],
];

function findingCaveats(findings: readonly Finding[], isSolved: boolean): Caveat[] {
  return FINDING_CAVEATS.flatMap(([code, pairOnly, solved]) => {
    const nets = [...new Set(findings.filter((finding) => finding.code === code).map(({ net }) => net))];
    if (nets.length === 0) return [];
    return [{ code, message: isSolved ? solved : pairOnly, where: listed(nets), fromHz: 0, toHz: 0 }];
  });
}
