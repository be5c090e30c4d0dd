import { type ReactElement, useState } from 'react';
import { hzToMhz, mhzToHz, nsToS, sToNs } from '../../app/units/convert.ts';
import { Button, IconButton } from '../components/button.tsx';
import { Icon } from '../components/icons.tsx';
import { EmptyState } from '../components/notes.tsx';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { TextField } from '../components/text-field.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { useBoard, useProblems, useSources } from '../state/hooks.ts';
import { addWaveform, editWaveform, removeWaveform, renameWaveform, type WaveformFile } from './edit-sources.ts';
import { PointsField } from './points-field.tsx';
import css from './sources.module.css';
import { WaveformPlot } from './waveform-plot.tsx';

const TIME = { unit: 's', barePrefix: 'n' } as const;

/** The waveforms, and one of them as time and spectrum while it is changed. */
export function WaveformEditor(): ReactElement {
  const sources = useSources();
  const board = useBoard();
  const waveforms = sources?.waveforms ?? [];
  const [chosen, setChosen] = useState<string | null>(null);
  const index = Math.max(
    0,
    waveforms.findIndex(({ name }) => name === chosen),
  );
  const waveform = waveforms[index];
  const model = board?.waveforms.find(({ name }) => name === waveform?.name);
  const users = (sources?.drives ?? []).filter((drive) => drive.waveform === waveform?.name).map(({ net }) => net);
  const loops = (sources?.loops ?? []).filter((loop) => loop.waveform === waveform?.name).map(({ name }) => name);
  return (
    <div className={css.scroll}>
      <div className={css.bar}>
        {waveforms.length > 0 && (
          <Select
            label="Waveform"
            value={waveform?.name ?? null}
            choices={waveforms.map(({ name, kind }) => ({ value: name, label: name, note: kind }))}
            onChange={setChosen}
          />
        )}
        <Button onPress={() => setChosen(addWaveform('trapezoid'))}>Add a clock</Button>
        <Button onPress={() => setChosen(addWaveform('random-data'))}>Add random data</Button>
      </div>
      {waveform === undefined ? (
        <EmptyState title="No waveform yet">
          <p>A waveform says how a driver switches: how often, between which voltages, how fast.</p>
        </EmptyState>
      ) : (
        <section className={css.editor} aria-label={`Waveform ${waveform.name}`}>
          <div className={css.bar}>
            <TextField
              label="Name"
              value={waveform.name}
              maxLength={1000}
              onCommit={(name) => {
                renameWaveform(index, name);
                setChosen(name);
              }}
            />
            <IconButton
              label={`Remove ${waveform.name}`}
              isDisabled={users.length + loops.length > 0}
              onPress={() => removeWaveform(index, waveform.name)}
            >
              <Icon name="trash" />
            </IconButton>
          </div>
          <p className={css.quiet}>
            {users.length + loops.length === 0 ? 'Drives nothing yet.' : `Drives ${[...users, ...loops].join(', ')}.`}
          </p>
          <KindFields waveform={waveform} index={index} />
          {model !== undefined && <WaveformPlot waveform={model} />}
        </section>
      )}
    </div>
  );
}

