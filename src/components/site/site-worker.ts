import { useSyncExternalStore } from 'react';

/** Where the program itself stands on this phone: whether it opens without signal, and whether a newer one waits. */
export type WorkerStanding =
  | 'looking'
  /** The browser keeps no programs here (a page without TLS, or an old browser). */
  | 'impossible'
  | 'keeping'
  | 'kept'
  /** A newer program is on the phone and is taken when the person says so, so that nothing typed is lost. */
  | 'newer';

export const WORKER = '/site-worker.js';
export const SCOPE = '/site';

let standing: WorkerStanding = 'looking';
let waiting: ServiceWorker | null = null;
let taking = false;
const listeners = new Set<() => void>();

const stand = (next: WorkerStanding) => {
  standing = next;
  for (const listener of listeners) listener();
};

const watched = (registration: ServiceWorkerRegistration) => {
  const look = () => {
    if (registration.waiting && registration.active) {
      waiting = registration.waiting;
      stand('newer');
    } else if (registration.active) stand('kept');
    else stand('keeping');
  };
  const follow = () => {
    const { installing } = registration;
    installing?.addEventListener('statechange', look);
    look();
  };
  registration.addEventListener('updatefound', follow);
  follow();
  const ask = () => {
    if (document.visibilityState === 'visible') void registration.update().catch(() => {});
  };
  window.addEventListener('online', ask);
  document.addEventListener('visibilitychange', ask);
};

/** Has the browser keep the program, so that /site opens without signal. */
export const keepProgram = async (): Promise<void> => {
  if (!('serviceWorker' in navigator)) return stand('impossible');
  // In development every module is fetched by itself and changes under one's hands.
  if (!import.meta.env.PROD) return stand('impossible');
  navigator.serviceWorker.addEventListener('controllerchange', () => {
    if (taking) location.reload();
  });
  try {
    watched(await navigator.serviceWorker.register(WORKER, { scope: SCOPE }));
  } catch {
    // Without signal an installed program is there all the same.
    const there = await navigator.serviceWorker.getRegistration(SCOPE);
    if (there?.active) stand('kept');
    else stand('impossible');
  }
};

/** Takes the newer program, in this tab at once and in others when they are opened again. */
export const takeNewer = (): void => {
  taking = true;
  waiting?.postMessage({ type: 'SKIP_WAITING' });
};

export const useProgram = (): WorkerStanding =>
  useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => standing,
    () => 'looking' as const,
  );
