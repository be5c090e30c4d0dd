import { type ReactElement, useLayoutEffect, useRef } from 'react';
import { Slider as AriaSlider, SliderThumb, SliderTrack } from 'react-aria-components';
import css from './slider.module.css';
import { positionOf, SLIDER_STEPS, type SliderRange, valueAt } from './slider-scale.ts';

export interface SliderProps {
  /** What it sets, for screen readers. */
  readonly label: string;
  readonly value: number;
  readonly range: SliderRange;
  /** The value in words, as it is read aloud: "3.3 ns". */
  readonly valueText: string;
  /** `gesture`: the number of the pull it belongs to, from pressing to letting go; null for keys. */
  readonly onChange: (value: number, gesture: number | null) => void;
}

/** Counts the pulls of all sliders, so that no two have the same number. */
let gestures = 0;

/** A quantity pulled along a range that follows the pull at once. */
export function Slider({ label, value, range, valueText, onChange }: SliderProps): ReactElement {
  const gesture = useRef<number | null>(null);
  const input = useRef<HTMLInputElement>(null);
  /** Positions between those that round to the same value: without it arrow keys could stand still. */
  const pulled = useRef({ position: positionOf(value, range), value });
  if (pulled.current.value !== value) pulled.current = { position: positionOf(value, range), value };
  // The component reads out positions; people want the quantity. It sets its own text again whenever it is drawn.
  useLayoutEffect(() => input.current?.setAttribute('aria-valuetext', valueText));
  const take = (position: number) => {
    const next = valueAt(position, range);
    pulled.current = { position, value: next };
    onChange(next, gesture.current);
  };
  return (
    <AriaSlider
      className={css.slider!}
      aria-label={label}
      minValue={0}
      maxValue={SLIDER_STEPS}
      step={1}
      value={Math.round(pulled.current.position)}
      onChange={(position) => take(position as number)}
      onChangeEnd={() => {
        gesture.current = null;
      }}
    >
      <SliderTrack
        className={css.track!}
        onPointerDownCapture={() => {
          gesture.current = ++gestures;
        }}
      >
        {({ state }) => (
          <>
            <span className={css.filled} style={{ width: `${state.getThumbPercent(0) * 100}%` }} />
            <SliderThumb className={css.thumb!} inputRef={input} />
          </>
        )}
      </SliderTrack>
    </AriaSlider>
  );
}
