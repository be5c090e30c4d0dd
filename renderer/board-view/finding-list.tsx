import type { ReactElement } from 'react';
import { EmptyState } from '../components/notes.tsx';
import { useSelection } from '../state/hooks.ts';
import { selectFinding } from '../state/selection.ts';
import css from './board-view.module.css';
import { useFindings } from './use-scene.ts';

/** The findings in words, with the numbers of their flags; choosing one brings its place into the picture. */
export function FindingList(): ReactElement {
  const findings = useFindings();
  const { finding: chosen } = useSelection();
  if (findings.length === 0) {
    return (
      <EmptyState title="No findings">
        <p>Places on the board to look at come with an estimate.</p>
      </EmptyState>
    );
  }
  return (
    <ol className={css.findings}>
      {findings.map(({ code, net, layer, message, atM }, i) => (
        <li key={`${code} ${net} ${atM.join(' ')}`}>
          <button type="button" aria-pressed={i === chosen} onClick={() => selectFinding(i === chosen ? null : i)}>
            <span className={css.flag}>{i + 1}</span>
            <span>
              <strong>{net}</strong> {layer}
              <br />
              {message}
            </span>
          </button>
        </li>
      ))}
    </ol>
  );
}
