import { Fragment, type ReactElement } from 'react';
import { IS_MAC, keysText } from '../commands/keys.ts';
import css from './overlays.module.css';
import { COMMANDS } from './use-commands.ts';

/** Keys that belong to no single command. */
const HABITS: readonly (readonly [what: string, keys: string])[] = [
  ['Next part of the window', 'Tab'],
  ['To the notices', 'F6'],
  ['Move the border between two parts', '← → ↑ ↓, Home, End'],
  ['Menu of what is pointed at', 'right click, Menu key'],
  ['Take back what was typed', 'Esc'],
];

/** Every key, from the commands themselves. */
export function Shortcuts(): ReactElement {
  const withKeys = COMMANDS.filter(({ keys }) => keys !== undefined);
  const groups = [...new Set(withKeys.map(({ group }) => group))];
  return (
    <div className={css.keys}>
      {groups.map((group) => (
        <Fragment key={group}>
          <h3>{group}</h3>
          <dl>
            {withKeys
              .filter((command) => command.group === group)
              .map(({ name, label, keys }) => (
                <KeyRow key={name} what={label} keys={keys!.map((key) => keysText(key, IS_MAC)).join(' or ')} />
              ))}
          </dl>
        </Fragment>
      ))}
      <h3>Everywhere</h3>
      <dl>
        {HABITS.map(([what, keys]) => (
          <KeyRow key={what} what={what} keys={keys} />
        ))}
      </dl>
    </div>
  );
}

const KeyRow = ({ what, keys }: { readonly what: string; readonly keys: string }): ReactElement => (
  <div>
    <dt>{what.replace(/…$/, '')}</dt>
    <dd>
      <kbd>{keys}</kbd>
    </dd>
  </div>
);
