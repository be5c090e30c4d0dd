import { useVirtualizer } from '@tanstack/react-virtual';
import { type ReactElement, useMemo, useRef, useState } from 'react';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { countText, degreesText } from '../../app/report/format.ts';
import { DETECTOR_SHORT } from '../../app/report/text-table.ts';
import { standingOf } from '../../app/report/verdict.ts';
import { Button } from '../components/button.tsx';
import { StandingMark } from '../components/marks/standing-mark.tsx';
import { RowSpacer } from '../components/row-spacer.tsx';
import { Cell, HeadCell, Row, Table } from '../components/table.tsx';
import { frequencyText, levelText, marginText } from '../i18n/format.ts';
import { useSelection } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import { selectLine } from '../state/selection.ts';
import { copyPoints } from './copying.ts';
import css from './spectrum.module.css';
import { useLimits } from './use-limits.ts';
import { useZoom } from './zoom.ts';

const ROW_PX = 31;
type Order = 'frequency' | 'margin';

export interface LineListProps {
  readonly points: readonly ResultPoint[];
  readonly onSaid: (text: string) => void;
}

/** Every reading as a row; only those in view are in the page. */
export function LineList({ points, onSaid }: LineListProps): ReactElement {
  const scroll = useRef<HTMLDivElement>(null);
  const { lineHz, detector } = useSelection();
  const { requiredMarginDb } = useLimits();
  const [zoom] = useZoom();
  const [order, setOrder] = useState<Order>('margin');
  const rows = useMemo(() => {
    const seen =
      zoom === null
        ? [...points]
        : points.filter(({ frequencyHz }) => frequencyHz >= zoom[0] && frequencyHz <= zoom[1]);
    return seen.sort((one, other) =>
      order === 'margin'
        ? one.marginDb - other.marginDb || one.frequencyHz - other.frequencyHz
        : one.frequencyHz - other.frequencyHz,
    );
  }, [points, zoom, order]);
  const virtual = useVirtualizer({
    count: rows.length,
    getScrollElement: () => scroll.current,
    estimateSize: () => ROW_PX,
    overscan: 12,
  });
  const items = virtual.getVirtualItems();
  const above = items[0]?.start ?? 0;
  const below = virtual.getTotalSize() - (items.at(-1)?.end ?? 0);
  const sort = (by: Order) => ({ direction: order === by ? ('ascending' as const) : null, onSort: () => setOrder(by) });
  return (
    <div className={css.list} ref={scroll} data-own-arrows="">
      <Table label={`${countText(rows.length, 'reading')}`}>
        <thead>
          <tr>
            <HeadCell isNumber sort={sort('frequency')}>
              Frequency
            </HeadCell>
            <HeadCell>By</HeadCell>
            <HeadCell isNumber>Level dBµV/m</HeadCell>
            <HeadCell isNumber>Limit</HeadCell>
            <HeadCell isNumber sort={sort('margin')}>
              Margin dB
            </HeadCell>
            <HeadCell>Pol.</HeadCell>
            <HeadCell isNumber>Height</HeadCell>
            <HeadCell isNumber>Angle</HeadCell>
            <HeadCell>Mainly</HeadCell>
          </tr>
        </thead>
        <tbody>
          {above > 0 && <RowSpacer columns={9} heightPx={above} />}
          {items.map(({ index }) => {
            const point = rows[index]!;
            return (
              <Row
                key={`${point.frequencyHz} ${point.detector}`}
                isChosen={point.frequencyHz === lineHz && (detector === null || point.detector === detector)}
              >
                <Cell isNumber>
                  <Button look="quiet" onPress={() => selectLine(point.frequencyHz, point.detector)}>
                    {frequencyText(point.frequencyHz)}
                  </Button>
                </Cell>
                <Cell>{DETECTOR_SHORT[point.detector]}</Cell>
                <Cell isNumber>{levelText(point.levelDbuvPerM)}</Cell>
                <Cell isNumber>{levelText(point.limitDbuvPerM)}</Cell>
                <Cell isNumber>
                  <StandingMark standing={standingOf(point, requiredMarginDb)} /> {marginText(point.marginDb)}
                </Cell>
                <Cell>{point.polarization === 'horizontal' ? 'H' : 'V'}</Cell>
                <Cell isNumber>{point.antennaHeightM.toFixed(2)} m</Cell>
                <Cell isNumber>{degreesText(point.turntableDeg)}°</Cell>
                <Cell>{point.contributors[0]?.name ?? ''}</Cell>
              </Row>
            );
          })}
          {below > 0 && <RowSpacer columns={9} heightPx={below} />}
        </tbody>
      </Table>
      <Button
        onPress={() =>
          void attempt('Copy', async () => {
            await copyPoints(rows);
            onSaid(`${countText(rows.length, 'line')} copied`);
          })
        }
      >
        Copy for a spreadsheet
      </Button>
    </div>
  );
}
