import type { DrawCommand, PaperPoint, PathRing } from './drawing';
import { boxRing } from './drawing';
import type { Outline } from './edge-dimensions';
import { PART_STROKE } from './part-stroke';
import type { LabelPlace, WantedLabel } from './plan-labels';
import type { PlanPart } from './plan-parts';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';

const partRing = ({ ground: { least, greatest } }: PlanPart, view: PlanView): PathRing => {
  const [left, bottom] = paperFromGround(view, least);
  const [right, top] = paperFromGround(view, greatest);
  return boxRing({ left, top, right, bottom });
};

/** Between parts, as far as the ground reaches. */
export function partLines(
  parts: readonly PlanPart[],
  { points }: Outline,
  view: PlanView,
): readonly DrawCommand[] {
  const [xs, ys] = [points.map(([x]) => x), points.map(([, y]) => y)];
  const within = (value: number, all: readonly number[]) =>
    Math.min(Math.max(value, Math.min(...all)), Math.max(...all));
  return parts.flatMap((part): DrawCommand[] => {
    const [from, , to] = partRing(part, view).points;
    const [left, right] = [within(from[0], xs), within(to[0], xs)];
    const [top, bottom] = [within(from[1], ys), within(to[1], ys)];
    const line = (start: PaperPoint, end: PaperPoint): DrawCommand => ({
      kind: 'line',
      from: start,
      to: end,
      stroke: PART_STROKE,
    });
    return [
      ...(part.right === null ? [] : [line([right, top], [right, bottom])]),
      ...(part.below === null ? [] : [line([left, bottom], [right, bottom])]),
    ];
  });
}

/** A part's name about its middle. */
export const partLabel =
  (view: PlanView) =>
  (part: PlanPart): WantedLabel => {
    const { points } = partRing(part, view);
    const [left, top] = points[0];
    const [right, bottom] = points[2];
    const shares = [0.5, 0.35, 0.65, 0.2, 0.8];
    return {
      text: part.name,
      weight: 700,
      places: shares.flatMap((down) =>
        shares.map((along): LabelPlace => ({
          middle: [left + (right - left) * along, top + (bottom - top) * down],
          turnDeg: 0,
          plate: true,
        })),
      ),
    };
  };
