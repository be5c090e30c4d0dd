import type { ReactElement } from 'react';
import {
  Autocomplete,
  Dialog,
  Input,
  Keyboard,
  Label,
  Menu,
  MenuItem,
  Modal,
  ModalOverlay,
  TextField,
  useFilter,
} from 'react-aria-components';
import { isEnabled, keysOf, runCommand } from '../commands/run-command.ts';
import css from './command-palette.module.css';
import { COMMANDS } from './use-commands.ts';

export interface CommandPaletteProps {
  readonly isOpen: boolean;
  readonly onClose: () => void;
}

/** Everything that can be done now, found by typing. */
export function CommandPalette({ isOpen, onClose }: CommandPaletteProps): ReactElement {
  return (
    <ModalOverlay
      className={css.overlay!}
      isDismissable
      isOpen={isOpen}
      onOpenChange={(isStillOpen) => !isStillOpen && onClose()}
    >
      <Modal className={css.modal!}>
        <Dialog className={css.dialog!} aria-label="Commands">
          <CommandList onClose={onClose} />
        </Dialog>
      </Modal>
    </ModalOverlay>
  );
}

function CommandList({ onClose }: { readonly onClose: () => void }): ReactElement {
  const { contains } = useFilter({ sensitivity: 'base' });
  const possible = COMMANDS.filter((command) => command.name !== 'help.palette' && isEnabled(command));
  const hasAllWords = (text: string, typed: string) => typed.split(/\s+/).every((word) => contains(text, word));
  return (
    <Autocomplete filter={hasAllWords}>
      <TextField autoFocus className={css.field!}>
        <Label className={css.label!}>Command</Label>
        <Input className={css.input!} placeholder="What do you want to do?" />
      </TextField>
      <Menu
        className={css.list!}
        aria-label="Commands"
        items={possible.map((command) => ({ ...command, id: command.name }))}
        renderEmptyState={() => <p className={css.empty}>No command of this name can be used now.</p>}
        onAction={(key) => {
          onClose();
          const command = COMMANDS.find(({ name }) => name === key);
          if (command !== undefined) runCommand(command);
        }}
      >
        {(command) => (
          <MenuItem className={css.item!} textValue={`${command.group} ${command.label}`}>
            <span className={css.group}>{command.group}</span>
            <span>{command.label}</span>
            <Keyboard className={css.keys!}>{keysOf(command) ?? ''}</Keyboard>
          </MenuItem>
        )}
      </Menu>
    </Autocomplete>
  );
}
