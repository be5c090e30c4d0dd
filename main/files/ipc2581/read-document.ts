import { type Attributes, ContentError, Names, wordAttribute } from './attributes.ts';
import { contentReader } from './content-reader.ts';
import { emptyDocument, type Ipc2581Document } from './document.ts';
import { layerReader, specReader, stackupReader } from './layer-reader.ts';
import { stepReader } from './step-reader.ts';
import { mmPerUnit } from './units.ts';
import { type ElementReader, readXml, type XmlOptions, type XmlResult } from './xml-reader.ts';

/**
 * Reads an IPC-2581 file of any revision in one pass, by the elements it holds. Throws AppError `file` with the line
 * when it is not well-formed, breaks off, or holds a number that is none.
 */
export async function readDocument(
  file: string,
  options: XmlOptions,
): Promise<{ document: Ipc2581Document; xml: XmlResult }> {
  const document = emptyDocument();
  const names = new Names();
  const root: ElementReader = {
    child(name, attributes) {
      if (name !== 'IPC-2581') throw new ContentError(`root element must be IPC-2581; received ${name.slice(0, 40)}`);
      document.revision = (attributes.revision ?? '').slice(0, 40);
      return bodyReader(document, names);
    },
  };
  const xml = await readXml(file, root, options);
  return { document, xml };
}

const bodyReader = (document: Ipc2581Document, names: Names): ElementReader => ({
  child(name) {
    if (name === 'Content') return contentReader(document, names);
    return name === 'Ecad' ? ecadReader(document, names) : undefined;
  },
});

const ecadReader = (document: Ipc2581Document, names: Names): ElementReader => ({
  child(name, attributes) {
    if (name === 'CadHeader') {
      document.mmPerUnit = mmPerUnit(name, attributes);
      document.units = wordAttribute(attributes, 'units');
      return { child: (inner, spec) => (inner === 'Spec' ? specReader(document, names, spec) : undefined) };
    }
    return name === 'CadData' ? cadDataReader(document, names) : undefined;
  },
});

function cadDataReader(document: Ipc2581Document, names: Names): ElementReader {
  if (Number.isNaN(document.mmPerUnit)) throw new ContentError('CadHeader with its units must come before CadData');
  return {
    child(name: string, attributes: Attributes) {
      if (name === 'Layer') return layerReader(document, names, attributes);
      if (name === 'Stackup') return stackupReader(document, names, attributes);
      return name === 'Step' ? stepReader(document, names, attributes) : undefined;
    },
  };
}
