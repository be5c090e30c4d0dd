import { type ReactElement, useMemo, useState } from 'react';
import { formatQuantity } from '../../app/units/quantity-text.ts';
import { ErrorNotice } from '../components/notes.tsx';
import { QuantityField } from '../components/quantity-field.tsx';
import { Select } from '../components/select.tsx';
import { DECIMAL_SIGN } from '../i18n/format.ts';
import { editLayout } from '../state/document.ts';
import { useBase, useBoard, useSelection, useSources } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import css from './levers.module.css';
import { withTracesMoved } from './move-layer.ts';
import { type LayerRun, layerRuns, withHeight } from './plane-height.ts';

const LENGTH = { unit: 'm', barePrefix: 'm' } as const;

/** Height to the plane and layer of one net's traces: the chosen net, else the one driven first. */
export function CopperLevers(): ReactElement {
  const board = useBoard();
  const sources = useSources();
  const selection = useSelection();
  const name = selection.net ?? sources?.drives?.[0]?.net;
  const net = board?.nets.find((candidate) => candidate.name === name);
  const runs = useMemo(() => (board && net ? layerRuns(board, net) : []), [board, net]);
  if (net === undefined || runs.length === 0) {
    return <p className={css.quiet}>Choose a net with traces: above, on the board or in Shares.</p>;
  }
  return (
    <section className={css.group} aria-label={`Copper of ${net.name}`}>
      <h4>{net.name}</h4>
      <p className={css.quiet}>Choose another net above, on the board or in Shares.</p>
      {runs.map((run) => (
        <LayerFields key={`${net.name} ${run.layer}`} net={net.name} run={run} />
      ))}
    </section>
  );
}

function LayerFields({ net, run }: { readonly net: string; readonly run: LayerRun }): ReactElement {
  const layout = useBase()?.layout;
  const [refused, setRefused] = useState<string | null>(null);
  const { layer, lengthM, plane } = run;
  const layers = (layout?.stackup ?? []).filter(({ kind, name }) => kind === 'copper' && name !== layer);
  const setHeight = (heightM: number) =>
    attempt('Height to the plane', () =>
      editLayout(`Height of ${layer} to ${plane!.layer}`, (before) => withHeight(before, layer, plane!.layer, heightM)),
    );
  const move = (to: string) => {
    const moved = withTracesMoved(layout!, net, layer, to);
    setRefused(typeof moved === 'string' ? moved : null);
    if (typeof moved === 'string') return;
    void attempt('Layer', () => editLayout(`${net} from ${layer} to ${to}`, () => moved));
  };
  return (
    <>
      <p>
        {formatQuantity(lengthM, LENGTH, { digits: 3, decimal: DECIMAL_SIGN })} on {layer},{' '}
        {plane === null ? 'over no plane' : `nearest plane ${plane.net} on ${plane.layer}`}
      </p>
      <div className={css.fields}>
        {plane !== null && (
          <QuantityField
            label="Height to the plane"
            value={plane.heightM}
            form={LENGTH}
            min={20e-6}
            max={10e-3}
            description="for everything on this layer"
            onCommit={(heightM) => heightM !== null && void setHeight(heightM)}
          />
        )}
        {layers.length > 0 && (
          <Select
            label="Layer"
            value={null}
            placeholder={layer}
            choices={layers.map((row) => ({ value: row.name, label: row.name }))}
            description="same path; crossings are not checked"
            onChange={move}
          />
        )}
      </div>
      {refused !== null && <ErrorNotice title="These traces cannot change the layer">{refused}</ErrorNotice>}
    </>
  );
}
