import { describe, expect, it } from 'vitest';
import { fieldSolverCases } from '../../app/validate/line-cases.ts';
import { lineChecks } from '../../app/validate/lines.ts';
import { expectClose } from '../support/expect-close.ts';
import { solveLine } from '../support/line-field-solution.ts';

describe('validation rows of lines', () => {
  it('all pass or are for information; ids are unique', () => {
    const rows = lineChecks();
    expect(rows.filter(({ status }) => status === 'fail')).toEqual([]);
    expect(rows.filter(({ status }) => status === 'info').length).toBe(3);
    expect(new Set(rows.map(({ id }) => id)).size).toBe(rows.length);
    for (const { id } of rows) expect(id).toMatch(/^[a-z0-9.-]+$/);
  });

  it.each(fieldSolverCases)('$id: the stored value is what the field solver gives', ({ section, z0Ohm }) => {
    expectClose(solveLine(section, 96).z0Ohm, z0Ohm, { rel: 2e-4, because: 'stored to 0.01 Ω' });
  });
});
