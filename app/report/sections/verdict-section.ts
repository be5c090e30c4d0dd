import type { EstimateResult, Verdict } from '../../estimate/result.ts';
import { DEFERENCE } from '../cautions.ts';
import { isItself, KIND_PHRASE, mainContributor, pathText } from '../contributor-text.ts';
import { inlineMark } from '../figures/marks.ts';
import { countText, fixed, frequencyText, levelText } from '../format.ts';
import { type Markup, markup, nameMarkup } from '../markup.ts';
import { limitName, readingsText, type Standing, standingsText, verdictText, worstText } from '../verdict.ts';
import { printed } from './number.ts';

/** Neither clearly over nor clearly fine is half filled. */
const VERDICT_MARK: Readonly<Record<Verdict, Standing>> = {
  exceeds: 'over',
  'falls-short': 'short',
  'within-uncertainty': 'short',
  meets: 'fine',
};

/** Verdict and the paragraph for whoever reads only one. */
export function verdictSection(result: EstimateResult): Markup {
  const mark = result.worst !== null && inlineMark(VERDICT_MARK[result.verdict], result.verdict);
  return markup`<section class="verdict"><p class="headline">${mark}${limitName(result)}: <strong>${verdictText(result)}</strong></p>
<p class="summary">${summary(result)}</p></section>`;
}

function summary(result: EstimateResult): Markup {
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
  return markup`${counts}${worstSentence(result)}${tail}${uncertainty} ${DEFERENCE}`;
}

function worstSentence(result: EstimateResult): Markup {
  const worst = result.points[0];
  const text = worstText(result).replace('-', '−');
  const sentence = text[0]!.toUpperCase() + text.slice(1);
  if (!worst) return markup`${sentence}.`;
  const main = mainContributor(worst);
  const from =
    main &&
    markup` Most of it comes from ${KIND_PHRASE[main.contributor.kind]}${nameMarkup(main.contributor.name)}${
      main.path &&
      !isItself(main.contributor, main.path) &&
      markup`, radiated mainly by the ${nameMarkup(pathText(main.path.name))}`
    }.`;
  return markup`${sentence}: ${printed(levelText(worst.levelDbuvPerM))} dBµV/m against ${printed(levelText(worst.limitDbuvPerM))} dBµV/m, ${worst.polarization}, antenna at ${fixed(worst.antennaHeightM, 2)} m, turntable ${fixed(worst.turntableDeg, 0)}°.${from}`;
}
