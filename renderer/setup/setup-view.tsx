import type { ReactElement } from 'react';
import { AppError } from '../../app/errors.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { limitRequestOf, type RunSettings } from '../../app/project/run-settings.ts';
import { Checkbox } from '../components/checkbox.tsx';
import { ErrorNotice } from '../components/notes.tsx';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { editSettings } from '../state/document.ts';
import { useBoard, useSettings } from '../state/hooks.ts';
import { CableTable } from './cable-table.tsx';
import { catalogueOf, classesOf, distancesOf, standardsOf, withClass, withStandard } from './limit-choices.ts';
import css from './setup.module.css';
import { SiteDrawing } from './site-drawing.tsx';

/** Against what the board is judged and how it stands there. */
export function SetupView(): ReactElement | null {
  const settings = useSettings();
  const board = useBoard();
  if (settings === null || board === null) return null;
  return (
    <div className={css.setup}>
      <LimitFields settings={settings} />
      <SiteFields settings={settings} />
      <SiteDrawing board={board} settings={settings} />
      <CableTable />
    </div>
  );
}

function LimitFields({ settings }: { readonly settings: RunSettings }): ReactElement {
  const catalogue = catalogueOf(settings);
  const classes = classesOf(catalogue, settings.standard);
  const distances = distancesOf(catalogue, settings.standard, settings.class);
  const isOwnDistance = settings.convertDistance || !distances.includes(settings.distanceM);
  const chosen = judged(settings);
  return (
    <fieldset className={css.fields}>
      <legend>Limit</legend>
      <Select
        label="Standard"
        value={settings.standard}
        choices={standardsOf(catalogue).map((value) => ({ value, label: value }))}
        onChange={(standard) => editSettings('Standard', withStandard(settings, catalogue, standard))}
        help={
          <HelpTip question="Which standard is mine?">
            <p>
              That depends on what the product is, where it is sold and who uses it. This program does not know; the
              choice, and the edition in force, are yours. Class B is for homes, class A for other places.
            </p>
          </HelpTip>
        }
      />
      {classes.length > 0 && (
        <Select
          label="Class"
          value={settings.class}
          choices={classes.map((value) => ({ value, label: value }))}
          onChange={(name) => editSettings('Class', withClass(settings, catalogue, name))}
        />
      )}
      {isOwnDistance ? (
        <QuantityField
          label="Antenna distance"
          value={settings.distanceM}
          form={{ unit: 'm' }}
          min={0.5}
          max={100}
          onCommit={(distanceM) => distanceM !== null && editSettings('Antenna distance', { distanceM })}
        />
      ) : (
        <Select
          label="Antenna distance"
          value={String(settings.distanceM)}
          choices={distances.map((distance) => ({ value: String(distance), label: `${distance} m` }))}
          onChange={(distance) => editSettings('Antenna distance', { distanceM: Number(distance) })}
        />
      )}
      <QuantityField
        label="Required margin"
        value={settings.requiredMarginDb}
        form={{ unit: 'dB', hasNoPrefix: true }}
        min={0}
        max={100}
        onCommit={(margin) => margin !== null && editSettings('Required margin', { requiredMarginDb: margin })}
        help={
          <HelpTip question="How much margin?">
            <p>
              Room for what an estimate and a laboratory do not know: a laboratory’s own uncertainty is 5 to 6 dB, this
              estimate’s is larger. Many ask for 6 to 10 dB.
            </p>
          </HelpTip>
        }
      />
      <Checkbox
        isSelected={settings.convertDistance}
        onChange={(convertDistance) => editSettings('Conversion of distances', { convertDistance })}
      >
        Convert limits of another distance
      </Checkbox>
      {typeof chosen === 'string' ? (
        <ErrorNotice title="There is no limit line for this">{chosen}</ErrorNotice>
      ) : (
        <p className={css.source}>
          {chosen.edition}. {chosen.sourceStatus === 'seen' ? 'Values seen in' : 'Values from memory, compare with'}:{' '}
          {chosen.source}
          {chosen.conversion !== undefined && `; ${chosen.conversion}`}
        </p>
      )}
    </fieldset>
  );
}

/** The limit lines, or why there are none. */
function judged(settings: RunSettings): ReturnType<typeof chooseLimits> | string {
  try {
    return chooseLimits(limitRequestOf(settings), catalogueOf(settings));
  } catch (error) {
    if (error instanceof AppError) return error.message;
    throw error;
  }
}

function SiteFields({ settings }: { readonly settings: RunSettings }): ReactElement {
  return (
    <fieldset className={css.fields}>
      <legend>Site</legend>
      <Select
        label="Site"
        value={settings.site}
        choices={[
          { value: 'ground-plane', label: 'Over a ground plane', note: 'open area, or a lined room with metal floor' },
          { value: 'free-space', label: 'Without reflections', note: 'fully lined room' },
        ]}
        onChange={(site) => editSettings('Site', { site })}
      />
      <Select
        label="Distance counts from"
        value={settings.measuredFrom}
        choices={[
          { value: 'boundary', label: 'Boundary', note: 'the circle around board and cables' },
          { value: 'center', label: 'Turntable axis' },
        ]}
        onChange={(measuredFrom) => editSettings('Where the distance counts from', { measuredFrom })}
      />
      <Select
        label="Board"
        value={settings.orientation}
        choices={[
          { value: 'flat', label: 'Flat on the table' },
          { value: 'upright', label: 'Upright', note: 'lower edge on the table' },
        ]}
        onChange={(orientation) => editSettings('How the board stands', { orientation })}
      />
      <Select
        label="Planes and cables"
        value={settings.structure}
        choices={[
          { value: 'solved', label: 'Solved', note: 'their common-mode currents count' },
          { value: 'pair-only', label: 'Left out', note: 'trace pairs alone: fast, far too low with cables' },
        ]}
        onChange={(structure) => editSettings('Planes and cables', { structure })}
        help={
          <HelpTip question="Why do planes and cables radiate?">
            <p>
              Every trace drives a small current over its own plane and into what hangs on it. That common-mode current
              is small, but plane and cable are large: below a few hundred megahertz a cable usually decides.
            </p>
          </HelpTip>
        }
      />
      <QuantityField
        label="Up to"
        value={settings.maxHz ?? null}
        form={{ unit: 'Hz', barePrefix: 'M' }}
        min={31e6}
        max={40e9}
        isOptional
        placeholder="the standard’s rule"
        onCommit={(maxHz) => editSettings('Upper frequency', { maxHz: maxHz ?? undefined } as Partial<RunSettings>)}
      />
    </fieldset>
  );
}
