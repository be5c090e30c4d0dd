import type { Waveform } from '../board/board.ts';

/**
 * The frequency that counts as "highest frequency generated or used" for the upper end of the measured range
 * (CISPR 32 table 1, FCC 15.33(b)), Hz:
 *
 * - trapezoid: its frequency;
 * - random data: the bit rate, the clock that sends the bits (double-edge clocking would be half of it, so the range
 *   is never too short);
 * - piecewise and samples: 1/period (what repeats; a clock inside a burst is not recognised);
 * - lines: the highest one, since a list does not say which are fundamentals (again never too short).
 */
export function fundamentalHz(waveform: Waveform): number {
  switch (waveform.kind) {
    case 'trapezoid':
      return waveform.frequencyHz;
    case 'random-data':
      return waveform.bitRateHz;
    case 'lines':
      return waveform.lines.reduce((highestHz, { frequencyHz }) => Math.max(highestHz, frequencyHz), 0);
    default:
      return 1 / waveform.periodS;
  }
}

/**
 * Drives of one clock domain add as phasors. The domain named in the file, else the waveform's own name; random data
 * without a named domain is independent on every drive (`driveKey`: anything unique to the drive, such as "net/pin").
 */
export function clockDomainOf(waveform: Waveform, driveKey: string): string {
  if (waveform.clockDomain !== undefined) return waveform.clockDomain;
  return waveform.kind === 'random-data' ? `${waveform.name} at ${driveKey}` : waveform.name;
}
