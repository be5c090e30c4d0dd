import type { ReactElement } from 'react';
import { fToPf, nsToS, pfToF, sToNs } from '../../app/units/convert.ts';
import { Button, IconButton } from '../components/button.tsx';
import { Checkbox } from '../components/checkbox.tsx';
import { Icon } from '../components/icons.tsx';
import { EmptyState } from '../components/notes.tsx';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { useBoard, useProblems, useSelection, useSources } from '../state/hooks.ts';
import { addLoad, driveNets, editDrive, editLoad, leaveNets, removeDrive, removeLoad } from './edit-sources.ts';
import css from './sources.module.css';

const OHM = { unit: 'Ω' } as const;

/** Driver and loads of the chosen net. */
export function NetEditor(): ReactElement {
  const board = useBoard();
  const sources = useSources();
  const { net: name } = useSelection();
  const problems = useProblems();
  const net = board?.nets.find((candidate) => candidate.name === name);
  if (net === undefined || sources === null) {
    return (
      <EmptyState title="No net chosen">
        <p>Choose a net in the list or on the board to say what drives it.</p>
      </EmptyState>
    );
  }
  const pins = net.pins.map((pin) => ({ value: pin.name, label: pin.name }));
  const waveforms = (sources.waveforms ?? []).map((waveform) => ({
    value: waveform.name,
    label: waveform.name,
    note: waveform.kind,
  }));
  const drives = (sources.drives ?? [])
    .map((drive, index) => ({ drive, index }))
    .filter(({ drive }) => drive.net === net.name);
  const loads = (sources.loads ?? [])
    .map((load, index) => ({ load, index }))
    .filter(({ load }) => load.net === net.name);
  const problemAt = (path: string) => problems.find((problem) => problem.path === path)?.text ?? null;
  return (
    <section className={css.editor} aria-label={`Sources of ${net.name}`}>
      <h3>{net.name}</h3>
      {drives.length === 0 && (
        <Select
          label="Drive it with"
          value={null}
          placeholder={waveforms.length === 0 ? 'add a waveform first' : 'a waveform'}
          isDisabled={waveforms.length === 0}
          choices={waveforms}
          onChange={(waveform) => driveNets([net.name], waveform)}
        />
      )}
      {drives.map(({ drive, index }) => (
        <fieldset key={index} className={css.fields}>
          <legend>
            Driver
            <IconButton label="Remove this driver" onPress={() => removeDrive(index, `Driver of ${net.name}`)}>
              <Icon name="trash" />
            </IconButton>
          </legend>
          <Select
            label="Waveform"
            value={drive.waveform}
            choices={waveforms}
            onChange={(waveform) => editDrive(index, `Waveform of ${net.name}`, { waveform })}
          />
          <Select
            label="Pin"
            value={drive.pin ?? null}
            placeholder="chosen by the program"
            choices={pins}
            onChange={(pin) => editDrive(index, `Driver pin of ${net.name}`, { pin })}
            message={problemAt(`drives[${index}].pin`)}
          />
          <QuantityField
            label="Driver resistance"
            value={drive.sourceOhm}
            form={OHM}
            min={0}
            onCommit={(sourceOhm) =>
              sourceOhm !== null && editDrive(index, `Driver resistance of ${net.name}`, { sourceOhm })
            }
            help={
              <HelpTip question="Where do I find the driver resistance?">
                <p>
                  In the driver’s IBIS model (slope of the load line), or as output voltage drop over output current in
                  its data sheet. Common CMOS outputs have 15 to 50 Ω.
                </p>
              </HelpTip>
            }
          />
          <QuantityField
            label="Series resistor"
            value={drive.seriesOhm}
            form={OHM}
            min={0}
            onCommit={(seriesOhm) =>
              seriesOhm !== null && editDrive(index, `Series resistor of ${net.name}`, { seriesOhm })
            }
          />
          <QuantityField
            label="Delay"
            value={nsToS(drive.delayNs)}
            form={{ unit: 's', barePrefix: 'n' }}
            onCommit={(delayS) =>
              delayS !== null && editDrive(index, `Delay of ${net.name}`, { delayNs: sToNs(delayS) })
            }
          />
          <Checkbox
            isSelected={drive.inverted}
            onChange={(inverted) => editDrive(index, `Inversion of ${net.name}`, { inverted })}
          >
            Inverted
          </Checkbox>
        </fieldset>
      ))}
      {loads.map(({ load, index }) => (
        <fieldset key={index} className={css.fields}>
          <legend>
            Load
            <IconButton label="Remove this load" onPress={() => removeLoad(index, `Load of ${net.name}`)}>
              <Icon name="trash" />
            </IconButton>
          </legend>
          <Select
            label="Pin"
            value={load.pin ?? null}
            placeholder="chosen by the program"
            choices={pins}
            onChange={(pin) => editLoad(index, `Load pin of ${net.name}`, { pin })}
            message={problemAt(`loads[${index}].pin`)}
          />
          <QuantityField
            label="Resistance"
            value={load.resistanceOhm ?? null}
            form={OHM}
            min={0}
            isOptional
            placeholder="open"
            onCommit={(resistanceOhm) =>
              editLoad(index, `Load of ${net.name}`, { resistanceOhm: resistanceOhm ?? undefined } as typeof load)
            }
          />
          <QuantityField
            label="Capacitance"
            value={pfToF(load.capacitancePf ?? 0)}
            form={{ unit: 'F', barePrefix: 'p' }}
            min={0}
            onCommit={(farad) =>
              farad !== null && editLoad(index, `Load of ${net.name}`, { capacitancePf: fToPf(farad) })
            }
          />
        </fieldset>
      ))}
      {drives.length > 0 && (
        <div className={css.bar}>
          <Select
            label="Add a load on"
            value={null}
            placeholder="a pin"
            choices={pins.filter(({ value }) => !loads.some(({ load }) => load.pin === value))}
            onChange={(pin) => addLoad(net.name, pin)}
          />
          <Button onPress={() => leaveNets([net.name])}>Do not drive</Button>
        </div>
      )}
    </section>
  );
}
