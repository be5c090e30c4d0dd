import type { ReactElement } from 'react';
import { keysOf, runCommand } from '../commands/run-command.ts';
import { IconButton } from '../components/button.tsx';
import { Icon } from '../components/icons.tsx';
import { MenuButton } from '../components/menu.tsx';
import { useApp } from '../state/app-store.ts';
import { useBase, useUndoLabels } from '../state/hooks.ts';
import { chooseTheme, useThemeChoice } from '../state/theme.ts';
import { usePalette } from '../theme/palette.ts';
import { menuGroups } from './command-menu.ts';
import { EstimateButton } from './estimate-button.tsx';
import css from './header.module.css';
import { COMMANDS, commandNamed } from './use-commands.ts';

export function Header(): ReactElement {
  return (
    <header className={css.header}>
      <MenuButton label="Menu" groups={() => menuGroups(COMMANDS)}>
        <Icon name="menu" />
      </MenuButton>
      <Title />
      <UndoButtons />
      <span className={css.space} />
      <EstimateButton />
      <CommandButton name="help.palette" icon="search" />
      <ThemeButton />
    </header>
  );
}

function Title(): ReactElement {
  const project = useApp((state) => state.project);
  const base = useBase();
  if (project === null) return <h1 className={css.title}>Quietboard</h1>;
  const { name, revision } = base?.layout ?? { name: '', revision: '' };
  return (
    <div className={css.title}>
      <h1>{project.name}</h1>
      <span className={css.board}>
        {name !== '' && name !== project.name && <span className={css.name}>{name}</span>}
        {revision !== '' && <span className={css.revision}>rev {revision}</span>}
      </span>
      {project.isReadOnly && <span className={css.revision}>read only</span>}
    </div>
  );
}

function UndoButtons(): ReactElement | null {
  const { undo, redo } = useUndoLabels();
  const hasDocument = useApp(({ history }) => history !== null);
  if (!hasDocument) return null;
  return (
    <span className={css.pair}>
      <CommandButton
        name="edit.undo"
        icon="undo"
        label={undo === null ? 'Undo' : `Undo: ${undo}`}
        isDisabled={undo === null}
      />
      <CommandButton
        name="edit.redo"
        icon="redo"
        label={redo === null ? 'Redo' : `Redo: ${redo}`}
        isDisabled={redo === null}
      />
    </span>
  );
}

interface CommandButtonProps {
  readonly name: string;
  readonly icon: Parameters<typeof Icon>[0]['name'];
  readonly label?: string;
  readonly isDisabled?: boolean;
}

function CommandButton({ name, icon, label, isDisabled = false }: CommandButtonProps): ReactElement {
  const command = commandNamed(name);
  return (
    <IconButton
      label={label ?? command.label}
      keys={keysOf(command)}
      isDisabled={isDisabled}
      onPress={() => runCommand(command)}
    >
      <Icon name={icon} />
    </IconButton>
  );
}

/** Changes between light and dark; back to the system's choice through the menu. */
function ThemeButton(): ReactElement {
  useThemeChoice();
  const other = usePalette().theme === 'dark' ? 'light' : 'dark';
  return (
    <IconButton label={`Theme: ${other}`} onPress={() => chooseTheme(other)}>
      <Icon name="theme" />
    </IconButton>
  );
}
