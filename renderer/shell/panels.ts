import { boardPanel } from '../board-view/index.ts';
import { ledgerPanel } from '../ledger/index.ts';
import { leversPanel } from '../levers/index.ts';
import { reportPanel } from '../report/index.ts';
import { setupPanel } from '../setup/index.ts';
import { sourcesPanel } from '../sources/index.ts';
import { rangeStripPanel, sharesPanel, spectrumPanel } from '../spectrum/index.ts';
import type { Panel } from './panel.ts';

/** All parts of the window, in the order of their tabs. A part adds its own line. */
export const PANELS: readonly Panel[] = [
  rangeStripPanel,
  boardPanel,
  spectrumPanel,
  sharesPanel,
  leversPanel,
  sourcesPanel,
  setupPanel,
  ledgerPanel,
  reportPanel,
];
