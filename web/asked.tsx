import type { ComponentChildren } from 'preact';
import { useEffect, useState } from 'preact/hooks';

export type Asked<T> = { state: 'waiting' } | { state: 'here'; value: T } | { state: 'refused'; why: string };

/** Asks for something once per key; `again` asks anew. */
export function useAsked<T>(key: string, ask: () => Promise<T>): Asked<T> & { again: () => void } {
  const [asked, setAsked] = useState<Asked<T>>({ state: 'waiting' });
  const [round, setRound] = useState(0);
  useEffect(() => {
    let current = true;
    setAsked((before) => (before.state === 'here' && round > 0 ? before : { state: 'waiting' }));
    ask().then(
      (value) => current && setAsked({ state: 'here', value }),
      (error: Error) => current && setAsked({ state: 'refused', why: error.message }),
    );
    return () => {
      current = false;
    };
  }, [key, round]);
  return { ...asked, again: () => setRound((n) => n + 1) };
}

/** What was asked for, or that it is being fetched, or why it is not to be had. */
export function Shown<T>({ asked, children }: { asked: Asked<T>; children: (value: T) => ComponentChildren }) {
  if (asked.state === 'waiting')
    return (
      <p class="waiting" aria-live="polite">
        Fetching …
      </p>
    );
  if (asked.state === 'refused')
    return (
      <p class="refused" role="alert">
        {asked.why}
      </p>
    );
  return <>{children(asked.value)}</>;
}
