import type { ResultPoint } from '../../estimate/result.ts';
import { isItself, mainContributor, pathText } from '../contributor-text.ts';
import { type Markup, markup, nameMarkup } from '../markup.ts';

/** "CLK via valve cable": the strongest contributor of a reading and its strongest path; nothing when it has none. */
export function mainMarkup(point: ResultPoint): Markup | undefined {
  const main = mainContributor(point);
  if (!main) return undefined;
  const { contributor, path } = main;
  return markup`${nameMarkup(contributor.name, 28)}${
    path && !isItself(contributor, path) && markup` via ${nameMarkup(pathText(path.name), 24)}`
  }`;
}
