// Compiles the kernel and writes its bytes as a module of the core; the same source gives the same bytes.
//   node main/kernel/build.mjs
import { writeFileSync } from 'node:fs';
import { kernelModuleText } from './compile.mjs';

const TARGET = new URL('../../app/kernel/kernel-bytes.ts', import.meta.url);

writeFileSync(TARGET, await kernelModuleText());
