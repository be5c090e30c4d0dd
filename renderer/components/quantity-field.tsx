import { type ReactElement, useState } from 'react';
import { formatQuantity, parseQuantity, type QuantityForm } from '../../app/units/quantity-text.ts';
import { DECIMAL_SIGN } from '../i18n/format.ts';
import { type FieldFrame, TextField } from './text-field.tsx';

export interface QuantityFieldProps extends Omit<FieldFrame, 'message'> {
  /** SI; null: empty. */
  readonly value: number | null;
  /** Called with what was typed, in SI, when it is a quantity within the range; `null` when an optional field was emptied. */
  readonly onCommit: (value: number | null) => void;
  readonly form: QuantityForm;
  readonly min?: number;
  readonly max?: number;
  readonly isOptional?: boolean;
  readonly isDisabled?: boolean;
  readonly placeholder?: string;
  /** A message about the value that was committed (from `useProblems`). */
  readonly message?: string | null;
}

/** A quantity as engineers type it: `3n3`, `3.3 ns`, `25M`, `4k7`. What makes no sense stays in the field with a message. */
export function QuantityField(props: QuantityFieldProps): ReactElement {
  const { value, onCommit, form, min, max, isOptional, message, ...rest } = props;
  const [refused, setRefused] = useState<{ readonly text: string; readonly must: string } | null>(null);
  const shown = value === null ? '' : formatQuantity(value, form, { decimal: DECIMAL_SIGN });

  const take = (text: string) => {
    const read = readQuantity(text, { form, min, max, isOptional: isOptional ?? false });
    setRefused(read.ok ? null : { text, must: read.message });
    if (read.ok && read.value !== value) onCommit(read.value);
  };
  // A value that came from elsewhere (undo, another window) replaces what was refused.
  const [seen, setSeen] = useState(value);
  if (seen !== value) {
    setSeen(value);
    setRefused(null);
  }
  return (
    <TextField
      {...rest}
      isNumber
      value={refused?.text ?? shown}
      onCommit={take}
      message={refused === null ? message : `Must be ${refused.must}`}
    />
  );
}

type Read = { readonly ok: true; readonly value: number | null } | { readonly ok: false; readonly message: string };

interface Rule {
  readonly form: QuantityForm;
  readonly min: number | undefined;
  readonly max: number | undefined;
  readonly isOptional: boolean;
}

function readQuantity(text: string, { form, min, max, isOptional }: Rule): Read {
  if (text.trim() === '' && isOptional) return { ok: true, value: null };
  const parsed = parseQuantity(text, form);
  if (!parsed.ok) return parsed;
  const bound = (limit: number) => formatQuantity(limit, form, { decimal: DECIMAL_SIGN });
  const received = () => `; this is ${bound(parsed.value)}`;
  if (min !== undefined && parsed.value < min) return { ok: false, message: `at least ${bound(min)}${received()}` };
  if (max !== undefined && parsed.value > max) return { ok: false, message: `at most ${bound(max)}${received()}` };
  return parsed;
}
