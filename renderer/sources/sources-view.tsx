import type { ReactElement } from 'react';
import { z } from 'zod';
import { Tabs } from '../components/tabs.tsx';
import { useProblems } from '../state/hooks.ts';
import { useRemembered } from '../state/remembered.ts';
import { NetEditor } from './net-editor.tsx';
import { NetTable } from './net-table.tsx';
import css from './sources.module.css';
import { WaveformEditor } from './waveform-editor.tsx';

const viewSchema = z.enum(['nets', 'waveforms']);

/** What switches on the board: which nets, from which pin, with what waveform, into what loads. */
export function SourcesView(): ReactElement {
  const [view, setView] = useRemembered('sources.view', viewSchema, 'nets');
  const problems = useProblems();
  return (
    <div className={css.view}>
      {problems.length > 0 && (
        <ul className={css.problems} role="alert">
          {problems.slice(0, 4).map(({ path, text }) => (
            <li key={path}>{text}</li>
          ))}
          {problems.length > 4 && <li>and {problems.length - 4} more</li>}
        </ul>
      )}
      <Tabs
        label="Sources"
        selected={view}
        onSelect={(name) => setView(viewSchema.parse(name))}
        tabs={[
          {
            name: 'nets',
            label: 'Nets',
            content: (
              <div className={css.nets}>
                <NetTable />
                <NetEditor />
              </div>
            ),
          },
          { name: 'waveforms', label: 'Waveforms', content: <WaveformEditor /> },
        ]}
      />
    </div>
  );
}
