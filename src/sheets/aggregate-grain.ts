import type { Laying } from '@/paving/laying';
import { unitAt } from '@/paving/unit-at';
import type { DrawCommand, PaperPoint, PathRing } from './drawing';
import type { Outline } from './edge-dimensions';
import { isInside } from './label-space';
import type { PlanView } from './plan-view';
import { groundFromPaper } from './plan-view';

/**
 * A grain that tells aggregate from units without colour: small three-cornered stones on a jittered
 * grid, over the ground but not under laid units. The same floor always gets the same grain.
 */
export function grainCommands(
  laying: Laying,
  view: PlanView,
  rings: readonly Outline[],
  grain: { readonly spacing: number; readonly size: number; readonly colour: string },
): readonly DrawCommand[] {
  const [perimeter, ...keepOuts] = rings;
  const xs = perimeter.points.map(([x]) => x);
  const ys = perimeter.points.map(([, y]) => y);
  const [left, right] = [Math.min(...xs), Math.max(...xs)];
  const [top, bottom] = [Math.min(...ys), Math.max(...ys)];
  const stones: PathRing[] = [];
  const columns = Math.floor((right - left) / grain.spacing);
  const rows = Math.floor((bottom - top) / grain.spacing);
  for (let row = 0; row <= rows; row += 1) {
    for (let column = 0; column <= columns; column += 1) {
      const at: PaperPoint = [
        left + (column + chance(column, row, 1)) * grain.spacing,
        top + (row + chance(column, row, 2)) * grain.spacing,
      ];
      if (!isInside(at, perimeter.points)) continue;
      if (keepOuts.some((keepOut) => isInside(at, keepOut.points))) continue;
      if (unitAt(laying, groundFromPaper(view, at))?.status === 'laid') continue;
      const size = grain.size * (0.7 + 0.6 * chance(column, row, 3));
      const turn = 2 * Math.PI * chance(column, row, 4);
      stones.push({
        points: [0, 2.2, 4.1].map((step) => [
          at[0] + size * Math.cos(turn + step),
          at[1] + size * Math.sin(turn + step),
        ]),
        closed: true,
      });
    }
  }
  return stones.length === 0 ? [] : [{ kind: 'path', rings: stones, fill: grain.colour }];
}

/** A number in [0, 1) that depends on its place alone: integer mixing after Wang. */
function chance(column: number, row: number, salt: number): number {
  let mixed =
    Math.imul(column, 0x27d4eb2d) ^ Math.imul(row, 0x165667b1) ^ Math.imul(salt, 0x9e3779b1);
  mixed = Math.imul(mixed ^ (mixed >>> 15), 0x2c1b3c6d);
  mixed = Math.imul(mixed ^ (mixed >>> 12), 0x297a2d39);
  return ((mixed ^ (mixed >>> 15)) >>> 0) / 2 ** 32;
}
