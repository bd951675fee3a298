/** What the readings say, asked again after every saved change; only the newest answer counts. */
import { useCallback, useEffect, useRef, useState } from 'react';
import { benchRoutes, type Suspects } from '@/contracts/bench';
import type { Phase } from './panel-props';

/** Changes that follow one another closer than this are asked about once, ms; a single one at once. */
const PAUSE = 100;

export type Told = Readonly<Record<Phase, Suspects | null>>;

export function useSuspects(
  ticketNumber: string,
  first: Told,
  phase: Phase,
  /** How often this phase was saved since the page was made. */
  saves: number,
) {
  const [told, setTold] = useState(first);
  const [failed, setFailed] = useState<Phase | null>(null);
  const [tries, setTries] = useState(0);
  const asked = useRef(-PAUSE);
  const heard = useRef<Record<Phase, number>>({ 'as-found': 0, 'after-repair': 0 });

  useEffect(() => {
    if (saves === heard.current[phase]) return;
    const stop = new AbortController();
    const since = performance.now() - asked.current;
    const wait = setTimeout(
      async () => {
        const address = benchRoutes.suspects.path.replace('{number}', ticketNumber);
        try {
          const answer = await fetch(`${address}?phase=${phase}`, { signal: stop.signal });
          if (!answer.ok) throw new Error(`Suspects answered ${answer.status}`);
          const suspects = (await answer.json()) as Suspects;
          heard.current[phase] = saves;
          setTold((before) => ({ ...before, [phase]: suspects }));
          setFailed(null);
        } catch {
          if (!stop.signal.aborted) setFailed(phase);
        }
      },
      Math.max(0, PAUSE - since),
    );
    asked.current = performance.now();
    return () => {
      clearTimeout(wait);
      stop.abort();
    };
  }, [ticketNumber, phase, saves, tries]);

  const again = useCallback(() => setTries((n) => n + 1), []);
  return { told: told[phase], failed: failed === phase, again };
}
