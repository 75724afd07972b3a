import { releaseProxy, wrap } from 'comlink';
import { useEffect, useRef, useState } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import type { PriceList } from '@/takeoff/price-list';
import type { TakeOff } from '@/takeoff/take-off';
import type { TakeOffWorker } from './take-off-worker';

export interface TakeOffState {
  /** The last that was worked out; it may be behind while `working`. */
  readonly takeOff: TakeOff | null;
  readonly working: boolean;
  readonly failure: string | null;
}

interface Hand {
  readonly call: (document: LayoutDocument, prices: PriceList | null) => Promise<TakeOff>;
  readonly dismiss: () => void;
}

function newHand(): Hand {
  const worker = new Worker(new URL('./take-off-worker.ts', import.meta.url), { type: 'module' });
  const remote = wrap<TakeOffWorker>(worker);
  return {
    call: (document, prices) => remote.takeOff(document, prices),
    dismiss: () => {
      remote[releaseProxy]();
      worker.terminate();
    },
  };
}

/**
 * Keeps a take-off up with a document, beside the page. What changes while one is worked out is taken
 * next; what lay between is passed over.
 *
 * @param document null where the floor cannot be laid
 */
export function useTakeOff(
  document: LayoutDocument | null,
  prices: PriceList | null,
): TakeOffState {
  const [state, setState] = useState<TakeOffState>({
    takeOff: null,
    working: false,
    failure: null,
  });
  const hand = useRef<Hand | null>(null);
  const busy = useRef(false);
  const wanted = useRef<readonly [LayoutDocument, PriceList | null] | null>(null);

  useEffect(
    () => () => {
      hand.current?.dismiss();
      hand.current = null;
      wanted.current = null;
      // What was asked of a dismissed worker is never answered.
      busy.current = false;
    },
    [],
  );

  useEffect(() => {
    if (!document) return;
    wanted.current = [document, prices];
    setState((now) => ({ ...now, working: true }));
    if (busy.current) return;
    const work = async () => {
      busy.current = true;
      while (wanted.current) {
        const [next, list] = wanted.current;
        wanted.current = null;
        const mine = (hand.current ??= newHand());
        try {
          const takeOff = await mine.call(next, list);
          if (hand.current !== mine) break;
          setState({ takeOff, working: wanted.current !== null, failure: null });
        } catch (error) {
          if (hand.current !== mine) break;
          const failure = error instanceof Error ? error.message : String(error);
          setState((now) => ({ ...now, working: wanted.current !== null, failure }));
        }
      }
      busy.current = false;
    };
    void work();
  }, [document, prices]);

  return state;
}
