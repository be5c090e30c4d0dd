import { lazy } from 'react';
import type { Panel } from '../shell/panel.ts';

/** The pages bring a PDF reader with them: only when they are asked for. */
const ReportView = lazy(async () => ({ default: (await import('./report-view.tsx')).ReportView }));

export const reportPanel: Panel = { name: 'report', label: 'Report', place: 'tab', Content: ReportView };
