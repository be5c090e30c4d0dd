import { describe, expect, it } from 'vitest';
import { handbookChecks } from '../../app/validate/handbook.ts';

describe('handbook rows', () => {
  const rows = handbookChecks();

  it.each(rows)('$id', ({ status, expected, computed, tolerance }) => {
    expect(status, `${computed} against ${expected}`).toBe('pass');
    // Half a per cent: a factor, a near term (13 % on the ribbon cable) or peak for rms cannot hide.
    expect(tolerance).toBeLessThanOrEqual(0.005 * expected);
  });

  it('has the worked examples and each id once', () => {
    expect(new Set(rows.map(({ id }) => id)).size).toBe(rows.length);
    for (const id of ['paul-dm-ribbon', 'paul-cm-ribbon', 'ott-dm-10cm2', 'ott-cm-5ua-3m', 'ott-cm-15ua-10m']) {
      expect(rows.map((row) => row.id)).toContain(`handbook-${id}`);
    }
  });
});
