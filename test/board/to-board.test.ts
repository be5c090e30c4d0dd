import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { parseBoardFile, toBoard } from '../../app/board/parse-board.ts';
import { appFailure } from '../support/app-failure.ts';
import { orchardBoard } from './example-board.ts';

const convert = (file: BoardFileInput, samples = new Map()) => toBoard(parseBoardFile(file), { samples });
const boardOf = (change: (board: BoardFileInput) => void) => {
  const file = orchardBoard();
  change(file);
  return convert(file);
};
const failureOf = (change: (board: BoardFileInput) => void) => appFailure(() => boardOf(change));

describe('toBoard', () => {
  it('converts to SI', () => {
    const { board, notes } = convert(orchardBoard());
    expect(notes).toEqual([]);
    const clock = board.nets[0]!;
    expect(clock.traces[0]!.widthM).toBeCloseTo(200e-6, 12);
    expect(clock.traces[0]!.pointsM[1]![0]).toBeCloseTo(0.06, 12);
    // Given bottom to top in the file; in the board the upper layer comes first.
    expect(clock.vias[0]).toMatchObject({ fromLayerIndex: 0, toLayerIndex: 2 });
    const waveform = board.waveforms[0]!;
    if (waveform.kind !== 'trapezoid') throw new Error('not a trapezoid');
    expect(waveform).toMatchObject({ frequencyHz: 25e6, low: 0, high: 3.3, dutyRatio: 0.5, quantity: 'V' });
    expect(waveform.fall1090S).toBeCloseTo(1.5e-9, 20);
    expect(board.waveforms[1]!.quantity).toBe('A');
    expect(board.loads[0]!.capacitanceF).toBeCloseTo(5e-12, 20);
    expect(board.cables[0]!.radiusM).toBeCloseTo(1.5e-3, 12);
    expect(board.cables[0]!.pointsM[2]![2]).toBeCloseTo(-0.7, 12);
    expect(board.structure.planes).toBe('solved');
  });

  it('converts cable tables, listed lines, data, delays and signs', () => {
    const { board } = boardOf((file) => {
      file.waveforms!.push(
        { name: 'raw', kind: 'lines', lines: [{ frequencyMhz: 50, amplitudeA: 2, phaseDeg: 90 }] },
        {
          name: 'bus',
          kind: 'random-data',
          bitRateMbps: 80,
          lowV: 0.2,
          highV: 1.8,
          riseNs: 2,
          fallNs: 3,
          clockDomain: 'm',
        },
      );
      Object.assign(file.drives![0]!, { waveform: 'bus', seriesOhm: 22, delayNs: -3, inverted: true });
      Object.assign(file.loops![0]!, { waveform: 'raw', delayNs: 7 });
      Object.assign(file.cables![0]!, {
        commonModeUa: [
          [30, 5],
          [300, 2],
        ],
        seriesImpedance: [[30, 40, 110]],
        farEnd: { resistanceOhm: 150 },
      });
      file.structure = { planes: 'pair-only', cellMm: 4 };
    });
    const [, , raw, bus] = board.waveforms;
    expect(raw).toMatchObject({ quantity: 'A', lines: [{ frequencyHz: 50e6, amplitude: 2, phaseRad: Math.PI / 2 }] });
    expect(bus).toMatchObject({ bitRateHz: 80e6, low: 0.2, high: 1.8, sequenceBits: 127, clockDomain: 'm' });
    if (bus?.kind !== 'random-data') throw new Error('not data');
    expect(bus.rise1090S * 1e9).toBeCloseTo(2, 9);
    expect(bus.fall1090S * 1e9).toBeCloseTo(3, 9);
    expect(board.drives[0]).toMatchObject({ sourceOhm: 25, seriesOhm: 22, isInverted: true });
    expect(board.drives[0]!.delayS * 1e9).toBeCloseTo(-3, 9);
    expect(board.loops[0]!.delayS * 1e9).toBeCloseTo(7, 9);
    const cable = board.cables[0]!;
    expect(cable.farEnd).toEqual({ resistanceOhm: 150 });
    expect(cable.seriesImpedance).toEqual([{ frequencyHz: 30e6, resistanceOhm: 40, reactanceOhm: 110 }]);
    expect(cable.commonModeRms!.map((row) => row.frequencyHz)).toEqual([30e6, 300e6]);
    expect(cable.commonModeRms![0]!.currentRmsA * 1e6).toBeCloseTo(5, 9);
    expect(board.structure).toEqual({ planes: 'pair-only', cellM: 0.004 });
  });

  it('stacks layers upwards from z = 0 at the underside', () => {
    const { stackup } = convert(orchardBoard()).board;
    const heightsUm = stackup.map((layer) => [layer.zBottomM, layer.zTopM].map((zM) => Math.round(zM * 1e6)));
    // By hand: GND 17 µm, dielectric 200 µm, TOP 35 µm.
    expect(heightsUm).toEqual([
      [217, 252],
      [17, 217],
      [0, 17],
    ]);
    expect(stackup.map((layer) => layer.epsilonR)).toEqual([1, 4.3, 1]);
  });

  it('gives a plane without points every ring of the outline', () => {
    const { board } = boardOf((file) => {
      file.outline!.push({
        pointsMm: [
          [100, 0],
          [110, 0],
          [110, 7],
        ],
      });
    });
    expect(board.planes.map((plane) => plane.ringM.length)).toEqual([4, 3]);
  });

  it('takes the bounding box of the copper when there is no outline, and says so', () => {
    const { board, notes } = boardOf((file) => {
      delete file.outline;
    });
    // The widest trace (0.2 mm) from x = 10, a via of 0.3 mm at (60, 10), a trace of 0.15 mm to y = 30.
    const [low, , high] = board.outlineM[0]!;
    expect(low!.map((m) => Number((m * 1e3).toFixed(6)))).toEqual([9.9, 9.85]);
    expect(high!.map((m) => Number((m * 1e3).toFixed(6)))).toEqual([60.15, 30.075]);
    expect(notes[0]).toContain('has no outline');
  });

  it('drops a repeated closing corner and leaves out traces without length, with a note', () => {
    const { board, notes } = boardOf((file) => {
      file.outline![0]!.pointsMm.push([0, 0]);
      file.nets[0]!.traces!.push({
        layer: 'TOP',
        widthMm: 0.2,
        pointsMm: [
          [5, 5],
          [5, 5],
        ],
      });
    });
    expect(board.outlineM[0]).toHaveLength(4);
    expect(board.nets[0]!.traces).toHaveLength(1);
    expect(notes).toEqual(['Traces without length left out: 1 (first: nets[0].traces[1]).']);
  });

  it.each<[string, (board: BoardFileInput) => void, string, string]>([
    [
      'a trace on an unknown layer',
      (b) => (b.nets[0]!.traces![0]!.layer = 'TPO'),
      'nets[0].traces[0].layer',
      '(nearest: "TOP")',
    ],
    ['a pin on a dielectric', (b) => (b.nets[0]!.pins![0]!.layer = 'D1'), 'nets[0].pins[0].layer', 'a copper layer'],
    ['a plane on an unknown layer', (b) => (b.planes![0]!.layer = 'X'), 'planes[0].layer', '(known: "TOP", "GND")'],
    [
      'a via that ends where it starts',
      (b) => (b.nets[0]!.vias![0]!.fromLayer = 'TOP'),
      'nets[0].vias[0].toLayer',
      'another layer',
    ],
    ['two nets of one name', (b) => (b.nets[1]!.name = 'CLK'), 'nets[1].name', 'nets[0].name has it'],
    ['two pins of one name', (b) => (b.nets[0]!.pins![2]!.name = 'U1.3'), 'nets[0].pins[2].name', 'not used before'],
    ['two layers of one name', (b) => (b.stackup[2]!.name = 'TOP'), 'stackup[2].name', 'not used before'],
    ['two waveforms of one name', (b) => (b.waveforms![1]!.name = 'clk'), 'waveforms[1].name', 'not used before'],
    ['coppers that touch', (b) => (b.stackup[1]!.thicknessMm = 0), 'stackup[2]', 'by a dielectric'],
    ['a stackup without copper', (b) => b.stackup.splice(0, 3, b.stackup[1]!), 'stackup', 'with a copper layer'],
    [
      'a plane without area',
      (b) =>
        (b.planes![0]!.pointsMm = [
          [0, 0],
          [10, 5],
          [20, 10],
        ]),
      'planes[0].pointsMm',
      'an area',
    ],
    [
      'a cutout without area',
      (b) =>
        (b.planes![0]!.cutoutsMm = [
          [
            [1, 1],
            [1, 1],
            [2, 1],
          ],
        ]),
      'planes[0].cutoutsMm[0]',
      'an area',
    ],
    ['a drive of an unknown net', (b) => (b.drives![0]!.net = 'CKL'), 'drives[0].net', '(nearest: "CLK")'],
    [
      'a drive at an unknown pin',
      (b) => (b.drives![0]!.pin = 'U1.33'),
      'drives[0].pin',
      'a pin of net "CLK" (nearest: "U1.3"',
    ],
    ['an unknown waveform', (b) => (b.drives![0]!.waveform = 'clock'), 'drives[0].waveform', '"clk"'],
    ['a drive in amperes', (b) => (b.drives![0]!.waveform = 'pw'), 'drives[0].waveform', 'in volts'],
    ['a loop in volts', (b) => (b.loops![0]!.waveform = 'clk'), 'loops[0].waveform', 'in amperes'],
    ['two drives on one pin', (b) => b.drives!.push({ ...b.drives![0]! }), 'drives[1].pin', 'no other of the drives'],
    ['two loads on one pin', (b) => b.loads!.push({ ...b.loads![0]! }), 'loads[1].pin', 'no other of the loads'],
    [
      'a loop that goes there and back',
      (b) =>
        (b.loops![0]!.pointsMm = [
          [0, 0, 1],
          [5, 0, 1],
          [3, 0, 1],
        ]),
      'loops[0].pointsMm',
      'an area',
    ],
    [
      'a cable that stands still',
      (b) => b.cables![0]!.pointsMm.splice(1, 0, [80, 25, 0]),
      'cables[0].pointsMm[1]',
      'another point',
    ],
    [
      'a table that falls in frequency',
      (b) =>
        (b.cables![0]!.commonModeUa = [
          [300, 2],
          [30, 5],
        ]),
      'cables[0].commonModeUa[1][0]',
      'above the row before',
    ],
    [
      'two series impedances',
      (b) => Object.assign(b.cables![0]!, { seriesOhm: 1, seriesImpedance: [[30, 1, 1]] }),
      'cables[0].seriesOhm',
      'left out',
    ],
    [
      'a drive of a net without pins',
      (b) => {
        b.nets[1]!.pins = [];
        b.drives!.push({ net: 'DATA0', waveform: 'clk' });
      },
      'drives[1].net',
      'a free pin',
    ],
    [
      'a load where only the driver is',
      (b) => {
        b.nets[1]!.pins!.pop();
        b.drives!.push({ net: 'DATA0', waveform: 'clk' });
        b.loads!.push({ net: 'DATA0' });
      },
      'loads[1].net',
      'a free pin',
    ],
    [
      'no outline and no copper',
      (b) => {
        delete b.outline;
        b.nets = [];
        b.drives = [];
        b.loads = [];
      },
      'outline',
      'must be given',
    ],
  ])('refuses %s', (_what, change, path, message) => {
    const error = failureOf(change);
    expect(error.code).toBe('input');
    expect(error.path).toBe(path);
    expect(error.message).toContain(message);
  });
});

