import { type ReactElement, useEffect, useState } from 'react';
import { VERDICT_STANDING } from '../../app/report/verdict.ts';
import { StandingMark } from '../components/marks/standing-mark.tsx';
import { frequencyText, levelText, marginText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelectedPoint, useShown } from '../state/hooks.ts';
import css from './levers.module.css';
import { causeText, changeText, spokenText } from './worst-words.ts';

/** The worst margin now, large, and against the kept state. */
export function Readout(): ReactElement {
  const shown = useShown();
  const kept = useApp((state) => state.kept?.result ?? null);
  const worst = shown?.worst ?? null;
  const verdict = shown?.verdict ?? null;
  const spoken = useRested(
    worst === null || shown!.isOutdated ? '' : spokenText(worst, shown!.points, kept?.worst ?? null),
  );
  if (shown === null || worst === null || verdict === null) {
    return <p className={css.quiet}>No worst margin: no line lies in the judged range, or the estimate is running.</p>;
  }
  const changeDb = kept?.worst ? worst.marginDb - kept.worst.marginDb : null;
  return (
    <section className={css.readout} aria-label="Worst margin" data-outdated={shown.isOutdated || undefined}>
      <p className={css.figure}>
        <StandingMark standing={VERDICT_STANDING[verdict]} />
        <span className={css.number} data-standing={VERDICT_STANDING[verdict]}>
          {marginText(worst.marginDb)} dB
        </span>
        {changeDb !== null && !shown.isOutdated && <span className={css.change}>{changeText(changeDb)}</span>}
      </p>
      <p>
        {shown.isOutdated ? 'Worst margin before this change, ' : 'Worst margin now, '}
        {causeText(worst, shown.points)}
        {kept?.worst && !shown.isOutdated && (
          <span className={css.quiet}>
            {' '}
            (was {marginText(kept.worst.marginDb)} dB at {frequencyText(kept.worst.frequencyHz)})
          </span>
        )}
      </p>
      <ChosenLine />
      <p className={css.hidden} role="status">
        {spoken}
      </p>
    </section>
  );
}

/** The chosen line when it is another one than the worst. */
function ChosenLine(): ReactElement | null {
  const shown = useShown();
  const point = useSelectedPoint();
  const kept = useApp((state) => state.kept?.result.points);
  if (point === null || shown === null || shown.isOutdated || point.frequencyHz === shown.worst?.frequencyHz)
    return null;
  const before = kept?.find(
    ({ frequencyHz, detector }) => frequencyHz === point.frequencyHz && detector === point.detector,
  );
  return (
    <p className={css.quiet}>
      Chosen line, {frequencyText(point.frequencyHz)}: {levelText(point.levelDbuvPerM)} dBµV/m, margin{' '}
      {marginText(point.marginDb)} dB{before !== undefined && ` (was ${marginText(before.marginDb)} dB)`}
    </p>
  );
}

/** A pull says nothing while it moves. */
const REST_MS = 900;

/** The text once it has not changed for a while: a screen reader is told where a pull ended, not every step of it. */
function useRested(text: string): string {
  const [rested, setRested] = useState('');
  useEffect(() => {
    const timer = setTimeout(() => setRested(text), REST_MS);
    return () => clearTimeout(timer);
  }, [text]);
  return rested;
}
