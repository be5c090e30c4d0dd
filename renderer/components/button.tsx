import type { ReactElement, ReactNode } from 'react';
import { Button as AriaButton, type ButtonProps as AriaButtonProps, TooltipTrigger } from 'react-aria-components';
import css from './button.module.css';
import { classes } from './classes.ts';
import { Tip } from './tooltip.tsx';

export interface ButtonProps extends Omit<AriaButtonProps, 'className' | 'style'> {
  /** `primary`: the one thing to do here; `quiet`: without an edge until pointed at. */
  readonly look?: 'plain' | 'primary' | 'quiet';
}

export function Button({ look = 'plain', ...props }: ButtonProps): ReactElement {
  return <AriaButton {...props} className={classes(css.button, css[look])} />;
}

export interface IconButtonProps extends Omit<ButtonProps, 'children' | 'aria-label'> {
  /** What it does: its name and its tooltip. */
  readonly label: string;
  /** Shown after the label in the tooltip. */
  readonly keys?: string | undefined;
  readonly children: ReactNode;
}

/** A button that shows only a picture. */
export function IconButton({ label, keys, look = 'quiet', children, ...props }: IconButtonProps): ReactElement {
  return (
    <TooltipTrigger delay={500}>
      <AriaButton {...props} aria-label={label} className={classes(css.button, css.icon, css[look])}>
        {children}
      </AriaButton>
      <Tip>
        {label}
        {keys !== undefined && <kbd className={css.keys}>{keys}</kbd>}
      </Tip>
    </TooltipTrigger>
  );
}
