import type { ReactElement, ReactNode } from 'react';
import { Dialog, DialogTrigger, Popover } from 'react-aria-components';
import type { Caveat } from '../../app/errors.ts';
import { countText, rangeText } from '../../app/report/format.ts';
import { Button } from '../components/button.tsx';
import { Icon } from '../components/icons.tsx';
import { inLocale } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useProblems } from '../state/hooks.ts';
import { showTab } from '../state/tabs.ts';
import css from './status-bar.module.css';

const NO_CAVEATS: readonly Caveat[] = [];

/** Where the model is outside its range: counted in view, one click away. */
export function CaveatList(): ReactElement | null {
  const caveats = useApp((state) => state.result?.result.caveats ?? NO_CAVEATS);
  const notes = useApp((state) => state.result?.result.notes) ?? [];
  if (caveats.length + notes.length === 0) return null;
  const text = caveats.length > 0 ? countText(caveats.length, 'caveat') : countText(notes.length, 'note');
  return (
    <CountedList title="Caveats of this result" button={text}>
      {caveats.map((caveat) => (
        <li key={`${caveat.code} ${caveat.where} ${caveat.fromHz}`}>
          {inLocale(caveat.message)}
          <span className={css.where}>
            {[caveat.where, inLocale(rangeText(caveat.fromHz, caveat.toHz))].filter(Boolean).join(', ')}
          </span>
        </li>
      ))}
      {notes.map((note) => (
        <li key={note}>{note}</li>
      ))}
    </CountedList>
  );
}

/** What keeps the document from being estimated. */
export function ProblemList(): ReactElement | null {
  const problems = useProblems();
  if (problems.length === 0) return null;
  return (
    <CountedList
      title="To be put right before the next estimate"
      button={
        <span id="problem-count" className={css.problem}>
          <Icon name="warning" />
          {countText(problems.length, 'thing')} to put right
        </span>
      }
      actions={<Button onPress={() => showTab('sources')}>Show sources</Button>}
    >
      {problems.map(({ path, text }) => (
        <li key={`${path} ${text}`}>{text}</li>
      ))}
    </CountedList>
  );
}

interface CountedListProps {
  readonly title: string;
  readonly button: ReactNode;
  readonly actions?: ReactNode;
  readonly children: ReactNode;
}

const CountedList = ({ title, button, actions, children }: CountedListProps): ReactElement => (
  <DialogTrigger>
    <Button look="quiet">{button}</Button>
    <Popover className={css.popover!} placement="top start" offset={4}>
      <Dialog className={css.list!} aria-label={title}>
        <h2>{title}</h2>
        <ul>{children}</ul>
        {actions}
      </Dialog>
    </Popover>
  </DialogTrigger>
);
