import { z } from 'zod';
import type { LimitRequest } from '../limits/choose.ts';
import type { SiteRequest } from '../site/site.ts';

/**
 * Against what and how a board is estimated, as kept with every run: everything a run depends on beside the board's
 * document. The defaults are those of the command line.
 */
export const runSettingsSchema = z.strictObject({
  standard: z.string().min(1).max(200).default('CISPR 32'),
  class: z.string().min(1).max(200).default('B'),
  distanceM: z.number().min(0.5).max(100).default(3),
  /** Convert limits of another distance by the standard's rule. */
  convertDistance: z.boolean().default(false),
  measuredFrom: z.enum(['boundary', 'center']).default('boundary'),
  site: z.enum(['ground-plane', 'free-space']).default('ground-plane'),
  orientation: z.enum(['flat', 'upright']).default('flat'),
  structure: z.enum(['solved', 'pair-only']).default('solved'),
  /** Upper end of the judged range; absent: the standard's rule. */
  maxHz: z.number().min(1e6).max(1e12).optional(),
  requiredMarginDb: z.number().min(0).max(100).default(0),
  /** The user's own limit lines: the content of a limit file, in place of the built-in ones. */
  limitFile: z.unknown().optional(),
});

export type RunSettings = z.output<typeof runSettingsSchema>;

export const limitRequestOf = (settings: RunSettings): LimitRequest => ({
  standard: settings.standard,
  class: settings.class,
  distanceM: settings.distanceM,
  convertDistance: settings.convertDistance,
  siteKind: settings.site,
});

export const siteRequestOf = (settings: RunSettings): SiteRequest => ({
  kind: settings.site,
  distanceM: settings.distanceM,
  measuredFrom: settings.measuredFrom,
  orientation: settings.orientation,
});
