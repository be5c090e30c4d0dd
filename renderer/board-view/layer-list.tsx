import type { ReactElement } from 'react';
import type { Board } from '../../app/board/board.ts';
import { Button } from '../components/button.tsx';
import { Checkbox } from '../components/checkbox.tsx';
import css from './board-view.module.css';
import { copperLayers, sightOf } from './layer-sight.ts';
import { useFindings, useLayers, useShownThings } from './use-scene.ts';

export interface LayerListProps {
  readonly board: Board;
  readonly isFromBottom: boolean;
}

/** Which layers are shown, which of them lies on top, and what else is drawn. */
export function LayerList({ board, isFromBottom }: LayerListProps): ReactElement {
  const [layers, setLayers] = useLayers();
  const [shown, setShown] = useShownThings();
  const findings = useFindings();
  const copper = copperLayers(board.stackup);
  const { activeLayer } = sightOf(copper, layers, isFromBottom);
  const setHidden = (name: string, isHidden: boolean) =>
    setLayers({
      hidden: isHidden ? [...layers.hidden, name] : layers.hidden.filter((one) => one !== name),
      active: isHidden && layers.active === name ? null : layers.active,
    });
  const bringUp = (name: string) =>
    setLayers({ hidden: layers.hidden.filter((one) => one !== name), active: layers.active === name ? null : name });
  return (
    <div className={css.layers}>
      <h2>Copper, from the top</h2>
      <ul>
        {copper.map(({ index, name }) => (
          <li key={index} data-active={index === activeLayer || undefined}>
            <Checkbox
              isSelected={!layers.hidden.includes(name)}
              label={`Show ${name}`}
              onChange={(isSelected) => setHidden(name, !isSelected)}
            />
            <Button look="quiet" aria-pressed={layers.active === name} onPress={() => bringUp(name)}>
              <span className={css.layerName}>{name}</span>
              {index === activeLayer && <small>on top</small>}
            </Button>
          </li>
        ))}
      </ul>
      <Button look="quiet" onPress={() => setLayers({ hidden: [], active: layers.active })}>
        Show all layers
      </Button>
      <h2>Besides copper</h2>
      <Checkbox isSelected={shown.cables} onChange={(cables) => setShown({ ...shown, cables })}>
        Cables ({board.cables.length})
      </Checkbox>
      <Checkbox isSelected={shown.findings} onChange={(on) => setShown({ ...shown, findings: on })}>
        Findings ({findings.length})
      </Checkbox>
    </div>
  );
}
