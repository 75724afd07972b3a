import { surfaceHeight } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { documentBuildUp } from '@/paving/build-up';
import { cornerName } from '@/paving/edge-names';
import { finishSurface } from '@/paving/finish-level';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { buildUpDepth, earthModel, thickestUnit, type EarthModel } from './earth-cells';

/** A peg with its levels, mm above the datum: what a string, a board and a digger go by. */
export interface PegLevel {
  /** A corner's letter; `Low` and `High` with a number where there are several. */
  readonly name: string;
  readonly kind: 'corner' | 'high' | 'low';
  readonly at: Point;
  /** Of the finished floor, compacted: where the string goes. */
  readonly finish: number;
  /** Of the units as laid, before they are compacted. */
  readonly laid: number;
  /** Of the bedding as screeded. */
  readonly screeded: number;
  /** Of the base, compacted. */
  readonly base: number;
  /** Of the bottom of the dig. */
  readonly formation: number;
  /** Of the ground as it is; null where no spot was taken. */
  readonly existing: number | null;
  /** To dig, mm; negative: to be made up with base. Null where no spot was taken. */
  readonly dig: number | null;
}

/** Places nearer to a corner than this, mm, are that corner. */
const SAME_PEG_MM = 5;

/** Where the line of a fall to a line crosses the outline. */
function lineCrossings(from: Point, to: Point, outline: readonly Point[]): Point[] {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const side = ([x, y]: Point) => dx * (y - from[1]) - dy * (x - from[0]);
  return outline.flatMap((start, n): Point[] => {
    const end = outline[(n + 1) % outline.length];
    const [a, b] = [side(start), side(end)];
    if (a < 0 === b < 0) return [];
    const t = a / (a - b);
    return [[start[0] + t * (end[0] - start[0]), start[1] + t * (end[1] - start[1])]];
  });
}

/** Low and high places of the finish that are no corners of the perimeter. */
function extremes(
  document: LayoutDocument,
  outline: readonly Point[],
  level: (at: Point) => number,
): { readonly kind: 'high' | 'low'; readonly at: Point }[] {
  const { fall } = documentLevels(document);
  if (fall.kind === 'none') return [];
  const along = [...outline].sort((p, q) => level(p) - level(q));
  const high = { kind: 'high' as const, at: along[along.length - 1] };
  switch (fall.kind) {
    case 'oneWay':
      return [{ kind: 'low', at: along[0] }, high];
    case 'toPoint':
      return [{ kind: 'low', at: ringHolds(outline, fall.at) ? fall.at : along[0] }, high];
    case 'toLine': {
      const crossings = lineCrossings(fall.from, fall.to, outline);
      const low = crossings.length > 0 ? crossings : [along[0]];
      return [...low.map((at) => ({ kind: 'low' as const, at })), high];
    }
  }
}

/** The pegs of a floor: every corner of the perimeter, then where it is lowest and highest if that is elsewhere. */
export function pegLevels(
  document: LayoutDocument,
  model: EarthModel = earthModel(document),
): PegLevel[] {
  const { proud } = documentLevels(document);
  const { bedding } = documentBuildUp(document);
  const [{ outline, edges }] = model.ground.rings;
  const finish = finishSurface(document);
  const thickness = thickestUnit(document);
  const below = buildUpDepth(document);
  const level = (at: Point) => surfaceHeight(finish, at);
  const places: { name: string; kind: PegLevel['kind']; at: Point }[] = edges.map(
    ({ start }, n) => ({ name: cornerName(0, n), kind: 'corner', at: start }),
  );
  const others = extremes(document, outline, level).filter(
    ({ at }) =>
      !edges.some(({ start }) => Math.hypot(start[0] - at[0], start[1] - at[1]) < SAME_PEG_MM),
  );
  for (const kind of ['low', 'high'] as const) {
    const same = others.filter((other) => other.kind === kind);
    const word = kind === 'low' ? 'Low' : 'High';
    same.forEach(({ at }, n) =>
      places.push({ name: same.length > 1 ? `${word} ${n + 1}` : word, kind, at }),
    );
  }
  return places.map(({ name, kind, at }) => {
    const here = level(at);
    const formation = here - below;
    const existing =
      model.existing.shape === 'none' ? null : surfaceHeight(model.existing.surface, at);
    return {
      name,
      kind,
      at,
      finish: here,
      laid: here + proud,
      screeded: here + proud - thickness,
      base: here - thickness - bedding,
      formation,
      existing,
      dig: existing === null ? null : existing - formation,
    };
  });
}
