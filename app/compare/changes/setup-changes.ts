import { NO_CLASS } from '../../limits/limit-line.ts';
import type { StoredRun } from '../../project/stored-run.ts';
import { type Draft, draft, sameData, wideDraft } from './draft.ts';
import { numberChange, type Words, wordChange } from './words.ts';

/** Set-up of a run as far as comparison goes. */
export type SetupRun = Pick<StoredRun, 'settings' | 'result' | 'programVersion'>;

const classText = (name: string): string => (name === NO_CLASS ? 'without classes' : `class ${name}`);

/** Where and against what the runs were judged, and by which program. */
export function setupChanges(before: SetupRun, after: SetupRun): Draft[] {
  const [one, other] = [before.settings, after.settings];
  const [was, is] = [before.result.limit, after.result.limit];
  const limit: Words[] = [
    wordChange('limit: standard', was.standard, is.standard),
    wordChange('limit:', classText(was.class), classText(is.class)),
    sameData(one.limitFile, other.limitFile) ? undefined : limitFileText(one.limitFile, other.limitFile),
    one.convertDistance === other.convertDistance
      ? undefined
      : wordChange(
          'limits of another distance:',
          convertedText(one.convertDistance),
          convertedText(other.convertDistance),
        ),
  ];
  const demands: Words[] = [
    numberChange('required margin', was.requiredMarginDb, is.requiredMarginDb, 'dB'),
    numberChange('judged up to', was.maxHz / 1e6, is.maxHz / 1e6, 'MHz'),
  ];
  const setup: Words[] = [
    numberChange('distance', one.distanceM, other.distanceM, 'm'),
    wordChange('distance measured from the', fromText(one.measuredFrom), fromText(other.measuredFrom)),
    wordChange('site:', siteText(one.site), siteText(other.site)),
    wordChange('board', one.orientation, other.orientation),
  ];
  const structure = wordChange('planes and cables:', structureText(one.structure), structureText(other.structure));
  const program = wordChange('program version', before.programVersion, after.programVersion);
  const said = (texts: readonly Words[], make: (text: string) => Draft) =>
    texts.filter((text) => text !== undefined).map(make);
  return [
    ...said(setup, (text) => ({ ...wideDraft('setup', text), isBreaking: true })),
    ...said(limit, (text) => ({ ...draft('limit', text), isBreaking: true })),
    ...said(demands, (text) => draft('limit', text)),
    ...said([structure], (text) => ({ ...wideDraft('structure', text), isBreaking: true })),
    ...said([program], (text) => wideDraft('program', text)),
  ];
}

const convertedText = (isConverted: boolean): string => (isConverted ? 'converted' : 'not converted');
const fromText = (from: 'boundary' | 'center'): string => (from === 'boundary' ? 'boundary' : 'turntable axis');
const siteText = (site: 'ground-plane' | 'free-space'): string =>
  site === 'ground-plane' ? 'ground plane' : 'free space';
const structureText = (structure: 'solved' | 'pair-only'): string =>
  structure === 'solved' ? 'solved' : 'not solved (trace pairs only)';

function limitFileText(before: unknown, after: unknown): string {
  if (before === undefined) return 'limit: built-in lines → a limit file';
  return after === undefined ? 'limit: a limit file → built-in lines' : 'limit: another content of the limit file';
}
