import type { ReactElement } from 'react';
import { QuantityField } from '../components/quantity-field.tsx';
import { editSources } from '../state/document.ts';
import css from './levers.module.css';
import { type LoopFile, ringAreaMm2, withArea } from './loop-area.ts';

/** Size of every current loop. */
export function LoopLevers({ loops }: { readonly loops: readonly LoopFile[] }): ReactElement {
  return (
    <div className={css.fields}>
      {loops.map((loop, index) => (
        <QuantityField
          key={loop.name}
          label={`Area of ${loop.name}`}
          value={ringAreaMm2(loop.pointsMm)}
          form={{ unit: 'mm²', hasNoPrefix: true }}
          min={0.01}
          max={1e6}
          description="same shape and place"
          onCommit={(areaMm2) => areaMm2 !== null && setArea(index, loop, areaMm2)}
        />
      ))}
    </div>
  );
}

const setArea = (index: number, { name }: LoopFile, areaMm2: number): void =>
  editSources(`Area of ${name}`, (sources) => ({
    ...sources,
    loops: (sources.loops ?? []).map((loop, i) =>
      i === index ? { ...loop, pointsMm: withArea(loop.pointsMm, areaMm2) } : loop,
    ),
  }));
