import { type KeyboardEvent, type ReactElement, type ReactNode, useState } from 'react';
import {
  TextField as AriaTextField,
  type TextFieldProps as AriaTextFieldProps,
  FieldError,
  Input,
  Label,
  Text,
  TextArea,
} from 'react-aria-components';
import { classes } from './classes.ts';
import css from './field.module.css';

export interface FieldFrame {
  readonly label: string;
  /** The label is for screen readers only: the place says it already (a table's cell). */
  readonly isLabelHidden?: boolean;
  /** Beside the label: a `HelpTip`. */
  readonly help?: ReactNode;
  /** Always shown under the field. */
  readonly description?: string;
  /** What is wrong with the value: "at least 1 kHz". */
  readonly message?: string | null | undefined;
}

export interface TextFieldProps extends FieldFrame {
  readonly value: string;
  /** Called when typing is done: on Enter, or when the field is left. */
  readonly onCommit?: (value: string) => void;
  /** Called on every keystroke. */
  readonly onChange?: (value: string) => void;
  readonly isDisabled?: boolean;
  readonly isNumber?: boolean;
  readonly lines?: number;
  readonly placeholder?: string;
  readonly maxLength?: number;
  readonly autoFocus?: boolean;
}

/**
 * A line (or more) of text. What is typed stays in the field until Enter or leaving; Esc takes it back.
 * While it differs from the value the field carries `data-dirty`: undo then means the typing.
 */
export function TextField(props: TextFieldProps): ReactElement {
  const { value, onCommit, onChange, lines = 1, isNumber, placeholder, maxLength, autoFocus, isDisabled } = props;
  const [typed, setTyped] = useState<string | null>(null);
  const take = (text: string) => {
    setTyped(text);
    onChange?.(text);
  };
  const commit = () => {
    if (typed !== null && typed !== value) onCommit?.(typed);
    setTyped(null);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && (lines === 1 || event.ctrlKey || event.metaKey)) commit();
    if (event.key !== 'Escape' || typed === null || typed === value) return;
    event.preventDefault();
    event.stopPropagation();
    take(value);
    setTyped(null);
  };
  const field = {
    className: classes(css.input, isNumber && css.number),
    placeholder,
    'data-dirty': typed !== null && typed !== value ? '' : undefined,
  };
  return (
    <FieldShell
      frame={props}
      value={typed ?? value}
      onChange={take}
      onBlur={commit}
      onKeyDown={onKeyDown}
      {...(isDisabled !== undefined && { isDisabled })}
      {...(maxLength !== undefined && { maxLength })}
      {...(autoFocus && { autoFocus })}
    >
      {lines === 1 ? <Input autoComplete="off" spellCheck={false} {...field} /> : <TextArea rows={lines} {...field} />}
    </FieldShell>
  );
}

interface FieldShellProps extends Omit<AriaTextFieldProps, 'children' | 'className'> {
  readonly frame: FieldFrame;
  readonly children: ReactNode;
}

/** Label above, description and message below. */
export function FieldShell({ frame, children, ...props }: FieldShellProps): ReactElement {
  const { label, isLabelHidden, help, description, message } = frame;
  const isInvalid = message !== undefined && message !== null;
  return (
    <AriaTextField {...props} className={css.field!} isInvalid={isInvalid}>
      <span className={isLabelHidden ? css.hiddenLabel : css.label}>
        <Label>{label}</Label>
        {help}
      </span>
      {children}
      {description !== undefined && (
        <Text slot="description" className={css.description!}>
          {description}
        </Text>
      )}
      <FieldError className={css.message!}>{message}</FieldError>
    </AriaTextField>
  );
}
