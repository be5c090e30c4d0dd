import type { ReactElement } from 'react';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import { mmToM, mToMm } from '../../app/units/convert.ts';
import { Button, IconButton } from '../components/button.tsx';
import { Icon } from '../components/icons.tsx';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { TextField } from '../components/text-field.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { type CableFile, cableLengthMm, newCable, withLength } from '../state/cable-shape.ts';
import { editSources } from '../state/document.ts';
import { useBoard, useProblems, useSelection, useSources } from '../state/hooks.ts';
import { selectCable } from '../state/selection.ts';
import css from './setup.module.css';

const LENGTH = { unit: 'm', barePrefix: 'm' } as const;

/** Cables that hang on the board: they usually decide. */
export function CableTable(): ReactElement {
  const cables = useSources()?.cables ?? [];
  const board = useBoard();
  const { cable: chosen } = useSelection();
  const problems = useProblems('cables');
  const edit = (label: string, change: (cables: readonly CableFile[]) => CableFile[]) =>
    editSources(label, (sources): SourcesPart => ({ ...sources, cables: change(sources.cables ?? []) }));
  const replace = (index: number, label: string, patch: Partial<CableFile>) =>
    edit(`${label} of ${cables[index]!.name}`, (all) =>
      all.map((cable, i) => (i === index ? { ...cable, ...patch } : cable)),
    );
  return (
    <fieldset className={css.fields}>
      <legend>
        Cables
        <HelpTip question="How is a cable modelled?">
          <p>
            As a straight wire with bends, joined to the board’s copper where it begins. Length, far end and what sits
            at the connector decide where it resonates; a centimetre moves a resonance, so read levels near one as
            “about”.
          </p>
        </HelpTip>
      </legend>
      {cables.map((cable, i) => (
        <div
          // biome-ignore lint/suspicious/noArrayIndexKey: a cable is what stands in its place; its name is being edited
          key={i}
          className={css.cableRow}
          data-chosen={cable.name === chosen || undefined}
        >
          <TextField
            label="Name"
            value={cable.name}
            maxLength={1000}
            message={problems.find(({ path }) => path === `cables[${i}].name`)?.text}
            onCommit={(name) => replace(i, 'Name', { name })}
          />
          <QuantityField
            label="Length"
            value={mmToM(cableLengthMm(cable.pointsMm))}
            form={LENGTH}
            min={0.005}
            max={50}
            message={problems.find(({ path }) => path.startsWith(`cables[${i}].points`))?.text ?? null}
            onCommit={(lengthM) =>
              lengthM !== null && replace(i, 'Length', { pointsMm: withLength(cable.pointsMm, mToMm(lengthM)) })
            }
          />
          <Select
            label="Far end"
            value={typeof cable.farEnd === 'string' ? cable.farEnd : 'loaded'}
            choices={[
              { value: 'open', label: 'Open' },
              { value: 'ground', label: 'On the ground plane' },
              { value: 'loaded', label: 'Loaded to ground' },
            ]}
            onChange={(end) => replace(i, 'Far end', { farEnd: end === 'loaded' ? { resistanceOhm: 150 } : end })}
          />
          {typeof cable.farEnd === 'object' && (
            <QuantityField
              label="Load"
              value={cable.farEnd.resistanceOhm}
              form={{ unit: 'Ω' }}
              min={0}
              onCommit={(ohm) => ohm !== null && replace(i, 'Load', { farEnd: { resistanceOhm: ohm } })}
            />
          )}
          <QuantityField
            label="At the connector"
            value={cable.seriesOhm ?? 0}
            form={{ unit: 'Ω' }}
            min={0}
            isDisabled={cable.seriesImpedance !== undefined}
            {...(cable.seriesImpedance !== undefined && {
              description: `table of ${cable.seriesImpedance.length} rows`,
            })}
            onCommit={(seriesOhm) => seriesOhm !== null && replace(i, 'Impedance at the connector', { seriesOhm })}
          />
          <span className={css.rowButtons}>
            <Button
              look="quiet"
              aria-pressed={cable.name === chosen}
              onPress={() => selectCable(cable.name === chosen ? null : cable.name)}
            >
              Show
            </Button>
            <IconButton
              label={`Remove ${cable.name}`}
              onPress={() => edit(`Remove ${cable.name}`, (all) => all.filter((_, at) => at !== i))}
            >
              <Icon name="trash" />
            </IconButton>
          </span>
        </div>
      ))}
      {problems
        .filter(({ path }) => !/^cables\[\d+\]\.(name|points)/.test(path))
        .map(({ path, text }) => (
          <p key={path} className={css.problem} role="alert">
            {text}
          </p>
        ))}
      <Button
        isDisabled={board === null}
        onPress={() =>
          edit('Add a cable', (all) => [
            ...all,
            newCable(
              board!,
              all.map(({ name }) => name),
            ),
          ])
        }
      >
        <Icon name="plus" />
        Add a cable
      </Button>
    </fieldset>
  );
}
