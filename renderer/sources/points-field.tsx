import { type ReactElement, useState } from 'react';
import { TextField } from '../components/text-field.tsx';
import type { WaveformFile } from './edit-sources.ts';
import { parsePoints, pointsText } from './points-text.ts';

type Piecewise = Extract<WaveformFile, { kind: 'piecewise' }>;

export interface PointsFieldProps {
  readonly waveform: Piecewise;
  readonly onChange: (patch: Partial<Piecewise>) => void;
  readonly problem: string | null;
}

/** Corner points, one a line: nanoseconds and volts (or amperes). */
export function PointsField({ waveform, onChange, problem }: PointsFieldProps): ReactElement {
  const [refused, setRefused] = useState<{ readonly text: string; readonly message: string } | null>(null);
  const key = waveform.pointsNsV === undefined ? 'pointsNsA' : 'pointsNsV';
  const take = (text: string) => {
    const parsed = parsePoints(text);
    setRefused(typeof parsed === 'string' ? { text, message: parsed } : null);
    if (typeof parsed !== 'string') onChange({ [key]: parsed });
  };
  return (
    <TextField
      label={`Points: ns and ${key === 'pointsNsV' ? 'V' : 'A'}, one pair a line`}
      lines={6}
      isNumber
      value={refused?.text ?? pointsText(waveform[key] ?? [])}
      onCommit={take}
      message={refused?.message ?? problem}
    />
  );
}
