import { type ReactElement, useState } from 'react';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { TextField } from '../components/text-field.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import type { CableFile } from '../state/cable-shape.ts';
import { FERRITE_MHZ, type ImpedanceRow, impedanceText, parseImpedance } from './impedance-table.ts';
import css from './levers.module.css';

interface ConnectorImpedanceProps {
  readonly cable: CableFile;
  readonly edit: (what: string, change: (before: CableFile) => CableFile) => void;
}

type Kind = 'resistor' | 'ferrite' | 'table';

const WHAT = 'Impedance at the connector';

/** What sits in series with the cable where it meets the board: a resistance, or a ferrite by its data sheet. */
export function ConnectorImpedance({ cable, edit }: ConnectorImpedanceProps): ReactElement {
  const rows = cable.seriesImpedance;
  const [asked, setAsked] = useState<Kind | null>(null);
  const kind = asked ?? kindOf(rows);
  const [refused, setRefused] = useState<{ readonly text: string; readonly must: string } | null>(null);
  const setRows = (next: ImpedanceRow[]) =>
    edit(WHAT, ({ seriesOhm: _, ...before }) => ({ ...before, seriesImpedance: next }));
  const setOhm = (seriesOhm: number) => edit(WHAT, ({ seriesImpedance: _, ...before }) => ({ ...before, seriesOhm }));
  const takeTable = (text: string) => {
    const read = parseImpedance(text);
    setRefused(typeof read === 'string' ? { text, must: read } : null);
    if (typeof read !== 'string') setRows(read);
  };
  const ohmAt = (mhz: number) => rows?.find(([frequencyMhz]) => frequencyMhz === mhz)?.[1] ?? 0;
  return (
    <>
      <Select
        label="At the connector"
        value={kind}
        choices={[
          { value: 'resistor', label: 'Resistance', note: 'the same at all frequencies; 0: nothing' },
          { value: 'ferrite', label: 'Ferrite', note: 'resistance at 25, 100 and 300 MHz' },
          { value: 'table', label: 'Table', note: 'MHz, R, X' },
        ]}
        onChange={setAsked}
        help={
          <HelpTip question="Which ferrite values?">
            <p>
              Data sheets state the impedance at 25, 100 and 300 MHz; above some 10 MHz it is nearly all resistance.
              Between the stated frequencies it is interpolated. With a curve of R and X, paste it as a table.
            </p>
          </HelpTip>
        }
      />
      {kind === 'resistor' && (
        <QuantityField
          label="Resistance"
          value={rows === undefined ? (cable.seriesOhm ?? 0) : null}
          form={{ unit: 'Ω' }}
          min={0}
          onCommit={(ohm) => ohm !== null && setOhm(ohm)}
        />
      )}
      {kind === 'ferrite' &&
        FERRITE_MHZ.map((mhz) => (
          <QuantityField
            key={mhz}
            label={`At ${mhz} MHz`}
            value={ohmAt(mhz)}
            form={{ unit: 'Ω' }}
            min={0}
            onCommit={(ohm) =>
              ohm !== null &&
              setRows(FERRITE_MHZ.map((each): ImpedanceRow => [each, each === mhz ? ohm : ohmAt(each), 0]))
            }
          />
        ))}
      {kind === 'table' && (
        <div className={css.wide}>
          <TextField
            label="MHz, R and X in Ω, one line each"
            lines={4}
            value={refused?.text ?? impedanceText(rows ?? [])}
            placeholder={'25 40 30\n100 120 45\n300 180 10'}
            message={refused?.must ?? null}
            onCommit={takeTable}
          />
        </div>
      )}
    </>
  );
}

function kindOf(rows: readonly ImpedanceRow[] | undefined): Kind {
  if (rows === undefined) return 'resistor';
  const isFerrite =
    rows.length === FERRITE_MHZ.length && rows.every(([mhz, , x], i) => mhz === FERRITE_MHZ[i] && x === 0);
  return isFerrite ? 'ferrite' : 'table';
}
