import { inputError } from '../errors.ts';
import { mmToM } from '../units/convert.ts';
import type { StackLayer } from './board.ts';
import type { BoardFile } from './board-file.ts';
import { oneOf } from './near-names.ts';
import { refuseDuplicates } from './references.ts';

/** Stackup in metres, top to bottom, with z = 0 at the underside. Throws `input` for doubled names or touching coppers. */
export function convertStackup(rows: BoardFile['stackup']): StackLayer[] {
  refuseDuplicates(
    rows.map((row) => row.name),
    (i) => `stackup[${i}].name`,
  );
  requireApartCoppers(rows);
  let zTopM = 0;
  const layers = rows.toReversed().map((row): StackLayer => {
    const zBottomM = zTopM;
    zTopM += mmToM(row.thicknessMm);
    const isDielectric = row.kind === 'dielectric';
    return {
      name: row.name,
      kind: row.kind,
      thicknessM: mmToM(row.thicknessMm),
      zBottomM,
      zTopM,
      epsilonR: isDielectric ? row.epsilonR : 1,
      tanDelta: isDielectric ? (row.lossTangent ?? 0) : 0,
      isGuessed: isDielectric && row.guessed === true,
    };
  });
  return layers.toReversed();
}

function requireApartCoppers(rows: BoardFile['stackup']): void {
  const coppers = rows.flatMap((row, i) => (row.kind === 'copper' ? [i] : []));
  if (coppers.length === 0) throw inputError('stackup', 'a list with a copper layer', `${rows.length} dielectrics`);
  for (const [n, upper] of coppers.entries()) {
    const lower = coppers[n + 1];
    if (lower === undefined) continue;
    const between = rows.slice(upper + 1, lower);
    const heightMm = between.reduce((sum, row) => sum + row.thicknessMm, 0);
    if (heightMm > 0) continue;
    const path = `stackup[${lower}]`;
    throw inputError(path, `separated from the copper above (stackup[${upper}]) by a dielectric with a thickness`, 0);
  }
}

/** Finds copper layers by name. */
export class CopperLayers {
  readonly #stackup: readonly StackLayer[];
  readonly #indexOf: ReadonlyMap<string, number>;

  constructor(stackup: readonly StackLayer[]) {
    this.#stackup = stackup;
    this.#indexOf = new Map(stackup.map((layer, i) => [layer.name, i]));
  }

  /** Index into the stackup. Throws `input` when the layer is unknown or no copper. */
  index(name: string, path: string): number {
    const index = this.#indexOf.get(name);
    if (index !== undefined && this.#stackup[index]!.kind === 'copper') return index;
    const coppers = this.#stackup.filter((layer) => layer.kind === 'copper').map((layer) => layer.name);
    throw inputError(path, oneOf('the name of a copper layer of the stackup', name, coppers), name);
  }
}
