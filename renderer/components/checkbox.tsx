import type { ReactElement, ReactNode } from 'react';
import { Checkbox as AriaCheckbox } from 'react-aria-components';
import css from './checkbox.module.css';

export interface CheckboxProps {
  readonly isSelected: boolean;
  /** Some of what it stands for is chosen. */
  readonly isMixed?: boolean;
  readonly onChange: (isSelected: boolean) => void;
  readonly isDisabled?: boolean;
  /** In place of children, where there is no room for a label. */
  readonly label?: string;
  readonly children?: ReactNode;
}

export function Checkbox({
  isSelected,
  isMixed = false,
  onChange,
  isDisabled = false,
  label,
  children,
}: CheckboxProps): ReactElement {
  return (
    <AriaCheckbox
      className={css.checkbox!}
      isSelected={isSelected}
      isIndeterminate={isMixed}
      onChange={onChange}
      isDisabled={isDisabled}
      {...(label !== undefined && { 'aria-label': label })}
    >
      <svg className={css.box} viewBox="0 0 16 16" aria-hidden="true">
        <path d={isMixed ? 'M4 8h8' : 'M3.5 8.5l3 3l6-7'} />
      </svg>
      {children}
    </AriaCheckbox>
  );
}
