import polygonClipping, { type Pair } from 'polygon-clipping';
import { layFloor, unitCorners } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { wavyFloor } from './floors';
import { medianMs, type Bench } from './ratio';

const UNITS = 102_000;
const SAMPLE = 400;

/**
 * Laying and reporting 100,000 units at 17° inside 200 corners, against asking polygon-clipping
 * for the intersection of each unit with the ground (a spread sample of the same units), per unit.
 */
export const layingAgainstClipping: Bench = {
  name: 'laying-against-clipping',
  run() {
    const document = wavyFloor(UNITS);
    const laying = layFloor(document);
    const { laid, motif, ground } = laying;
    if (laid.count < 100_000) throw new Error(`only ${laid.count} units were laid`);
    const oursMs = medianMs(() => floorReport(layFloor(document)), 15, 5);
    const shell = ground.rings[0].outline.map(([x, y]): Pair => [x, y]);
    const every = Math.floor(laid.count / SAMPLE);
    const units = Array.from({ length: SAMPLE }, (_, n) =>
      unitCorners(motif[0], laid.x[n * every], laid.y[n * every]).map(([x, y]): Pair => [x, y]),
    );
    const theirsMs = medianMs(
      () => {
        for (const unit of units) polygonClipping.intersection([shell], [unit]);
      },
      3,
      1,
    );
    const ours = (oursMs * 1e6) / laid.count;
    const theirs = (theirsMs * 1e6) / SAMPLE;
    return [
      {
        name: 'polygon-clipping ÷ laying and report, per unit',
        value: theirs / ours,
        least: 1000,
        detail: `${laid.count} units in ${oursMs.toFixed(1)} ms: ${ours.toFixed(0)} ns a unit, against ${(theirs / 1000).toFixed(0)} µs a unit`,
      },
    ];
  },
};
