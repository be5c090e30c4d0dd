import type { ReactElement } from 'react';
import {
  Select as AriaSelect,
  Button,
  FieldError,
  Label,
  ListBox,
  ListBoxItem,
  Popover,
  SelectValue,
  Text,
} from 'react-aria-components';
import { classes } from './classes.ts';
import field from './field.module.css';
import { Icon } from './icons.tsx';
import css from './menu.module.css';
import type { FieldFrame } from './text-field.tsx';

export interface Choice<T extends string> {
  readonly value: T;
  readonly label: string;
  /** A second line in the list. */
  readonly note?: string;
}

export interface SelectProps<T extends string> extends FieldFrame {
  readonly value: T | null;
  readonly choices: readonly Choice<T>[];
  readonly onChange: (value: T) => void;
  readonly isDisabled?: boolean;
  readonly placeholder?: string;
}

/** One of a few. */
export function Select<T extends string>(props: SelectProps<T>): ReactElement {
  const { label, isLabelHidden, help, description, message, value, choices, onChange, isDisabled, placeholder } = props;
  return (
    <AriaSelect
      className={field.field!}
      value={value}
      onChange={(key) => key !== null && onChange(key as T)}
      isInvalid={message !== undefined && message !== null}
      {...(isDisabled !== undefined && { isDisabled })}
      {...(placeholder !== undefined && { placeholder })}
    >
      <span className={isLabelHidden ? field.hiddenLabel : field.label}>
        <Label>{label}</Label>
        {help}
      </span>
      <Button className={classes(field.input, css.selectButton)}>
        <SelectValue className={css.selectValue!}>
          {({ defaultChildren, isPlaceholder, selectedText }) => (isPlaceholder ? defaultChildren : selectedText)}
        </SelectValue>
        <Icon name="down" />
      </Button>
      {description !== undefined && (
        <Text slot="description" className={field.description!}>
          {description}
        </Text>
      )}
      <FieldError className={field.message!}>{message}</FieldError>
      <Popover className={css.popover!} offset={2}>
        <ListBox className={css.list!} items={choices.map((choice) => ({ ...choice, id: choice.value }))}>
          {(choice) => (
            <ListBoxItem className={css.item!} textValue={choice.label}>
              <span className={css.itemText}>{choice.label}</span>
              {choice.note !== undefined && <span className={css.note}>{choice.note}</span>}
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </AriaSelect>
  );
}
