import { expose } from 'comlink';
import { cutPieces, type CutPieces } from '@/paving/cutting/cut-pieces';
import { cutReport, type CutReport } from '@/paving/cutting/cut-report';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { wholeReport } from '@/paving/report';
import { cuttingComparison, type CuttingComparison, type SawTerms } from '@/takeoff/cutting-cost';
import type { PriceList } from '@/takeoff/price-list';

/** A floor whole and cut, as the panel shows it. */
export interface CutFloor {
  readonly cut: CutReport;
  readonly comparison: CuttingComparison;
}

/** Cutting beside the page: the very code that the server and the command line run. */
const cutWorker = {
  pieces: (document: LayoutDocument): CutPieces => cutPieces(layFloor(document)),

  compare: (document: LayoutDocument, prices: PriceList | null, terms: SawTerms): CutFloor => {
    const laying = layFloor(document);
    const cut = cutReport(laying);
    const whole = wholeReport(laying);
    return { cut, comparison: cuttingComparison(laying, whole, cut, prices, terms) };
  },
};

export type CutWorker = typeof cutWorker;
expose(cutWorker);
