import { allLimitLines } from '../../app/limits/catalogue.ts';
import { parseLimitFile } from '../../app/limits/limit-file.ts';
import { type LimitLine, NO_CLASS } from '../../app/limits/limit-line.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';

/** The limit lines there are to choose from: the built-in ones, or the user's own. */
export const catalogueOf = ({ limitFile }: RunSettings): readonly LimitLine[] =>
  limitFile === undefined ? allLimitLines : parseLimitFile(limitFile);

const distinct = <T>(values: readonly T[]): T[] => [...new Set(values)];

export const standardsOf = (catalogue: readonly LimitLine[]): string[] =>
  distinct(catalogue.map(({ standard }) => standard));

/** Empty for a standard without classes. */
export const classesOf = (catalogue: readonly LimitLine[], standard: string): string[] =>
  distinct(catalogue.filter((line) => line.standard === standard).map((line) => line.class)).filter(
    (name) => name !== NO_CLASS,
  );

/** Distances the standard's class has lines for, rising, m. */
export const distancesOf = (catalogue: readonly LimitLine[], standard: string, className: string): number[] =>
  distinct(
    catalogue
      .filter((line) => line.standard === standard && [className, NO_CLASS].includes(line.class))
      .map(({ distanceM }) => distanceM),
  ).sort((one, other) => one - other);

/** The set-up with another standard: its class and distance move to ones that the standard has. */
export function withStandard(
  settings: RunSettings,
  catalogue: readonly LimitLine[],
  standard: string,
): Partial<RunSettings> {
  const classes = classesOf(catalogue, standard);
  const className = classes.includes(settings.class) ? settings.class : (classes.at(-1) ?? settings.class);
  return { standard, class: className, ...withDistance(settings, catalogue, standard, className) };
}

export const withClass = (
  settings: RunSettings,
  catalogue: readonly LimitLine[],
  className: string,
): Partial<RunSettings> => ({
  class: className,
  ...withDistance(settings, catalogue, settings.standard, className),
});

function withDistance(
  { distanceM, convertDistance }: RunSettings,
  catalogue: readonly LimitLine[],
  standard: string,
  className: string,
): Partial<RunSettings> {
  const distances = distancesOf(catalogue, standard, className);
  if (convertDistance || distances.includes(distanceM) || distances.length === 0) return {};
  return { distanceM: distances[0]! };
}
