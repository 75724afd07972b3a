import type { Point } from '@/geometry/point';
import { arcRise, vertexBulge, vertexPoint } from '../ground-edits';
import type { LayoutDocument } from '../layout-document';
import { regularSketch, ringStarts, surveyOf, usualTapes, type Survey, type Tape } from './survey';

/** How wide a ground is drawn of which nothing is known yet, mm. */
const ROUGH_SIZE_MM = 6000;

/** A survey of the ground as drawn; its arcs are kept. */
export function groundSurvey({ ground }: Pick<LayoutDocument, 'ground'>): Survey {
  const rings = [ground.perimeter, ...ground.keepOuts.map(({ ring }) => ring)];
  const survey = surveyOf(
    ground.perimeter.map(vertexPoint),
    ground.keepOuts.map(({ name, ring }) => ({ name, ring: ring.map(vertexPoint) })),
  );
  const arcs = rings.flatMap((ring, n) =>
    ring.flatMap((vertex, edge) =>
      vertexBulge(vertex) === 0 ? [] : [{ ring: n, edge, rise: arcRise(ring, edge) }],
    ),
  );
  return { ...survey, arcs };
}

/** A survey of a ground with so many corners, of which nothing is known yet. */
export const freshSurvey = (corners: number): Survey => ({
  rings: [{ corners }],
  pegs: 0,
  sketch: regularSketch(corners, ROUGH_SIZE_MM),
  tapes: usualTapes(corners),
  arcs: [],
});

const tapeChanged = (survey: Survey, index: number, change: (tape: Tape) => Tape): Survey => ({
  ...survey,
  tapes: survey.tapes.map((tape, n) => (n === index ? change(tape) : tape)),
});

/** With a tape's reading, mm; null rubs it out. */
export const tapeReadAs = (survey: Survey, index: number, length: number | null): Survey =>
  tapeChanged(survey, index, ({ from, to, left }) => ({
    from,
    to,
    ...(length === null ? {} : { length }),
    ...(left && length !== null ? { left } : {}),
  }));

/** A tape left out of account, or taken back into it. */
export const tapeLeftOut = (survey: Survey, index: number, left: boolean): Survey =>
  tapeChanged(survey, index, ({ from, to, length }) => ({
    from,
    to,
    ...(length === undefined ? {} : { length }),
    ...(left ? { left } : {}),
  }));

export const tapeTakenAway = (survey: Survey, index: number): Survey => ({
  ...survey,
  tapes: survey.tapes.filter((_, n) => n !== index),
});

/** The place in the list of the tape between two points; −1 where there is none. */
export const tapeBetween = ({ tapes }: Survey, from: number, to: number): number =>
  tapes.findIndex(
    (tape) => (tape.from === from && tape.to === to) || (tape.from === to && tape.to === from),
  );

/** With a tape more, still to be read; as it was where there is one already. */
export const tapeAdded = (survey: Survey, from: number, to: number): Survey =>
  from === to || tapeBetween(survey, from, to) >= 0
    ? survey
    : { ...survey, tapes: [...survey.tapes, { from, to }] };

/** With a peg beside the ground, and tapes to it from the first two corners. */
export function pegAdded(survey: Survey): Survey {
  const peg = survey.sketch.length;
  const low = Math.min(...survey.sketch.map(([, y]) => y));
  const across = survey.sketch.reduce((sum, [x]) => sum + x, 0) / peg;
  return {
    ...survey,
    pegs: survey.pegs + 1,
    sketch: [...survey.sketch, [across, low - ROUGH_SIZE_MM / 4]],
    tapes: [...survey.tapes, { from: 0, to: peg }, { from: 1, to: peg }],
  };
}

/** Without the last peg and its tapes. */
export function pegTakenAway(survey: Survey): Survey {
  if (survey.pegs === 0) return survey;
  const peg = survey.sketch.length - 1;
  return {
    ...survey,
    pegs: survey.pegs - 1,
    sketch: survey.sketch.slice(0, peg),
    tapes: survey.tapes.filter(({ from, to }) => from !== peg && to !== peg),
  };
}

/** The rise of a side over the straight line between its ends, mm; 0 makes it straight. */
export function sideBent(survey: Survey, ring: number, edge: number, rise: number): Survey {
  const others = survey.arcs.filter((arc) => arc.ring !== ring || arc.edge !== edge);
  return { ...survey, arcs: rise === 0 ? others : [...others, { ring, edge, rise }] };
}

/**
 * With the letters of every ring run round the other way, the first corner of each kept: for tapes that were
 * read to corners lettered clockwise. The readings go with their corners, so that the ground is mirrored.
 */
export function lettersTurned(survey: Survey): Survey {
  const starts = ringStarts(survey);
  const turned = (point: number): number => {
    const ring = survey.rings.findIndex((_, n) => point < starts[n + 1]);
    if (ring < 0) return point;
    const { corners } = survey.rings[ring];
    return starts[ring] + ((corners - (point - starts[ring])) % corners);
  };
  return {
    ...survey,
    tapes: survey.tapes.map((tape) => {
      const [from, to] = [turned(tape.to), turned(tape.from)];
      // Sides are named as they run, tapes across by the first letter.
      const ordered = tapeSide(survey, tape) !== null || from < to;
      return { ...tape, from: ordered ? from : to, to: ordered ? to : from };
    }),
    arcs: survey.arcs.map((arc) => ({
      ...arc,
      edge: survey.rings[arc.ring].corners - 1 - arc.edge,
    })),
  };
}

/** The ring and edge that a tape lies along; null for one that runs across. */
export function tapeSide(
  survey: Survey,
  { from, to }: Tape,
): { ring: number; edge: number } | null {
  const starts = ringStarts(survey);
  for (let ring = 0; ring < survey.rings.length; ring++) {
    const { corners } = survey.rings[ring];
    const a = from - starts[ring];
    const b = to - starts[ring];
    if (Math.min(a, b) < 0 || Math.max(a, b) >= corners) continue;
    if ((a + 1) % corners === b) return { ring, edge: a };
    if ((b + 1) % corners === a) return { ring, edge: b };
  }
  return null;
}

/** Another shape that the tapes allow as well taken for the one that is meant, mm. */
export const shapeTaken = (survey: Survey, places: readonly Point[]): Survey => ({
  ...survey,
  sketch: places.map(([x, y]) => [x, y]),
});
