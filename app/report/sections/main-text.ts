import type { ResultPoint } from '../../estimate/result.ts';
import { name, type Text } from '../blocks.ts';
import { isItself, mainContributor, pathText } from '../contributor-text.ts';

/** "CLK via valve cable": the strongest contributor of a reading and its strongest path; nothing when it has none. */
export function mainText(point: ResultPoint): Text {
  const main = mainContributor(point);
  if (!main) return undefined;
  const { contributor, path } = main;
  return [name(contributor.name, 28), path && !isItself(contributor, path) && [' via ', name(pathText(path.name), 24)]];
}
