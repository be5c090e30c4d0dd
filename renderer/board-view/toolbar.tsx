import type { KeyboardEvent, ReactElement, RefObject } from 'react';
import { countText } from '../../app/report/format.ts';
import { keysOf, runCommand } from '../commands/run-command.ts';
import { Button, IconButton } from '../components/button.tsx';
import { Icon, type IconName } from '../components/icons.tsx';
import { MenuButton } from '../components/menu.tsx';
import { Select } from '../components/select.tsx';
import { boardCommand } from './board-commands.ts';
import { viewEntries } from './board-menu.ts';
import css from './board-view.module.css';
import type { Drawer } from './remembered-view.ts';
import type { Colouring } from './scene.ts';
import { useShownThings } from './use-scene.ts';

export interface ToolbarProps {
  readonly field: RefObject<HTMLInputElement | null>;
  readonly query: string;
  readonly onQuery: (query: string) => void;
  readonly found: number;
  /** Enter in the search field: to the next net found, with Shift to the one before. */
  readonly onCycle: (by: 1 | -1) => void;
  readonly isFromBottom: boolean;
  readonly drawer: Drawer;
  readonly onDrawer: (drawer: Drawer) => void;
}

const COLOURINGS: readonly { readonly value: Colouring; readonly label: string }[] = [
  { value: 'shares', label: 'Shares' },
  { value: 'current', label: 'Plane current' },
  { value: 'none', label: 'No colours' },
];

export function Toolbar(props: ToolbarProps): ReactElement {
  const { field, query, onQuery, found, onCycle, isFromBottom, drawer, onDrawer } = props;
  const [shown, setShown] = useShownThings();
  const toggle = (name: Drawer) => onDrawer(drawer === name ? 'closed' : name);
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter') onCycle(event.shiftKey ? -1 : 1);
    else if (event.key === 'Escape' && query !== '') onQuery('');
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  return (
    <div className={css.toolbar} role="toolbar" aria-label="Board" data-own-arrows="">
      <span className={css.search}>
        <Icon name="search" />
        <input
          ref={field}
          type="text"
          aria-label="Find a net; Enter goes to the next one"
          placeholder="Find a net"
          autoComplete="off"
          spellCheck={false}
          value={query}
          onChange={(event) => onQuery(event.target.value)}
          onKeyDown={onKeyDown}
        />
        <span className={css.found} role="status">
          {query === '' ? '' : countText(found, 'net')}
        </span>
      </span>
      <Select
        label="What the colours show"
        isLabelHidden
        value={shown.colouring}
        choices={COLOURINGS}
        onChange={(colouring) => setShown({ ...shown, colouring })}
      />
      <span className={css.buttons}>
        <Tool name="fit" icon="fit" />
        <Tool name="zoom-in" icon="plus" />
        <Tool name="zoom-out" icon="minus" />
        <Button look="quiet" onPress={() => runCommand(boardCommand('turn'))}>
          {isFromBottom ? 'From bottom' : 'From top'}
        </Button>
        <Button look="quiet" aria-pressed={drawer === 'layers'} onPress={() => toggle('layers')}>
          Layers
        </Button>
        <Button look="quiet" aria-pressed={drawer === 'nets'} onPress={() => toggle('nets')}>
          Nets
        </Button>
        <Button look="quiet" aria-pressed={drawer === 'findings'} onPress={() => toggle('findings')}>
          Findings
        </Button>
        <MenuButton label="More on the board" groups={() => [{ label: 'Board', entries: viewEntries() }]}>
          <Icon name="more" />
        </MenuButton>
      </span>
    </div>
  );
}

function Tool({ name, icon }: { readonly name: string; readonly icon: IconName }): ReactElement {
  const command = boardCommand(name);
  return (
    <IconButton label={command.label} keys={keysOf(command)} onPress={() => runCommand(command)}>
      <Icon name={icon} />
    </IconButton>
  );
}
