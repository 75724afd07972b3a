import { describe, expect, test } from 'vitest';
import { bestFace } from '@/paving/fit/best-face';
import { fit, fitBegun, fitRefusal, fitSteps, FIT_STOPPED, type FitHold } from '@/paving/fit/fit';
import { shiftMap, shiftMapPlace } from '@/paving/fit/shift-map';
import { rangeTurns } from '@/paving/fit/turn-sweep';
import { gapProfile } from '@/paving/gap-profile';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../../oracle/documents';
import { startCounter } from '../../oracle/start-counter';

const COURT: LayoutDocument = parsed(
  documentOf({
    ground: {
      perimeter: [
        [0, 0],
        [7200, 0],
        [7200, 3100],
        [4300, 3100],
        [4300, 5400],
        [0, 5400],
      ],
      keepOuts: [
        {
          name: 'Tree pit',
          ring: [
            [1500, 3600],
            [2500, 3600],
            [2500, 4600],
            [1500, 4600],
          ],
        },
      ],
    },
    units: [unitOf('a', 450)],
    bond: { kind: 'chequer', unit: 'a', joint: 3 },
    placement: { origin: [0, 0], turn: 45 },
    clearance: 6,
  }),
);
const atTurn = (turn: number): LayoutDocument => ({
  ...COURT,
  placement: { origin: [0, 0], turn },
});
const reported = (placement: LayoutDocument['placement'], document = COURT) =>
  floorReport(layFloor({ ...document, placement, lifted: [] }));

test('every choice lays as many units, with as much play, as it says, and has more play than those before it', () => {
  const { wholeUnits, placement, play, leastGap, choices } = fit(COURT);
  expect(choices[0]).toEqual({ wholeUnits, placement, play, leastGap });
  expect(choices.length).toBeGreaterThan(1);
  choices.forEach((choice, n) => {
    const report = reported(choice.placement);
    expect(report.wholeUnits).toBe(choice.wholeUnits);
    expect(report.play).toBeCloseTo(choice.play, 9);
    expect(report.leastGap).toBeCloseTo(choice.leastGap, 9);
    expect(choice.wholeUnits).toBeGreaterThanOrEqual(0.85 * wholeUnits);
    if (n > 0) {
      expect(choice.wholeUnits).toBeLessThan(choices[n - 1].wholeUnits);
      expect(choice.play).toBeGreaterThan(choices[n - 1].play);
    }
  });
});

test('the whole field may drift by its play in any direction without losing a unit', () => {
  for (const { placement, play, wholeUnits } of fit(COURT).choices) {
    for (let angle = 0; angle < 360; angle += 15) {
      const [x, y] = placement.origin;
      const far = play - 0.001;
      const origin: [number, number] = [
        x + far * Math.cos((angle * Math.PI) / 180),
        y + far * Math.sin((angle * Math.PI) / 180),
      ];
      expect(reported({ ...placement, origin }).wholeUnits).toBeGreaterThanOrEqual(wholeUnits);
    }
  }
});

test('the same document gives the same answer, wherever its pattern stands and whatever is lifted', () => {
  const found = fit(COURT);
  expect(fit(COURT)).toEqual(found);
  const elsewhere = fit({
    ...COURT,
    placement: { origin: [311, -77], turn: 45 },
    lifted: [[0, 0, 0]],
  });
  expect(elsewhere.choices.map(({ wholeUnits }) => wholeUnits)).toEqual(
    found.choices.map(({ wholeUnits }) => wholeUnits),
  );
  elsewhere.choices.forEach(({ play }, n) => expect(play).toBeCloseTo(found.choices[n].play, 3));
});

test('the start is given as near as can be to where the pattern stands', () => {
  const origin: [number, number] = [100_000, -50_000];
  const { placement } = fit({ ...COURT, placement: { origin, turn: 45 } });
  const step = 2 * 453;
  expect(
    Math.hypot(placement.origin[0] - origin[0], placement.origin[1] - origin[1]),
  ).toBeLessThanOrEqual(step);
});

test('begun, it gives the start and its face at once, and the whole from the same pieces', () => {
  const begun = fitBegun(COURT);
  expect(begun.result).toEqual(fit(COURT, { choices: false }));
  expect(begun.face()).toEqual(bestFace(COURT));
  expect(begun.whole()).toEqual(fit(COURT));
  const hold: FitHold[] = [{ edge: [0, 0] }];
  const held = fitBegun(atTurn(0), { hold });
  expect(held.result).toEqual(fit(atTurn(0), { hold, choices: false }));
  expect(held.face()).toBeNull();
  expect(held.whole()).toEqual(fit(atTurn(0), { hold }));
});

