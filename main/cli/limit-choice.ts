import type { LimitRequest } from '../../app/limits/choose.ts';
import { parseLimitFile } from '../../app/limits/limit-file.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import { inFile } from '../files/load-board.ts';
import { readJson } from '../files/read-text.ts';

interface LimitOptions {
  readonly standard?: string;
  readonly class?: string;
  readonly distance: number;
  readonly convertDistance?: boolean;
  readonly site: 'ground-plane' | 'free-space';
  readonly limitFile?: string;
}

/**
 * What to choose the limit lines by. A limit file takes the place of the built-in lines; its first line then names
 * standard and class where the options do not. Throws `file` and `input`.
 */
export async function limitChoice(
  options: LimitOptions,
): Promise<{ limits: LimitRequest; catalogue: readonly LimitLine[] | undefined }> {
  const catalogue = options.limitFile === undefined ? undefined : await readLimitFile(options.limitFile);
  const first = catalogue?.find((line) => options.standard === undefined || line.standard === options.standard);
  const limits: LimitRequest = {
    standard: options.standard ?? first?.standard ?? 'CISPR 32',
    class: options.class ?? first?.class ?? 'B',
    distanceM: options.distance,
    convertDistance: options.convertDistance === true,
    siteKind: options.site,
  };
  return { limits, catalogue };
}

async function readLimitFile(file: string): Promise<readonly LimitLine[]> {
  const { json } = await readJson(file);
  return inFile(file, () => parseLimitFile(json));
}
