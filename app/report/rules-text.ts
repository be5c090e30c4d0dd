import { bandText, countText, frequencyText } from './format.ts';
import { mechanismText } from './mechanisms.ts';
import type { Radiation } from './radiation.ts';
import type { RulingBand } from './ruling-bands.ts';

/** "30–210 MHz valve cable; 210–640 MHz plane", at most so many bands; `cableName` shortens or escapes a name. */
export function bandsText(bands: readonly RulingBand[], most: number, cableName: (name: string) => string): string {
  const shown = bands
    .slice(0, most)
    .map(({ fromHz, toHz, mechanism }) => `${bandText(fromHz, toHz)} ${mechanismText(mechanism, cableName)}`);
  return [...shown, ...(bands.length > most ? [`${countText(bands.length - most, 'more band')} above`] : [])].join(
    '; ',
  );
}

/** Where planes and cables are not in the levels; empty when they are everywhere. */
export function unsolvedText({ unsolvedFromHz }: Radiation): string {
  if (unsolvedFromHz === undefined) return '';
  return unsolvedFromHz === 0
    ? 'planes and cables not solved'
    : `planes and cables not solved from ${frequencyText(unsolvedFromHz)}`;
}