test('with a hold it can be stopped on the way', () => {
  let asked = 0;
  const hold: FitHold[] = [{ edge: [0, 0] }];
  fit(atTurn(0), { hold, shouldStop: () => ++asked < 0 });
  expect(asked).toBeGreaterThan(10);
  for (const after of [0, 1, asked >> 1, asked - 1]) {
    let times = 0;
    expect(() => fit(atTurn(0), { hold, shouldStop: () => ++times > after })).toThrow(FIT_STOPPED);
  }
});

test('where nothing can be laid the answer says so and the placement is kept', () => {
  const document = { ...COURT, units: [unitOf('a', 5000)] };
  expect(fit(document)).toEqual({
    wholeUnits: 0,
    placement: document.placement,
    leastGap: null,
    play: null,
    choices: [],
  });
  expect(bestFace(document)).toEqual({ most: 0, outline: null });
});

describe('a hold to an edge', () => {
  const document = atTurn(0);

  test('sets a row exactly the clearance inside the edge', () => {
    const { placement, wholeUnits } = fit(document, { hold: [{ edge: [0, 0] }] });
    const report = reported(placement);
    expect(report.wholeUnits).toBe(wholeUnits);
    expect(report.edges[0].least).toBeCloseTo(6, 6);
  });

  test('has no more units than the best start along that line, of a thousand', () => {
    const { wholeUnits, placement } = fit(document, { hold: [{ edge: [0, 0] }] });
    const counts = Array.from({ length: 1000 }, (_, n) => {
      const origin: [number, number] = [(n / 1000) * 906, placement.origin[1]];
      return reported({ origin, turn: 0 }).wholeUnits;
    });
    expect(Math.max(...counts)).toBeLessThanOrEqual(wholeUnits);
  });

  test('and to another takes both freedoms', () => {
    const { placement } = fit(document, { hold: [{ edge: [0, 0] }, { edge: [0, 5] }] });
    const { edges } = reported(placement);
    expect(edges[0].least).toBeCloseTo(6, 6);
    expect(edges[5].least).toBeCloseTo(6, 6);
  });

  test('to a keep-out’s edge keeps the row off the keep-out', () => {
    const { placement } = fit(document, { hold: [{ edge: [1, 0] }] });
    const { edges } = reported(placement);
    expect(edges.find(({ ring, edge }) => ring === 1 && edge === 0)!.least).toBeCloseTo(6, 6);
  });
});

describe('a hold between two edges', () => {
  const margins = (document: LayoutDocument, hold: FitHold[], pairs: [number, number][]) => {
    const { placement, wholeUnits } = fit(document, { hold });
    expect(wholeUnits).toBeGreaterThan(0);
    const profiles = gapProfile(layFloor({ ...document, placement }));
    for (const [one, other] of pairs) {
      expect(Math.abs(profiles[one].least! - profiles[other].least!)).toBeLessThanOrEqual(0.1);
    }
    return wholeUnits;
  };

  test.each([0, 45, 17])('makes their margins the same at a turn of %d°', (turn) => {
    margins(
      atTurn(turn),
      [
        {
          between: [
            [0, 0],
            [0, 4],
          ],
        },
      ],
      [[0, 4]],
    );
  });

  test('and two such hold both ways', () => {
    const hold: FitHold[] = [
      {
        between: [
          [0, 0],
          [0, 4],
        ],
      },
      {
        between: [
          [0, 5],
          [0, 1],
        ],
      },
    ];
    const units = margins(atTurn(0), hold, [
      [0, 4],
      [5, 1],
    ]);
    expect(units).toBeLessThanOrEqual(fit(atTurn(0)).wholeUnits);
  });
});

describe('a hold is refused', () => {
  test.each([
    [[{ edge: [0, 9] }], 'there is no edge 9 of the perimeter'],
    [[{ edge: [0, 0] }], 'a turn of 0° or 90° would do'],
    [
      [
        {
          between: [
            [0, 0],
            [0, 1],
          ],
        },
      ],
      'are not parallel',
    ],
    [
      [
        {
          between: [
            [0, 2],
            [0, 4],
          ],
        },
      ],
      'do not face each other',
    ],
    [
      [
        {
          between: [
            [0, 0],
            [0, 4],
          ],
        },
        {
          between: [
            [0, 0],
            [0, 2],
          ],
        },
      ],
      'the two holds are parallel',
    ],
  ] as [FitHold[], string][])('%j: %s', (hold, words) => {
    expect(fitRefusal(COURT, { hold })?.message).toContain(words);
    expect(() => fit(COURT, { hold })).toThrow(words);
  });

  test('at an arc, and with the turns that would do where units are askew', () => {
    const round = parsed(
      documentOf({
        ground: {
          perimeter: [
            [-2000, 0, 1],
            [2000, 0, 1],
          ],
          keepOuts: [],
        },
      }),
    );
    expect(fitRefusal(round, { hold: [{ edge: [0, 0] }] })?.message).toContain('is an arc');
    expect(fitRefusal(atTurn(20), { hold: [{ edge: [0, 1] }] })?.turns).toEqual([0, 90]);
  });
});

