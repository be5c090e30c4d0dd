import type { ReactElement } from 'react';

/** Room for rows of a long table that are not in the page because they are out of view. */
export const RowSpacer = ({
  heightPx,
  columns,
}: {
  readonly heightPx: number;
  readonly columns: number;
}): ReactElement => (
  <tr>
    <td colSpan={columns} style={{ height: heightPx, padding: 0 }} />
  </tr>
);
