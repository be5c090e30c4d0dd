import { describe, expect, it } from 'vitest';
import { findingCount, importParts, line, netOf, onLayer, polygon, WIDTH } from './fixture.ts';

const set = (net: string, features: string, extra = ''): string =>
  `<Set net="${net}">${extra}<Features>${features}</Features></Set>`;
const straight = (points: string, width = WIDTH): string => {
  const [x0, y0, x1, y1] = points.split(/[ ,]/);
  return `<Line startX="${x0}" startY="${y0}" endX="${x1}" endY="${y1}">${width}</Line>`;
};

describe('traces', () => {
  it('keep segments and curves of a polyline in document order', async () => {
    const steps = `<PolyBegin x="10" y="10"/><PolyStepSegment x="14" y="10"/>
      <PolyStepCurve x="16" y="12" centerX="14" centerY="12" clockwise="false"/><PolyStepSegment x="16" y="20"/>
      <PolyStepCurve x="18" y="22" centerX="18" centerY="20" clockwise="true"/>`;
    const imported = await importParts({ step: onLayer('TOP', set('A', `<Polyline>${steps}${WIDTH}</Polyline>`)) });
    expect(imported.summary).toMatchObject({ segments: 2, arcs: 2, netsWithTraces: 1 });
    const traces = netOf(imported, 'A').traces!;
    expect(traces).toHaveLength(1);
    const { pointsMm } = traces[0]!;
    expect(pointsMm.slice(0, 2)).toEqual([
      [10, 10],
      [14, 10],
    ]);
    const corner = pointsMm.findIndex(([x, y]) => x === 16 && y === 12);
    expect(pointsMm[corner + 1]).toEqual([16, 20]);
    expect(pointsMm.at(-1)).toEqual([18, 22]);
    // Two straight pieces and two quarters of radius 2.
    expect(imported.summary.traceLengthMm).toBeCloseTo(4 + 8 + 2 * Math.PI, 9);
    expect(imported.summary.netLengths).toEqual([{ name: 'A', lengthMm: imported.summary.traceLengthMm }]);
  });

  it('are found in nested UserSpecial, and plain', async () => {
    const nested = `<UserSpecial><UserSpecial>${straight('1,1 4,5')}</UserSpecial>${straight('4,5 4,9')}</UserSpecial>`;
    const imported = await importParts({
      step: onLayer('TOP', `${set('A', nested)}${set('B', straight('1,20 7,28'))}`),
    });
    expect(imported.summary).toMatchObject({ segments: 3, nets: 2, netsWithTraces: 2 });
    expect(imported.summary.netLengths).toEqual([
      { name: 'B', lengthMm: 10 },
      { name: 'A', lengthMm: 9 },
    ]);
  });

  it('take a full circle for an arc with equal ends', async () => {
    const arc = `<Arc startX="30" startY="20" endX="30" endY="20" centerX="25" centerY="20" clockwise="TRUE">${WIDTH}</Arc>`;
    const imported = await importParts({ step: onLayer('TOP', set('RING', arc)) });
    expect(imported.summary).toMatchObject({ segments: 0, arcs: 1 });
    expect(imported.summary.traceLengthMm).toBeCloseTo(10 * Math.PI, 9);
    const xs = netOf(imported, 'RING').traces![0]!.pointsMm.map(([x]) => x);
    expect(Math.min(...xs)).toBeCloseTo(20, 2);
  });

  it('turn clockwise when an arc does not say', async () => {
    // From east to north of (25, 20) clockwise: three quarters of the circle, by way of the west.
    const arc = `<Arc startX="30" startY="20" endX="25" endY="25" centerX="25" centerY="20">${WIDTH}</Arc>`;
    const curve = `<Polyline><PolyBegin x="30" y="20"/><PolyStepCurve x="25" y="25" centerX="25" centerY="20"/>${WIDTH}</Polyline>`;
    const imported = await importParts({ step: onLayer('TOP', set('A', arc) + set('B', curve)) });
    for (const { lengthMm } of imported.summary.netLengths) expect(lengthMm).toBeCloseTo(7.5 * Math.PI, 9);
  });

  it('say when an arc misses its centre', async () => {
    const arc = `<Arc startX="30" startY="20" endX="25" endY="25.2" centerX="25" centerY="20" clockwise="false">${WIDTH}</Arc>`;
    const imported = await importParts({ step: onLayer('TOP', set('A', arc)) });
    expect(findingCount(imported, 'arc-radius-mismatch')).toBe(1);
    expect(imported.summary.traceLengthMm).toBeCloseTo((5.1 * Math.PI) / 2, 9);
  });

  it('are moved by Xform first and then by every Location', async () => {
    const features = `<Xform rotation="90"/><Location x="10" y="5"/><Location x="40" y="5"/>${straight('1,0 6,0')}`;
    const imported = await importParts({ step: onLayer('TOP', set('A', features)) });
    expect(imported.summary.segments).toBe(2);
    expect(netOf(imported, 'A').traces!.map(({ pointsMm }) => pointsMm)).toEqual([
      [
        [10, 6],
        [10, 11],
      ],
      [
        [40, 6],
        [40, 11],
      ],
    ]);
  });

  it('come out of user symbols, scaled with their width, the dictionary in units of its own', async () => {
    const imported = await importParts({
      content: `<DictionaryUser units="INCH"><EntryUser id="SYM"><UserSpecial>
        <Line startX="0" startY="0" endX="0.1" endY="0"><LineDesc lineEnd="ROUND" lineWidth="0.01"/></Line>
        </UserSpecial></EntryUser></DictionaryUser>`,
      step: onLayer(
        'TOP',
        set('A', '<Xform scale="2" rotation="90"/><Location x="3" y="4"/><UserPrimitiveRef id="SYM"/>'),
      ),
    });
    expect(netOf(imported, 'A').traces).toEqual([
      {
        layer: 'TOP',
        widthMm: 0.508,
        pointsMm: [
          [3, 4],
          [3, 9.08],
        ],
      },
    ]);
  });

  it('take widths by reference, also mixed with inline ones, and when the dictionary comes last', async () => {
    const dictionary = `<DictionaryLineDesc units="MICRON"><EntryLineDesc id="W"><LineDesc lineEnd="ROUND" lineWidth="150"/>
      </EntryLineDesc></DictionaryLineDesc>`;
    const sets = `${set('A', straight('1,1 5,1', '<LineDescRef id="W"/>'))}${set('A', straight('1,3 5,3'))}`;
    const step = onLayer('TOP', sets);
    const early = await importParts({ content: dictionary, step });
    expect(netOf(early, 'A').traces!.map(({ widthMm }) => widthMm)).toEqual([0.15, 0.25]);
    const late = await importParts({ content: dictionary, isContentLast: true, step });
    expect(late).toEqual(early);
  });

  it('guess a width that is referred to and not there, and say so', async () => {
    const sets = `${set('A', straight('1,1 5,1', '<LineDescRef id="W"/>'))}${set('A', straight('1,3 5,3'))}`;
    const imported = await importParts({ step: onLayer('TOP', sets) });
    expect(findingCount(imported, 'unresolved-references')).toBe(1);
    expect(findingCount(imported, 'line-width-guessed')).toBe(1);
    expect(netOf(imported, 'A').traces![0]!.widthMm).toBe(0.25);
    expect(imported.summary.segments).toBe(2);
  });

  it('take the width of their Set when they have none, as revision A allows', async () => {
    const sets = set(
      'A',
      `<Polyline>${polygon('1,1 5,1 5,6')}</Polyline>`,
      '<LineDesc lineEnd="ROUND" lineWidth="0.4"/>',
    );
    const imported = await importParts({ step: onLayer('TOP', sets) });
    expect(netOf(imported, 'A').traces![0]!.widthMm).toBe(0.4);
  });

  it('take the net of a Route when their Sets name none, as revision A allows', async () => {
    const bare = `<Set><Features>${straight('1,1 5,1')}</Features></Set>`;
    const imported = await importParts({ step: `<Route net="R">${onLayer('TOP', bare)}</Route>` });
    expect(netOf(imported, 'R').traces).toHaveLength(1);
  });

  it('are nothing of width 0, without net, or in the pseudo net', async () => {
    const sets = [
      set('A', straight('1,1 5,1', '<LineDesc lineEnd="ROUND" lineWidth="0.0"/>')),
      `<Set geometryUsage="TEXT"><Features>${straight('1,2 5,2')}</Features></Set>`,
      set('No Net', straight('1,3 5,3')),
      set('', straight('1,3 5,3')),
      set('B', straight('2,2 2,2')),
      set('B', straight('2,2 2,4')),
    ].join('');
    const imported = await importParts({ step: onLayer('TOP', sets) });
    expect(imported.board.nets.map(({ name }) => name)).toEqual(['A', 'B']);
    expect(netOf(imported, 'A').traces).toBeUndefined();
    expect(netOf(imported, 'B').traces).toHaveLength(1);
    expect(findingCount(imported, 'zero-width-lines')).toBe(1);
    expect(findingCount(imported, 'copper-without-net')).toBe(3);
    expect(findingCount(imported, 'zero-length-lines')).toBe(1);
    // A drawn piece counts even when it has no length: the counting rule asks for a net and a copper layer only.
    expect(imported.summary.segments).toBe(2);
  });

  it('are not taken from mask, silk and document layers', async () => {
    const layers = `<Layer name="TOP" layerFunction="PLANE" side="TOP"/><Layer name="MASK" layerFunction="SOLDERMASK" side="TOP"/>
      <Layer name="CORE" layerFunction="DIELCORE"/><Layer name="BOT" layerFunction="MIXED" side="BOTTOM"/>`;
    const imported = await importParts({
      layers,
      step: `${onLayer('MASK', line('M', '1,1 9,1'))}${onLayer('TOP', line('A', '1,1 9,1'))}${onLayer('BOT', line('A', '1,1 3,1'))}`,
    });
    expect(imported.board.nets.map(({ name }) => name)).toEqual(['A']);
    expect(imported.summary).toMatchObject({ segments: 2, traceLengthMm: 10 });
  });

  it('on a layer that the file never declares are left out with a finding', async () => {
    const imported = await importParts({
      step: `${onLayer('TOP', line('A', '1,1 9,1'))}${onLayer('GHOST', line('B', '1,1 9,1'))}`,
    });
    expect(findingCount(imported, 'layer-undeclared')).toBe(1);
    expect(imported.summary.segments).toBe(1);
  });

  it('tell a hatched plane from routing', async () => {
    // 60 lines of 30 mm, 0.3 mm wide, 0.5 mm apart: 540 mm² of copper in 885 mm².
    const hatch = Array.from({ length: 60 }, (_, i) =>
      set('GND', straight(`20,${5 + i / 2} 50,${5 + i / 2}`, '<LineDesc lineWidth="0.3"/>')),
    );
    const imported = await importParts({ step: onLayer('TOP', hatch.join('')) });
    expect(findingCount(imported, 'hatched-plane')).toBe(1);
    expect(imported.board.planes).toBeUndefined();
    // The same lines 0.1 mm wide and spread over the board: 360 mm² of copper in 1770 mm².
    const routed = Array.from({ length: 60 }, (_, i) =>
      set('BUS', straight(`20,${5 + i / 2} 80,${5 + i / 2}`, '<LineDesc lineWidth="0.1"/>')),
    );
    const plain = await importParts({ step: onLayer('TOP', routed.join('')) });
    expect(findingCount(plain, 'hatched-plane')).toBe(0);
  });
});
