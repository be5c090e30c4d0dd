import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { electronBinding } from '../db/native-binding.ts';

export type DesktopRuntime = { readonly program: string } | { readonly missing: string };

/** The desktop runtime of this checkout, or in words what of it is missing. `requireFrom`: a file of the checkout. */
export function desktopRuntime(requireFrom: string | URL): DesktopRuntime {
  const require = createRequire(requireFrom);
  let program: string;
  let folder: string;
  try {
    folder = dirname(require.resolve('electron/package.json'));
    program = require('electron') as string;
  } catch {
    return { missing: 'the desktop runtime (Electron) is not installed here' };
  }
  if (!existsSync(program)) return { missing: 'the desktop runtime (Electron) is not installed here' };
  const modulesVersion = readFileSync(join(folder, 'abi_version'), 'utf8').trim();
  if (!existsSync(electronBinding(modulesVersion))) {
    return {
      missing: 'the database module for the desktop runtime is not built ("npm run native:electron" builds it)',
    };
  }
  return { program };
}
