import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type BoardFile, boardFileSchema } from '../../../app/board/board-file.ts';
import type { ImportSummary } from '../../../app/board/import-summary.ts';
import { toBoard } from '../../../app/board/to-board.ts';
import { AppError } from '../../../app/errors.ts';
import { importBoard } from '../../../main/files/import-board.ts';

/** Parts of an invented file; each has a default that makes a plain two-layer board of 80 × 50 mm. */
export interface Parts {
  readonly declaration?: string;
  readonly root?: string;
  readonly content?: string;
  /** Puts Content behind Ecad, as some home-made writers do. */
  readonly isContentLast?: boolean;
  readonly header?: string;
  readonly layers?: string;
  readonly stackup?: string;
  readonly profile?: string;
  /** Inside the step, after the profile. */
  readonly step?: string;
  /** Replaces all steps. */
  readonly steps?: string;
}

export const polygon = (points: string): string => {
  const [first, ...rest] = points.split(' ').map((point) => point.split(','));
  const steps = rest.map(([x, y]) => `<PolyStepSegment x="${x}" y="${y}"/>`).join('');
  return `<PolyBegin x="${first![0]}" y="${first![1]}"/>${steps}`;
};

export const PROFILE = `<Profile><Polygon>${polygon('0,0 80,0 80,50 0,50 0,0')}</Polygon></Profile>`;
export const LAYERS = `<Layer name="TOP" layerFunction="SIGNAL" side="TOP" polarity="POSITIVE"/>
  <Layer name="CORE" layerFunction="DIELCORE" side="INTERNAL" polarity="POSITIVE"/>
  <Layer name="BOT" layerFunction="SIGNAL" side="BOTTOM" polarity="POSITIVE"/>
  <Layer name="DRILL" layerFunction="DRILL" side="ALL" polarity="POSITIVE"><Span fromLayer="TOP" toLayer="BOT"/></Layer>`;
export const HEADER = `<CadHeader units="MILLIMETER">
  <Spec name="FR"><Dielectric type="DIELECTRIC_CONSTANT"><Property value="4.2"/></Dielectric>
    <Dielectric type="LOSS_TANGENT"><Property value="0.018"/></Dielectric></Spec></CadHeader>`;
const STACKUP = `<Stackup name="PRIMARY" overallThickness="1.6" whereMeasured="METAL"><StackupGroup name="G" thickness="1.6">
  <StackupLayer layerOrGroupRef="TOP" thickness="0.035" sequence="1"/>
  <StackupLayer layerOrGroupRef="CORE" thickness="1.53" sequence="2"><SpecRef id="FR"/></StackupLayer>
  <StackupLayer layerOrGroupRef="BOT" thickness="0.035" sequence="3"/></StackupGroup></Stackup>`;

export function ipcFile(parts: Parts = {}): string {
  const step = `<Step name="board">${parts.profile ?? PROFILE}${parts.step ?? onLayer('TOP', line('SIG', '1,2 11,2'))}</Step>`;
  const content = `<Content><FunctionMode mode="USERDEF"/>${parts.content ?? ''}</Content>`;
  const ecad = `<Ecad name="x">${parts.header ?? HEADER}<CadData>
${parts.layers ?? LAYERS}${parts.stackup ?? STACKUP}
${parts.steps ?? step}</CadData></Ecad>`;
  const [first, second] = parts.isContentLast ? [ecad, content] : [content, ecad];
  return `${parts.declaration ?? '<?xml version="1.0" encoding="UTF-8"?>\n'}${
    parts.root ?? '<IPC-2581 revision="C" xmlns="http://webstds.ipc.org/2581">'
  }\n${first}\n${second}</IPC-2581>`;
}

export const onLayer = (layer: string, sets: string): string =>
  `<LayerFeature layerRef="${layer}">${sets}</LayerFeature>`;
export const WIDTH = '<LineDesc lineEnd="ROUND" lineWidth="0.25"/>';

/** A Set with one Polyline through the points. */
export const line = (net: string, points: string, width = WIDTH): string =>
  `<Set net="${net}"><Features><Location x="0" y="0"/><Polyline>${polygon(points)}${width}</Polyline></Features></Set>`;

/** A Set with one filled contour; `attributes` go to the Set. */
export const contour = (attributes: string, points: string, cutouts: readonly string[] = []): string =>
  `<Set ${attributes}><Features><Location x="0" y="0"/><Contour><Polygon>${polygon(points)}</Polygon>${cutouts
    .map((cutout) => `<Cutout>${polygon(cutout)}</Cutout>`)
    .join('')}</Contour></Features></Set>`;

export interface Imported {
  readonly board: BoardFile;
  readonly summary: ImportSummary;
}

/** Writes the text to a file of its own and imports it; the board must pass the schema and become a board in SI units. */
export async function importText(text: string | Buffer, name = 'invented.xml'): Promise<Imported> {
  const folder = await mkdtemp(join(tmpdir(), 'quietboard-import-'));
  try {
    const file = join(folder, name);
    await writeFile(file, text);
    const { board, summary } = await importBoard(file);
    const parsed = boardFileSchema.parse(board);
    // Without any net or plane nothing has an extent, and the conversion rightly asks for one.
    if (parsed.nets.length > 0) toBoard(parsed);
    return { board: parsed, summary };
  } finally {
    await rm(folder, { recursive: true });
  }
}

export const importParts = (parts: Parts): Promise<Imported> => importText(ipcFile(parts));

/** The AppError of a failing import; fails the test when it succeeds or throws anything else. */
export async function importError(text: string | Buffer, name?: string): Promise<AppError> {
  try {
    await importText(text, name);
  } catch (error) {
    if (error instanceof AppError) return error;
    throw error;
  }
  throw new Error('the import succeeded');
}

/** Count of a finding; 0 when there is none. */
export const findingCount = ({ summary }: Imported, code: string): number =>
  summary.findings.find((finding) => finding.code === code)?.count ?? 0;

export const findingMessage = ({ summary }: Imported, code: string): string =>
  summary.findings.find((finding) => finding.code === code)?.message ?? '';

export const netOf = ({ board }: Imported, name: string): BoardFile['nets'][number] => {
  const net = board.nets.find((candidate) => candidate.name === name);
  if (net === undefined) throw new Error(`no net ${name}`);
  return net;
};
