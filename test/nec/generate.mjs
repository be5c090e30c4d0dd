/** Writes the reference maxima anew: npm run references (needs nec2c; a few minutes). The diff is for review. */
import { fileURLToPath } from 'node:url';
import { runnerImport } from 'vite';

const root = fileURLToPath(new URL('../..', import.meta.url));
const { module } = await runnerImport(fileURLToPath(new URL('write-maxima.ts', import.meta.url)), {
  root,
  configFile: false,
  logLevel: 'error',
});
await module.writeMaxima();
