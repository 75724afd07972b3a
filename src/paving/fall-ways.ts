import type { Point } from '@/geometry/point';
import { rotation } from '@/geometry/rotation';
import type { LayoutDocument } from './layout-document';
import { documentLevels, type Fall } from './levels';
import { groundMiddle } from './placement-edits';

/** The ways down a fall as unit vectors, y up: one for each plane that meets the next, none of a level floor. */
export function fallWays(fall: Fall): readonly Point[] {
  switch (fall.kind) {
    case 'none':
      return [];
    case 'oneWay':
      return [rotation(fall.direction)];
    case 'toPoint':
      return [0, 90, 180, 270].map((turn) => rotation(fall.direction + turn));
    case 'toLine': {
      const [dx, dy] = [fall.to[0] - fall.from[0], fall.to[1] - fall.from[1]];
      const along = (Math.atan2(dy, dx) * 180) / Math.PI;
      return [rotation(along + 90), rotation(along - 90)];
    }
  }
}

/** Where a fall is shown: the place that it leads to, or the middle of the floor. */
export function fallPlace(document: LayoutDocument): Point {
  const { fall } = documentLevels(document);
  switch (fall.kind) {
    case 'toPoint':
      return fall.at;
    case 'toLine':
      return [(fall.from[0] + fall.to[0]) / 2, (fall.from[1] + fall.to[1]) / 2];
    default:
      return groundMiddle(document);
  }
}
