import { type ReactElement, type ReactNode, useRef } from 'react';
import {
  Menu as AriaMenu,
  Button,
  Header,
  Keyboard,
  MenuItem,
  MenuSection,
  MenuTrigger,
  Popover,
} from 'react-aria-components';
import button from './button.module.css';
import { classes } from './classes.ts';
import css from './menu.module.css';

export interface MenuEntry {
  readonly name: string;
  readonly label: string;
  readonly keys?: string | undefined;
  readonly isDisabled?: boolean;
  readonly run: () => void;
}

export interface MenuGroup {
  readonly label: string;
  readonly entries: readonly MenuEntry[];
}

/** The entries of a menu, under headings where there is more than one group. */
export function MenuList({
  groups,
  label,
}: {
  readonly groups: readonly MenuGroup[];
  readonly label: string;
}): ReactElement {
  const hasHeadings = groups.length > 1;
  const disabledKeys = groups
    .flatMap(({ entries }) => entries.filter((entry) => entry.isDisabled))
    .map(({ name }) => name);
  return (
    <AriaMenu className={css.list!} aria-label={label} disabledKeys={disabledKeys}>
      {groups.map((group) => (
        <MenuSection key={group.label} className={css.section!} aria-label={group.label}>
          {hasHeadings && <Header className={css.heading!}>{group.label}</Header>}
          {group.entries.map((entry) => (
            <MenuItem
              key={entry.name}
              id={entry.name}
              className={css.item!}
              textValue={entry.label}
              onAction={entry.run}
            >
              <span className={css.itemText}>{entry.label}</span>
              {entry.keys !== undefined && <Keyboard className={css.keys!}>{entry.keys}</Keyboard>}
            </MenuItem>
          ))}
        </MenuSection>
      ))}
    </AriaMenu>
  );
}

export interface MenuButtonProps {
  readonly label: string;
  /** Asked for each time the menu opens. */
  readonly groups: () => readonly MenuGroup[];
  /** What the button shows; its label when absent. */
  readonly children?: ReactNode;
}

export function MenuButton({ label, groups, children }: MenuButtonProps): ReactElement {
  return (
    <MenuTrigger>
      <Button
        className={classes(button.button, button.quiet, children !== undefined && button.icon)}
        aria-label={label}
      >
        {children ?? label}
      </Button>
      <Popover className={css.popover!} offset={2}>
        <FreshMenu groups={groups} label={label} />
      </Popover>
    </MenuTrigger>
  );
}

const FreshMenu = ({ groups, label }: Pick<MenuButtonProps, 'groups' | 'label'>): ReactElement => (
  <MenuList groups={groups()} label={label} />
);

export interface ContextMenuProps {
  /** Where it was asked for, in client coordinates; null: closed. */
  readonly at: { readonly x: number; readonly y: number } | null;
  readonly onClose: () => void;
  readonly label: string;
  readonly groups: readonly MenuGroup[];
}

/** A menu at the pointer. The owner keeps `at` from `onContextMenu` (which the menu key raises too). */
export function ContextMenu({ at, onClose, label, groups }: ContextMenuProps): ReactElement {
  const anchor = useRef<HTMLSpanElement>(null);
  return (
    <>
      <span ref={anchor} className={css.anchor} style={{ left: at?.x ?? 0, top: at?.y ?? 0 }} aria-hidden="true" />
      <Popover
        className={css.popover!}
        triggerRef={anchor}
        placement="bottom start"
        offset={0}
        isOpen={at !== null}
        onOpenChange={(isOpen) => !isOpen && onClose()}
      >
        <MenuList
          label={label}
          groups={groups.map((group) => ({
            ...group,
            entries: group.entries.map((entry) => ({
              ...entry,
              run: () => {
                onClose();
                entry.run();
              },
            })),
          }))}
        />
      </Popover>
    </>
  );
}
