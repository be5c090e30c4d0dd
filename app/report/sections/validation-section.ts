import { type Column, name, note, paragraph, type Section, strong, type Text, table } from '../blocks.ts';
import { countText } from '../format.ts';
import type { ValidationSummary } from '../validation-summary.ts';

const MOST_ROWS = 60;

const COLUMNS: readonly Column[] = [
  { head: 'Compared', width: 46 },
  { head: 'Outside values', width: 30 },
  { head: 'Pass', width: 8, isNumber: true },
  { head: 'Fail', width: 8, isNumber: true },
  { head: 'Info', width: 8, isNumber: true },
];

/** How the program's own published checks came out; how to run them when that was not asked for. */
export function validationSection(summary: ValidationSummary | null): Section {
  const title = 'Validation of the program';
  if (summary === null || summary.groups.length === 0) {
    return {
      title,
      blocks: [
        paragraph(
          'Not run for this report. "quietboard validate" compares the program with standards, books, closed forms and a general field solver, and prints every row.',
        ),
      ],
    };
  }
  const { groups, programVersion } = summary;
  const total = (key: 'pass' | 'fail' | 'info') => groups.reduce((sum, group) => sum + group[key], 0);
  const left = groups.length - MOST_ROWS;
  const rows = groups
    .slice(0, MOST_ROWS)
    .map(({ topic, statuses, pass, fail, info }): Text[] => [
      name(topic, 80),
      statuses.join(', '),
      String(pass),
      fail > 0 ? strong(String(fail)) : '0',
      String(info),
    ]);
  return {
    title,
    blocks: [
      paragraph(
        `quietboard ${programVersion}: `,
        strong(`${countText(total('pass'), 'check passes', 'checks pass')}, ${total('fail')} fail`),
        `, ${total('info')} are for information. Each compares a number from outside with what the program's own kernels compute.`,
      ),
      table(COLUMNS, rows),
      ...(left > 0 ? [note(`And ${left} more topics.`)] : []),
    ],
  };
}
