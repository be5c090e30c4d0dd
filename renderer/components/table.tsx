import type { ComponentProps, ReactElement, ReactNode } from 'react';
import { classes } from './classes.ts';
import css from './table.module.css';

/** Pieces of a plain table: hairlines, numbers to the right, headings that stay in view and can sort. */

export interface TableProps {
  /** What the table holds, for screen readers. */
  readonly label: string;
  readonly children: ReactNode;
}

export const Table = ({ label, children }: TableProps): ReactElement => (
  <table className={css.table} aria-label={label}>
    {children}
  </table>
);

export type SortDirection = 'ascending' | 'descending';

export interface HeadCellProps {
  readonly children: ReactNode;
  readonly isNumber?: boolean;
  /** Present: the column can sort. */
  readonly sort?: { readonly direction: SortDirection | null; readonly onSort: () => void };
}

export function HeadCell({ children, isNumber, sort }: HeadCellProps): ReactElement {
  const name = classes(css.head, isNumber && css.number);
  if (sort === undefined) {
    return (
      <th scope="col" className={name}>
        {children}
      </th>
    );
  }
  const arrow = sort.direction === null ? '' : sort.direction === 'ascending' ? '↑' : '↓';
  return (
    <th scope="col" className={name} aria-sort={sort.direction ?? 'none'}>
      <button type="button" className={css.sort} onClick={sort.onSort}>
        {children}
        <span className={css.arrow} aria-hidden="true">
          {arrow}
        </span>
      </button>
    </th>
  );
}

export interface RowProps extends ComponentProps<'tr'> {
  readonly isChosen?: boolean;
}

export const Row = ({ isChosen, className, ...props }: RowProps): ReactElement => (
  <tr {...props} aria-selected={isChosen} className={classes(css.row, isChosen && css.chosen, className)} />
);

export interface CellProps extends ComponentProps<'td'> {
  readonly isNumber?: boolean;
}

export const Cell = ({ isNumber, className, ...props }: CellProps): ReactElement => (
  <td {...props} className={classes(css.cell, isNumber && css.number, className)} />
);
