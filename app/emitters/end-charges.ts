import type { CrossSection, Line } from '../lines/cross-section.ts';
import type { Network } from '../network/network.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import type { PlacedSection } from './pair-elements.ts';
import { type EndKind, traceEndM } from './trace-end.ts';

/** Between two planes an end's charge has no moment and changes next to nothing. */
export function endLengthsM(section: CrossSection, line: Line, kinds: readonly [EndKind, EndKind]): [number, number] {
  if (section.kind !== 'microstrip') return [0, 0];
  const { widthM, heightM, epsilonR } = section;
  const { z0Ohm, epsilonEff } = line;
  const lengthM = (kind: EndKind) => traceEndM({ widthM, heightM, epsilonR, z0Ohm, epsilonEff }, kind);
  return [lengthM(kinds[0]), lengthM(kinds[1])];
}

/** The charge of the traces' ends as capacitors at their nodes: it flows through the line like its own. */
export function withEndCharges(network: Network, sections: readonly PlacedSection[]): Network {
  const ends = sections.flatMap(({ index, endsM: [startM, endM], z0Ohm, epsilonEff }) => {
    const { nodeA, nodeB } = network.sections[index]!;
    const capacitanceFPerM = Math.sqrt(epsilonEff) / (z0Ohm * SPEED_OF_LIGHT_M_PER_S);
    return [
      { node: nodeA, capacitanceF: capacitanceFPerM * startM },
      { node: nodeB, capacitanceF: capacitanceFPerM * endM },
    ].filter(({ capacitanceF }) => capacitanceF > 0);
  });
  return { ...network, loads: [...network.loads, ...ends] };
}
