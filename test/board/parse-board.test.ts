import { describe, expect, it } from 'vitest';
import { parseBoardFile, parseSourcesFile, toBoard } from '../../app/board/parse-board.ts';
import { appFailure } from '../support/app-failure.ts';
import { orchardBoard } from './example-board.ts';

type Loose = Record<string, unknown> & { nets: Record<string, unknown>[]; waveforms: Record<string, unknown>[] };
const loose = () => orchardBoard() as unknown as Loose;

describe('parseBoardFile', () => {
  it('takes the documented example and fills the defaults in', () => {
    const file = parseBoardFile(orchardBoard());
    expect(file.drives?.[0]).toMatchObject({ seriesOhm: 0, delayNs: 0, inverted: false });
    expect(file.waveforms?.[0]).toMatchObject({ dutyPercent: 50 });
    expect(file.cables?.[0]).toMatchObject({ farEnd: 'open' });
    expect(toBoard(file).board.name).toBe('Orchard valve controller');
  });

  it('says path, what must be and what came', () => {
    const board = orchardBoard();
    board.nets[0]!.traces![0]!.widthMm = -0.2;
    const error = appFailure(() => parseBoardFile(board));
    expect(error.code).toBe('input');
    expect(error.path).toBe('nets[0].traces[0].widthMm');
    expect(error.message).toBe('nets[0].traces[0].widthMm must be a number greater than 0; received -0.2');
  });

  it.each<[string, (board: Loose) => void, string]>([
    ['an unknown key, named with the known ones', (b) => (b.nets[1]!.widht = 1), 'nets[1].widht must be left out'],
    [
      'a key that looks like a prototype',
      (b) => Object.defineProperty(b, '__proto__', { value: 1, enumerable: true }),
      '__proto__ must be left out',
    ],
    ['a missing list', (b) => delete (b as Record<string, unknown>).nets, 'nets must be a list; received nothing'],
    ['a text for a number', (b) => (b.nets[0]!.z0Ohm = '50'), 'nets[0].z0Ohm must be a number; received "50"'],
    [
      'a point of one number',
      (b) => (b.nets[0]!.pins = [{ name: 'U1.1', layer: 'TOP', atMm: [1] }]),
      'nets[0].pins[0].atMm',
    ],
    [
      'an unknown waveform kind',
      (b) => (b.waveforms[0]!.kind = 'sine'),
      'waveforms[0].kind must be "trapezoid" or "random-data" or "samples"',
    ],
    [
      'a cable end that is none',
      (b) =>
        Object.assign(b, {
          cables: [
            {
              name: 'c',
              pointsMm: [
                [0, 0, 0],
                [1, 0, 0],
              ],
              farEnd: 'shut',
            },
          ],
        }),
      'cables[0].farEnd must be "open", "ground" or',
    ],
    [
      'a cable called like a radiation path',
      (b) =>
        Object.assign(b, {
          cables: [
            {
              name: 'plane',
              pointsMm: [
                [0, 0, 0],
                [1, 0, 0],
              ],
            },
          ],
        }),
      'cables[0].name must be another name than "pair", "plane" and "loop"',
    ],
    [
      'coordinates in another unit',
      (b) => (b.nets[0]!.pins = [{ name: 'U1.1', layer: 'TOP', atMm: [25_400_000, 0] }]),
      'at most 100000; received 25400000',
    ],
  ])('refuses %s', (_what, change, message) => {
    const board = loose();
    change(board);
    expect(appFailure(() => parseBoardFile(board)).message).toContain(message);
  });

  it('tells only the kind of a file of another kind', () => {
    const error = appFailure(() => parseBoardFile({ format: 'quietboard-sources', version: 1, drives: [] }));
    expect(error.message).toBe('format must be "quietboard-board"; received "quietboard-sources"');
  });

  it('tells five failures and counts the rest', () => {
    const board = orchardBoard();
    board.nets = Array.from({ length: 8 }, () => ({ name: '' }));
    const lines = appFailure(() => parseBoardFile(board)).message.split('\n');
    expect(lines).toHaveLength(6);
    expect(lines[0]).toBe('nets[0].name must be a text of at least 1 character; received ""');
    expect(lines[5]).toBe('… and 3 more');
  });

  it.each([[null], [[]], ['x'], [3]])('refuses %j as a whole', (json) => {
    expect(appFailure(() => parseBoardFile(json)).message).toMatch(/^the file must be an object; received/);
  });
});

