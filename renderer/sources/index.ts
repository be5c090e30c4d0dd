import type { Panel } from '../shell/panel.ts';
import { SourcesView } from './sources-view.tsx';

export const sourcesPanel: Panel = { name: 'sources', label: 'Sources', place: 'tab', Content: SourcesView };
