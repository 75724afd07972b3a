import { LIVE_POLL_S } from '@/api-types/live';
import type { Db } from './database';
import { logError } from './log';
import { projectPulse } from './project-pulse';

interface Watch {
  pulse: string | null;
  readonly listeners: Set<() => void>;
  timer: NodeJS.Timeout | undefined;
}

/** One watch for each project that somebody has open through this process, however many they are. */
const watches = new Map<string, Watch>();

const look = async (db: Db, watch: Watch, firmId: string, projectId: string): Promise<void> => {
  try {
    const pulse = await projectPulse(db, firmId, projectId);
    if (pulse !== watch.pulse) {
      watch.pulse = pulse;
      for (const listener of watch.listeners) listener();
    }
  } catch (error) {
    logError('live', error);
  }
  if (watch.listeners.size === 0) return;
  watch.timer = setTimeout(() => void look(db, watch, firmId, projectId), LIVE_POLL_S * 1000);
  watch.timer.unref();
};

/**
 * Calls `changed` once soon, and then whenever something in the project may have changed, through whichever process.
 * Give what it returns a call to stop; when the last has stopped, nothing is asked of the database any more.
 */
export const watchProject = (
  db: Db,
  firmId: string,
  projectId: string,
  changed: () => void,
): (() => void) => {
  const key = `${firmId}/${projectId}`;
  const watch = watches.get(key) ?? { pulse: null, listeners: new Set(), timer: undefined };
  watch.listeners.add(changed);
  if (!watches.has(key)) {
    watches.set(key, watch);
    void look(db, watch, firmId, projectId);
  }
  return () => {
    watch.listeners.delete(changed);
    if (watch.listeners.size > 0) return;
    clearTimeout(watch.timer);
    if (watches.get(key) === watch) watches.delete(key);
  };
};
