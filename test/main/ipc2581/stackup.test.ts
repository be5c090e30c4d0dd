import { describe, expect, it } from 'vitest';
import { findingCount, findingMessage, type Imported, importParts, LAYERS, line, onLayer } from './fixture.ts';

const layer = (name: string, layerFunction: string, side = 'INTERNAL'): string =>
  `<Layer name="${name}" layerFunction="${layerFunction}" side="${side}" polarity="POSITIVE"/>`;
const row = (ref: string, thickness: string, rest = '', inside = ''): string =>
  `<StackupLayer layerOrGroupRef="${ref}" thickness="${thickness}" ${rest}>${inside}</StackupLayer>`;
const stackup = (rows: string, overall = '0', name = 'PRIMARY'): string =>
  `<Stackup name="${name}" overallThickness="${overall}"><StackupGroup name="G" thickness="0">${rows}</StackupGroup></Stackup>`;
const header = (specs: string): string => `<CadHeader units="MILLIMETER">${specs}</CadHeader>`;
const spec = (name: string, epsilonR: string, tanDelta = ''): string =>
  `<Spec name="${name}"><Dielectric type="DIELECTRIC_CONSTANT"><Property value="${epsilonR}"/></Dielectric>${
    tanDelta === '' ? '' : `<Dielectric type="LOSS_TANGENT"><Property value="${tanDelta}"/></Dielectric>`
  }</Spec>`;
const names = ({ board }: Imported): string[] => board.stackup.map(({ name }) => name);
const BOTH = `${onLayer('TOP', line('A', '1,1 9,1'))}${onLayer('BOT', line('B', '1,1 9,1'))}`;

