import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { kernelModuleText } from '../../main/kernel/compile.mjs';

it('the kernel in the core is what its source in main/kernel/ compiles to', async () => {
  const committed = readFileSync(new URL('../../app/kernel/kernel-bytes.ts', import.meta.url), 'utf8');
  expect(await kernelModuleText(), 'run `npm run kernel`').toBe(committed);
});
