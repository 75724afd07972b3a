import { layFloor } from '@/paving/laying';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { floorReport } from '@/paving/report';
import { wavyFloor } from './floors';
import { medianMs, type Bench } from './ratio';

/** One frame of a screen that shows sixty a second. */
const FRAME_MS = 1000 / 60;

/** From the document to the laid units of a floor of 500 units, as a share of a frame. */
export const usualFloor: Bench = {
  name: 'usual-floor',
  run() {
    const document = wavyFloor(500, 12);
    const units = layFloor(document).laid.count;
    const layMs = medianMs(() => layFloor(document), 400, 200);
    const parseMs = medianMs(() => parseLayoutDocument(document), 400, 200);
    const laying = layFloor(document);
    const reportMs = medianMs(() => floorReport(laying), 400, 200);
    return [
      {
        name: 'document to laid units ÷ a frame',
        value: layMs / FRAME_MS,
        greatest: 0.1,
        detail: `${units} units in ${layMs.toFixed(3)} ms of ${FRAME_MS.toFixed(1)} ms; checking the document ${parseMs.toFixed(3)} ms, the report ${reportMs.toFixed(3)} ms`,
      },
      {
        name: 'checked, laid and reported ÷ a frame',
        value: (layMs + parseMs + reportMs) / FRAME_MS,
        greatest: 0.5,
        detail: `${(layMs + parseMs + reportMs).toFixed(3)} ms`,
      },
    ];
  },
};
