/**
 * Lets so many pieces of work run at a time in this process; the rest wait their turn in order.
 *
 * @returns a function that runs `work` when its turn comes and answers what it answers.
 */
export function turns(atOnce: number) {
  let running = 0;
  const waiting: (() => void)[] = [];
  return async function inTurn<T>(work: () => Promise<T>): Promise<T> {
    if (running >= atOnce) await new Promise<void>((go) => waiting.push(go));
    else running += 1;
    try {
      return await work();
    } finally {
      const next = waiting.shift();
      if (next) next();
      else running -= 1;
    }
  };
}
