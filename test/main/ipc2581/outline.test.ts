import { describe, expect, it } from 'vitest';
import { contour, findingCount, findingMessage, importParts, line, netOf, onLayer, polygon } from './fixture.ts';

const TRACE = onLayer('TOP', line('A', '1,1 9,1'));

describe('outline', () => {
  it('is shifted to the origin, everything with it, and says so', async () => {
    const points = '-122,-84 -120,-84 -120,-83 -122,-83 -122,-84';
    const pad = '<Set net="A"><Pad><Location x="-121" y="-83.25"/><PinRef componentRef="U1" pin="1"/></Pad></Set>';
    const via = '<Set net="A"><Hole name="H" diameter="0.2" platingStatus="VIA" x="-120.5" y="-83.5"/></Set>';
    const imported = await importParts({
      profile: `<Datum x="5" y="5"/><Profile><Polygon>${polygon(points)}</Polygon></Profile>`,
      step: `${onLayer('TOP', line('A', '-121.9,-83.9 -121.9,-83.1') + pad + contour('net="A"', points))}${onLayer('DRILL', via)}`,
    });
    expect(imported.board.outline).toEqual([
      {
        pointsMm: [
          [0, 0],
          [2, 0],
          [2, 1],
          [0, 1],
        ],
      },
    ]);
    expect(netOf(imported, 'A')).toMatchObject({
      traces: [
        {
          pointsMm: [
            [0.1, 0.1],
            [0.1, 0.9],
          ],
        },
      ],
      pins: [{ atMm: [1, 0.75] }],
      vias: [{ atMm: [1.5, 0.5] }],
    });
    expect(imported.board.planes![0]!.pointsMm![2]).toEqual([2, 1]);
    expect(findingMessage(imported, 'coordinates-shifted')).toContain('(122, 84) mm');
  });

  it('at the origin is not shifted', async () => {
    expect(findingCount(await importParts({ step: TRACE }), 'coordinates-shifted')).toBe(0);
  });

  it('has chords for arcs; its size is that of its vertices, its origin that of its arcs', async () => {
    // 40 × 20 mm with half circles at both ends, which bulge by 10 mm.
    const profile = `<Profile><Polygon><PolyBegin x="0" y="0"/><PolyStepSegment x="40" y="0"/>
      <PolyStepCurve x="40" y="20" centerX="40" centerY="10" clockwise="false"/><PolyStepSegment x="0" y="20"/>
      <PolyStepCurve x="0" y="0" centerX="0" centerY="10" clockwise="false"/></Polygon></Profile>`;
    const imported = await importParts({ profile, step: TRACE });
    expect(imported.summary.boardMm).toEqual([40, 20]);
    const points = imported.board.outline![0]!.pointsMm;
    const xs = points.map(([x]) => x);
    expect(Math.min(...xs)).toBe(0);
    expect(Math.max(...xs)).toBeCloseTo(60, 2);
    // Every chord's middle is within 1 µm of the half circle it stands for, here about (50, 10).
    for (let i = 1; i < points.length; i++) {
      const [x, y] = [(points[i - 1]![0] + points[i]![0]) / 2, (points[i - 1]![1] + points[i]![1]) / 2];
      if (x > 50.5) expect(Math.abs(Math.hypot(x - 50, y - 10) - 10)).toBeLessThan(0.001 + 2e-6);
    }
    expect(netOf(imported, 'A').traces![0]!.pointsMm[0]).toEqual([11, 1]);
  });

  it('may be missing: the copper takes its place', async () => {
    const imported = await importParts({ profile: '', step: onLayer('TOP', line('A', '10,20 15,20 15,28')) });
    expect(imported.board.outline).toBeUndefined();
    expect(findingCount(imported, 'no-outline')).toBe(1);
    expect(imported.summary.boardMm).toEqual([5, 8]);
    expect(netOf(imported, 'A').traces![0]!.pointsMm[0]).toEqual([0, 0]);
    const flat = await importParts({
      profile: `<Profile><Polygon>${polygon('0,0 9,0 0,0')}</Polygon></Profile>`,
      step: TRACE,
    });
    expect(findingCount(flat, 'no-outline')).toBe(1);
  });

  it('may have its own transform', async () => {
    const profile = `<Profile><Polygon>${polygon('0,0 30,0 30,10 0,10')}<Xform rotation="90"/></Polygon></Profile>`;
    expect((await importParts({ profile, step: TRACE })).summary.boardMm).toEqual([10, 30]);
  });
});

describe('panels', () => {
  const panel = (before: boolean): string => {
    const panelStep = `<Step name="panel"><Profile><Polygon>${polygon('0,0 200,0 200,200 0,200')}</Polygon></Profile>
      <StepRepeat stepRef="board" x="5" y="5" nx="2" ny="2" dx="90" dy="60" angle="0" mirror="false"/>
      ${onLayer('TOP', contour('', '1,1 3,1 3,3 1,3').repeat(9))}</Step>`;
    const board = `<Step name="board"><Profile><Polygon>${polygon('0,0 80,0 80,50 0,50')}</Polygon></Profile>
      <Component refDes="U1" packageRef="X" layerRef="TOP"/>${TRACE}</Step>`;
    return before ? panelStep + board : board + panelStep;
  };

  it.each([true, false])(
    'give the step that has copper with nets, wherever it stands (panel first: %s)',
    async (before) => {
      const imported = await importParts({ steps: panel(before) });
      expect(imported.board.name).toBe('board');
      expect(imported.summary).toMatchObject({ boardMm: [80, 50], components: 1, segments: 1 });
      expect(findingMessage(imported, 'panel-step-chosen')).toContain('"board"');
    },
  );

  it('of several boards give the one with most copper and name the others', async () => {
    const small = `<Step name="small">${onLayer('TOP', line('B', '1,1 2,1'))}</Step>`;
    const large = `<Step name="large">${onLayer('TOP', line('A', '1,1 9,1') + line('A', '9,1 9,9'))}</Step>`;
    const imported = await importParts({ steps: small + large });
    expect(imported.board.name).toBe('large');
    expect(findingMessage(imported, 'steps-left-out')).toContain('"small"');
  });

  it('leave a step without a name to the name of the file', async () => {
    expect((await importParts({ steps: `<Step>${TRACE}</Step>` })).board.name).toBe('invented');
  });
});
