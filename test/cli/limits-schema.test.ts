import { describe, expect, it } from 'vitest';
import { runCli } from '../support/run-cli.ts';

describe('limits', () => {
  it('lists the lines of a standard by an alias, in any case', async () => {
    const { code, stdout } = await runCli(['limits', 'en55032', '--json', '-']);
    expect(code).toBe(0);
    const { lines } = JSON.parse(stdout);
    expect(new Set(lines.map((line: { standard: string }) => line.standard))).toEqual(new Set(['CISPR 32']));
    const classB = lines.find(
      (line: Record<string, unknown>) =>
        line.class === 'B' &&
        line.distanceM === 10 &&
        line.detector === 'quasi-peak' &&
        line.siteKind === 'ground-plane',
    );
    // CISPR 32 table A.4, class B at 10 m: 30 dBµV/m to 230 MHz, 37 above.
    expect(classB.points).toEqual([
      [30e6, 30],
      [230e6, 30],
      [230e6, 37],
      [1e9, 37],
    ]);
    expect(classB).toHaveProperty('sourceStatus');
    expect(classB).toHaveProperty('edition');
  });

  it('prints every standard within 80 columns, with status', async () => {
    const { stdout } = await runCli(['limits']);
    for (const text of ['CISPR 32', 'FCC 15.109', 'from memory', 'seen', '30:40, 230:40/47, 1000:47']) {
      expect(stdout).toContain(text);
    }
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
  });
});

describe('schema', () => {
  it.each([
    ['board', 'quietboard-board', ['format', 'version', 'name', 'stackup', 'nets']],
    ['sources', 'quietboard-sources', ['format', 'version']],
    ['field', 'quietboard-field', ['format', 'version', 'frequenciesHz', 'ground', 'elements', 'observersM']],
    ['result', 'quietboard-result', undefined],
  ])('prints that of %s', async (name, format, required) => {
    const { code, stdout } = await runCli(['schema', name]);
    const schema = JSON.parse(stdout);
    expect(code).toBe(0);
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(schema.properties.format.const).toBe(format);
    expect(schema.additionalProperties).toBe(false);
    // What has a default may be left out of a file; a result has all its keys, but for the maps of solved currents.
    const always = Object.keys(schema.properties).filter((key) => key !== 'currentMaps');
    expect(schema.required.sort()).toEqual((required ?? always).sort());
  });
});
