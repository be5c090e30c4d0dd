import { type ReactElement, useRef } from 'react';
import { formatQuantity } from '../../app/units/quantity-text.ts';
import { QuantityField } from '../components/quantity-field.tsx';
import { Slider } from '../components/slider.tsx';
import { DECIMAL_SIGN, frequencyText } from '../i18n/format.ts';
import { editSources } from '../state/document.ts';
import { GESTURE } from '../state/history.ts';
import type { Effect } from './effects.ts';
import css from './levers.module.css';
import type { QuickLever } from './quick-lever.ts';
import { changeText, NO_CHANGE } from './worst-words.ts';

export interface LeverRowProps {
  readonly lever: QuickLever;
  /** Of the usual change; undefined: not known yet, null: cannot be told. */
  readonly effect: Effect | null | undefined;
  /** The line where its net comes nearest to the limit. */
  readonly ownHz: number | null;
}

/** One quantity: typed, or pulled while the worst margin moves. */
export function LeverRow({ lever, effect, ownHz }: LeverRowProps): ReactElement {
  const { key, label, step, remark, value, form, most, probe, set } = lever;
  const range = useSteadyRange(lever);
  const words = (quantity: number) => formatQuantity(quantity, form, { digits: 3, decimal: DECIMAL_SIGN });
  return (
    <div className={css.row}>
      <QuantityField
        label={label}
        value={value}
        form={form}
        min={0}
        max={most}
        onCommit={(typed) => typed !== null && editSources(step, (sources) => set(sources, typed))}
      />
      <div className={css.pull}>
        <Slider
          label={step}
          value={value}
          range={range}
          valueText={words(value)}
          onChange={(pulled, gesture) =>
            editSources(
              step,
              (sources) => set(sources, pulled),
              gesture === null ? `lever ${key}` : `${GESTURE}${gesture}`,
            )
          }
        />
        <span className={css.ends} aria-hidden="true">
          <span>{words(range.min)}</span>
          <span>{words(range.max)}</span>
        </span>
      </div>
      <span className={css.effect}>
        {probe !== null && effect !== undefined && (
          <>
            {probe.label}: {effect === null ? 'to be estimated' : effectText(effect, ownHz)}
          </>
        )}
      </span>
      {remark !== null && <span className={css.remark}>{remark}</span>}
    </div>
  );
}

/** The worst margin's change; where that stands still, the change at the net's own line. */
function effectText({ worstDb, ownDb }: Effect, ownHz: number | null): string {
  const isFelt = changeText(worstDb) !== NO_CHANGE;
  if (isFelt || ownHz === null || ownDb === null) return `worst margin ${changeText(worstDb)}`;
  return `${changeText(ownDb)} at ${frequencyText(ownHz)}, worst margin stays`;
}

/** The range grows with a value beyond it, and does not shrink again under the hand. */
function useSteadyRange({ range }: QuickLever): QuickLever['range'] {
  const widest = useRef(range);
  if (range.max > widest.current.max || range.scale === 'logarithmic') widest.current = range;
  return widest.current;
}
