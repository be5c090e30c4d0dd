import type { Panel } from '../shell/panel.ts';
import { RangeStrip } from './range-strip.tsx';
import { Shares } from './shares.tsx';
import { SpectrumView } from './spectrum-view.tsx';

export const rangeStripPanel: Panel = { name: 'range-strip', label: 'Range', place: 'strip', Content: RangeStrip };
export const spectrumPanel: Panel = { name: 'spectrum', label: 'Spectrum', place: 'spectrum', Content: SpectrumView };
export const sharesPanel: Panel = { name: 'shares', label: 'Shares', place: 'tab', Content: Shares };
