import type { Ipc2581Document, Material, StackupRow } from '../document.ts';

/**
 * Finds the material facts of stackup rows. Some writers name their Specs `<layer>_<number>` and refer to
 * `SPEC_<layer>`, which leads nowhere: then the Spec is found by the layer's name.
 */
export class MaterialFinder {
  /** References that lead to no Spec. */
  dangling = 0;
  private readonly document: Ipc2581Document;
  private readonly byBaseName = new Map<string, Material>();

  constructor(document: Ipc2581Document) {
    this.document = document;
    for (const [name, material] of document.specs) {
      const base = name.replace(/_\d+$/, '');
      if (!this.byBaseName.has(base)) this.byBaseName.set(base, material);
    }
  }

  /** Facts of the row: its own ones first, then those of its Specs, then those of its layer's. */
  find(row: StackupRow): Material {
    const layer = this.document.layers.get(row.layerRef);
    const sources = [row.material];
    for (const id of [...row.specRefs, ...(layer?.specRefs ?? [])]) {
      const spec = this.document.specs.get(id);
      if (spec === undefined) this.dangling++;
      const found = spec ?? this.byName(row.layerRef) ?? this.byName(id.replace(/^SPEC_/, ''));
      if (found !== undefined) sources.push(found);
    }
    if (sources.length === 1) sources.push(this.byName(row.layerRef) ?? { text: '' });
    const facts: Material = { text: sources.map(({ text }) => text).join(' ') };
    const epsilonR = sources.find((source) => source.epsilonR !== undefined)?.epsilonR;
    const lossTangent = sources.find((source) => source.lossTangent !== undefined)?.lossTangent;
    if (epsilonR !== undefined) facts.epsilonR = epsilonR;
    if (lossTangent !== undefined) facts.lossTangent = lossTangent;
    return facts;
  }

  private byName(name: string): Material | undefined {
    return this.document.specs.get(name) ?? this.byBaseName.get(name);
  }
}
