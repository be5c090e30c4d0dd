import { type ReactElement, useState } from 'react';
import { z } from 'zod';
import { Button } from '../components/button.tsx';
import { EmptyState } from '../components/notes.tsx';
import { frequencyText } from '../i18n/format.ts';
import { useShown } from '../state/hooks.ts';
import { useRemembered } from '../state/remembered.ts';
import { LineList } from './line-list.tsx';
import css from './spectrum.module.css';
import { SpectrumChart } from './spectrum-chart.tsx';
import { useZoom } from './zoom.ts';

const formSchema = z.enum(['chart', 'list']);

/** Levels against the limit lines, as a chart or as a list. */
export function SpectrumView(): ReactElement {
  const shown = useShown();
  const [form, setForm] = useRemembered('spectrum.form', formSchema, 'chart');
  const [zoom, setZoom] = useZoom();
  const [copied, setCopied] = useState('');
  return (
    <div className={css.view}>
      <div className={css.bar}>
        <Button look="quiet" aria-pressed={form === 'chart'} onPress={() => setForm('chart')}>
          Chart
        </Button>
        <Button look="quiet" aria-pressed={form === 'list'} onPress={() => setForm('list')}>
          List
        </Button>
        {zoom !== null && (
          <Button look="quiet" onPress={() => setZoom(null)}>
            {frequencyText(zoom[0])} to {frequencyText(zoom[1])}: show all
          </Button>
        )}
        <span className={css.state} role="status">
          {copied || stateText(shown?.source, shown?.isOutdated === true)}
        </span>
      </div>
      {shown === null && form === 'list' ? (
        <EmptyState title="No lines yet">
          <p>They come with the first estimate.</p>
        </EmptyState>
      ) : form === 'chart' ? (
        <SpectrumChart onSaid={setCopied} />
      ) : (
        <LineList points={shown!.points} onSaid={setCopied} />
      )}
    </div>
  );
}

function stateText(source: string | undefined, isOutdated: boolean): string {
  if (source === 'partial') return 'estimating: lines so far';
  if (source === 'trial') return 'quick answer to the change';
  return isOutdated ? 'out of date: the board or the set-up was changed since' : '';
}
