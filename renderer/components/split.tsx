import { type KeyboardEvent, type PointerEvent, type ReactElement, type ReactNode, useRef, useState } from 'react';
import { classes } from './classes.ts';
import css from './split.module.css';

export interface SplitProps {
  /** What the border between both moves: "Width of the board". */
  readonly label: string;
  readonly direction: 'row' | 'column';
  /** Share of the first part, 0–1. */
  readonly share: number;
  readonly onChange: (share: number) => void;
  /** Least share of either part. */
  readonly least?: number;
  readonly first: ReactNode;
  readonly second: ReactNode;
}

const STEP = 0.02;
const LARGE_STEP = 0.1;

/** Two parts with a border that can be moved, by pointer or by arrow keys (Home, End: as far as it goes; double click: half). */
export function Split({ label, direction, share, onChange, least = 0.15, first, second }: SplitProps): ReactElement {
  const box = useRef<HTMLDivElement>(null);
  const [isDragged, setIsDragged] = useState(false);
  const clamp = (value: number) => Math.min(1 - least, Math.max(least, value));
  const isRow = direction === 'row';

  const drag = (event: PointerEvent) => {
    if (!isDragged || box.current === null) return;
    const { left, top, width, height } = box.current.getBoundingClientRect();
    onChange(clamp(isRow ? (event.clientX - left) / width : (event.clientY - top) / height));
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const next = movedBy(event, share, isRow);
    if (next === null) return;
    event.preventDefault();
    onChange(clamp(next));
  };
  const now = Math.round(clamp(share) * 100);
  return (
    <div ref={box} className={classes(css.split, css[direction])}>
      <div className={css.part} style={{ flex: `${clamp(share)} 1 0` }}>
        {first}
      </div>
      {/* biome-ignore lint/a11y/useSemanticElements: a separator that moves has no HTML element (WAI-ARIA window splitter). */}
      <div
        role="separator"
        tabIndex={0}
        className={classes(css.border, isDragged && css.dragged)}
        aria-label={label}
        aria-orientation={isRow ? 'vertical' : 'horizontal'}
        aria-valuenow={now}
        aria-valuemin={Math.round(least * 100)}
        aria-valuemax={Math.round((1 - least) * 100)}
        onKeyDown={onKeyDown}
        onDoubleClick={() => onChange(0.5)}
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          setIsDragged(true);
        }}
        onPointerMove={drag}
        onPointerUp={() => setIsDragged(false)}
        onPointerCancel={() => setIsDragged(false)}
      />
      <div className={css.part} style={{ flex: `${1 - clamp(share)} 1 0` }}>
        {second}
      </div>
    </div>
  );
}

function movedBy({ key, shiftKey }: KeyboardEvent, share: number, isRow: boolean): number | null {
  const step = shiftKey ? LARGE_STEP : STEP;
  switch (key) {
    case isRow ? 'ArrowLeft' : 'ArrowUp':
      return share - step;
    case isRow ? 'ArrowRight' : 'ArrowDown':
      return share + step;
    case 'Home':
      return 0;
    case 'End':
      return 1;
    default:
      return null;
  }
}
