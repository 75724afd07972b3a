import { useEffect, useRef, useState } from 'react';
import { wrap, type Remote } from 'comlink';
import type { SheetPack } from '@/api-types/sheet-pack';
import type { PaperName } from '@/sheets/paper';
import type { NumberedSheet } from '@/sheets/sheet-draft';
import type { PackWorker } from './pack-worker';

export type Drawn =
  | { readonly kind: 'drawing' }
  | { readonly kind: 'failed'; readonly message: string }
  | { readonly kind: 'drawn'; readonly sheets: readonly NumberedSheet[] };

/** The pack's sheets on a paper, drawn by a worker, and the worker for what else it makes. */
export function usePackSheets(pack: SheetPack, paper: PaperName | 'auto') {
  const [drawn, setDrawn] = useState<Drawn>({ kind: 'drawing' });
  const [tries, setTries] = useState(0);
  const hand = useRef<Remote<PackWorker> | null>(null);
  useEffect(() => {
    const worker = new Worker(new URL('./pack-worker.ts', import.meta.url), { type: 'module' });
    const remote = wrap<PackWorker>(worker);
    hand.current = remote;
    let wanted = true;
    setDrawn({ kind: 'drawing' });
    const fail = (error: unknown) => {
      if (!wanted) return;
      const message = error instanceof Error ? error.message : '';
      setDrawn({ kind: 'failed', message });
    };
    worker.addEventListener('error', () => fail(null));
    remote.sheets(pack, paper).then((sheets) => {
      if (wanted) setDrawn({ kind: 'drawn', sheets });
    }, fail);
    return () => {
      wanted = false;
      worker.terminate();
    };
  }, [pack, paper, tries]);
  return { drawn, hand, again: () => setTries((count) => count + 1) };
}
