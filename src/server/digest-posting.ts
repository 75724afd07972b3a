import { endBeforeClosing, type Db } from './database';
import { postDigests } from './digests';
import { logError } from './log';

/** How often it is looked for digests that are due, ms. */
const LOOK_MS = 60_000;

/** Gathers digests for as long as the process runs; the sender of letters calls this once. */
export const startDigests = (db: Db): void => {
  let stopped = false;
  let running = Promise.resolve();
  const timer = setInterval(() => {
    running = running
      .then(() => (stopped ? 0 : postDigests(db)))
      .then(() => undefined)
      .catch((error: unknown) => logError('digests could not be gathered', error));
  }, LOOK_MS);
  timer.unref();
  endBeforeClosing(async () => {
    stopped = true;
    clearInterval(timer);
    await running;
  });
};
