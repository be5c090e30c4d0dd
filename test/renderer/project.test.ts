import { beforeEach, describe, expect, it } from 'vitest';
import { AppError } from '../../app/errors.ts';
import { EMPTY_PROJECT, getState, type Project, setState } from '../../renderer/state/app-store.ts';
import { forgetDraft } from '../../renderer/state/draft.ts';
import { openFiles, openProject } from '../../renderer/state/project.ts';
import { remember } from '../../renderer/state/remembered.ts';
import { FakeHost } from './fake-host.ts';
import { BASE, BASE_ID, openDocument, present, WORK } from './open-document.ts';

/** Oracle: what must be on the screen after each way of opening, written out. */

const PROJECT: Project = { projectId: 'q', name: 'Untitled', file: '/untitled', isReadOnly: false, runCount: 0 };
const FILE = new File(['content'], 'lamp.revB.xml');

let host: FakeHost;

beforeEach(() => {
  let name = PROJECT.name;
  forgetDraft();
  setState({ ...EMPTY_PROJECT, project: null, jobs: [], remembered: new Map() });
  host = new FakeHost({
    'project.open': () => ({ project: PROJECT }),
    'project.close': () => ({}),
    'project.rename': (input) => {
      name = input.name;
      return {};
    },
    'project.info': () => ({ project: { ...PROJECT, name } }),
    'settings.get': () => ({ value: null }),
    'settings.put': () => ({}),
    'runs.list': () => ({ runs: [] }),
    'measurements.list': () => ({ measurements: [] }),
    'draft.load': () => ({ draft: null }),
    'base.get': () => ({ base: BASE }),
    'file.upload': ({ bytes }) => ({ uploadId: 'u', sizeBytes: bytes.length }),
    'board.open': () => ({ baseId: BASE_ID, base: BASE, sources: WORK.sources }),
  });
});

describe('opening', () => {
  it('a board file begins a project of the board’s name', async () => {
    await openFiles([FILE]);
    expect(present().sources).toBe(WORK.sources);
    expect(getState().project!.name).toBe(BASE.layout.name);
    expect(host.inputs('board.open')[0]).not.toHaveProperty('onto');
    expect(new TextDecoder().decode(host.inputs('file.upload')[0]!.bytes)).toBe('content');
  });

  it('a layout begins a project of the file’s name: programs call all their boards the same', async () => {
    const summary = {
      format: 'quietboard-import' as const,
      source: { format: 'IPC-2581', revision: 'C', units: 'mm' },
      ...{ copperLayers: 2, nets: 1, netsWithTraces: 1, segments: 1, arcs: 0, vias: 0, components: 0 },
      ...{ boardMm: [80, 50] as [number, number], traceLengthMm: 1, netLengths: [], findings: [] },
    };
    host.answer({ 'board.open': () => ({ baseId: BASE_ID, base: BASE, sources: {}, summary }) });
    await openFiles([FILE]);
    expect(getState().project!.name).toBe('lamp.revB');
    expect(getState().importSummary).toBe(summary);
  });

  it('a further file goes upon the present document and keeps settings and name', async () => {
    openDocument();
    await openFiles([FILE]);
    expect(host.inputs('board.open')[0]!.onto).toEqual({ baseId: BASE_ID, sources: WORK.sources });
    expect(present().settings).toBe(WORK.settings);
    expect(host.inputs('project.rename')).toHaveLength(0);
  });

  it('a file that is refused leaves the present document as it is', async () => {
    openDocument();
    host.answer({
      'board.open': () => {
        throw new AppError('file', 'lamp.revB.xml: is no layout');
      },
    });
    await expect(openFiles([FILE])).rejects.toThrow('is no layout');
    expect(present()).toBe(WORK);
    expect(getState().jobs).toHaveLength(0);
  });

  it('a project that cannot be read leaves none half open', async () => {
    host.answer({
      'draft.load': () => {
        throw new AppError('file', 'is damaged');
      },
    });
    await expect(openProject('/untitled')).rejects.toThrow('is damaged');
    expect(getState()).toMatchObject({ project: null, isOpening: false, history: null });
    expect(host.inputs('project.close')).toEqual([{ projectId: PROJECT.projectId }]);
  });

  it('another project first saves what the views of the last one remember, for that one', async () => {
    openDocument();
    remember('project', 'shell.tab', 'levers');
    await openProject('/untitled');
    expect(host.inputs('settings.put')).toEqual([{ projectId: 'p', key: 'views', value: { 'shell.tab': 'levers' } }]);
    expect(getState().remembered.size).toBe(0);
  });
});
