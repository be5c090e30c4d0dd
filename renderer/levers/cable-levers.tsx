import type { ReactElement } from 'react';
import { mmToM, mToMm } from '../../app/units/convert.ts';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { type CableFile, cableLengthMm, withLength } from '../state/cable-shape.ts';
import { editSources } from '../state/document.ts';
import { useSources } from '../state/hooks.ts';
import { ConnectorImpedance } from './connector-impedance.tsx';
import css from './levers.module.css';

/** A common-mode load that many measurements assume, ohm. */
const USUAL_LOAD_OHM = 150;

/** Length, far end and connector of every cable. */
export function CableLevers(): ReactElement {
  const cables = useSources()?.cables ?? [];
  if (cables.length === 0) return <p className={css.quiet}>No cable hangs on the board. Set-up adds one.</p>;
  return (
    <>
      {cables.map((cable, index) => (
        <CableRow key={cable.name} cable={cable} index={index} />
      ))}
    </>
  );
}

function CableRow({ cable, index }: { readonly cable: CableFile; readonly index: number }): ReactElement {
  const edit = (what: string, change: (before: CableFile) => CableFile) =>
    editSources(`${what} of ${cable.name}`, (sources) => ({
      ...sources,
      cables: (sources.cables ?? []).map((before, i) => (i === index ? change(before) : before)),
    }));
  const { farEnd, pointsMm, commonModeUa } = cable;
  return (
    <section className={css.group} aria-label={`Levers of ${cable.name}`}>
      <h4>{cable.name}</h4>
      {commonModeUa !== undefined && (
        <p className={css.quiet}>Its current is stated: ends and connector do not count.</p>
      )}
      <div className={css.fields}>
        <QuantityField
          label="Length"
          value={mmToM(cableLengthMm(pointsMm))}
          form={{ unit: 'm' }}
          min={0.005}
          max={50}
          onCommit={(lengthM) =>
            lengthM !== null &&
            edit('Length', (before) => ({ ...before, pointsMm: withLength(before.pointsMm, mToMm(lengthM)) }))
          }
        />
        <Select
          label="Far end"
          value={typeof farEnd === 'string' ? farEnd : 'loaded'}
          choices={[
            { value: 'open', label: 'Open' },
            { value: 'ground', label: 'On the ground plane' },
            { value: 'loaded', label: 'Loaded to ground' },
          ]}
          onChange={(end) =>
            edit('Far end', (before) => ({
              ...before,
              farEnd: end === 'loaded' ? { resistanceOhm: USUAL_LOAD_OHM } : end,
            }))
          }
        />
        {typeof farEnd === 'object' && (
          <QuantityField
            label="Load"
            value={farEnd.resistanceOhm}
            form={{ unit: 'Ω' }}
            min={0}
            onCommit={(resistanceOhm) =>
              resistanceOhm !== null && edit('Load', (before) => ({ ...before, farEnd: { resistanceOhm } }))
            }
          />
        )}
        <ConnectorImpedance cable={cable} edit={edit} />
      </div>
    </section>
  );
}
