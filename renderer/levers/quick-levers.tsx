import { type ReactElement, useMemo, useState } from 'react';
import { Button } from '../components/button.tsx';
import { TextField } from '../components/text-field.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { frequencyText, marginText, numberText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelection, useSources } from '../state/hooks.ts';
import { selectNet } from '../state/selection.ts';
import { showTab } from '../state/tabs.ts';
import { type Effects, useEffects } from './effects.ts';
import { LeverRow } from './lever-row.tsx';
import css from './levers.module.css';
import { type QuickLever, quickLevers } from './quick-lever.ts';
import { type RankedSubject, rankedSubjects } from './subjects.ts';

const AT_FIRST = 3;
const NO_POINTS: readonly never[] = [];

/** Levers of the nets that count, strongest first; any other by its name. */
export function QuickLevers(): ReactElement | null {
  const sources = useSources();
  const { lineHz } = useSelection();
  // Of the kept state: the order must not change under the hand.
  const points = useApp(({ kept, result }) => (kept ?? result)?.result.points ?? NO_POINTS);
  const [search, setSearch] = useState('');
  const [count, setCount] = useState(AT_FIRST);
  const subjects = useMemo(
    () => (sources === null ? [] : rankedSubjects(points, lineHz, sources)),
    [points, lineHz, sources],
  );
  const wanted = search.trim().toLowerCase();
  const found = subjects.filter(({ name }) => name.toLowerCase().includes(wanted));
  const shown = found.slice(0, count);
  const groups = sources === null ? [] : shown.map((subject) => ({ subject, levers: quickLevers(sources, subject) }));
  const effects = useEffects(
    groups.flatMap(({ subject: { frequencyHz }, levers }) => levers.map((lever) => ({ lever, frequencyHz }))),
  );
  if (sources === null) return null;
  return (
    <section aria-label="Changes answered at once">
      <div className={css.heading}>
        <h3>
          At once
          <HelpTip question="How are these answered so fast?">
            <p>
              How strongly each net radiates from each of its pins is solved once and kept. Another edge, resistor or
              load only mixes the kept fields anew: the same result as an estimate, within about 0.1 dB.
            </p>
            <p>The order is how near the limit each net would come by itself, in the kept state.</p>
          </HelpTip>
        </h3>
        <TextField label="Find a net" isLabelHidden placeholder="Find a net" value={search} onChange={setSearch} />
      </div>
      {groups.map(({ subject, levers }) => (
        <Group key={`${subject.kind} ${subject.name}`} subject={subject} levers={levers} effects={effects} />
      ))}
      {found.length === 0 && <p className={css.quiet}>No driven net is called like this.</p>}
      {found.length > shown.length && (
        <Button look="quiet" onPress={() => setCount(count + 2 * AT_FIRST)}>
          Show more ({numberText(found.length - shown.length)})
        </Button>
      )}
    </section>
  );
}

interface GroupProps {
  readonly subject: RankedSubject;
  readonly levers: readonly QuickLever[];
  readonly effects: Effects;
}

function Group({ subject, levers, effects }: GroupProps): ReactElement {
  const { kind, name, ownMarginDb, frequencyHz } = subject;
  const { net } = useSelection();
  const isChosen = kind === 'net' && net === name;
  return (
    <section className={css.group} aria-label={`Levers of ${name}`} data-chosen={isChosen || undefined}>
      <h4>
        {kind === 'net' ? (
          <button
            type="button"
            className={css.name}
            aria-pressed={isChosen}
            onClick={() => selectNet(isChosen ? null : name)}
          >
            {name}
          </button>
        ) : (
          <span>{name} (current loop)</span>
        )}
        <span className={css.own}>
          {frequencyHz === null
            ? 'makes no line'
            : `alone ${marginText(ownMarginDb)} dB at ${frequencyText(frequencyHz)}`}
        </span>
      </h4>
      {levers.map((lever) => (
        <LeverRow key={lever.key} lever={lever} effect={effects.get(lever.key)} ownHz={frequencyHz} />
      ))}
      {levers.length === 0 && (
        <p className={css.quiet}>
          Its waveform is measured or drawn and has no single edge time.{' '}
          <Button look="quiet" onPress={() => showTab('sources')}>
            Change it in Sources
          </Button>
        </p>
      )}
    </section>
  );
}