describe('stackup', () => {
  it('holds coppers, dielectrics and outer mask, and nothing of paste, silk and documents', async () => {
    const layers = `${layer('PASTE', 'SOLDERPASTE', 'TOP')}${layer('SILK', 'SILKSCREEN', 'TOP')}${layer('MASK', 'SOLDERMASK', 'TOP')}
      ${layer('TOP', 'CONDUCTOR', 'TOP')}${layer('PREPREG', 'DIELPREG')}${layer('INNERMASK', 'SOLDERMASK')}
      ${layer('CORE', 'DIELCORE')}${layer('BOT', 'CONDUCTOR', 'BOTTOM')}${layer('M2', 'SOLDERMASK', 'BOTTOM')}${layer('NOTE', 'DOCUMENT')}`;
    const rows = [
      row('PASTE', '0.1'),
      row('SILK', '0.02'),
      row('MASK', '0.012', '', '<SpecRef id="M"/>'),
      row('TOP', '0.05', '', '<SpecRef id="CU"/>'),
      row('PREPREG', '0.2', '', '<SpecRef id="P"/>'),
      row('INNERMASK', '0.01'),
      row('CORE', '0.8', '', '<SpecRef id="C"/>'),
      row('BOT', '0.035'),
      row('M2', '0'),
      row('NOTE', '0.3'),
    ].join('');
    const imported = await importParts({
      header: header(`${spec('M', '3.7')}${spec('CU', '3.9')}${spec('P', '4.1', '0.015')}${spec('C', '4.6', '0.02')}`),
      layers,
      stackup: stackup(rows, '1.085'),
      step: BOTH,
    });
    expect(imported.board.stackup).toEqual([
      { name: 'MASK', kind: 'dielectric', thicknessMm: 0.012, epsilonR: 3.7 },
      { name: 'TOP', kind: 'copper', thicknessMm: 0.05 }, // its own 3.9 (resin between the traces) is not used
      { name: 'PREPREG', kind: 'dielectric', thicknessMm: 0.2, epsilonR: 4.1, lossTangent: 0.015 },
      { name: 'CORE', kind: 'dielectric', thicknessMm: 0.8, epsilonR: 4.6, lossTangent: 0.02 },
      { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
    ]);
    expect(imported.summary.copperLayers).toBe(2);
    expect(findingCount(imported, 'stackup-thickness-differs')).toBe(0);
  });

  it('goes by sequence when every row has one, whatever its start and gaps, else by document order', async () => {
    const shuffled = `${row('BOT', '0.035', 'sequence="12"')}${row('TOP', '0.035', 'sequence="3"')}${row('CORE', '1.5', 'sequence="7"')}`;
    expect(names(await importParts({ stackup: stackup(shuffled), step: BOTH }))).toEqual(['TOP', 'CORE', 'BOT']);
    const partly = `${row('TOP', '0.035', 'sequence="9"')}${row('CORE', '1.5')}${row('BOT', '0.035', 'sequence="1"')}`;
    expect(names(await importParts({ stackup: stackup(partly), step: BOTH }))).toEqual(['TOP', 'CORE', 'BOT']);
  });

  it('turns over when it begins with the bottom side', async () => {
    const upside = `${row('BOT', '0.018')}${row('CORE', '1.5')}${row('TOP', '0.035')}`;
    const imported = await importParts({ stackup: stackup(upside), step: BOTH });
    expect(names(imported)).toEqual(['TOP', 'CORE', 'BOT']);
    expect(findingCount(imported, 'stackup-reversed')).toBe(1);
  });

  it('finds materials whose references dangle by the name of the layer', async () => {
    const imported = await importParts({
      header: header(`${spec('DIEL_1_1', '4.4', '0.025')}${spec('DIEL_2_7', '4.6')}`),
      layers: `${LAYERS}${layer('DIEL_1', 'DIELPREG')}${layer('DIEL_2', 'DIELCORE')}`,
      stackup: stackup(
        `${row('TOP', '0.035', '', '<SpecRef id="SPEC_TOP"/>')}${row('DIEL_1', '0.2', '', '<SpecRef id="SPEC_DIEL_1"/>')}
         ${row('DIEL_2', '1', '', '<SpecRef id="SPEC_DIEL_2"/>')}${row('BOT', '0.035', '', '<SpecRef id="SPEC_BOT"/>')}`,
      ),
      step: BOTH,
    });
    expect(imported.board.stackup.slice(1, 3)).toEqual([
      { name: 'DIEL_1', kind: 'dielectric', thicknessMm: 0.2, epsilonR: 4.4, lossTangent: 0.025 },
      { name: 'DIEL_2', kind: 'dielectric', thicknessMm: 1, epsilonR: 4.6 },
    ]);
    expect(findingCount(imported, 'spec-ref-dangling')).toBe(4);
    expect(findingCount(imported, 'epsilon-guessed')).toBe(0);
  });

  it('guesses a permittivity that is nowhere, marks it and says so', async () => {
    const imported = await importParts({
      header: header('<Spec name="FR"><General type="MATERIAL"/></Spec>'),
      step: BOTH,
    });
    expect(imported.board.stackup[1]).toEqual({
      name: 'CORE',
      kind: 'dielectric',
      thicknessMm: 1.53,
      epsilonR: 4.3,
      guessed: true,
    });
    expect(findingCount(imported, 'epsilon-guessed')).toBe(1);
  });

  it('takes nonsense below 1 for a gap in the data', async () => {
    const imported = await importParts({ header: header(spec('FR', '0.0', '-1')), step: BOTH });
    expect(imported.board.stackup[1]).toMatchObject({ epsilonR: 4.3, guessed: true });
  });

  it('reads revision A: facts on the row, rows that are no layers, air outside', async () => {
    const facts = (epsilonR: string): string =>
      `<NonstandardAttribute name="DIELECTRIC_CONSTANT" type="DOUBLE" value="${epsilonR}"/>
       <NonstandardAttribute name="LOSS_TANGENT" type="DOUBLE" value="0.02"/>`;
    const rows = [
      row('SURFACE1', '0.5', 'materialType="AIR"'),
      row('TOP', '0.035', 'materialType="COPPER"'),
      row('DIELECTRIC1', '0.6', 'materialType="FR-4"', facts('4.5')),
      row(
        'INNER',
        '0.035',
        'materialType="COPPER"',
        '<NonstandardAttribute name="ELECTRICAL_CONDUCTIVITY" value="595900 mho/cm"/>',
      ),
      row('DIELECTRIC2', '0.6', 'materialType="FR-4"', facts('4.25')),
      row('BOT', '0.035', 'materialType="COPPER"'),
      row('SURFACE2', '0', 'materialType="AIR"'),
    ].join('');
    const imported = await importParts({ stackup: stackup(rows, '1.305'), step: BOTH });
    expect(names(imported)).toEqual(['TOP', 'DIELECTRIC1', 'INNER', 'DIELECTRIC2', 'BOT']);
    expect(imported.board.stackup[1]).toMatchObject({ epsilonR: 4.5, lossTangent: 0.02 });
    expect(imported.board.stackup[2]).toEqual({ name: 'INNER', kind: 'copper', thicknessMm: 0.035 });
    expect(imported.board.stackup[3]).toMatchObject({ epsilonR: 4.25 });
  });

  it('drops coppers of zero thickness that only hold pads', async () => {
    const layers = `${LAYERS}${layer('DRILLPADS', 'CONDUCTOR')}`;
    const rows = `${row('TOP', '0')}${row('CORE', '1.5')}${row('DRILLPADS', '0')}${row('BOT', '0.035')}`;
    const imported = await importParts({ layers, stackup: stackup(rows), step: BOTH });
    expect(names(imported)).toEqual(['TOP', 'CORE', 'BOT']);
    expect(findingCount(imported, 'copper-layer-dropped')).toBe(1);
  });

  it('takes one group when the groups repeat the board', async () => {
    const rows = `${row('TOP', '0.035')}${row('CORE', '1.5')}${row('BOT', '0.035')}`;
    const other = `${row('TOP', '0.07')}${row('CORE', '0.7')}${row('BOT', '0.07')}`;
    const twice = (secondName: string): string => `<Stackup name="S" overallThickness="3.14">
      <StackupGroup name="panel_layers" thickness="1.57">${other}</StackupGroup>
      <StackupGroup name="${secondName}" thickness="1.57">${rows}</StackupGroup></Stackup>`;
    const own = await importParts({ stackup: twice('board_AllLayers'), step: BOTH });
    expect(own.board.stackup.map(({ thicknessMm }) => thicknessMm)).toEqual([0.035, 1.5, 0.035]);
    expect(findingCount(own, 'stackup-repeated')).toBe(3);
    const first = await importParts({ stackup: twice('unnamed'), step: BOTH });
    expect(first.board.stackup.map(({ thicknessMm }) => thicknessMm)).toEqual([0.07, 0.7, 0.07]);
    expect(findingCount(first, 'stackup-repeated')).toBe(3);
  });

  it('puts a group where a row names it', async () => {
    const nested = `<Stackup name="S" overallThickness="0">
      <StackupGroup name="CORES" thickness="1">${row('CORE', '0.9')}${row('BOT', '0.035')}</StackupGroup>
      <StackupGroup name="ALL" thickness="1">${row('TOP', '0.035')}${row('CORES', '0.935')}</StackupGroup></Stackup>`;
    expect(names(await importParts({ stackup: nested, step: BOTH }))).toEqual(['TOP', 'CORE', 'BOT']);
  });

  it('keeps groups in order when their sequences start anew', async () => {
    const groups = `<Stackup name="S" overallThickness="0">
      <StackupGroup name="UPPER" thickness="1">${row('TOP', '0.035', 'sequence="1"')}${row('CORE', '0.9', 'sequence="2"')}</StackupGroup>
      <StackupGroup name="LOWER" thickness="1">${row('BOT', '0.035', 'sequence="1"')}</StackupGroup></Stackup>`;
    expect(names(await importParts({ stackup: groups, step: BOTH }))).toEqual(['TOP', 'CORE', 'BOT']);
  });

  it('takes the PRIMARY stackup of several, else the one with most coppers', async () => {
    const small = stackup(row('TOP', '0.01'), '0', 'FLEX');
    const large = stackup(`${row('TOP', '0.035')}${row('CORE', '1.5')}${row('BOT', '0.035')}`, '0', 'RIGID');
    const byCount = await importParts({ stackup: `${small}${large}`, step: BOTH });
    expect(byCount.board.stackup[0]!.thicknessMm).toBe(0.035);
    expect(findingCount(byCount, 'several-stackups')).toBe(2);
    const primary = large.replace('RIGID', 'Primary').replaceAll('0.035', '0.018');
    const byName = await importParts({ stackup: `${large}${primary}`, step: BOTH });
    expect(byName.board.stackup[0]!.thicknessMm).toBe(0.018);
  });

  it('warns when the stated thickness is off by more than 2 %', async () => {
    const rows = `${row('TOP', '0.03')}${row('CORE', '0.94')}${row('BOT', '0.03')}`;
    const off = await importParts({ stackup: stackup(rows, '1.03'), step: BOTH });
    expect(findingMessage(off, 'stackup-thickness-differs')).toContain('1 mm, but 1.03 mm');
    const near = await importParts({ stackup: stackup(rows, '1.019'), step: BOTH });
    expect(findingCount(near, 'stackup-thickness-differs')).toBe(0);
    const laminate = await importParts({ stackup: stackup(rows, '0.94'), step: BOTH });
    expect(findingCount(laminate, 'stackup-thickness-differs')).toBe(0);
  });

  it('spaces the coppers evenly when the file states none, and says so', async () => {
    const layers = `${layer('BOT', 'SIGNAL', 'BOTTOM')}${layer('IN', 'PLANE')}${layer('TOP', 'SIGNAL', 'TOP')}`;
    const imported = await importParts({ layers, stackup: '', step: `${BOTH}${onLayer('IN', line('G', '1,1 9,1'))}` });
    expect(names(imported)).toEqual(['TOP', 'guessed dielectric 1', 'IN', 'guessed dielectric 2', 'BOT']);
    // 1.6 mm board, three coppers of 35 µm, two equal gaps.
    expect(imported.board.stackup[1]).toMatchObject({ thicknessMm: 0.7475, epsilonR: 4.3, guessed: true });
    expect(findingCount(imported, 'no-stackup')).toBe(3);
    expect(findingCount(imported, 'dielectric-guessed')).toBe(2);
  });

  it('divides the stated thickness over gaps without a dielectric', async () => {
    const rows = `${row('TOP', '0.05')}${row('BOT', '0.05')}`;
    const imported = await importParts({ stackup: stackup(rows, '0.8'), step: BOTH });
    expect(imported.board.stackup[1]).toMatchObject({ kind: 'dielectric', thicknessMm: 0.7, guessed: true });
  });

  it('does not take what rounding left of the stated thickness for a gap', async () => {
    // Stated is more than the rows by a rounding error.
    const rows = `${row('TOP', '0.1')}${row('BOT', '0.2')}`;
    const imported = await importParts({ stackup: stackup(rows, '0.30000000000000009'), step: BOTH });
    expect(imported.board.stackup[1]).toMatchObject({ thicknessMm: 0.2, guessed: true });
  });

  it('adds a copper that has traces but no row', async () => {
    const layers = `${LAYERS}${layer('IN', 'SIGNAL')}`;
    const rows = `${row('TOP', '0.035')}${row('CORE', '1.5')}${row('BOT', '0.035')}`;
    const imported = await importParts({
      layers,
      stackup: stackup(rows),
      step: `${BOTH}${onLayer('IN', line('C', '1,1 9,1'))}`,
    });
    expect(names(imported)).toEqual(['TOP', 'CORE', 'IN', 'guessed dielectric 1', 'BOT']);
    expect(findingCount(imported, 'layer-not-in-stackup')).toBe(1);
  });

  it('gives rows of one material names of their own', async () => {
    const rows = `${row('TOP', '0.035')}${row('CORE', '0.5')}${row('CORE', '0.7')}${row('BOT', '0.035')}`;
    expect(names(await importParts({ stackup: stackup(rows), step: BOTH }))).toEqual(['TOP', 'CORE', 'CORE#2', 'BOT']);
  });

  it('converts thickness from inches', async () => {
    const imported = await importParts({
      header: header('').replace('MILLIMETER', 'INCH'),
      stackup: stackup(`${row('TOP', '0.0014')}${row('CORE', '0.06')}${row('BOT', '0.0014')}`),
      step: BOTH,
    });
    expect(imported.board.stackup.map(({ thicknessMm }) => thicknessMm)).toEqual([0.03556, 1.524, 0.03556]);
  });
});

describe('copper layers on which nothing is drawn', () => {
  it('are named: the export left them out', async () => {
    const layers = `${LAYERS}${layer('GND', 'PLANE')}`;
    const rows = `${row('TOP', '0.035')}${row('CORE', '0.5')}${row('GND', '0.035')}${row('CORE', '0.7')}${row('BOT', '0.035')}`;
    const imported = await importParts({ layers, stackup: stackup(rows), step: BOTH });
    expect(findingCount(imported, 'copper-layers-empty')).toBe(1);
    expect(findingMessage(imported, 'copper-layers-empty')).toContain('"GND"');
    expect(findingMessage(imported, 'copper-layers-empty')).toContain('USERDEF');
    expect(imported.summary.copperLayers).toBe(3);
  });
});
