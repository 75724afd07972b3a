/** How often it is looked whether the parent is still there, ms. */
const LOOK_EVERY = 500;

/**
 * npm passes SIGTERM to the shell that it runs scripts in, and that shell dies of it without passing it
 * on. So when npm started this process and the shell is gone, that counts as the signal.
 */
export const endWithNpm = (): void => {
  if (!process.env.npm_lifecycle_event) return;
  const parent = process.ppid;
  const watch = setInterval(() => {
    if (process.ppid === parent) return;
    clearInterval(watch);
    process.kill(process.pid, 'SIGTERM');
  }, LOOK_EVERY);
  watch.unref();
};
