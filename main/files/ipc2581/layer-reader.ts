import { type Attributes, ContentError, type Names, optionalNumber, wordAttribute } from './attributes.ts';
import type { Ipc2581Document, Layer, Material, Stackup, StackupRow } from './document.ts';
import type { ElementReader } from './xml-reader.ts';

const MOST_ROWS = 2000;

/** Layer: function, side, polarity and the span of a drill layer. */
export function layerReader(
  document: Ipc2581Document,
  names: Names,
  attributes: Attributes,
): ElementReader | undefined {
  const name = names.read('Layer', attributes, 'name');
  if (name === undefined || document.layers.has(name)) return undefined;
  const layer: Layer = {
    name,
    layerFunction: wordAttribute(attributes, 'layerFunction'),
    side: wordAttribute(attributes, 'side'),
    isNegative: wordAttribute(attributes, 'polarity') === 'NEGATIVE',
    specRefs: [],
  };
  document.layers.set(name, layer);
  return {
    child(element, inner) {
      if (element === 'Span') {
        layer.from = names.read(element, inner, 'fromLayer');
        layer.to = names.read(element, inner, 'toLayer');
      } else addSpecRef(layer.specRefs, names, element, inner);
      return undefined;
    },
  };
}

/** Spec: material text, permittivity and loss tangent; the first value of each counts. */
export function specReader(document: Ipc2581Document, names: Names, attributes: Attributes): ElementReader | undefined {
  const name = names.read('Spec', attributes, 'name');
  if (name === undefined) return undefined;
  const material: Material = document.specs.get(name) ?? { text: '' };
  document.specs.set(name, material);
  return {
    child(element, inner) {
      const type = wordAttribute(inner, 'type');
      if (element === 'General' && type === 'MATERIAL') {
        return { child: (leaf, property) => void addText(material, leaf === 'Property' ? property.text : undefined) };
      }
      if (element !== 'Dielectric') return undefined;
      return {
        child(leaf, property) {
          if (leaf === 'Property') setDielectric(material, type, property.value ?? property.text ?? '');
          return undefined;
        },
      };
    },
  };
}

/** Stackup with its groups and rows. */
export function stackupReader(document: Ipc2581Document, names: Names, attributes: Attributes): ElementReader {
  const stackup: Stackup = {
    name: names.read('Stackup', attributes, 'name') ?? '',
    overallThicknessMm: thicknessMm(document, 'Stackup', attributes, 'overallThickness'),
    groups: [],
  };
  document.stackups.push(stackup);
  return {
    child(element, inner) {
      if (element !== 'StackupGroup') return undefined;
      const rows: StackupRow[] = [];
      stackup.groups.push({ name: names.read(element, inner, 'name') ?? '', rows });
      return {
        child: (leaf, row) => (leaf === 'StackupLayer' ? stackupRowReader(document, names, row, rows) : undefined),
      };
    },
  };
}

function stackupRowReader(
  document: Ipc2581Document,
  names: Names,
  attributes: Attributes,
  rows: StackupRow[],
): ElementReader | undefined {
  const layerRef = names.read('StackupLayer', attributes, 'layerOrGroupRef');
  if (layerRef === undefined) return undefined;
  const row: StackupRow = {
    layerRef,
    thicknessMm: thicknessMm(document, 'StackupLayer', attributes, 'thickness'),
    sequence: optionalNumber('StackupLayer', attributes, 'sequence'),
    specRefs: [],
    material: { text: '' },
  };
  addText(row.material, attributes.materialType);
  if (rows.length >= MOST_ROWS) throw new ContentError(`a StackupGroup has more than ${MOST_ROWS} rows`);
  rows.push(row);
  return {
    child(element, inner) {
      addSpecRef(row.specRefs, names, element, inner);
      if (element === 'NonstandardAttribute') {
        const label = (inner.name ?? '').toUpperCase().replace(/[^A-Z]+/g, '_');
        if (label.includes('MATERIAL')) addText(row.material, inner.value);
        else setDielectric(row.material, label, inner.value ?? '');
      }
      return undefined;
    },
  };
}

const thicknessMm = (document: Ipc2581Document, element: string, attributes: Attributes, name: string): number =>
  Math.max(0, optionalNumber(element, attributes, name) ?? 0) * document.mmPerUnit;

function addSpecRef(specRefs: string[], names: Names, element: string, attributes: Attributes): void {
  const id = element === 'SpecRef' ? names.read(element, attributes, 'id') : undefined;
  if (id !== undefined) specRefs.push(id);
}

function addText(material: Material, text: string | undefined): undefined {
  if (text !== undefined && text !== '') material.text = `${material.text} ${text}`.trim().slice(0, 400);
}

/** Takes "4.2" or "4.2 (1 GHz)"; below 1 it is no permittivity but a gap in the data. */
function setDielectric(material: Material, label: string, text: string): void {
  const value = Number.parseFloat(text);
  if (!Number.isFinite(value)) return;
  if (/DIELECTRIC_CONSTANT|PERMITTIVITY|^DK$|^ER$/.test(label)) {
    if (value >= 1 && value < 1000) material.epsilonR ??= value;
  } else if (/LOSS_TAN|DISSIPATION_FACTOR|^DF$|TAN_DELTA/.test(label)) {
    if (value >= 0 && value < 10) material.lossTangent ??= value;
  }
}
