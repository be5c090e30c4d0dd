import { markup } from '../markup.ts';

/** Pattern of the band of a required margin. Once in a page; figures that stand alone each need their own. */
export const HATCH = markup`<pattern id="hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><path class="hatch" d="M0 0V5"/></pattern>`;
