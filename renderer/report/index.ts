import type { Panel } from '../shell/panel.ts';
import { ReportView } from './report-view.tsx';

export const reportPanel: Panel = { name: 'report', label: 'Report', place: 'tab', Content: ReportView };
