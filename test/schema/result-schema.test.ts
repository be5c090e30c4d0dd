import { describe, expectTypeOf, it } from 'vitest';
import type { z } from 'zod';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { resultSchema } from '../../app/estimate/result-schema.ts';

/** Read-only all the way down, so that only the shapes are compared. */
type Frozen<T> = T extends object ? { readonly [K in keyof T]: Frozen<T[K]> } : T;

describe('resultSchema', () => {
  it('is the type of the result, key by key (checked by the compiler)', () => {
    expectTypeOf<Frozen<z.output<typeof resultSchema>>>().toEqualTypeOf<Frozen<EstimateResult>>();
  });
});
