import { z } from 'zod';
import type { Point } from '@/geometry/point';
import { cornerName, keepOutName } from '../edge-names';

/**
 * A tape survey, as a layout document keeps it: points, and tapes between them. Points are numbered
 * through: the corners of the perimeter, anticlockwise, then those of each keep-out, then pegs that
 * stand anywhere and only help to tape. Lengths in mm.
 */

export const GREATEST_SURVEY_POINTS = 80;
const GREATEST_TAPES = 400;
/** No tape is longer, mm. */
export const GREATEST_TAPE_MM = 200_000;

const point = z.number().int().min(0).lt(GREATEST_SURVEY_POINTS);
const length = z
  .number({ error: 'must be a number of millimetres' })
  .positive('must be more than 0 mm')
  .max(GREATEST_TAPE_MM, 'is over 200 m; lengths are in millimetres');
/** Rough places may lie as far from the origin as ground may, mm. */
const GREATEST_PLACE_MM = 100_000_000;
const coordinate = z.number().min(-GREATEST_PLACE_MM).max(GREATEST_PLACE_MM);

const tapeSchema = z.object({
  from: point,
  to: point,
  /** As read; without it the tape is still to be read. */
  length: length.optional(),
  /** Left out of account, though it is kept. */
  left: z.boolean().optional(),
});

const surveyRingSchema = z.object({
  /** Of a keep-out; the perimeter has none. */
  name: z.string().trim().min(1, 'needs a name').max(80).optional(),
  corners: z.number().int().min(3, 'needs at least 3 corners').max(GREATEST_SURVEY_POINTS),
});

/** The greatest rise of an arc over the straight line between its ends, mm; negative where it bends into the ring. */
const surveyArcSchema = z.object({
  ring: z.number().int().min(0),
  edge: z.number().int().min(0),
  rise: z.number().min(-GREATEST_TAPE_MM).max(GREATEST_TAPE_MM),
});

export const surveySchema = z
  .object({
    /** The perimeter, then keep-outs. */
    rings: z.array(surveyRingSchema).min(1).max(20),
    pegs: z.number().int().min(0).max(20).default(0),
    /** Where each point lies roughly, mm: tells which of two mirrored places is meant, nothing else. */
    sketch: z.array(z.tuple([coordinate, coordinate])),
    tapes: z.array(tapeSchema).max(GREATEST_TAPES),
    arcs: z.array(surveyArcSchema).max(GREATEST_SURVEY_POINTS).default([]),
  })
  .superRefine(({ rings, pegs, sketch, tapes, arcs }, issue) => {
    const points = rings.reduce((sum, { corners }) => sum + corners, 0) + pegs;
    if (points > GREATEST_SURVEY_POINTS)
      issue.addIssue({
        code: 'custom',
        path: ['rings'],
        message: `has ${points} points; a survey may have ${GREATEST_SURVEY_POINTS}`,
      });
    if (sketch.length !== points)
      issue.addIssue({
        code: 'custom',
        path: ['sketch'],
        message: `has ${sketch.length} places for ${points} points`,
      });
    tapes.forEach(({ from, to }, n) => {
      if (from >= points || to >= points || from === to)
        issue.addIssue({
          code: 'custom',
          path: ['tapes', n],
          message: 'must run between two different points of the survey',
        });
    });
    arcs.forEach(({ ring, edge }, n) => {
      if (ring >= rings.length || edge >= rings[ring].corners)
        issue.addIssue({
          code: 'custom',
          path: ['arcs', n],
          message: 'is on no side of the survey',
        });
    });
  });

export type Survey = z.infer<typeof surveySchema>;
export type SurveyRing = z.infer<typeof surveyRingSchema>;
export type Tape = z.infer<typeof tapeSchema>;

/** A tape that was read and is taken into account. */
export interface ReadTape {
  /** Its place in the survey's list. */
  readonly tape: number;
  readonly from: number;
  readonly to: number;
  readonly length: number;
}

export const readTapes = ({ tapes }: Pick<Survey, 'tapes'>): ReadTape[] =>
  tapes.flatMap(({ from, to, length, left }, tape) =>
    length === undefined || left ? [] : [{ tape, from, to, length }],
  );

