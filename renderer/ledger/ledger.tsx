import { type ReactElement, useState } from 'react';
import { z } from 'zod';
import { Tabs } from '../components/tabs.tsx';
import { useRemembered } from '../state/remembered.ts';
import { ComparisonView } from './comparison-view.tsx';
import type { RunPair } from './pair.ts';
import { RunTable } from './run-table.tsx';
import { TrendView } from './trend-view.tsx';

const viewSchema = z.enum(['runs', 'comparison', 'trend']);

/** Revisions and runs, two of them compared, and how the margins moved. */
export function Ledger(): ReactElement {
  const [view, setView] = useRemembered('ledger.view', viewSchema, 'runs');
  const [pair, setPair] = useState<RunPair>({ before: null, after: null });
  const compare = (chosen: RunPair) => {
    setPair(chosen);
    setView('comparison');
  };
  return (
    <Tabs
      label="Ledger"
      selected={view}
      onSelect={(name) => setView(viewSchema.parse(name))}
      tabs={[
        { name: 'runs', label: 'Runs', content: <RunTable onCompare={compare} /> },
        { name: 'comparison', label: 'Comparison', content: <ComparisonView pair={pair} onChange={setPair} /> },
        { name: 'trend', label: 'Trend', content: <TrendView /> },
      ]}
    />
  );
}
