import type { Panel } from '../shell/panel.ts';
import { SetupView } from './setup-view.tsx';

export const setupPanel: Panel = { name: 'setup', label: 'Set-up', place: 'tab', Content: SetupView };
