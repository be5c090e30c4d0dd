import type { EstimateResult } from '../estimate/result.ts';

/** What the estimate takes into account, and what not, for the structure setting of this result. */
export function modelText({ structure, site }: EstimateResult): { included: string[]; missing: string[] } {
  const included = [
    'Spectral lines of every waveform; line currents on every driven net from the stackup, the driver and the loads.',
    'Trace, return current straight under it on the reference plane, vertical currents at pins and vias, polarisation current of the dielectric.',
    site.kind === 'ground-plane'
      ? 'Perfectly reflecting ground under the table; the maximum over antenna height, turntable angle and both polarisations.'
      : 'Free space without any reflection; the maximum over antenna height, turntable angle and both polarisations.',
    'Receiver bandwidth and detector of the judged band.',
  ];
  const missing = [
    'Enclosure, heat sinks, parts other than their pins; connectors other than as ideal joints; imperfect ground.',
  ];
  if (structure === 'solved') {
    included.push(
      'Currents that the traces drive over the finite planes and into the cables (partial elements with retardation on square cells).',
    );
    missing.push('Resonance of the cavity between power and ground: the planes count as one sheet.');
  } else {
    missing.push(
      'Currents on the planes as a whole and on cables driven by the board: switched off here. Above some 100 MHz, and with any cable, they usually radiate more than the traces themselves.',
    );
  }
  return { included, missing };
}