/** The number of the first corner of each ring, and last that of the first peg. */
export function ringStarts({ rings }: Pick<Survey, 'rings'>): number[] {
  const starts = [0];
  for (const { corners } of rings) starts.push(starts[starts.length - 1] + corners);
  return starts;
}

export const surveyPointCount = (survey: Pick<Survey, 'rings' | 'pegs'>): number =>
  ringStarts(survey)[survey.rings.length] + survey.pegs;

/** `A`, `K1a`, `P1`: corners are lettered as on the drawings. */
export function surveyPointName(survey: Pick<Survey, 'rings' | 'pegs'>, point: number): string {
  const starts = ringStarts(survey);
  for (let ring = 0; ring < survey.rings.length; ring++) {
    if (point >= starts[ring + 1]) continue;
    const corner = cornerName(ring, point - starts[ring]);
    return ring === 0 ? corner : keepOutName(ring) + corner;
  }
  return `P${point - starts[survey.rings.length] + 1}`;
}

export const tapeName = (
  survey: Pick<Survey, 'rings' | 'pegs'>,
  { from, to }: Pick<Tape, 'from' | 'to'>,
): string => `${surveyPointName(survey, from)} – ${surveyPointName(survey, to)}`;

/** Corners in a regular ring, anticlockwise from the lower left, as wide as `size` mm or so. */
export function regularSketch(corners: number, size: number): [number, number][] {
  return Array.from({ length: corners }, (_, n) => {
    const angle = ((n - 0.5) / corners) * 2 * Math.PI - Math.PI / 2;
    const at = (value: number) => Math.round((value * size) / 2);
    return [at(Math.cos(angle)), at(Math.sin(angle))];
  });
}

/**
 * The tapes that fix a perimeter well: every side, and each corner from the first two, as a floor is
 * set out. For 4 corners that is the sides and both diagonals; it leaves corners − 3 tapes to check by.
 */
export function usualTapes(corners: number): Tape[] {
  const tapes: Tape[] = [];
  for (let n = 0; n < corners; n++) tapes.push({ from: n, to: (n + 1) % corners });
  for (const from of [0, 1])
    for (let to = from + 2; to < corners; to++)
      if ((to + 1) % corners !== from) tapes.push({ from, to });
  return tapes;
}

/** A survey of a ground still to be taped, from how it is drawn. */
export function surveyOf(
  perimeter: readonly Point[],
  keepOuts: readonly { readonly name: string; readonly ring: readonly Point[] }[] = [],
): Survey {
  const rings: SurveyRing[] = [{ corners: perimeter.length }];
  const sketch: [number, number][] = perimeter.map(([x, y]) => [x, y]);
  const tapes = usualTapes(perimeter.length);
  for (const { name, ring } of keepOuts) {
    const start = sketch.length;
    rings.push({ name, corners: ring.length });
    ring.forEach(([x, y], n) => {
      sketch.push([x, y]);
      for (const from of nearestTwo(perimeter, [x, y])) tapes.push({ from, to: start + n });
    });
    ring.forEach((_, n) => tapes.push({ from: start + n, to: start + ((n + 1) % ring.length) }));
  }
  return { rings, pegs: 0, sketch, tapes, arcs: [] };
}

/** The two corners that a point is best taped from: as near to square as any two can be. */
function nearestTwo(perimeter: readonly Point[], [x, y]: Point): number[] {
  let best = [0, 1];
  let most = -1;
  for (let a = 0; a < perimeter.length; a++)
    for (let b = a + 1; b < perimeter.length; b++) {
      const [ax, ay] = [perimeter[a][0] - x, perimeter[a][1] - y];
      const [bx, by] = [perimeter[b][0] - x, perimeter[b][1] - y];
      const size = Math.hypot(ax, ay) * Math.hypot(bx, by);
      // Square, and near: tapes are short and seldom in each other's way.
      const worth = size > 0 ? (ax * by - ay * bx) ** 2 / size ** 2 / Math.sqrt(size) : -1;
      if (worth > most) {
        most = worth;
        best = [a, b];
      }
    }
  return best;
}