describe('pins chosen by the program', () => {
  it('drives the first pin of a driver-like part and loads the farthest pin, and says both', () => {
    const { board, notes } = boardOf((file) => {
      delete file.drives![0]!.pin;
      delete file.loads![0]!.pin;
    });
    // R1.1 comes first in the file but is no driver; from U1.3 (x = 10) U2.7 (x = 60) is farther than R1.1 (x = 30).
    expect(board.drives[0]).toMatchObject({ pin: 'U1.3', isPinChosen: true });
    expect(board.loads[0]).toMatchObject({ pin: 'U2.7', isPinChosen: true });
    expect(notes[0]).toMatch(/^Driver pin not stated.*: "CLK" at "U1.3"\.$/);
    expect(notes[1]).toMatch(/^Load pin not stated.*: "CLK" at "U2.7"\.$/);
  });

  it('drives the first pin when no part is driver-like', () => {
    const { board } = boardOf((file) => {
      for (const [i, pin] of file.nets[0]!.pins!.entries()) pin.name = `R${i}.1`;
      file.drives = [{ net: 'CLK', waveform: 'clk' }];
      file.loads = [];
    });
    expect(board.drives[0]!.pin).toBe('R0.1');
  });

  it('passes over pins that are stated elsewhere', () => {
    const { board } = boardOf((file) => {
      file.drives!.push({ net: 'CLK', waveform: 'clk' });
      file.loads!.push({ net: 'CLK' });
    });
    expect(board.drives[1]!.pin).toBe('U2.7');
    expect(board.loads[1]!.pin).toBe('R1.1');
  });

  it('notes open ends and loads that nothing drives', () => {
    const { notes } = boardOf((file) => {
      file.loads = [{ net: 'DATA0' }];
    });
    expect(notes.join('\n')).toContain('Driven net without a load, its far end is open: "CLK".');
    expect(notes.join('\n')).toContain('Load on a net without a drive, it has no effect: "DATA0".');
  });
});

