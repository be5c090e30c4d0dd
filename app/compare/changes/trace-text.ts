import { shortName } from '../../report/markup.ts';
import { copperKeys, type Net } from './copper-key.ts';
import { chainLengthMm, lengthChange } from './place-text.ts';
import { boxMm } from './rings.ts';
import { joined, lengthMmText, numberChange, type Words } from './words.ts';

type Traces = Net['traces'];

/** Traces on one layer. */
interface LayerCopper {
  readonly lengthMm: number;
  /** The only width, or undefined. */
  readonly widthMm: number | undefined;
  /** Corners of what encloses it, nm: other corners are other copper, and cheap to see. */
  readonly corners: string;
  /** Equal for equal copper (`copperKeys`). */
  readonly key: () => string;
  /** The same whatever the widths. */
  readonly routeKey: () => string;
}

/** "trace on TOP 54 → 19 mm, on BOT none → 26 mm"; undefined for the same copper. */
export function traceText(before: Traces, after: Traces, nanometres: (valueMm: number) => number): Words {
  const [one, other] = [byLayer(before, nanometres), byLayer(after, nanometres)];
  const layers = [...new Set([...one.keys(), ...other.keys()])];
  const parts = layers.flatMap((layer) => {
    const text = layerText(one.get(layer), other.get(layer));
    return text === undefined ? [] : [`on ${shortName(layer)} ${text}`];
  });
  const all = joined(parts, ', ');
  return all && `trace ${all}`;
}

function layerText(one: LayerCopper | undefined, other: LayerCopper | undefined): Words {
  if (!one || !other) {
    const side = (copper: LayerCopper | undefined) => (copper ? `${lengthMmText(copper.lengthMm)} mm` : 'none');
    return `${side(one)} → ${side(other)}`;
  }
  const isSameBox = one.corners === other.corners;
  if (isSameBox && one.key() === other.key()) return undefined;
  const length = lengthChange('', one.lengthMm, other.lengthMm)?.trim();
  const isUniform = one.widthMm !== undefined && other.widthMm !== undefined;
  const width = isUniform ? numberChange('width', one.widthMm, other.widthMm, 'mm') : undefined;
  if (length !== undefined || width !== undefined) return joined([length, width], ', ');
  return isSameBox && one.routeKey() === other.routeKey()
    ? 'other widths along the way'
    : `another way, still ${lengthMmText(other.lengthMm)} mm`;
}

function byLayer(traces: Traces, nanometres: (valueMm: number) => number): Map<string, LayerCopper> {
  const groups = new Map<string, NonNullable<Traces>>();
  for (const trace of traces ?? []) {
    const group = groups.get(trace.layer);
    if (group) group.push(trace);
    else groups.set(trace.layer, [trace]);
  }
  return new Map(
    [...groups].map(([layer, own]) => {
      const widths = new Set(own.map(({ widthMm }) => nanometres(widthMm)));
      const text = (keys: ReadonlyMap<string, string>) =>
        [...keys]
          .map((pair) => pair.join(' '))
          .sort()
          .join('\n');
      return [
        layer,
        {
          lengthMm: own.reduce((sum, { pointsMm }) => sum + chainLengthMm(pointsMm), 0),
          widthMm: widths.size === 1 ? own[0]!.widthMm : undefined,
          corners: boxMm(own.flatMap(({ pointsMm }) => pointsMm))
            .map(nanometres)
            .join(' '),
          key: () => text(copperKeys(own, nanometres)),
          routeKey: () =>
            text(
              copperKeys(
                own.map((trace) => ({ ...trace, widthMm: 0 })),
                nanometres,
              ),
            ),
        },
      ];
    }),
  );
}
