import { labelledLimits } from '../../../app/report/limit-labels.ts';
import type { ReportTitle } from '../../../app/report/report-title.ts';
import type { RunReport } from '../../../main/pdf/run-document.ts';
import { hostileBoard, hostileResult } from '../../support/hostile-names.ts';
import { denseResult, emptyResult, SAMPLE_LIMIT_LINES, sampleResult } from '../../support/sample-result.ts';
import { sampleResultBoard } from '../../support/sample-result-board.ts';

/** Invented reports for tests of the printed pages. */

export const TITLE: ReportTitle = {
  project: 'Greenhouse',
  author: 'A. Sample',
  dateText: '2031-03-03 14:05 UTC',
  runNumber: 12,
  note: 'before the second prototype',
};

export const sampleReport = (changes: Partial<RunReport> = {}): RunReport => ({
  result: sampleResult(),
  board: sampleResultBoard(),
  limitLines: SAMPLE_LIMIT_LINES,
  title: TITLE,
  paper: 'A4',
  validation: {
    programVersion: '0.1.0',
    groups: [
      { topic: 'Limit lines', statuses: ['seen', 'from memory'], pass: 31, fail: 0, info: 1 },
      { topic: 'Transmission lines', statuses: ['derived'], pass: 20, fail: 2, info: 3 },
    ],
  },
  ...changes,
});

export const hostileReport = (changes: Partial<RunReport> = {}): RunReport =>
  sampleReport({
    result: hostileResult(),
    board: hostileBoard(),
    title: {
      project: 'Проект \u202e漢字 </text><script>',
      author: '😀 Ω',
      dateText: '3 March 2031',
      runNumber: null,
      note: `${'N'.repeat(500)} שלום\r\n\t\x07`,
    },
    validation: null,
    ...changes,
  });

export const emptyReport = (): RunReport =>
  sampleReport({
    result: emptyResult(),
    board: {
      ...sampleResultBoard(),
      outlineM: [],
      stackup: [],
      planes: [],
      nets: [],
      waveforms: [],
      drives: [],
      loads: [],
      loops: [],
      cables: [],
      notes: '',
    },
    limitLines: labelledLimits([]),
    title: { project: '', author: '', dateText: '', runNumber: null, note: '' },
    validation: null,
  });

const LONG_NAMES = ['Сигнал_тактовый_', 'ΔΣ_MOD_', 'µC/RESET_', 'VERY_LONG/SHEET/PATH/NET_NAME_'];

/** Two hundred driven nets, three thousand readings, findings and caveats by the hundred. */
export function crowdedReport(): RunReport {
  const board = sampleResultBoard();
  const nets = Array.from({ length: 200 }, (_, i) => ({
    ...board.nets[i % board.nets.length]!,
    name: `${LONG_NAMES[i % 4]!.repeat(1 + (i % 3))}${i}`,
  }));
  const use = <Item extends { net: string; pin: string }>(items: readonly Item[], pinAt: number): Item[] =>
    nets.map(({ name, pins }, i) => ({ ...items[i % items.length]!, net: name, pin: pins.at(pinAt)!.name }));
  const dense = denseResult(3000);
  const points = dense.points.map((point, p) => ({
    ...point,
    contributors: Array.from({ length: 12 }, (_, c) => ({
      ...point.contributors[0]!,
      name: nets[(c * 7 + p) % nets.length]!.name,
    })),
  }));
  return sampleReport({
    board: { ...board, nets, drives: use(board.drives, 0), loads: use(board.loads, -1) },
    result: {
      ...dense,
      points,
      findings: nets.slice(0, 150).map(({ name }, i) => ({ ...dense.findings[i % 3]!, net: name })),
      caveats: nets.map(({ name }, i) => ({
        ...dense.caveats[0]!,
        where: name,
        message: `${i} ${'text '.repeat(30)}`,
      })),
      notes: nets.map(({ name }) => `${name}: pin chosen`),
    },
  });
}
