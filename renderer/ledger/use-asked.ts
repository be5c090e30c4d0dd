import { useEffect, useState } from 'react';
import { failureText } from '../state/notices.ts';

/** What came of a question to the host. */
export type Asked<T> =
  | { readonly state: 'loading' }
  | { readonly state: 'ready'; readonly answer: T }
  | { readonly state: 'failed'; readonly message: string };

/** Asks again whenever `key` changes; an answer that comes too late is dropped. `null`: nothing to ask. */
export function useAsked<T>(key: string | null, ask: () => Promise<T>): Asked<T> | null {
  const [asked, setAsked] = useState<{ readonly key: string; readonly outcome: Asked<T> } | null>(null);
  // biome-ignore lint/correctness/useExhaustiveDependencies: the key says when the question is another one
  useEffect(() => {
    if (key === null) return;
    let isCurrent = true;
    const take = (outcome: Asked<T>) => isCurrent && setAsked({ key, outcome });
    ask().then(
      (answer) => take({ state: 'ready', answer }),
      (error: unknown) => take({ state: 'failed', message: failureText(error) ?? 'stopped' }),
    );
    return () => {
      isCurrent = false;
    };
  }, [key]);
  if (key === null) return null;
  return asked?.key === key ? asked.outcome : { state: 'loading' };
}
