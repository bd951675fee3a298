/**
 * What the readings say of the parts, told by the island that knows to those that draw parts, through one event of
 * the window (`mw:standings`). The last word is kept on the window for islands that wake up later.
 */
import { useEffect, useState } from 'react';
import type { PartState } from './PartSymbol';

/** Reference → what is drawn into its symbol. */
export type Standings = Readonly<Record<string, PartState>>;

const EVENT = 'mw:standings';
const shelf = () => window as { meterwrightStandings?: Standings };

export function tellStandings(standings: Standings): void {
  shelf().meterwrightStandings = standings;
  window.dispatchEvent(new CustomEvent(EVENT));
}

/** The standings as they are now; none on the server and until somebody tells. */
export function useStandings(): Standings {
  const [standings, setStandings] = useState<Standings>({});
  useEffect(() => {
    const hear = () => setStandings(shelf().meterwrightStandings ?? {});
    hear();
    window.addEventListener(EVENT, hear);
    return () => window.removeEventListener(EVENT, hear);
  }, []);
  return standings;
}
