/** Lets so much work through at a time; the rest waits in the order in which it came. */
export const takeTurns = (places: number): (<T>(work: () => Promise<T>) => Promise<T>) => {
  let free = places;
  const waiting: (() => void)[] = [];
  return async (work) => {
    if (free > 0) free -= 1;
    else await new Promise<void>((go) => waiting.push(go));
    try {
      return await work();
    } finally {
      const next = waiting.shift();
      if (next === undefined) free += 1;
      else next();
    }
  };
};