describe('sampled waveforms', () => {
  const withSamples = (periodNs: number, timesS: number[], values: number[], inLoop = false) => {
    const file = orchardBoard();
    file.waveforms!.push({ name: 'meas', kind: 'samples', file: 'edge.csv', periodNs });
    if (inLoop) file.loops![0]!.waveform = 'meas';
    const { board, notes } = convert(file, new Map([['edge.csv', { timesS, values }]]));
    const waveform = board.waveforms[2]!;
    if (waveform.kind !== 'samples') throw new Error('not sampled');
    return { waveform, notes };
  };

  it('start at their first point and keep one period', () => {
    const timesS = [-2e-9, 0, 2e-9, 4e-9, 6e-9, 8e-9];
    const { waveform, notes } = withSamples(8, timesS, [1, 2, 3, 4, 5, 6]);
    expect(waveform.timesS.map((timeS) => Math.round(timeS * 1e9))).toEqual([0, 2, 4, 6]);
    expect(waveform.values).toEqual([1, 2, 3, 4]);
    expect(notes).toEqual(['Waveform "meas": its file holds 1.25 periods, the first counts.']);
  });

  it('say how much of the period they leave open', () => {
    expect(withSamples(20, [0, 5e-9, 10e-9], [0, 1, 0]).notes[0]).toContain('covers 50 % of the period');
  });

  it('are in amperes where a loop uses them', () => {
    expect(withSamples(10, [0, 5e-9, 10e-9], [0, 1, 0]).waveform.quantity).toBe('V');
    expect(withSamples(10, [0, 5e-9, 10e-9], [0, 1, 0], true).waveform.quantity).toBe('A');
  });

  it('are refused when times do not rise or the file was not read', () => {
    expect(appFailure(() => withSamples(10, [0, 5e-9, 5e-9], [0, 1, 0])).message).toContain('row 3');
    const file = orchardBoard();
    file.waveforms!.push({ name: 'meas', kind: 'samples', file: 'edge.csv', periodNs: 1 });
    expect(appFailure(() => convert(file)).path).toBe('waveforms[2].file');
  });
});