describe('waveforms in a file', () => {
  const withWaveform = (waveform: Record<string, unknown>) =>
    appFailure(() => parseSourcesFile({ format: 'quietboard-sources', version: 1, waveforms: [waveform] }));
  const trapezoid = { name: 'w', kind: 'trapezoid', frequencyMhz: 100, riseNs: 1, fallNs: 1 };
  const data = { name: 'w', kind: 'random-data', bitRateMbps: 100, lowV: 0, highV: 1, riseNs: 1, fallNs: 1 };
  const piecewise = { name: 'w', kind: 'piecewise', periodNs: 10 };

  it.each<[string, Record<string, unknown>, string, string]>([
    ['no level', trapezoid, 'waveforms[0].lowV', 'given: lowV and highV for drives, lowA and highA for loops'],
    ['one level', { ...trapezoid, lowA: 0 }, 'waveforms[0].highA', 'given'],
    [
      'volts and amperes',
      { ...trapezoid, lowV: 0, highV: 1, highA: 1 },
      'waveforms[0].highA',
      'left out beside lowV, highV',
    ],
    // Ramps of 0.8·T·duty in sum (10–90 %) just fit: 100 MHz at 30 % has 3 ns above half, so 2 · 0.8 · 3 = 4.8 ns.
    [
      'ramps longer than the pulse',
      { ...trapezoid, lowV: 0, highV: 1, dutyPercent: 30, riseNs: 3, fallNs: 1.9 },
      'waveforms[0].riseNs',
      'at most 4.8 ns',
    ],
    ['data edges longer than a bit', { ...data, riseNs: 9, fallNs: 8 }, 'waveforms[0].riseNs', 'at most 16 ns'],
    ['a length that is no 2^n − 1', { ...data, sequenceBits: 100 }, 'waveforms[0].sequenceBits', '2^n − 1'],
    [
      'times that fall',
      {
        ...piecewise,
        pointsNsV: [
          [0, 0],
          [3, 1],
          [2, 0],
        ],
      },
      'waveforms[0].pointsNsV[2][0]',
      'later than',
    ],
    [
      'times beyond the period',
      {
        ...piecewise,
        pointsNsV: [
          [1, 0],
          [12, 1],
        ],
      },
      'waveforms[0].pointsNsV[1][0]',
      'at most one period',
    ],
    [
      'a jump at the period',
      {
        ...piecewise,
        pointsNsA: [
          [1, 0],
          [5, 2],
          [11, 1],
        ],
      },
      'waveforms[0].pointsNsA[2][1]',
      "the first point's value",
    ],
    [
      'lines in both units',
      {
        name: 'w',
        kind: 'lines',
        lines: [
          { frequencyMhz: 1, amplitudeV: 1 },
          { frequencyMhz: 2, amplitudeA: 1 },
        ],
      },
      'waveforms[0].lines[1].amplitudeA',
      'left out',
    ],
    [
      'a line twice',
      {
        name: 'w',
        kind: 'lines',
        lines: [
          { frequencyMhz: 1, amplitudeV: 1 },
          { frequencyMhz: 1, amplitudeV: 2 },
        ],
      },
      'waveforms[0].lines[1].frequencyMhz',
      'no other line',
    ],
  ])('refuses %s', (_what, waveform, path, message) => {
    const error = withWaveform(waveform);
    expect(error.path).toBe(path);
    expect(error.message).toContain(message);
  });

  it('takes ramps that just fit, and sequences of 2^n − 1', () => {
    const waveforms = [
      { ...trapezoid, lowV: 0, highV: 1, dutyPercent: 30, riseNs: 3, fallNs: 1.8 },
      { ...data, riseNs: 8, fallNs: 8, sequenceBits: 32767 },
    ];
    expect(parseSourcesFile({ format: 'quietboard-sources', version: 1, waveforms }).waveforms).toHaveLength(2);
  });
});
