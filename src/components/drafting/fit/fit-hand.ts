import { releaseProxy, wrap, type Remote } from 'comlink';
import type { FitWorker } from './fit-worker';

/** A worker that fits beside the page; dismissed, it stops whatever it is at. */
export interface Hand {
  readonly worker: Worker;
  readonly remote: Remote<FitWorker>;
}

export function newHand(): Hand {
  const worker = new Worker(new URL('./fit-worker.ts', import.meta.url), { type: 'module' });
  return { worker, remote: wrap<FitWorker>(worker) };
}

export function dismissed(hand: Hand | null): null {
  hand?.remote[releaseProxy]();
  hand?.worker.terminate();
  return null;
}
