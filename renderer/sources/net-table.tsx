import { useVirtualizer } from '@tanstack/react-virtual';
import { type ReactElement, useMemo, useRef, useState } from 'react';
import { countText } from '../../app/report/format.ts';
import { Button } from '../components/button.tsx';
import { Checkbox } from '../components/checkbox.tsx';
import { EmptyState } from '../components/notes.tsx';
import { RowSpacer } from '../components/row-spacer.tsx';
import { Select } from '../components/select.tsx';
import { Cell, HeadCell, Row, Table } from '../components/table.tsx';
import { TextField } from '../components/text-field.tsx';
import { quantityText } from '../i18n/format.ts';
import { useBoard, useSelection, useSources } from '../state/hooks.ts';
import { hover, selectNet } from '../state/selection.ts';
import { driveNets, leaveNets } from './edit-sources.ts';
import { filterRows, type NetFilter, netRows } from './net-rows.ts';
import css from './sources.module.css';

const ROW_PX = 31;
const PROPOSAL_WORDS = { clock: 'clock?', data: 'data?', switching: 'switching?' } as const;

/** Every net with copper: find, choose one, or drive many at once. */
export function NetTable(): ReactElement {
  const board = useBoard();
  const sources = useSources();
  const { net: chosen } = useSelection();
  const [text, setText] = useState('');
  const [filter, setFilter] = useState<NetFilter>('all');
  const [marked, setMarked] = useState<ReadonlySet<string>>(new Set());
  const scroll = useRef<HTMLDivElement>(null);
  const rows = useMemo(() => netRows(board?.nets ?? [], sources ?? {}), [board?.nets, sources]);
  const shown = useMemo(() => filterRows(rows, text, filter), [rows, text, filter]);
  const virtual = useVirtualizer({
    count: shown.length,
    getScrollElement: () => scroll.current,
    estimateSize: () => ROW_PX,
    overscan: 10,
  });
  const items = virtual.getVirtualItems();
  const above = items[0]?.start ?? 0;
  const below = virtual.getTotalSize() - (items.at(-1)?.end ?? 0);
  const waveforms = sources?.waveforms ?? [];
  const markedShown = shown.filter(({ name }) => marked.has(name));
  const mark = (name: string, isMarked: boolean) => {
    const next = new Set(marked);
    if (isMarked) next.add(name);
    else next.delete(name);
    setMarked(next);
  };
  const names = markedShown.map(({ name }) => name);
  return (
    <section className={css.netTable} aria-label="Nets">
      <div className={css.bar}>
        <TextField label="Find nets" placeholder="part of a name, or SPI_*" value={text} onChange={setText} />
        <Select
          label="Show"
          value={filter}
          choices={[
            { value: 'all', label: `All (${rows.length})` },
            { value: 'driven', label: `Driven (${rows.filter((row) => row.waveforms.length > 0).length})` },
            {
              value: 'proposed',
              label: `Proposed (${filterRows(rows, '', 'proposed').length})`,
              note: 'their names suggest that they switch',
            },
          ]}
          onChange={setFilter}
        />
      </div>
      {names.length > 0 && (
        <div className={css.bar}>
          <Select
            label={`Drive ${countText(names.length, 'net')} with`}
            value={null}
            placeholder={waveforms.length === 0 ? 'add a waveform first' : 'a waveform'}
            isDisabled={waveforms.length === 0}
            choices={waveforms.map(({ name, kind }) => ({ value: name, label: name, note: kind }))}
            onChange={(waveform) => driveNets(names, waveform)}
          />
          <Button onPress={() => leaveNets(names)}>Do not drive</Button>
          <Button look="quiet" onPress={() => setMarked(new Set())}>
            Clear choice
          </Button>
        </div>
      )}
      <div className={css.scroll} ref={scroll} data-own-arrows="">
        {shown.length === 0 ? (
          <EmptyState title="No such net">
            <p>Only nets with copper are listed.</p>
          </EmptyState>
        ) : (
          <Table label="Nets with copper">
            <thead>
              <tr>
                <HeadCell>
                  <Checkbox
                    label={`Choose all ${shown.length} shown`}
                    isSelected={markedShown.length === shown.length}
                    isMixed={markedShown.length > 0 && markedShown.length < shown.length}
                    onChange={(isAll) => setMarked(new Set(isAll ? shown.map(({ name }) => name) : []))}
                  />
                </HeadCell>
                <HeadCell>Net</HeadCell>
                <HeadCell>Driven by</HeadCell>
                <HeadCell isNumber>Length</HeadCell>
                <HeadCell isNumber>Pins</HeadCell>
                <HeadCell isNumber>Loads</HeadCell>
              </tr>
            </thead>
            <tbody>
              {above > 0 && <RowSpacer columns={6} heightPx={above} />}
              {items.map(({ index }) => {
                const row = shown[index]!;
                return (
                  <Row
                    key={row.name}
                    isChosen={row.name === chosen}
                    onPointerEnter={() => hover({ net: row.name })}
                    onPointerLeave={() => hover({ net: null })}
                  >
                    <Cell>
                      <Checkbox
                        label={`Choose ${row.name}`}
                        isSelected={marked.has(row.name)}
                        onChange={(isMarked) => mark(row.name, isMarked)}
                      />
                    </Cell>
                    <Cell>
                      <button
                        type="button"
                        className={css.name}
                        aria-pressed={row.name === chosen}
                        onClick={() => selectNet(row.name === chosen ? null : row.name)}
                      >
                        {row.name}
                      </button>
                    </Cell>
                    <Cell>
                      {row.waveforms.length > 0 ? (
                        row.waveforms.join(', ')
                      ) : (
                        <span className={css.quiet}>
                          {row.proposal === undefined ? '–' : PROPOSAL_WORDS[row.proposal]}
                        </span>
                      )}
                    </Cell>
                    <Cell isNumber>{quantityText(row.lengthM, 'm')}</Cell>
                    <Cell isNumber>{row.pinCount}</Cell>
                    <Cell isNumber>{row.loadCount}</Cell>
                  </Row>
                );
              })}
              {below > 0 && <RowSpacer columns={6} heightPx={below} />}
            </tbody>
          </Table>
        )}
      </div>
    </section>
  );
}
