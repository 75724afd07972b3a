import { expose } from 'comlink';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import type { PriceList } from '@/takeoff/price-list';
import { takeOff, type TakeOff } from '@/takeoff/take-off';

/** The take-off beside the page: the very code that the server and the command line run. */
const takeOffWorker = {
  takeOff: (document: LayoutDocument, prices: PriceList | null): TakeOff => {
    const laying = layFloor(document);
    return takeOff(laying, floorReport(laying), prices);
  },
};

export type TakeOffWorker = typeof takeOffWorker;
expose(takeOffWorker);
