import type { Content, ContentTable, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import { describe, expect, it } from 'vitest';
import { CAUTIONS } from '../../../app/report/cautions.ts';
import { verdictText } from '../../../app/report/verdict.ts';
import { MARGINS_PT, PAGE_SIZES, roomOn } from '../../../main/pdf/page.ts';
import { runDocument } from '../../../main/pdf/run-document.ts';
import { bookmarksOf, nodesOf, picturesOf, textOf } from './definition.ts';
import { crowdedReport, emptyReport, hostileReport, sampleReport, TITLE } from './reports.ts';

const report = sampleReport();
const sample = runDocument(report);

const tablesOf = (definition: TDocumentDefinitions): ContentTable['table'][] =>
  nodesOf(definition).flatMap(({ table }) => (table === undefined ? [] : [table as ContentTable['table']]));

describe('printed report of a run', () => {
  it('has its parts in the order of a review', () => {
    expect(bookmarksOf(sample)).toEqual([
      'Estimate of radiated emission',
      'Worst margin in each band',
      'Strongest causes',
      'Margin over frequency',
      'How sure',
      'Spectrum',
      'What radiates',
      'Worst lines',
      'What the worst lines are made of',
      'Contributors',
      'Findings on the board',
      'Board',
      'Limit',
      'Set-up',
      'Sources',
      'Current on plane and cables',
      'Model and caveats',
      'Notes',
      'Validation of the program',
      'Cautions',
      'Sign-off',
    ]);
  });

  it('says title, verdict, causes, sources, caveats, checks and every caution', () => {
    const { result, board } = report;
    const text = textOf(sample);
    for (const said of [
      TITLE.project,
      TITLE.author,
      TITLE.dateText,
      TITLE.note,
      result.board.name,
      result.board.sha256,
      verdictText(result),
      'CLK_25M through the damper cable',
      'Most of it comes from net CLK_25M',
      'Laboratory: ±6.3 dB',
      '51 checks pass, 2 fail',
      'Prepared',
      'Reviewed',
      'Approved',
      'Signature',
      ...CAUTIONS,
      ...result.notes,
      ...result.caveats.map(({ message }) => message),
      ...result.findings.map(({ message }) => message),
      ...board.waveforms.map(({ name }) => name),
      ...board.cables.map(({ name }) => name),
    ]) {
      expect(text).toContain(said);
    }
  });

  it('draws spectrum, strips, board, layers, currents, cables and set-up', () => {
    const large = picturesOf(sample).filter((source) => source.length > 1500);
    // Strip on the summary page; spectrum and strip; mechanisms; board; layers; set-up; plane and cables for three lines.
    expect(large).toHaveLength(1 + 2 + 1 + 1 + 1 + 1 + 3 * 2);
    for (const source of picturesOf(sample)) expect(source).not.toMatch(/NaN|undefined|Infinity|class=/);
  });

  it('fits every table into the width of its paper', () => {
    for (const paper of ['A4', 'Letter'] as const) {
      const definition = runDocument(sampleReport({ paper }));
      const { widthPt } = roomOn(paper);
      const { widthPt: paperPt } = PAGE_SIZES[paper];
      expect(widthPt).toBeCloseTo(paperPt - MARGINS_PT.left - MARGINS_PT.right, 9);
      const fixed = tablesOf(definition).filter(({ widths }) =>
        (widths as unknown[]).every((w) => typeof w === 'number'),
      );
      expect(fixed.length).toBeGreaterThan(12);
      for (const { widths } of fixed) {
        const sum = (widths as number[]).reduce((one, other) => one + other, 0);
        expect(sum).toBeLessThan(widthPt);
      }
    }
  });

  it('keeps headings with what follows: in a block that does not break, or in the head of its table', () => {
    // A section's title is bold and 11.5 points high.
    const isTitle = (value: unknown): boolean => (value as { fontSize?: unknown }).fontSize === 11.5;
    const holdsTitle = (content: Content): boolean => nodesOf({ content: [content] }).some(isTitle);
    const holders = (sample.content as Content[]).filter(holdsTitle);
    expect(holders).toHaveLength(20);
    for (const holder of holders) {
      const { unbreakable, table } = holder as { unbreakable?: boolean; table?: ContentTable['table'] };
      if (unbreakable === true) continue;
      expect(table!.headerRows).toBe(2);
      expect(table!.keepWithHeaderRows).toBe(1);
      expect(holdsTitle(table!.body[0]![0] as Content)).toBe(true);
    }
  });

  it('repeats the head of a table on every page and breaks no row', () => {
    const heads = tablesOf(sample).filter(({ headerRows }) => headerRows !== undefined);
    expect(heads.length).toBeGreaterThan(10);
    for (const { headerRows, keepWithHeaderRows, dontBreakRows, body } of heads) {
      expect(dontBreakRows).toBe(true);
      expect(body.length).toBeGreaterThanOrEqual(headerRows! + keepWithHeaderRows!);
    }
  });

  it('numbers its pages and says what it is on each', () => {
    const { header, footer } = sample as unknown as {
      header: () => Content;
      footer: (page: number, pages: number) => Content;
    };
    const head = textOf({ content: [header()] });
    expect(head).toContain('Greenhouse · Greenhouse damper controller, revision C');
    expect(head).toContain('run 12 · 2031-03-03 14:05 UTC · 3f1c9a7e5b2d');
    expect(textOf({ content: [footer(3, 9)] })).toContain('page 3 of 9');
  });

  it('describes itself, in one language, without a link, a script or a file', () => {
    expect(sample.info).toMatchObject({
      title: 'Estimate of radiated emission: Greenhouse damper controller, revision C',
      author: 'A. Sample',
      subject: 'Greenhouse; Greenhouse damper controller, revision C; run 12',
      creationDate: new Date('2031-03-03T12:00:00Z'),
    });
    expect(sample.language).toBe('en');
    for (const node of nodesOf(sample)) {
      expect(Object.keys(node)).not.toEqual(
        expect.arrayContaining([expect.stringMatching(/^(link|linkTo.*|image|qr|attachment)$/)]),
      );
    }
  });

  it('stands without points, planes, sources, cables, title or checks', () => {
    const text = textOf(runDocument(emptyReport()));
    expect(text).toContain('no line in the judged range');
    expect(text).toContain('not stored');
    expect(text).toContain('Not run for this report.');
    expect(text).not.toMatch(/NaN|undefined|Infinity|null/);
    expect(bookmarksOf(runDocument(emptyReport()))).not.toContain('Worst lines');
  });

  it('shows hostile names as the text they are, with no character that cannot be printed', () => {
    const definition = runDocument(hostileReport());
    const text = textOf(definition);
    expect(text).toContain('</text></svg><script>');
    expect(text).toContain('\\u{202e}\\u{6f22}\\u{5b57}');
    expect(text).not.toContain('N'.repeat(400));
    const all = [text, ...picturesOf(definition), JSON.stringify(definition.info)].join('');
    expect(all.search(/[\p{Cf}\p{Cs}\p{Script=Han}\p{Script=Hebrew}\p{Emoji_Presentation}]/u)).toBe(-1);
  });

  it('ends its tables some time, and says how many rows are left', () => {
    const definition = runDocument(crowdedReport());
    const text = textOf(definition);
    const rows = Math.max(...tablesOf(definition).map(({ body }) => body.length));
    expect(rows).toBeLessThanOrEqual(63);
    expect(text).toContain('The 2960 readings that follow have larger margins');
    expect(text).toContain('90 more in the JSON result.');
    expect(text).toContain('140 more in the JSON result.');
    expect(text).toContain('140 more in the board file.');
    expect(text).toContain('160 more in the JSON result.');
    expect(text).toContain('more, weaker ones.');
  });
});
