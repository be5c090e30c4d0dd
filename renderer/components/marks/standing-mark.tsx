import type { ReactElement } from 'react';
import { markPath } from '../../../app/report/figures/marks.ts';
import type { Standing } from '../../../app/report/verdict.ts';
import { classes } from '../classes.ts';
import css from './marks.module.css';

/** What a standing is called. */
export const STANDING_WORDS: Readonly<Record<Standing, string>> = {
  over: 'over the limit',
  short: 'short of the required margin',
  fine: 'fine',
};

export interface StandingMarkProps {
  readonly standing: Standing;
  /** The words stand beside it. */
  readonly isDecoration?: boolean;
}

/** Filled triangle, half-filled diamond or small ring: the same mark as in charts and reports. */
export function StandingMark({ standing, isDecoration }: StandingMarkProps): ReactElement {
  const { outline, half } = markPath(standing, 0, 0);
  const label = STANDING_WORDS[standing];
  return (
    <svg
      className={classes(css.mark, css[standing])}
      viewBox="-7 -7 14 14"
      role="img"
      aria-hidden={isDecoration}
      aria-label={label}
    >
      <title>{label}</title>
      <path className={css.rim} d={outline} />
      {half !== '' && <path className={css.half} d={half} />}
    </svg>
  );
}
