import type { BoardFile } from '../../board/board-file.ts';
import { countText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import { type Draft, pairUp, wideDraft } from './draft.ts';
import { joined, namesText, numberChange, sameNumber, type Words, wordChange } from './words.ts';

type Layer = BoardFile['stackup'][number];

const isCopper = ({ kind }: Layer): boolean => kind === 'copper';

/** New names of copper layers: only where nothing about the copper layers but their names is different. */
export function layerRenames(before: BoardFile, after: BoardFile): Map<string, string> {
  const [one, other] = [before.stackup, after.stackup];
  const isSameBuild =
    one.length === other.length &&
    one.every((layer, i) => layer.kind === other[i]!.kind && sameNumber(layer.thicknessMm, other[i]!.thicknessMm));
  const [was, is] = [new Set(one.map(({ name }) => name)), new Set(other.map(({ name }) => name))];
  if (!isSameBuild) return new Map();
  return new Map(
    one.flatMap((layer, i): [string, string][] => {
      const next = other[i]!.name;
      // Names that both have were swapped, which is no renaming.
      return layer.name !== next && !is.has(layer.name) && !was.has(next) ? [[layer.name, next]] : [];
    }),
  );
}

/** `before` with its layers under their new names. */
export function stackupChanges(before: BoardFile, after: BoardFile, renames: ReadonlyMap<string, string>): Draft[] {
  const said = [
    ...[...renames].map(([from, to]) => `stackup: layer ${shortName(from)} is now named ${shortName(to)}`),
    buildText(before.stackup, after.stackup),
    ...pairUp(before.stackup, after.stackup, ({ name, kind }) => JSON.stringify([kind, name])).map(({ one, other }) =>
      one && other ? layerText(one, other) : undefined,
    ),
    orderText(before.stackup, after.stackup),
  ];
  return said.filter((text) => text !== undefined).map((text) => wideDraft('stackup', text));
}

function layerText(one: Layer, other: Layer): Words {
  const parts = joined(
    [
      numberChange('', one.thicknessMm, other.thicknessMm, 'mm')?.trim(),
      one.kind === 'dielectric' && other.kind === 'dielectric'
        ? joined(
            [
              numberChange('permittivity', one.epsilonR, other.epsilonR, ''),
              numberChange('loss tangent', one.lossTangent ?? 0, other.lossTangent ?? 0, ''),
            ],
            ', ',
          )
        : undefined,
    ],
    ', ',
  );
  return parts && `stackup: ${shortName(other.name)} ${parts}`;
}

/** Layers that came or went, and what that did to the dielectric next to the copper layers that stayed. */
function buildText(before: readonly Layer[], after: readonly Layer[]): Words {
  const pairs = pairUp(before, after, ({ name, kind }) => JSON.stringify([kind, name]));
  const added = pairs.flatMap(({ one, other }) => (!one && other ? [other.name] : []));
  const removed = pairs.flatMap(({ one, other }) => (one && !other ? [one.name] : []));
  if (added.length + removed.length === 0) return undefined;
  const copperCount = (layers: readonly Layer[]) => layers.filter(isCopper).length;
  const totalMm = (layers: readonly Layer[]) =>
    Number(layers.reduce((sum, { thicknessMm }) => sum + thicknessMm, 0).toFixed(6));
  const [was, is] = [copperCount(before), copperCount(after)];
  const parts = joined([
    was === is ? undefined : `${was} → ${countText(is, 'copper layer')}`,
    numberChange('board', totalMm(before), totalMm(after), 'mm thick'),
    ...gapTexts(before, after),
    was === is && added.length > 0 ? `${namesText(added)} added` : undefined,
    was === is && removed.length > 0 ? `${namesText(removed)} removed` : undefined,
  ]);
  return parts && `stackup: ${parts}`;
}

/** "dielectric under TOP 1.53 → 0.2 mm", for copper layers of both. */
function gapTexts(before: readonly Layer[], after: readonly Layer[]): Words[] {
  const [one, other] = [gapsUnder(before), gapsUnder(after)];
  return [...other].map(([name, gapMm]) =>
    one.has(name) ? numberChange(`dielectric under ${shortName(name)}`, one.get(name), gapMm, 'mm') : undefined,
  );
}

/** Dielectric between a copper layer and the next one below, mm; the lowest has none. */
function gapsUnder(layers: readonly Layer[]): Map<string, number> {
  const gaps = new Map<string, number>();
  let above: string | undefined;
  let gapMm = 0;
  for (const layer of layers) {
    if (!isCopper(layer)) {
      gapMm += layer.thicknessMm;
      continue;
    }
    if (above !== undefined) gaps.set(above, gapMm);
    above = layer.name;
    gapMm = 0;
  }
  return gaps;
}

/** Layers of both in another order. */
function orderText(before: readonly Layer[], after: readonly Layer[]): Words {
  const is = new Set(after.map(({ name }) => name));
  const was = new Set(before.map(({ name }) => name));
  const order = (layers: readonly Layer[], others: ReadonlySet<string>) =>
    layers.map(({ name }) => name).filter((name) => others.has(name));
  const [one, other] = [order(before, is), order(after, was)];
  return one.join('\n') === other.join('\n') ? undefined : 'stackup: layers in another order';
}

/** How planes and cables are modelled, as the board file asks for it. */
export function structureChanges(before: BoardFile, after: BoardFile): Draft[] {
  const parts = joined([
    wordChange('planes', before.structure?.planes, after.structure?.planes, 'as the set-up says'),
    numberChange('cell size', before.structure?.cellMm, after.structure?.cellMm, 'mm', 'chosen by the program'),
  ]);
  return parts === undefined ? [] : [wideDraft('structure', `structure: ${parts}`)];
}
