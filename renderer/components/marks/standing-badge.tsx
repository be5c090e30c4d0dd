import type { ReactElement, ReactNode } from 'react';
import type { Standing } from '../../../app/report/verdict.ts';
import { classes } from '../classes.ts';
import css from './marks.module.css';
import { StandingMark } from './standing-mark.tsx';

export interface StandingBadgeProps {
  readonly standing: Standing;
  /** What it says beside the mark: "exceeds by 3.1 dB at 125 MHz". */
  readonly children: ReactNode;
}

/** A verdict or margin in words with its mark. */
export const StandingBadge = ({ standing, children }: StandingBadgeProps): ReactElement => (
  <span className={classes(css.badge, css[standing])}>
    <StandingMark standing={standing} isDecoration />
    {children}
  </span>
);
