import { dbText, signedDbText } from '../../compare/run-text.ts';
import type { Change, ChangeEffect, ContributorChange } from '../../compare/types.ts';
import { pathText } from '../contributor-text.ts';
import { frequencyText } from '../format.ts';
import { shortName } from '../markup.ts';

/** Changes of one net, loop or cable that follow each other, with the one effect they have together. */
export interface ChangeGroup {
  readonly changes: readonly Change[];
  readonly effect: ChangeEffect | null;
}

export function changeGroups(changes: readonly Change[]): ChangeGroup[] {
  const groups: { changes: Change[]; effect: ChangeEffect | null }[] = [];
  for (const change of changes) {
    const last = groups.at(-1);
    if (last?.effect && change.effect && isSameEffect(last.effect, change.effect)) last.changes.push(change);
    else groups.push({ changes: [change], effect: change.effect });
  }
  return groups;
}

const isSameEffect = (one: ChangeEffect, other: ChangeEffect): boolean =>
  one.name === other.name && one.frequencyHz === other.frequencyHz && one.detector === other.detector;

/** "level of CLK_25M −9.0 dB at 125 MHz", with what it follows from when that is more than one change. */
export function effectText({
  name,
  frequencyHz,
  beforeDbuvPerM,
  afterDbuvPerM,
  changeDb,
  isAlone,
}: ChangeEffect): string {
  const at = `at ${frequencyText(frequencyHz)}`;
  const whose = `${isAlone ? '' : 'all changes together: '}level of ${shortName(name)}`;
  if (changeDb !== null) return `${whose} ${signedDbText(changeDb)} dB ${at}`;
  if (afterDbuvPerM !== null) return `${whose} now ${dbText(afterDbuvPerM)} dBµV/m ${at}`;
  return `${whose} gone ${at}${beforeDbuvPerM === null ? '' : ` (was ${dbText(beforeDbuvPerM)} dBµV/m)`}`;
}

/**
 * Who made a line change most, with the dB of each own level: "CLK_25M via valve cable −18.1, via supply cable −18.0". A name
 * that comes twice in a row is said once.
 */
export function contributorsText(contributors: readonly ContributorChange[]): string {
  return contributors
    .map((each, i) => {
      const before = contributors[i - 1];
      return contributorText(each, before?.kind === each.kind && before.name === each.name);
    })
    .join(', ');
}

function contributorText({ kind, name, path, changeDb, beforeDbuvPerM }: ContributorChange, isKnown: boolean): string {
  const via = path === name || path === kind ? '' : `via ${shortName(pathText(path), 32)}`;
  const who = [isKnown ? '' : shortName(name, 32), via].filter((text) => text !== '').join(' ');
  if (changeDb !== null) return `${who} ${signedDbText(changeDb)}`;
  return beforeDbuvPerM === null ? `${who} new` : `${who} gone`;
}
