import type { Check } from './check.ts';
import { handbookChecks } from './handbook.ts';
import { limitChecks } from './limits.ts';
import { lineChecks } from './lines.ts';
import { necChecks } from './nec-references.ts';
import { siteAttenuationChecks } from './site-attenuation.ts';
import { sourceChecks } from './sources.ts';
import { structureChecks } from './structure-references.ts';

/** The whole table of trust, in a fixed order. */
export function allChecks(): Check[] {
  return [
    ...siteAttenuationChecks(),
    ...handbookChecks(),
    ...sourceChecks(),
    ...lineChecks(),
    ...necChecks(),
    ...structureChecks(),
    ...limitChecks(),
  ];
}