describe('a range of turns', () => {
  test('finds at each turn what the fit finds there, and the best of them', () => {
    const told: [number, number][] = [];
    const found = fit(COURT, {
      turn: { from: 0, to: 90, step: 15 },
      progress: ({ turn }, share) => told.push([turn, share]),
    });
    const turns = found.turns!;
    expect(told.slice(0, 7).map(([turn]) => turn)).toEqual([0, 15, 30, 45, 60, 75, 90]);
    expect(told.length).toBe(turns.length);
    expect(turns.map(({ turn }) => turn)).toEqual(
      turns.map(({ turn }) => turn).sort((a, b) => a - b),
    );
    for (const { turn, wholeUnits, play } of turns.filter(({ turn: at }) => at % 15 === 0)) {
      const alone = fit(atTurn(turn), { choices: false });
      expect(alone.wholeUnits).toBe(wholeUnits);
      expect(alone.play).toBeCloseTo(play!, 3);
    }
    expect(found.wholeUnits).toBe(Math.max(...turns.map(({ wholeUnits }) => wholeUnits)));
    expect(turns.find(({ turn }) => turn === found.placement.turn)!.wholeUnits).toBe(
      found.wholeUnits,
    );
  });

  test('passes over turns at which an edge cannot be held', () => {
    const found = fit(COURT, { turn: { from: 0, to: 90, step: 30 }, hold: [{ edge: [0, 0] }] });
    expect(found.turns!.map(({ turn }) => turn)).toEqual([0, 90]);
    expect(
      fitRefusal(COURT, { turn: { from: 10, to: 20, step: 5 }, hold: [{ edge: [0, 0] }] })?.hold,
    ).toBe(0);
  });

  test('can be gone through turn by turn, and stopped', () => {
    const steps = fitSteps(COURT, { turn: { from: 0, to: 10, step: 5 }, choices: false });
    expect(steps.next().value).toMatchObject({ turn: 0 });
    let asked = 0;
    expect(() =>
      fit(COURT, { turn: { from: 0, to: 90, step: 1 }, shouldStop: () => ++asked > 2 }),
    ).toThrow(FIT_STOPPED);
    expect(asked).toBe(3);
  });

  test('that is none is refused', () => {
    expect(rangeTurns({ from: 0, to: 0.3, step: 0.1 })).toEqual([0, 0.1, 0.2, 0.3]);
    expect(() => rangeTurns({ from: 0, to: 10, step: 0 })).toThrow('not a range');
    expect(() => rangeTurns({ from: 10, to: 0, step: 1 })).toThrow('not a range');
  });
});

test('a start is counted alike by the counter, the laying and the shift map', () => {
  const map = shiftMap(COURT, 60);
  const count = startCounter(COURT);
  for (let n = 0; n < 200; n++) {
    const origin: [number, number] = [(n * 137.7) % 3000, (n * 411.3) % 2500];
    expect(count(origin)).toBe(reported({ origin, turn: 45 }).wholeUnits);
  }
  const best = fit(COURT);
  expect(count(best.placement.origin)).toBe(best.wholeUnits);
  const [u, v] = shiftMapPlace(map, best.placement.origin);
  const column = Math.min(map.width - 1, Math.floor((u / map.pitch) * map.width));
  const row = Math.min(map.height - 1, Math.floor((v / map.rise) * map.height));
  expect(map.counts[row * map.width + column]).toBeLessThanOrEqual(best.wholeUnits);
  expect(map.most).toBeLessThanOrEqual(best.wholeUnits);
});

test('the outline of the best starts runs where their count ends', () => {
  const { most, outline } = bestFace(COURT);
  const best = fit(COURT);
  expect(most).toBe(best.wholeUnits);
  const map = shiftMap(COURT, 8);
  const [x0, y0] = map.from;
  const [dx, dy] = map.direction;
  const count = startCounter(COURT);
  const at = (u: number, v: number) => count([x0 + u * dx - v * dy, y0 + u * dy + v * dx]);
  expect(outline!.length).toBeGreaterThanOrEqual(3);
  outline!.forEach(([ax, ay], n) => {
    const [bx, by] = outline![(n + 1) % outline!.length];
    const size = Math.hypot(bx - ax, by - ay);
    const [mx, my] = [(ax + bx) / 2, (ay + by) / 2];
    // Anticlockwise: the best starts are on the left of each side.
    const [lx, ly] = [-(by - ay) / size, (bx - ax) / size];
    expect(at(mx + 0.001 * lx, my + 0.001 * ly)).toBe(most);
    expect(at(mx - 0.001 * lx, my - 0.001 * ly)).toBeLessThan(most);
  });
  expect(shiftMapPlace(map, best.placement.origin)[0]).toBeLessThan(map.pitch);
});
