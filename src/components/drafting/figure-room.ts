import type { Point } from '@/geometry/point';

/** A place on the screen that something takes, px. */
export interface Box {
  readonly at: Point;
  readonly half: Point;
}

/** What is taken of the screen, so that no figure stands on another. */
export interface FigureRoom {
  readonly take: (box: Box) => void;
  readonly free: (box: Box) => boolean;
}

/** Boxes are looked for in squares of this size, px: about a figure's width. */
const SQUARE_PX = 64;

const overlaps = (one: Box, other: Box): boolean =>
  [0, 1].every(
    (axis) => Math.abs(one.at[axis] - other.at[axis]) < one.half[axis] + other.half[axis],
  );

/** Room with nothing in it. However much is taken, a box is held against those near it alone. */
export function figureRoom(): FigureRoom {
  const squares = new Map<string, Box[]>();
  const eachSquare = ({ at, half }: Box, visit: (key: string) => boolean): boolean => {
    const [x0, y0] = [0, 1].map((axis) => Math.floor((at[axis] - half[axis]) / SQUARE_PX));
    const [x1, y1] = [0, 1].map((axis) => Math.floor((at[axis] + half[axis]) / SQUARE_PX));
    for (let x = x0; x <= x1; x++)
      for (let y = y0; y <= y1; y++) if (!visit(`${x} ${y}`)) return false;
    return true;
  };
  return {
    take: (box) => {
      eachSquare(box, (key) => {
        const own = squares.get(key);
        if (own) own.push(box);
        else squares.set(key, [box]);
        return true;
      });
    },
    free: (box) =>
      eachSquare(box, (key) => !squares.get(key)?.some((other) => overlaps(other, box))),
  };
}
