import type { PDFDocumentProxy } from 'pdfjs-dist';
import { type ReactElement, useEffect, useState } from 'react';
import { z } from 'zod';
import type { Input } from '../../app/contract/procedures.ts';
import { call } from '../api/api.ts';
import { Button } from '../components/button.tsx';
import { EmptyState, ErrorNotice, InfoNotice } from '../components/notes.tsx';
import { Select } from '../components/select.tsx';
import { TextField } from '../components/text-field.tsx';
import { dateText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useIsOutdated } from '../state/hooks.ts';
import { attempt, failureText } from '../state/notices.ts';
import { useRemembered } from '../state/remembered.ts';
import { saveBytes } from '../state/save-bytes.ts';
import { openPages } from './open-pages.ts';
import { PagePicture } from './page-picture.tsx';
import { printPages } from './print-pages.ts';
import css from './report.module.css';
import { reportSubjects } from './report-subject.ts';

const paperSchema = z.enum(['A4', 'Letter']);
const subjectSchema = z.enum(['run', 'comparison', 'trend']);
/** Height over width. */
const SHAPES = { A4: 297 / 210, Letter: 11 / 8.5 } as const;

type Format = NonNullable<Input<'report.render'>['format']>;

const FORMATS: readonly { readonly format: Format; readonly label: string; readonly isForAll: boolean }[] = [
  { format: 'pdf', label: 'Save PDF', isForAll: true },
  { format: 'html', label: 'HTML', isForAll: true },
  { format: 'csv', label: 'CSV', isForAll: true },
  { format: 'json', label: 'JSON', isForAll: true },
  { format: 'junit', label: 'JUnit', isForAll: false },
];

/** The pages as they will print, and ways to take them along. */
export function ReportView(): ReactElement {
  const runs = useApp((state) => state.runs);
  const shownRun = useApp((state) => state.result?.run ?? null);
  const project = useApp((state) => state.project);
  const isOutdated = useIsOutdated();
  const [paper, setPaper] = useRemembered('report.paper', paperSchema, 'A4', 'program');
  const [author, setAuthor] = useRemembered('report.author', z.string(), '', 'program');
  const [name, setName] = useRemembered('report.subject', subjectSchema, 'run');
  const subjects = reportSubjects(runs, shownRun);
  const chosen = subjects.find((entry) => entry.name === name) ?? subjects[0];
  const request =
    project === null || chosen === undefined
      ? null
      : { projectId: project.projectId, subject: chosen.subject, paper, author, dateText: dateText(new Date()) };
  const preview = usePreview(request, `${project?.name} ${runs.map(({ run, note }) => `${run}${note}`).join()}`);
  if (request === null) {
    return (
      <EmptyState title="No report yet">
        <p>A report shows a kept run. Press Estimate: every estimate is kept.</p>
      </EmptyState>
    );
  }
  const save = (format: Format) =>
    attempt('Report', async () => {
      const { name: fileName, mediaType, bytes } = await call('report.render', { ...request, format });
      await saveBytes(fileName, mediaType, new Uint8Array(bytes));
    });
  return (
    <div className={css.report}>
      <div className={css.bar}>
        <Select
          label="About"
          value={chosen!.name}
          choices={subjects.map((entry) => ({ value: entry.name, label: entry.label }))}
          onChange={setName}
        />
        <Select
          label="Paper"
          value={paper}
          choices={paperSchema.options.map((value) => ({ value, label: value }))}
          onChange={setPaper}
        />
        <TextField label="Author" value={author} maxLength={200} onCommit={setAuthor} />
        <div className={css.buttons}>
          {FORMATS.filter(({ isForAll }) => isForAll || chosen!.name === 'run').map(({ format, label }) => (
            <Button key={format} look={format === 'pdf' ? 'primary' : 'plain'} onPress={() => void save(format)}>
              {label}
            </Button>
          ))}
          <Button
            isDisabled={preview.pages === null}
            onPress={() => void attempt('Print', () => printPages(preview.pages!))}
          >
            Print
          </Button>
        </div>
      </div>
      {isOutdated && name === 'run' && (
        <InfoNotice title="The board or the set-up was changed since this run">
          The report shows the run as it was. Estimate again to print the present state.
        </InfoNotice>
      )}
      {preview.failure !== null && <ErrorNotice title="The pages cannot be shown">{preview.failure}</ErrorNotice>}
      <section
        className={css.pages}
        data-own-arrows=""
        aria-label="Pages"
        aria-busy={preview.isLoading}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reached by the keys that scroll it
        tabIndex={0}
      >
        {preview.pages === null && preview.failure === null && <p className={css.wait}>Setting the pages…</p>}
        {preview.pages !== null &&
          numbersTo(preview.pages.numPages).map((number) => (
            <PagePicture key={number} pages={preview.pages!} number={number} shape={SHAPES[paper]} />
          ))}
      </section>
    </div>
  );
}

const numbersTo = (last: number): number[] => Array.from({ length: last }, (_, i) => i + 1);

interface Preview {
  readonly pages: PDFDocumentProxy | null;
  readonly failure: string | null;
  readonly isLoading: boolean;
}

/** The pages of the report asked for; the last ones stay until the next are there. `state`: what else they depend on. */
function usePreview(request: Omit<Input<'report.render'>, 'format'> | null, state: string): Preview {
  const [preview, setPreview] = useState<Preview>({ pages: null, failure: null, isLoading: true });
  const key = request === null ? null : JSON.stringify([request, state]);
  // biome-ignore lint/correctness/useExhaustiveDependencies: the key says when it is another report
  useEffect(() => {
    if (request === null) return;
    let isCurrent = true;
    setPreview((before) => ({ ...before, failure: null, isLoading: true }));
    const show = async () => {
      const { bytes } = await call('report.render', { ...request, format: 'pdf' });
      const pages = await openPages(new Uint8Array(bytes));
      if (isCurrent) setPreview({ pages, failure: null, isLoading: false });
      else void pages.destroy();
    };
    show().catch((error: unknown) => {
      if (isCurrent) setPreview({ pages: null, failure: failureText(error) ?? 'stopped', isLoading: false });
    });
    return () => {
      isCurrent = false;
    };
  }, [key]);
  const { pages } = preview;
  useEffect(() => () => void pages?.destroy(), [pages]);
  return preview;
}
