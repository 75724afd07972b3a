import { z } from 'zod';
import type { DocumentProblem } from './document-problem';

/**
 * Levels of a floor, as the document keeps them. Every level is in millimetres above the **datum**,
 * the perimeter's top, which is taken as level all round; below it they are negative. Falls are
 * in per cent: millimetres down for each 100 mm along.
 */

/** No level lies farther than this from the datum, mm. */
export const GREATEST_LEVEL_MM = 10_000;
/** Units stand proud of the finish by no more than this before they are compacted, mm. */
export const GREATEST_PROUD_MM = 100;
/** As far from the origin as any coordinate of a document, mm. */
const GREATEST_PLACE_MM = 100_000_000;
/** More spots than this are a survey for another program. */
export const GREATEST_SPOTS = 2000;
/** Spots nearer to one another than this, mm, are one place measured twice. */
export const SPOT_SPACING_MM = 1;
/** A steeper floor than this, per cent, is a stair or a slip of the finger. */
export const GREATEST_FALL_PERCENT = 25;

const level = z
  .number({ error: 'must be a number of millimetres above the datum' })
  .min(-GREATEST_LEVEL_MM, 'is over 10 m below the edge; levels are in millimetres')
  .max(GREATEST_LEVEL_MM, 'is over 10 m above the edge; levels are in millimetres');

const percent = z
  .number({ error: 'must be a number of per cent' })
  .positive('must be more than 0 %; a floor that falls nowhere has the fall "none"')
  .max(GREATEST_FALL_PERCENT, `is steeper than ${GREATEST_FALL_PERCENT} %`);

const place = z
  .number({ error: 'must be a number of millimetres' })
  .min(-GREATEST_PLACE_MM, 'lies more than 100 km from the origin')
  .max(GREATEST_PLACE_MM, 'lies more than 100 km from the origin');
const at = z.tuple([place, place]);

const direction = z.number({ error: 'must be a number of degrees' }).min(-3600).max(3600);

const fallSchema = z.discriminatedUnion(
  'kind',
  [
    z.object({ kind: z.literal('none') }),
    /** One plane, down towards `direction`, degrees anticlockwise from the x axis. */
    z.object({ kind: z.literal('oneWay'), direction, percent }),
    /**
     * Four planes of the same fall that meet in the point, each falling square to `direction` or along
     * it, with straight creases between them: what straight boards can screed.
     */
    z.object({ kind: z.literal('toPoint'), at, direction: direction.default(0), percent }),
    /** Two planes down to the line through both points, on and on. */
    z.object({ kind: z.literal('toLine'), from: at, to: at, percent }),
  ],
  { error: 'must be one of none, oneWay, toPoint or toLine' },
);

/** A place where the existing ground was measured. */
export const spotSchema = z.object({
  name: z.string().trim().min(1).max(40).optional(),
  at,
  /** Of the existing ground there. */
  level,
});

/** Finish, fall and the ground as it is. */
export const levelsSchema = z.object({
  /** Of the finished floor where it is highest; 0 is flush with the edge's top. */
  finish: level.default(0),
  fall: fallSchema.default({ kind: 'none' }),
  /** How far the units stand above the finish until they are compacted, mm. */
  proud: z
    .number({ error: 'must be a number of millimetres' })
    .min(0, 'must be 0 mm or more')
    .max(GREATEST_PROUD_MM, `is over ${GREATEST_PROUD_MM} mm`)
    .default(0),
  /** Measured levels of the existing ground, in the order in which they were taken. */
  spots: z.array(spotSchema).max(GREATEST_SPOTS, `are more than ${GREATEST_SPOTS}`).default([]),
});

export type Fall = z.infer<typeof fallSchema>;
export type Spot = z.infer<typeof spotSchema>;
export type Levels = z.infer<typeof levelsSchema>;

/** What a document without levels stands for: a flat floor flush with the edge, no spots taken. */
const PLAIN_LEVELS: Levels = levelsSchema.parse({});

/** The levels of a document, or what stands for one that says nothing. */
export const documentLevels = (document: { readonly levels?: Levels }): Levels =>
  document.levels ?? PLAIN_LEVELS;

/** Pairs of spots at one place, by index, the first such pair of each. */
export function spotClashes(spots: readonly Spot[]): (readonly [first: number, second: number])[] {
  const seen = new Map<string, number[]>();
  const cell = (value: number) => Math.floor(value / SPOT_SPACING_MM);
  const clashes: [number, number][] = [];
  spots.forEach(({ at: [x, y] }, n) => {
    let clash = -1;
    for (let i = cell(x) - 1; i <= cell(x) + 1; i++)
      for (let j = cell(y) - 1; j <= cell(y) + 1; j++)
        for (const m of seen.get(`${i},${j}`) ?? []) {
          const [mx, my] = spots[m].at;
          if (clash < 0 && Math.hypot(mx - x, my - y) < SPOT_SPACING_MM) clash = m;
        }
    if (clash >= 0) clashes.push([clash, n]);
    const key = `${cell(x)},${cell(y)}`;
    seen.set(key, [...(seen.get(key) ?? []), n]);
  });
  return clashes;
}

/** What the levels of a document must satisfy together. */
export function levelProblems({ levels }: { readonly levels?: Levels }): DocumentProblem[] {
  if (!levels) return [];
  const { fall, spots } = levels;
  const problems: DocumentProblem[] = spotClashes(spots).map(([first, second]) => ({
    path: ['levels', 'spots', second, 'at'],
    message: `is the same place as that of spot ${first + 1}; keep one of the two, or move one of them`,
    at: spots[second].at,
  }));
  if (
    fall.kind === 'toLine' &&
    Math.hypot(fall.to[0] - fall.from[0], fall.to[1] - fall.from[1]) < SPOT_SPACING_MM
  ) {
    problems.push({
      path: ['levels', 'fall', 'to'],
      message: 'is the same place as from; a line needs two places apart',
      at: fall.to,
    });
  }
  return problems;
}
