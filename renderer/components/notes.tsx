import type { ReactElement, ReactNode } from 'react';
import { classes } from './classes.ts';
import { Icon } from './icons.tsx';
import css from './notes.module.css';

export interface EmptyStateProps {
  /** What would be here. */
  readonly title: string;
  /** How to get it. */
  readonly children?: ReactNode;
}

/** In place of a view that has nothing to show yet. */
export const EmptyState = ({ title, children }: EmptyStateProps): ReactElement => (
  <div className={css.empty}>
    <p className={css.title}>{title}</p>
    {children !== undefined && <div className={css.text}>{children}</div>}
  </div>
);

export interface NoteProps {
  /** What happened, or what must be known. */
  readonly title: ReactNode;
  /** Where, and what to do. */
  readonly children?: ReactNode;
  readonly actions?: ReactNode;
}

/** A failure that stays where it happened: what, where, what to do. */
export const ErrorNotice = ({ title, children, actions }: NoteProps): ReactElement => (
  <div className={classes(css.note, css.problem)} role="alert">
    <Icon name="warning" />
    <NoteBody title={title} actions={actions}>
      {children}
    </NoteBody>
  </div>
);

/** Something to know that is no failure. */
export const InfoNotice = ({ title, children, actions }: NoteProps): ReactElement => (
  <div className={css.note} role="status">
    <Icon name="info" />
    <NoteBody title={title} actions={actions}>
      {children}
    </NoteBody>
  </div>
);

const NoteBody = ({ title, children, actions }: NoteProps): ReactElement => (
  <div className={css.body}>
    <p className={css.title}>{title}</p>
    {children !== undefined && <div className={css.text}>{children}</div>}
    {actions !== undefined && <div className={css.actions}>{actions}</div>}
  </div>
);
