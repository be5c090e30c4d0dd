import { readFileSync } from 'node:fs';
import asc from 'assemblyscript/asc';

const HEX_PER_LINE = 112;

/** Text of app/kernel/kernel-bytes.ts for the sources in this folder. Throws with the compiler's words when it refuses. */
export async function kernelModuleText() {
  let bytes;
  const flags = [
    '--runtime',
    'stub',
    '--enable',
    'simd',
    '--enable',
    'bulk-memory',
    '--importMemory',
    '--noExportMemory',
  ];
  const { error, stderr } = await asc.main(['index.ts', '-O3', '--noAssert', '--outFile', 'kernel.wasm', ...flags], {
    readFile: (name) => read(name),
    writeFile: (_, content) => {
      bytes = content;
    },
    listFiles: () => [],
  });
  if (error || !bytes) throw new Error(`assembly: ${error?.message}\n${stderr.toString()}`);
  const hex = Buffer.from(bytes).toString('hex');
  const lines = hex.match(new RegExp(`.{1,${HEX_PER_LINE}}`, 'g'));
  return [
    '/** Bytes of the compiled kernel, hexadecimal. Written by `npm run kernel` from main/kernel/: do not edit. */',
    'export const KERNEL_HEX = [',
    ...lines.map((line) => `  '${line}',`),
    "].join('');",
    '',
  ].join('\n');
}

function read(name) {
  try {
    return readFileSync(new URL(name, import.meta.url), 'utf8');
  } catch {
    return null;
  }
}
