/**
 * Writes the reference values anew (needs nec2c): npm run references. The diff is for review.
 * `-- lines`: two-wire lines only (a few minutes); `-- structures`: whole boards only (about an hour).
 */
import { fileURLToPath } from 'node:url';
import { runnerImport } from 'vite';

const root = fileURLToPath(new URL('../..', import.meta.url));
const load = async (file) => {
  const path = fileURLToPath(new URL(file, import.meta.url));
  return (await runnerImport(path, { root, configFile: false, logLevel: 'error' })).module;
};
const [wanted] = process.argv.slice(2);
if (wanted !== 'structures') await (await load('write-maxima.ts')).writeMaxima();
if (wanted !== 'lines') await (await load('write-structure-maxima.ts')).writeStructureMaxima();
