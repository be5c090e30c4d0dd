import { describe, expect, it } from 'vitest';
import { limitChecks } from '../../app/validate/limits.ts';
import { sourceChecks } from '../../app/validate/sources.ts';

describe.each([
  ['sources', sourceChecks, 7],
  ['limits', limitChecks, 41],
] as const)('published checks of %s', (_, checks, count) => {
  it('all pass, each with an id of its own', () => {
    const rows = checks();
    expect(rows).toHaveLength(count);
    expect(rows.filter((row) => row.status !== 'pass')).toEqual([]);
    expect(new Set(rows.map((row) => row.id)).size).toBe(count);
  });
});
