/**
 * Work in steps: a generator that yields wherever it may be interrupted. Run through at once where it is short or nobody waits; on the
 * server, where others are served by the same thread, with rests in between.
 */
export type Steps<T> = Generator<void, T, void>;

/** Longest that a step-wise work holds the thread before others have their turn, ms. */
const HOLD_MS = 20;

/** Lets whatever waits for the thread have its turn. */
export const rest = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

/** Runs steps to their end at once. */
export const stepsRun = <T>(steps: Steps<T>): T => {
  for (;;) {
    const { done, value } = steps.next();
    if (done) return value as T;
  }
};

/** Runs steps to their end, letting others have a turn now and then. */
export const stepsWithRests = async <T>(steps: Steps<T>): Promise<T> => {
  let since = performance.now();
  for (;;) {
    const { done, value } = steps.next();
    if (done) return value as T;
    if (performance.now() - since < HOLD_MS) continue;
    await rest();
    since = performance.now();
  }
};
