import type { ReactElement } from 'react';
import { Button } from '../components/button.tsx';
import { Disclosure } from '../components/disclosure.tsx';
import { InfoNotice } from '../components/notes.tsx';
import { inLocale, numberText } from '../i18n/format.ts';
import { type ImportSummary, setState, useApp } from '../state/app-store.ts';
import { showTab } from '../state/tabs.ts';
import css from './work-notices.module.css';

/** What an opened layout was understood as, and what not. */
export function ImportNotice(): ReactElement | null {
  const summary = useApp((state) => state.importSummary);
  if (summary === null) return null;
  const close = () => setState({ importSummary: null });
  const nameSources = () => {
    close();
    showTab('sources');
  };
  return (
    <InfoNotice
      title={`Read ${[summary.source.format, summary.source.revision].filter(Boolean).join(' ')}`}
      actions={
        <>
          <Button look="primary" onPress={nameSources}>
            Next: say what switches
          </Button>
          <Button onPress={close}>Close</Button>
        </>
      }
    >
      <ul className={css.facts}>
        {factsOf(summary).map((fact) => (
          <li key={fact}>{fact}</li>
        ))}
      </ul>
      <Findings findings={summary.findings} />
    </InfoNotice>
  );
}

function factsOf(summary: ImportSummary): string[] {
  const [widthMm, heightMm] = summary.boardMm.map((sideMm) => numberText(Math.round(sideMm * 10) / 10));
  const counted = (count: number, one: string) => `${numberText(count)} ${count === 1 ? one : `${one}s`}`;
  return [
    `${widthMm} × ${heightMm} mm`,
    counted(summary.copperLayers, 'copper layer'),
    `${counted(summary.nets, 'net')}, ${numberText(summary.netsWithTraces)} with traces`,
    `${counted(summary.segments, 'straight piece')}, ${counted(summary.arcs, 'arc')}`,
    counted(summary.vias, 'via'),
    counted(summary.components, 'component'),
    `${numberText(Math.round(summary.traceLengthMm))} mm of trace`,
  ];
}

function Findings({ findings }: Pick<ImportSummary, 'findings'>): ReactElement {
  if (findings.length === 0) return <p>Everything in it was understood.</p>;
  const title = `${numberText(findings.length)} ${findings.length === 1 ? 'thing was' : 'things were'} guessed, repaired or left out`;
  return (
    <Disclosure title={title}>
      <ul className={css.findings}>
        {findings.map(({ code, message }) => (
          <li key={`${code} ${message}`}>{inLocale(message)}</li>
        ))}
      </ul>
    </Disclosure>
  );
}
