import { useEffect, useState } from 'react';
import type { Output } from '../../app/contract/procedures.ts';
import { getState, useApp } from '../state/app-store.ts';
import { shownOf } from '../state/result.ts';
import type { Work } from '../state/work.ts';
import { isBusy, tryChange, useLevers } from './follow.ts';
import type { QuickLever } from './quick-lever.ts';

/** Change of the worst margin, dB, by a lever's key; null: the kept responses cannot tell. */
export type Effects = ReadonlyMap<string, number | null>;

const NONE: Effects = new Map();
/** The hand has come to rest. */
const QUIET_MS = 350;

/** What a usual change of each lever would give, found out one after the other while nothing else is asked. */
export function useEffects(levers: readonly QuickLever[]): Effects {
  const answered = useLevers((state) => state.answered);
  const isAble = useLevers((state) => state.prepared !== null && state.needsSolve === null && state.failure === null);
  const work = useApp((state) => state.history?.present ?? null);
  const [found, setFound] = useState<{ readonly work: Work; readonly effects: Effects } | null>(null);
  const keys = levers.map(({ key }) => key).join('\n');
  // biome-ignore lint/correctness/useExhaustiveDependencies: the levers follow from the document and their keys
  useEffect(() => {
    if (!isAble || work === null || answered !== work) return;
    let isWanted = true;
    const effects = new Map(found?.work === work ? found.effects : NONE);
    const timer = setTimeout(async () => {
      for (const lever of levers) {
        if (!isWanted || isBusy()) return;
        if (lever.probe === null || effects.has(lever.key)) continue;
        const effect = await effectOf(lever, work);
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

async function effectOf({ probe, set }: QuickLever, work: Work): Promise<number | null> {
  const now = shownOf(getState());
  if (probe === null || now === null || now.isOutdated || now.worst === null) return null;
  try {
    const reply = await tryChange(set(work.sources, probe.value));
    return changeOf(now.worst, reply);
  } catch {
    // A change the model refuses has no effect to be told; the lever itself says why when it is pulled.
    return null;
  }
}

function changeOf(now: { readonly marginDb: number }, reply: Output<'levers.try'> | null): number | null {
  if (reply === null || 'needsSolve' in reply || reply.worst === null) return null;
  return reply.worst.marginDb - now.marginDb;
}
