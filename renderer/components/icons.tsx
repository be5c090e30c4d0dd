import type { ReactElement } from 'react';

/** Strokes on a 16 × 16 field, drawn for this program. */
const PATHS = {
  menu: 'M2.5 4h11M2.5 8h11M2.5 12h11',
  undo: 'M3 6.5h6.5a3.5 3.5 0 0 1 0 7H6M3 6.5l3-3M3 6.5l3 3',
  redo: 'M13 6.5H6.5a3.5 3.5 0 0 0 0 7H10M13 6.5l-3-3M13 6.5l-3 3',
  search: 'M7 2.5a4.5 4.5 0 1 0 0 9a4.5 4.5 0 0 0 0-9M10.5 10.5L14 14',
  close: 'M4 4l8 8M12 4l-8 8',
  down: 'M4.5 6.5L8 10l3.5-3.5',
  left: 'M9.5 4.5L6 8l3.5 3.5',
  right: 'M6.5 4.5L10 8l-3.5 3.5',
  theme: 'M8 2.5a5.5 5.5 0 1 0 0 11zM8 2.5a5.5 5.5 0 0 1 0 11',
  fit: 'M2.5 6v-3.5h3.5M10 2.5h3.5v3.5M13.5 10v3.5h-3.5M6 13.5h-3.5v-3.5',
  plus: 'M8 3v10M3 8h10',
  minus: 'M3 8h10',
  trash: 'M3 4.5h10M6.5 4.5v-2h3v2M4.5 4.5l.5 9h6l.5-9',
  copy: 'M5.5 5.5h8v8h-8zM3.5 10.5h-1v-8h8v1',
  more: 'M3.5 8h.01M8 8h.01M12.5 8h.01',
  info: 'M8 2.5a5.5 5.5 0 1 0 0 11a5.5 5.5 0 0 0 0-11M8 7.5v3.5M8 5v.01',
  warning: 'M8 2.5L14 13.5H2zM8 6.5v3.5M8 12v.01',
  stop: 'M4.5 4.5h7v7h-7z',
  layers: 'M8 2.5l6 3l-6 3l-6-3zM2 8.5l6 3l6-3M2 11l6 3l6-3',
  eye: 'M1.5 8c3-5 10-5 13 0c-3 5-10 5-13 0M8 6.2a1.8 1.8 0 1 0 0 3.6a1.8 1.8 0 0 0 0-3.6',
  save: 'M3 3h8l2 2v8H3zM5.5 3v3h4v-3M5 13v-4h6v4',
} as const;

export type IconName = keyof typeof PATHS;

/** A picture beside words or in an `IconButton`; never the only name of anything. */
export function Icon({ name }: { readonly name: IconName }): ReactElement {
  return (
    <svg width="1em" height="1em" viewBox="0 0 16 16" aria-hidden="true" focusable="false" style={{ fontSize: '1rem' }}>
      <path
        d={PATHS[name]}
        fill="none"
        stroke="currentColor"
        strokeWidth="1.3"
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </svg>
  );
}
