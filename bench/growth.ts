import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { wavyFloor } from './floors';
import { medianMs, type Bench, type Ratio } from './ratio';

const SIZES = [1_000, 10_000, 100_000, 1_000_000];
/** Time per unit and step of perimeter may grow by this from the smallest floor to the largest. */
const GREATEST_GROWTH = 2;

/** Laying and reporting floors of 1k to 1M units: the time for each unit and each pitch of perimeter. */
export const growth: Bench = {
  name: 'growth',
  run() {
    const costs = SIZES.map((units) => {
      const document = wavyFloor(units);
      const laying = layFloor(document);
      const pitches = laying.ground.edges.reduce((sum, { length }) => sum + length, 0) / 203;
      const runs = Math.max(5, Math.min(200, 400_000 / units));
      const ms = medianMs(() => floorReport(layFloor(document)), runs, Math.min(40, runs));
      return { units: laying.laid.count, ms, ns: (ms * 1e6) / (laying.laid.count + pitches) };
    });
    return costs.slice(1).map(({ units, ms, ns }, n): Ratio => {
      const before = costs[n];
      return {
        name: `time per unit and pitch of perimeter, ${units} ÷ ${before.units} units`,
        value: ns / before.ns,
        greatest: GREATEST_GROWTH,
        detail: `${ms.toFixed(2)} ms, ${ns.toFixed(0)} ns each, against ${before.ns.toFixed(0)} ns`,
      };
    });
  },
};
