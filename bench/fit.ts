import { fit } from '@/paving/fit/fit';
import { frameMost } from '@/paving/fit/cell-fit';
import { unitCount } from '@/paving/fit/count';
import { fitFrame } from '@/paving/fit/fit-frame';
import type { LayoutDocument } from '@/paving/layout-document';
import { COURT_CHEQUER, COURT_SQUARE, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { fitFloors, squareFloor } from './fit-floors';
import { medianMs, medianOf, type Bench, type Ratio } from './ratio';

/** Starts that the search tries each way. */
const SEARCH = 64;
const RUNS = 9;

/** The most units of a grid of starts, by the project's own fastest count. */
function searchMost(document: LayoutDocument): number {
  const frame = fitFrame(document);
  let most = 0;
  for (let j = 0; j < SEARCH; j++) {
    const v = ((j + 0.5) / SEARCH) * frame.rise;
    for (let i = 0; i < SEARCH; i++) {
      most = Math.max(most, unitCount(frame, ((i + 0.5) / SEARCH) * frame.pitch, v));
    }
  }
  return most;
}

/** Work is repeated for so long before it is timed, the fit as the search, so that all of it runs compiled, ms. */
const WARM_MS = 1000;

/** Then it is timed for so long, or as many times as `RUNS` tells where that is longer, ms. */
const TIMED_MS = 300;

/** Medians of several works that are timed by turns, so that what else the machine does falls on all alike, ms. */
function warmMs(...works: readonly (() => unknown)[]): number[] {
  for (const work of works) {
    const end = performance.now() + WARM_MS;
    while (performance.now() < end) work();
  }
  const times = works.map((): number[] => []);
  const end = performance.now() + TIMED_MS * works.length;
  for (let run = 0; run < RUNS || performance.now() < end; run++) {
    works.forEach((work, n) => {
      const start = performance.now();
      work();
      times[n].push(performance.now() - start);
    });
  }
  return times.map(medianOf);
}

/**
 * The fit against a search of 64 × 64 starts. Two lines a floor: the proof of the most units, which
 * is what a search guesses at; and the whole fit, which finds the start with the most play as well,
 * lays it and measures it. The search knows nothing of play and lays nothing, so the second line asks
 * more of the fit than of the search. The trade-off, which a search gives nothing like, is timed apart.
 */
export const fitAgainstSearch: Bench = {
  name: 'fit-against-search',
  run: () =>
    Object.entries(fitFloors).flatMap(([name, document]): Ratio[] => {
      const found = searchMost(document);
      const { wholeUnits } = fit(document, { choices: false });
      if (wholeUnits < found) throw new Error(`${name}: fit ${wholeUnits}, search ${found}`);
      const [search, proof, best] = warmMs(
        () => searchMost(document),
        () => frameMost(fitFrame(document)),
        () => fit(document, { choices: false }),
      );
      const units = `fit ${wholeUnits} units, search ${found}`;
      return [
        {
          name: `${name}: search ÷ the most units, proven`,
          value: search / proof,
          least: 1,
          detail: `${units}; ${proof.toFixed(2)} ms against ${search.toFixed(1)} ms`,
        },
        {
          name: `${name}: search ÷ the same with the most play, laid and measured`,
          value: search / best,
          least: 1,
          detail: `${best.toFixed(2)} ms against ${search.toFixed(1)} ms, which finds no play`,
        },
      ];
    }),
};

const demo = { COURT_SQUARE, COURT_CHEQUER, ROUND_TERRACE, SIDE_YARD };
/** The fit, trade-off and all, is to keep up with a hand that lets go, ms. */
const PROMPT_MS = 100;

/** The whole fit on the demo's floors, and a sweep of turns against it. */
export const fitOnTable: Bench = {
  name: 'fit-on-table',
  run: () => {
    const prompt = Object.entries(demo).map(([name, document]): Ratio => {
      // The table's worker lives on: its fits run compiled.
      const [ms] = warmMs(() => fit(document));
      return {
        name: `${name}: the whole fit ÷ ${PROMPT_MS} ms`,
        value: ms / PROMPT_MS,
        greatest: 1,
        detail: `${ms.toFixed(1)} ms with the trade-off`,
      };
    });
    const [single] = warmMs(() => fit(COURT_CHEQUER));
    const range = { from: 0, to: 90, step: 0.5 };
    const sweep = medianMs(() => fit(COURT_CHEQUER, { turn: range }), 3, 1);
    return [
      ...prompt,
      {
        name: 'a sweep of 0–90° by 0.5° ÷ one fit',
        value: sweep / single,
        greatest: 180,
        detail: `${sweep.toFixed(0)} ms against ${single.toFixed(1)} ms`,
      },
    ];
  },
};

const PITCHES = [10, 100, 1_000, 10_000];

/** How the proof's time grows with perimeter ÷ pitch. */
export const fitGrowth: Bench = {
  name: 'fit-growth',
  run: () => {
    const costs = PITCHES.map((pitches) => {
      const document = squareFloor(pitches);
      return { pitches, ms: medianMs(() => frameMost(fitFrame(document)), RUNS, 3) };
    });
    return costs.slice(1).map(({ pitches, ms }, n): Ratio => {
      const before = costs[n];
      const times = pitches / before.pitches;
      return {
        name: `time over that of ${before.pitches} ÷ (${pitches} ÷ ${before.pitches}) to the power 1.5`,
        value: ms / before.ms / times ** 1.5,
        greatest: 1,
        detail: `${pitches} pitches of perimeter: ${ms.toFixed(2)} ms, against ${before.ms.toFixed(2)} ms`,
      };
    });
  },
};
