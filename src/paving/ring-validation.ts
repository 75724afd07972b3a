import { edgeName } from './edge-names';
import { arcIsStraight, arcSegmentArea, arcSteps } from '@/geometry/arc';
import { regionClip } from '@/geometry/clipping';
import type { Point } from '@/geometry/point';
import { ringArea, ringHolds } from '@/geometry/ring';
import {
  pointSegmentDistance,
  segmentPairs,
  segmentsCross,
  segmentsTouch,
  type OwnedSegment,
} from '@/geometry/segment-pairs';
import { ARC_SAGITTA_MM, AREA_TOLERANCE_MM2, LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { shownPlace, type DocumentProblem } from './document-problem';
import { groundRing, ringEdges, type GroundRing } from './ground';
import type { LayoutDocument, Vertex } from './layout-document';

/** The ground of one document may come to this many chords, arcs flattened. */
const GREATEST_CHORDS = 50_000;

/** Area inside a ring with its arcs, mm², positive when it runs anticlockwise. */
export function vertexRingArea(ring: readonly Vertex[]): number {
  const corners = ring.map((vertex): Point => [vertex[0], vertex[1]]);
  return ringEdges(ring).reduce(
    (sum, { start, end, bulge }) => sum + arcSegmentArea(start, end, bulge),
    ringArea(corners),
  );
}

/**
 * The ring anticlockwise. One that runs clockwise is turned about its first corner, which stays
 * the first; each arc goes with its edge, and bulges the other way as it is now run backwards.
 */
export function ringAnticlockwise(ring: readonly Vertex[]): Vertex[] {
  if (vertexRingArea(ring) >= 0) return ring.map((vertex) => [...vertex] as Vertex);
  const count = ring.length;
  return ring.map((_, n): Vertex => {
    const corner = ring[(count - n) % count];
    const before = ring[(2 * count - n - 1) % count];
    const bulge = before.length === 3 ? -before[2] : 0;
    return bulge === 0 ? [corner[0], corner[1]] : [corner[0], corner[1], bulge];
  });
}

/** The rings of a document with the path of each. */
function pathedRings(ground: LayoutDocument['ground']) {
  return [
    { vertices: ground.perimeter, path: ['ground', 'perimeter'] as (string | number)[] },
    ...ground.keepOuts.map((keepOut, n) => ({
      vertices: keepOut.ring,
      path: ['ground', 'keepOuts', n, 'ring'] as (string | number)[],
    })),
  ];
}

/** Corners that repeat, and outlines too fine to work with. */
function cornerProblems(ground: LayoutDocument['ground']): DocumentProblem[] {
  const problems: DocumentProblem[] = [];
  let chords = 0;
  for (const { vertices, path } of pathedRings(ground)) {
    ringEdges(vertices).forEach(({ start, end, bulge }, n) => {
      if (Math.hypot(end[0] - start[0], end[1] - start[1]) <= LENGTH_TOLERANCE_MM) {
        const last = n === vertices.length - 1;
        problems.push({
          path: [...path, last ? n : n + 1],
          message: last
            ? `repeats the first corner, ${shownPlace(start)}; a ring closes by itself, so leave the last corner out`
            : `repeats the corner before it, ${shownPlace(end)}; leave one of the two out`,
          at: start,
        });
      } else {
        chords += arcIsStraight(start, end, bulge) ? 1 : arcSteps(start, end, bulge, 'tangent') + 1;
      }
    });
  }
  if (chords > GREATEST_CHORDS) {
    problems.push({
      path: ['ground'],
      message: `has outlines of about ${chords} straight pieces, arcs included; at most ${GREATEST_CHORDS} can be laid to, so leave out corners or split the floor`,
    });
  }
  return problems;
}

function ringSegments(ring: GroundRing): OwnedSegment[] {
  return ring.edges.flatMap(({ chords, edge }) =>
    chords.slice(1).map((b, n) => ({ a: chords[n], b, ring: ring.ring, edge })),
  );
}

/** True when the chain a → b → c folds back along itself. */
function foldsBack(a: Point, b: Point, c: Point): boolean {
  const ahead = (b[0] - a[0]) * (c[0] - b[0]) + (b[1] - a[1]) * (c[1] - b[1]);
  if (ahead >= 0) return false;
  const shorter = Math.hypot(a[0] - b[0], a[1] - b[1]) < Math.hypot(c[0] - b[0], c[1] - b[1]);
  return (
    (shorter ? pointSegmentDistance(a, b, c) : pointSegmentDistance(c, a, b)) <= LENGTH_TOLERANCE_MM
  );
}

function tooIntricate(path: (string | number)[]): DocumentProblem {
  return {
    path,
    message:
      'has too many long edges side by side to be checked for crossings; leave out corners, or split the floor',
  };
}

/** So many crossings of a ring are told at most. */
const MOST_CROSSINGS = 8;

/** Where one ring crosses itself; else the first place where it touches or folds back on itself. */
function ringFaults(ring: GroundRing, path: (string | number)[]): DocumentProblem[] {
  const segments = ringSegments(ring);
  const edgeCount = ring.edges.length;
  let touching: DocumentProblem | null = null;
  const crossings: DocumentProblem[] = [];
  for (let n = 0; n < segments.length && !touching; n++) {
    const next = segments[n + 1 === segments.length ? 0 : n + 1];
    if (foldsBack(segments[n].a, segments[n].b, next.b)) {
      touching = {
        path: [...path, next.edge],
        message: `folds back along itself at ${shownPlace(next.a)}; move the corner so that the two edges part`,
        at: next.a,
      };
    }
  }
  const checked = segmentPairs(segments, LENGTH_TOLERANCE_MM, (m, n) => {
    const one = segments[m];
    const other = segments[n];
    const apart = Math.abs(m - n);
    if (apart === 1 || apart === segments.length - 1) return false;
    const at = segmentsCross(one.a, one.b, other.a, other.b);
    if (at) {
      const [first, second] = [one.edge, other.edge].sort((p, q) => p - q);
      crossings.push({
        path,
        message: `crosses itself at ${shownPlace(at)}, where edge ${edgeName(ring.ring, first, edgeCount)} meets edge ${edgeName(ring.ring, second, edgeCount)}; move a corner so that they part`,
        at,
      });
      return crossings.length >= MOST_CROSSINGS;
    }
    // Chords of one edge or of neighbours come near each other where they join; only those of
    // edges apart can touch by mistake.
    const edgesApart = Math.abs(one.edge - other.edge);
    const neighbours = edgesApart <= 1 || edgesApart === edgeCount - 1;
    const near = segmentsTouch(
      one.a,
      one.b,
      other.a,
      other.b,
      neighbours ? 0 : LENGTH_TOLERANCE_MM,
    );
    if (near && !touching) {
      touching = {
        path,
        message: `touches itself at ${shownPlace(near)}; move a corner so that the ring stays clear of itself`,
        at: near,
      };
    }
    return false;
  });
  if (crossings.length > 0) return crossings;
  if (touching) return [touching];
  return checked ? [] : [tooIntricate(path)];
}

/** Keep-outs that cross or leave the perimeter, or overlap each other, by more than 1 mm². */
function keepOutProblems(
  rings: readonly GroundRing[],
  ground: LayoutDocument['ground'],
): DocumentProblem[] {
  const problems: DocumentProblem[] = [];
  const meets = new Map<string, Point>();
  const crossed = new Set<string>();
  const segments = rings.flatMap(ringSegments);
  const checked = segmentPairs(segments, LENGTH_TOLERANCE_MM, (m, n) => {
    const one = segments[m];
    const other = segments[n];
    if (one.ring === other.ring) return false;
    const key = `${Math.min(one.ring, other.ring)} ${Math.max(one.ring, other.ring)}`;
    if (crossed.has(key)) return false;
    const cross = segmentsCross(one.a, one.b, other.a, other.b);
    if (cross) crossed.add(key);
    const at =
      cross ??
      (meets.has(key) ? null : segmentsTouch(one.a, one.b, other.a, other.b, LENGTH_TOLERANCE_MM));
    if (at) meets.set(key, at);
    return false;
  });
  if (!checked) return [tooIntricate(['ground'])];
  // Two arcs drawn along each other part by a sagitta either side once they are flattened.
  const allowance = (ring: GroundRing) =>
    ring.edges.reduce(
      (sum, { bulge, length }) => (bulge === 0 ? sum : sum + 2 * ARC_SAGITTA_MM * length),
      AREA_TOLERANCE_MM2,
    );
  const named = (ring: number) => `"${ground.keepOuts[ring - 1].name}"`;
  const box = rings.map(({ outline }) => {
    const xs = outline.map(([x]) => x);
    const ys = outline.map(([, y]) => y);
    const least = (all: number[]) => all.reduce((p, q) => Math.min(p, q));
    const greatest = (all: number[]) => all.reduce((p, q) => Math.max(p, q));
    return [least(xs), least(ys), greatest(xs), greatest(ys)];
  });
  for (let ring = 1; ring < rings.length; ring++) {
    const path = ['ground', 'keepOuts', ring - 1, 'ring'];
    const { outline } = rings[ring];
    const allowed = allowance(rings[ring]);
    const touch = meets.get(`0 ${ring}`);
    const outside = () =>
      problems.push({
        path,
        message: `${named(ring)} lies outside the perimeter; move it inside or remove it`,
        at: outline[0],
      });
    if (!touch) {
      if (!ringHolds(rings[0].outline, outline[0])) outside();
    } else {
      const beyond = regionClip('difference', [[outline]], [[[rings[0].outline]]]);
      if (beyond.ok && beyond.area > rings[ring].area - allowed) outside();
      else if (!beyond.ok || beyond.area > allowed) {
        const at = beyond.ok ? touch : beyond.at;
        problems.push({
          path,
          message: `${named(ring)} crosses the perimeter near ${shownPlace(at)}; keep it inside (it may touch the edge), or draw the perimeter round it`,
          at,
        });
      }
    }
    for (let other = 1; other < ring; other++) {
      const [p, q] = [box[ring], box[other]];
      if (p[0] > q[2] || q[0] > p[2] || p[1] > q[3] || q[1] > p[3]) continue;
      const at = meets.get(`${other} ${ring}`);
      const across = rings[other].outline;
      if (!at) {
        if (ringHolds(across, outline[0]) || ringHolds(outline, across[0])) {
          problems.push({
            path,
            message: `${named(ring)} and ${named(other)} lie one inside the other; remove the inner one`,
            at: outline[0],
          });
        }
        continue;
      }
      const shared = regionClip('intersection', [[outline]], [[[across]]]);
      if (!shared.ok || shared.area > Math.max(allowed, allowance(rings[other]))) {
        problems.push({
          path,
          message: `${named(ring)} overlaps ${named(other)} near ${shownPlace(at)}; move them apart (they may touch), or draw them as one`,
          at,
        });
      }
    }
  }
  return problems;
}

/**
 * Everything wrong with the rings of a document whose shape is right: rings that are no ring,
 * cross or touch themselves, and keep-outs that are not within the perimeter and apart. Rings
 * are handed in anticlockwise, and are checked as they are laid to, arcs flattened.
 */
export function ringProblems(ground: LayoutDocument['ground']): DocumentProblem[] {
  const corners = cornerProblems(ground);
  if (corners.length > 0) return corners;
  const problems: DocumentProblem[] = [];
  const rings = pathedRings(ground).map(({ vertices, path }, n) => {
    const ring = groundRing(vertices, n, null);
    const found = ringFaults(ring, path);
    problems.push(...found);
    if (found.length > 0) return ring;
    if (!(ring.area > AREA_TOLERANCE_MM2)) {
      problems.push({
        path,
        message: 'has no area; place its corners so that they enclose some ground',
        at: ring.outline[0],
      });
    }
    return ring;
  });
  return problems.length > 0 ? problems : keepOutProblems(rings, ground);
}
