import { releaseProxy, wrap } from 'comlink';
import { useEffect, useRef, useState } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import type { SawTerms } from '@/takeoff/cutting-cost';
import type { PriceList } from '@/takeoff/price-list';
import type { CutFloor, CutWorker } from './cut-worker';

export interface CutFloorState {
  /** The last that was worked out; while `working` it is behind. */
  readonly floor: CutFloor | null;
  readonly working: boolean;
  readonly failure: string | null;
}

/** How long the floor rests before it is cut, ms: while it is dragged nobody reads what cutting costs. */
const REST_MS = 200;

function newHand() {
  const worker = new Worker(new URL('./cut-worker.ts', import.meta.url), { type: 'module' });
  const remote = wrap<CutWorker>(worker);
  return {
    compare: (document: LayoutDocument, prices: PriceList | null, terms: SawTerms) =>
      remote.compare(document, prices, terms),
    dismiss: () => {
      remote[releaseProxy]();
      worker.terminate();
    },
  };
}

/**
 * Keeps what cutting costs up with a document, beside the page. A floor that changes while one is worked
 * out starts anew; whether the document itself is cut makes no difference.
 *
 * @param document null where the floor cannot be laid
 */
export function useCutFloor(
  document: LayoutDocument | null,
  prices: PriceList | null,
  terms: SawTerms,
): CutFloorState {
  const [state, setState] = useState<CutFloorState>({ floor: null, working: false, failure: null });
  const last = useRef<LayoutDocument | null>(null);
  // Switching between whole and cut changes nothing of what both come to.
  if (!last.current || !document || !sameButCutting(last.current, document))
    last.current = document;
  const asked = last.current;

  useEffect(() => {
    if (!asked) return;
    let hand: ReturnType<typeof newHand> | null = null;
    let gone = false;
    setState((now) => ({ ...now, working: true }));
    const rest = setTimeout(async () => {
      hand = newHand();
      try {
        const floor = await hand.compare(asked, prices, terms);
        if (!gone) setState({ floor, working: false, failure: null });
      } catch (error) {
        const failure = error instanceof Error ? error.message : String(error);
        if (!gone) setState((now) => ({ ...now, working: false, failure }));
      }
      hand.dismiss();
      hand = null;
    }, REST_MS);
    return () => {
      gone = true;
      clearTimeout(rest);
      hand?.dismiss();
    };
  }, [asked, prices, terms]);

  return state;
}

function sameButCutting(one: LayoutDocument, other: LayoutDocument): boolean {
  const names = new Set([...Object.keys(one), ...Object.keys(other)]) as Set<keyof LayoutDocument>;
  names.delete('cutting');
  return [...names].every((name) => one[name] === other[name]);
}
