import { InvalidArgumentError } from 'commander';

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** Parser of a numeric option; the message names the range. */
export function numberWithin(low: number, high: number, unit = ''): (text: string) => number {
  return (text) => {
    const value = NUMBER.test(text.trim()) ? Number(text) : Number.NaN;
    if (value >= low && value <= high) return value;
    throw new InvalidArgumentError(`It must be a number from ${low} to ${high}${unit === '' ? '' : ` ${unit}`}.`);
  };
}

/** Parser of a whole-number option. */
export function wholeNumberWithin(low: number, high: number): (text: string) => number {
  return (text) => {
    const value = /^\d+$/.test(text.trim()) ? Number(text) : Number.NaN;
    if (value >= low && value <= high) return value;
    throw new InvalidArgumentError(`It must be a whole number from ${low} to ${high}.`);
  };
}
