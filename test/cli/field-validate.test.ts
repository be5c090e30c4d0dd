import { describe, expect, it } from 'vitest';
import type { Check } from '../../app/validate/check.ts';
import { runCli, testFolder } from '../support/run-cli.ts';

const { write } = testFolder();
const job = (change: object = {}) => ({
  format: 'quietboard-field',
  version: 1,
  frequenciesHz: [100e6],
  ground: 'none',
  elements: [{ fromM: [0, 0, -0.005], toM: [0, 0, 0.005], currentA: [2, 0] }],
  observersM: [[300, 0, 0]],
  ...change,
});

describe('field', () => {
  it('gives the far field of a short element', async () => {
    const { code, stdout, stderr } = await runCli(['field', write('job.json', job()), '--json', '-']);
    expect([code, stderr]).toEqual([0, '']);
    const result = JSON.parse(stdout);
    expect(result).toMatchObject({ format: 'quietboard-field-result', version: 1, fields: [{ frequencyHz: 100e6 }] });
    const { electricVPerM, magneticAPerM } = result.fields[0].observers[0];
    const ezVPerM = Math.hypot(...electricVPerM[2]);
    // Broadside far field η·k·I·l/(4πr), C. A. Balanis, Antenna Theory, section 4.2 (from memory); terms left out: 1/(kr)² = 3e-6.
    const expectedVPerM = (376.730313 * ((2 * Math.PI * 100e6) / 299_792_458) * 2 * 0.01) / (4 * Math.PI * 300);
    expect(ezVPerM / expectedVPerM).toBeCloseTo(1, 4);
    expect(ezVPerM / Math.hypot(...magneticAPerM.flat())).toBeCloseTo(376.73, 1);
  });

  it('takes an equal end current as said or left out', async () => {
    const element = { fromM: [0, 0, 0], toM: [0.1, 0, 0], currentA: [1, 0.5] };
    const [short, long] = [{ elements: [element] }, { elements: [{ ...element, currentEndA: [1, 0.5] }] }];
    const one = await runCli(['field', write('short.json', job(short)), '--json', '-']);
    const other = await runCli(['field', write('long.json', job(long)), '--json', '-']);
    expect(one.stdout).toBe(other.stdout);
  });

  it.each<[string, object, string]>([
    ['an element below a perfect ground', { ground: 'perfect' }, 'elements[0].fromM[2] must be at least 0'],
    [
      'an element without length',
      { elements: [{ fromM: [0, 0, 1], toM: [0, 0, 1], currentA: [1, 0] }] },
      'another point',
    ],
    ['no frequency', { frequenciesHz: [] }, 'frequenciesHz must be a list of at least 1 entry'],
  ])('refuses %s', async (_what, change, message) => {
    const { code, stderr } = await runCli(['field', write('bad.json', job(change))]);
    expect(stderr).toContain(message);
    expect(code).toBe(2);
  });

  it('prints a table without --json', async () => {
    const { stdout } = await runCli(['field', write('table.json', job())]);
    expect(stdout.split('\n')[0]).toContain('|E| V/m (peak)');
    expect(stdout.split('\n')[1]).toMatch(/^100\.000 +1 +4\.188\de-3/);
  });
});

describe('validate', () => {
  it('prints the documented rows and ends with 1 exactly when one fails', async () => {
    const { code, stdout } = await runCli(['validate', '--json', '-']);
    const { checks } = JSON.parse(stdout) as { checks: Check[] };
    expect(checks.length).toBeGreaterThan(100);
    for (const check of checks) {
      expect(check.difference).toBeCloseTo(check.computed - check.expected, 12);
      if (check.status !== 'info') {
        expect(check.status).toBe(Math.abs(check.difference) <= check.tolerance ? 'pass' : 'fail');
      }
    }
    expect(new Set(checks.map((check) => check.id)).size).toBe(checks.length);
    expect(code).toBe(checks.some((check) => check.status === 'fail') ? 1 : 0);
  });
});
