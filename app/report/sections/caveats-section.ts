import type { EstimateResult } from '../../estimate/result.ts';
import { type Column, code, heading, joined, list, name, note, type Section, type Text, table } from '../blocks.ts';
import { byMessage, type CaveatGroup, groupCaveats } from '../caveat-groups.ts';
import { NUMBERED_FINDINGS } from '../figures/board-figure.ts';
import { countText, placeText, rangeText } from '../format.ts';
import { shortName } from '../markup.ts';
import { modelText } from '../model-text.ts';

const MOST_FINDINGS = 200;
const MOST_CAVEAT_ROWS = 300;
const MOST_PLACES = 12;

const FINDING_COLUMNS: readonly Column[] = [
  { head: 'No.', width: 5, isNumber: true },
  { head: 'Net', width: 19 },
  { head: 'Place, mm', width: 14, isWhole: true },
  { head: 'Layer', width: 11 },
  { head: 'Finding', width: 51 },
];

/** Places on the board a reviewer can go and look at. */
export function findingsSection({ findings }: EstimateResult, mostFindings = MOST_FINDINGS): Section {
  const title = 'Findings on the board';
  if (findings.length === 0) return { title, blocks: [] };
  const shown = findings.slice(0, mostFindings);
  const left = findings.length - shown.length;
  const rows = shown.map(({ net, atM, layer, message }, i) => [
    String(i + 1),
    name(net, 30),
    placeText(atM).replaceAll('-', '−'),
    name(layer, 24),
    name(message, 400),
  ]);
  return {
    title,
    blocks: [
      table(FINDING_COLUMNS, rows, 'findings'),
      ...(left > 0 ? [note(`${left} more in the JSON result.`)] : []),
      ...(findings.length > NUMBERED_FINDINGS
        ? [note(`The first ${NUMBERED_FINDINGS} are numbered on the board.`)]
        : []),
    ],
  };
}

const CAVEAT_COLUMNS: readonly Column[] = [
  { head: 'Caveat', width: 20 },
  { head: 'Applies to', width: 22 },
  { head: 'Range', width: 17, isWhole: true },
  { head: 'What it means', width: 41 },
];

/** What the model includes and leaves out, and every caveat with its range. */
export function modelSection(result: EstimateResult, mostRows = MOST_CAVEAT_ROWS): Section {
  const { included, missing } = modelText(result);
  const groups = groupCaveats(result.caveats, byMessage);
  const shown = groups.slice(0, mostRows);
  return {
    title: 'Model and caveats',
    blocks: [
      {
        kind: 'side by side',
        columns: [
          [heading('Included'), list(included)],
          [heading('Not included'), list(missing)],
        ],
      },
      heading(result.caveats.length === 0 ? 'No caveats' : countText(result.caveats.length, 'caveat')),
      ...(shown.length > 0 ? [table(CAVEAT_COLUMNS, shown.map(caveatRow))] : []),
      ...(groups.length > shown.length ? [note(`${groups.length - shown.length} more in the JSON result.`)] : []),
    ],
  };
}

function caveatRow(group: CaveatGroup): Text[] {
  const places = group.where.slice(0, MOST_PLACES);
  const more = group.where.length - places.length;
  return [
    code(shortName(group.code, 60)),
    [
      places.length === 0
        ? 'whole result'
        : joined(
            places.map((place) => name(place, 60)),
            ', ',
          ),
      more > 0 && ` and ${more} more`,
    ],
    rangeText(group.fromHz, group.toHz),
    name(group.message, 500),
  ];
}