function KindFields({ waveform, index }: { readonly waveform: WaveformFile; readonly index: number }): ReactElement {
  const problems = useProblems(`waveforms[${index}]`);
  const problemAt = (key: string) => problems.find(({ path }) => path === `waveforms[${index}].${key}`)?.text ?? null;
  const change = (what: string, patch: object) =>
    editWaveform(index, `${what} of ${waveform.name}`, { ...waveform, ...patch } as WaveformFile);
  const period = (
    <QuantityField
      label="Period"
      value={'periodNs' in waveform ? nsToS(waveform.periodNs) : null}
      form={TIME}
      min={1e-12}
      onCommit={(periodS) => periodS !== null && change('Period', { periodNs: sToNs(periodS) })}
    />
  );
  switch (waveform.kind) {
    case 'trapezoid':
      return (
        <div className={css.fields}>
          <QuantityField
            label="Frequency"
            value={mhzToHz(waveform.frequencyMhz)}
            form={{ unit: 'Hz', barePrefix: 'M' }}
            min={1}
            message={problemAt('frequencyMhz')}
            onCommit={(hz) => hz !== null && change('Frequency', { frequencyMhz: hzToMhz(hz) })}
          />
          <QuantityField
            label="Duty"
            value={waveform.dutyPercent}
            form={{ unit: '%', hasNoPrefix: true }}
            min={0.001}
            max={99.999}
            message={problemAt('dutyPercent')}
            onCommit={(dutyPercent) => dutyPercent !== null && change('Duty', { dutyPercent })}
            help={
              <HelpTip question="What does the duty do?">
                <p>
                  The time above the 50 % level, of the period. At exactly 50 % the even harmonics vanish; real clocks
                  are a little off, and then they are there.
                </p>
              </HelpTip>
            }
          />
          <EdgeFields waveform={waveform} change={change} problemAt={problemAt} />
        </div>
      );
    case 'random-data':
      return (
        <div className={css.fields}>
          <QuantityField
            label="Bit rate"
            value={mhzToHz(waveform.bitRateMbps)}
            form={{ unit: 'bit/s', barePrefix: 'M' }}
            min={1}
            message={problemAt('bitRateMbps')}
            onCommit={(rate) => rate !== null && change('Bit rate', { bitRateMbps: hzToMhz(rate) })}
          />
          <Select
            label="Sequence"
            value={String(waveform.sequenceBits)}
            choices={Array.from({ length: 14 }, (_, i) => 2 ** (i + 2) - 1).map((bits) => ({
              value: String(bits),
              label: `${bits} bits`,
            }))}
            onChange={(bits) => change('Sequence', { sequenceBits: Number(bits) })}
          />
          <EdgeFields waveform={waveform} change={change} problemAt={problemAt} />
        </div>
      );
    case 'piecewise':
      return (
        <div className={css.fields}>
          {period}
          <PointsField
            waveform={waveform}
            onChange={(patch) => change('Points', patch)}
            problem={problems[0]?.text ?? null}
          />
        </div>
      );
    case 'samples':
      return (
        <div className={css.fields}>
          {period}
          <p className={css.quiet}>
            Read from {waveform.file}. Drop another table of time and value with this name to replace it.
          </p>
        </div>
      );
    case 'lines':
      return (
        <p className={css.quiet}>
          {waveform.lines.length} spectral lines, stated in the sources file. Drop a sources file to change them.
        </p>
      );
  }
}

interface EdgeFieldsProps {
  readonly waveform: Extract<WaveformFile, { kind: 'trapezoid' | 'random-data' }>;
  readonly change: (what: string, patch: object) => void;
  readonly problemAt: (key: string) => string | null;
}

function EdgeFields({ waveform, change, problemAt }: EdgeFieldsProps): ReactElement {
  const isCurrent = waveform.lowA !== undefined;
  const [low, high] = isCurrent ? (['lowA', 'highA'] as const) : (['lowV', 'highV'] as const);
  const level = { unit: isCurrent ? 'A' : 'V' };
  return (
    <>
      <QuantityField
        label="Low"
        value={waveform[low] ?? null}
        form={level}
        message={problemAt(low)}
        onCommit={(value) => value !== null && change('Low level', { [low]: value })}
      />
      <QuantityField
        label="High"
        value={waveform[high] ?? null}
        form={level}
        message={problemAt(high)}
        onCommit={(value) => value !== null && change('High level', { [high]: value })}
      />
      <QuantityField
        label="Rise 10–90 %"
        value={nsToS(waveform.riseNs)}
        form={TIME}
        min={0}
        message={problemAt('riseNs')}
        onCommit={(timeS) => timeS !== null && change('Rise time', { riseNs: sToNs(timeS) })}
        help={
          <HelpTip question="Why does the rise time matter so much?">
            <p>
              Above 1/(π · rise time) every harmonic falls twice as fast. A 1 ns edge reaches to about 320 MHz; 3 ns to
              about 110 MHz. Data sheets often state the slowest edge; the fastest one radiates.
            </p>
          </HelpTip>
        }
      />
      <QuantityField
        label="Fall 90–10 %"
        value={nsToS(waveform.fallNs)}
        form={TIME}
        min={0}
        message={problemAt('fallNs')}
        onCommit={(timeS) => timeS !== null && change('Fall time', { fallNs: sToNs(timeS) })}
      />
      <TextField
        label="Clock domain"
        value={waveform.clockDomain ?? ''}
        placeholder="its own"
        maxLength={1000}
        onCommit={(clockDomain) =>
          change('Clock domain', { clockDomain: clockDomain === '' ? undefined : clockDomain })
        }
        help={
          <HelpTip question="What is a clock domain?">
            <p>Waveforms of one domain keep their phases: their fields add up, or cancel. Others add as powers.</p>
          </HelpTip>
        }
      />
    </>
  );
}
