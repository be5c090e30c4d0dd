import { type Attributes, type Names, wordAttribute } from './attributes.ts';
import type { Ipc2581Document } from './document.ts';
import { readLineWidth, readShape, type Shape, type ShapeContext } from './shapes.ts';
import { mmPerUnit } from './units.ts';
import type { ElementReader } from './xml-reader.ts';

/** Content: the function mode and the dictionaries, each in units of its own. The first entry of an id counts. */
export function contentReader(document: Ipc2581Document, names: Names): ElementReader {
  return {
    child(name, attributes) {
      switch (name) {
        case 'FunctionMode':
          document.functionMode = wordAttribute(attributes, 'mode').slice(0, 40);
          return undefined;
        case 'DictionaryLineDesc':
          return entries(names, attributes, 'EntryLineDesc', (id, context) => lineDescEntry(document, id, context));
        case 'DictionaryFillDesc':
          return entries(names, attributes, 'EntryFillDesc', (id) => fillDescEntry(document, id));
        case 'DictionaryStandard':
          return entries(names, attributes, 'EntryStandard', (id, context) =>
            shapeEntry(document.standardShapes, id, context),
          );
        case 'DictionaryUser':
          return entries(names, attributes, 'EntryUser', (id, context) => shapeEntry(document.userShapes, id, context));
        default:
          return undefined;
      }
    },
  };
}

function entries(
  names: Names,
  dictionary: Attributes,
  entryName: string,
  entryReader: (id: string, context: ShapeContext) => ElementReader,
): ElementReader {
  let context: ShapeContext | undefined;
  return {
    child(name, attributes) {
      if (name !== entryName) return undefined;
      // Only now: an empty dictionary may leave its units out.
      context ??= { mmPerUnit: mmPerUnit(entryName.replace('Entry', 'Dictionary'), dictionary), names };
      const id = names.read(name, attributes, 'id');
      return id === undefined ? undefined : entryReader(id, context);
    },
  };
}

const lineDescEntry = (document: Ipc2581Document, id: string, context: ShapeContext): ElementReader => ({
  child(name, attributes) {
    const width = readLineWidth(context, name, attributes);
    if (typeof width === 'number' && !document.lineWidthsMm.has(id)) document.lineWidthsMm.set(id, width);
    return undefined;
  },
});

const fillDescEntry = (document: Ipc2581Document, id: string): ElementReader => ({
  child(name, attributes) {
    if (name === 'FillDesc' && !document.fills.has(id))
      document.fills.set(id, wordAttribute(attributes, 'fillProperty'));
    return undefined;
  },
});

function shapeEntry(dictionary: Map<string, readonly Shape[]>, id: string, context: ShapeContext): ElementReader {
  const shapes: Shape[] = [];
  return {
    child: (name, attributes) => readShape(context, name, attributes, (shape) => shapes.push(shape)),
    end() {
      if (!dictionary.has(id)) dictionary.set(id, shapes);
    },
  };
}
