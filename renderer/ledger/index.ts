import type { Panel } from '../shell/panel.ts';
import { Ledger } from './ledger.tsx';

export const ledgerPanel: Panel = { name: 'ledger', label: 'Ledger', place: 'tab', Content: Ledger };
