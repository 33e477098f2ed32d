/** Runs one after the other: asked while it runs, it runs once more afterwards. */
export const oneAtATime = (run: () => Promise<void>): (() => void) => {
  let busy = false;
  let again = false;
  const go = async () => {
    if (busy) {
      again = true;
      return;
    }
    busy = true;
    do {
      again = false;
      await run();
    } while (again);
    busy = false;
  };
  return () => void go();
};
