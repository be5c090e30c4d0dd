import type { EstimateResult } from '../../estimate/result.ts';
import { mark, name, strong, type Text } from '../blocks.ts';
import { DEFERENCE } from '../cautions.ts';
import { isItself, KIND_PHRASE, mainContributor, pathText } from '../contributor-text.ts';
import { countText, degreesText, fixed, frequencyText, levelText } from '../format.ts';
import { printed } from '../number.ts';
import { limitName, readingsText, standingsText, VERDICT_STANDING, verdictText, worstText } from '../verdict.ts';

/** The mark of a verdict and the verdict in words. */
export const verdictHeadline = (result: EstimateResult): Text => [
  result.worst !== null && mark(VERDICT_STANDING[result.verdict], result.verdict),
  `${limitName(result)}: `,
  strong(verdictText(result)),
];

/** The paragraph for whoever reads only one. */
export function verdictSummary(result: EstimateResult): Text {
  const { limit, caveats, findings } = result;
  const counts =
    result.points.length === 0
      ? ''
      : `${readingsText(result.points)} up to ${frequencyText(limit.maxHz)}: ${standingsText(result)}. `;
  const said = [
    caveats.length > 0 && `${countText(caveats.length, 'caveat applies', 'caveats apply')}`,
    findings.length > 0 &&
      `${countText(findings.length, 'place', 'places')} on the board deserve${findings.length === 1 ? 's' : ''} a look`,
  ].filter((part) => part !== false);
  const tail = said.length === 0 ? '' : ` ${said.join('; ')}.`;
  const uncertainty = ` A laboratory's own uncertainty is ±${levelText(limit.labUncertaintyDb)} dB; the error of this model comes on top and is not in that figure.`;
  return [counts, worstSentence(result), tail, uncertainty, ` ${DEFERENCE}`];
}

function worstSentence(result: EstimateResult): Text {
  const worst = result.points[0];
  const text = printed(worstText(result));
  const sentence = text[0]!.toUpperCase() + text.slice(1);
  if (!worst) return `${sentence}.`;
  const main = mainContributor(worst);
  return [
    `${sentence}: ${printed(levelText(worst.levelDbuvPerM))} dBµV/m against ${printed(levelText(worst.limitDbuvPerM))} dBµV/m, ${worst.polarization}, antenna at ${fixed(worst.antennaHeightM, 2)} m, turntable ${degreesText(worst.turntableDeg)}°.`,
    main && [
      ` Most of it comes from ${KIND_PHRASE[main.contributor.kind]}`,
      name(main.contributor.name),
      main.path &&
        !isItself(main.contributor, main.path) && [', radiated mainly by the ', name(pathText(main.path.name))],
      '.',
    ],
  ];
}
