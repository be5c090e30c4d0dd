import { useEffect, useState } from 'react';
import type { Output } from '../../app/contract/procedures.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { getState, useApp } from '../state/app-store.ts';
import { shownOf } from '../state/result.ts';
import type { Work } from '../state/work.ts';
import { isBusy, tryChange, useLevers } from './follow.ts';
import type { QuickLever } from './quick-lever.ts';

/** What a usual change of a lever gives. */
export interface Effect {
  /** Change of the worst margin, dB. */
  readonly worstDb: number;
  /** Change of the margin at the line where its net comes nearest to the limit, dB. */
  readonly ownDb: number | null;
}

/** By a lever's key; null: the kept responses cannot tell. */
export type Effects = ReadonlyMap<string, Effect | null>;

/** A lever and the line its net counts at. */
export interface LeverAt {
  readonly lever: QuickLever;
  readonly frequencyHz: number | null;
}

const NONE: Effects = new Map();
/** The hand has come to rest. */
const QUIET_MS = 350;

/** What a usual change of each lever would give, found out one after the other while nothing else is asked. */
export function useEffects(levers: readonly LeverAt[]): Effects {
  const answered = useLevers((state) => state.answered);
  const isAble = useLevers((state) => state.prepared !== null && state.needsSolve === null && state.failure === null);
  const work = useApp((state) => state.history?.present ?? null);
  const [found, setFound] = useState<{ readonly work: Work; readonly effects: Effects } | null>(null);
  const keys = levers.map(({ lever, frequencyHz }) => `${lever.key} ${frequencyHz}`).join('\n');
  // biome-ignore lint/correctness/useExhaustiveDependencies: the levers follow from the document and their keys
  useEffect(() => {
    if (!isAble || work === null || answered !== work) return;
    let isWanted = true;
    const effects = new Map(found?.work === work ? found.effects : NONE);
    const timer = setTimeout(async () => {
      for (const { lever, frequencyHz } of levers) {
        if (!isWanted || isBusy()) return;
        if (lever.probe === null || effects.has(lever.key)) continue;
        const effect = await effectOf(lever, frequencyHz, work);
        if (!isWanted) return;
        effects.set(lever.key, effect);
        setFound({ work, effects: new Map(effects) });
      }
    }, QUIET_MS);
    return () => {
      isWanted = false;
      clearTimeout(timer);
    };
  }, [work, answered, isAble, keys]);
  return found !== null && found.work === work ? found.effects : NONE;
}

async function effectOf({ probe, set }: QuickLever, frequencyHz: number | null, work: Work): Promise<Effect | null> {
  const now = shownOf(getState());
  if (probe === null || now === null || now.isOutdated) return null;
  try {
    return effectBetween(now, await tryChange(set(work.sources, probe.value)), frequencyHz);
  } catch {
    // A change the model refuses has no effect to be told; the lever itself says why when it is pulled.
    return null;
  }
}

/** The difference an answer makes; null when it is none, or when there is no worst margin. */
export function effectBetween(
  now: { readonly worst: { readonly marginDb: number } | null; readonly points: readonly ResultPoint[] },
  reply: Output<'levers.try'> | null,
  frequencyHz: number | null,
): Effect | null {
  if (reply === null || 'needsSolve' in reply || reply.worst === null || now.worst === null) return null;
  const ownDb = marginAt(reply.points, frequencyHz) - marginAt(now.points, frequencyHz);
  return { worstDb: reply.worst.marginDb - now.worst.marginDb, ownDb: Number.isFinite(ownDb) ? ownDb : null };
}

const marginAt = (points: readonly ResultPoint[], frequencyHz: number | null): number =>
  Math.min(...points.filter((point) => point.frequencyHz === frequencyHz).map(({ marginDb }) => marginDb));
