/** Names that mean ground on nearly every board. */
const GROUND = /^(?:[ADPCS]?GND|[ADP]?VSS|GROUND|EARTH|0V)\d*$/i;

/**
 * The net of a negative plane, which the file does not state. First the net of its thermal reliefs (most frequent),
 * then a net that the layer's name contains as a word (longest first), then a ground net when the name speaks of
 * ground. Undefined when nothing fits.
 */
export function guessPlaneNet(
  layer: string,
  thermalNets: readonly string[],
  netNames: Iterable<string>,
): string | undefined {
  const names = [...netNames];
  return mostFrequent(thermalNets) ?? byName(layer, names) ?? groundOf(layer, names);
}

function mostFrequent(names: readonly string[]): string | undefined {
  const counts = new Map<string, number>();
  for (const name of names) counts.set(name, (counts.get(name) ?? 0) + 1);
  return [...counts].toSorted((p, q) => q[1] - p[1])[0]?.[0];
}

/** Words of a layer name, whole and without a number at the end: `L2_GND2` gives `GND2` and `GND`. */
function wordsOf(layer: string): Set<string> {
  const words = layer.toUpperCase().split(/[^A-Z0-9+.]+/);
  return new Set(
    [layer.toUpperCase(), ...words, ...words.map((word) => word.replace(/\d+$/, ''))].filter((word) => word !== ''),
  );
}

function byName(layer: string, names: readonly string[]): string | undefined {
  const words = wordsOf(layer);
  const fitting = names.filter((name) => words.has(name.toUpperCase()));
  return fitting.toSorted((p, q) => q.length - p.length)[0];
}

function groundOf(layer: string, names: readonly string[]): string | undefined {
  return [...wordsOf(layer)].some((word) => GROUND.test(word)) ? names.find((name) => GROUND.test(name)) : undefined;
}
