import type { Panel } from '../shell/panel.ts';
import { LeversView } from './levers-view.tsx';

export const leversPanel: Panel = { name: 'levers', label: 'Levers', place: 'tab', Content: LeversView };
