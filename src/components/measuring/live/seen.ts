/** Which batches of an inspection this tablet has, read from the server or sent by itself. */
export interface Seen {
  /** All up to this number were read. */
  readonly read: (through: number) => void;
  /** This one was its own, and is here as it was kept. */
  readonly sent: (batch: number) => void;
  readonly has: (batch: number) => boolean;
}

/** Its own sendings need no reading, as long as none of another tablet lies between them. */
export const seenFrom = (through: number): Seen => {
  let last = through;
  const own = new Set<number>();
  const goOn = () => {
    while (own.delete(last + 1)) last += 1;
  };
  return {
    read: (batch) => {
      last = Math.max(last, batch);
      goOn();
    },
    sent: (batch) => {
      own.add(batch);
      goOn();
    },
    has: (batch) => batch <= last,
  };
};
