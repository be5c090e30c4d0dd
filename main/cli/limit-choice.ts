import { parseLimitFile } from '../../app/limits/limit-file.ts';
import { inFile } from '../files/in-file.ts';
import { readJson } from '../files/read-text.ts';

/** The content of a limit file, checked; undefined without one. Throws `file` and `input` with the file's name. */
export async function readLimitFile(file: string | undefined): Promise<unknown> {
  if (file === undefined) return undefined;
  const { json } = await readJson(file);
  inFile(file, () => parseLimitFile(json));
  return json;
}

/**
 * Standard and class to judge by. A limit file takes the place of the built-in lines; its first line then names
 * standard and class where the options do not.
 */
export function standardAndClass(
  options: { readonly standard?: string; readonly class?: string },
  limitFile: unknown,
): { standard: string; class: string } {
  const lines = limitFile === undefined ? undefined : parseLimitFile(limitFile);
  const first = lines?.find((line) => options.standard === undefined || line.standard === options.standard);
  return {
    standard: options.standard ?? first?.standard ?? 'CISPR 32',
    class: options.class ?? first?.class ?? 'B',
  };
}
