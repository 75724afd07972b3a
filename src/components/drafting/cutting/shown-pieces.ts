import { releaseProxy, wrap, type Remote } from 'comlink';
import { cutPieces, type CutPieces } from '@/paving/cutting/cut-pieces';
import type { Laying } from '@/paving/laying';
import type { CutWorker } from './cut-worker';

const known = new WeakMap<Laying, CutPieces>();

/** The pieces of a floor that is cut at its edge, worked out once; null for a floor that is not. */
export function piecesOf(laying: Laying | null): CutPieces | null {
  if (laying?.document.cutting !== 'edge') return null;
  let pieces = known.get(laying);
  if (!pieces) {
    pieces = cutPieces(laying);
    known.set(laying, pieces);
  }
  return pieces;
}

/** Pieces that take no longer than this, ms, as long as laying and figures do, keep up with the hand; others come after it has rested. */
const FRAME_MS = 24;
const REST_MS = 150;
/** What a unit at the edge is taken to cost before any was timed, ms. */
const FIRST_GUESS_MS = 0.05;

/** Hands out pieces of floors as they are shown, one after another. */
export interface PieceKeeper {
  /** The floor's pieces, or null while they are worked out beside the page. */
  of(laying: Laying | null): CutPieces | null;
  dispose(): void;
}

/** `again` is called when pieces that were due have come. */
export function createPieceKeeper(again: () => void): PieceKeeper {
  let msAUnit = FIRST_GUESS_MS;
  let rest: ReturnType<typeof setTimeout> | undefined;
  let wanted: Laying | null = null;
  let hand: { worker: Worker; remote: Remote<CutWorker> } | null = null;

  const workOut = async (laying: Laying) => {
    if (!hand) {
      const worker = new Worker(new URL('./cut-worker.ts', import.meta.url), { type: 'module' });
      hand = { worker, remote: wrap<CutWorker>(worker) };
    }
    // What the worker cannot do the page does, if slowly: a floor must not lose its pieces for it.
    const made = await hand.remote.pieces(laying.document).catch(() => cutPieces(laying));
    known.set(laying, made);
    if (wanted === laying) again();
  };

  return {
    of(laying) {
      if (laying?.document.cutting !== 'edge') return null;
      const made = known.get(laying);
      if (made) return made;
      if (laying.leftOut.count * msAUnit <= FRAME_MS) {
        const from = performance.now();
        const pieces = piecesOf(laying);
        const took = (performance.now() - from) / Math.max(1, laying.leftOut.count);
        msAUnit = 0.7 * msAUnit + 0.3 * took;
        return pieces;
      }
      if (wanted !== laying) {
        wanted = laying;
        clearTimeout(rest);
        rest = setTimeout(() => void workOut(laying), REST_MS);
      }
      return null;
    },
    dispose() {
      clearTimeout(rest);
      wanted = null;
      hand?.remote[releaseProxy]();
      hand?.worker.terminate();
      hand = null;
    },
  };
}
