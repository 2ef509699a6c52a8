/** Lets one piece of work through at a time, in the order in which they came. */
export interface WriteGate {
  through<T>(work: () => Promise<T>): Promise<T>;
  /** Resolves when everything that came before has ended. */
  settled(): Promise<void>;
}

/**
 * All writing to the database passes here. A plain write that is made on the same connection while a transaction is
 * open becomes part of that transaction: acknowledged to its caller, and then lost when the other one fails.
 */
export function createWriteGate(): WriteGate {
  let last: Promise<unknown> = Promise.resolve();
  return {
    through(work) {
      const result = last.then(work);
      last = result.catch(() => undefined); // a failure belongs to its caller, not to the next in line
      return result;
    },
    async settled() {
      await last;
    },
  };
}
