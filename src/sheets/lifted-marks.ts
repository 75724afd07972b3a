import type { Laying } from '@/paving/laying';
import { unitCorners } from '@/paving/laying';
import type { DrawCommand, PaperPoint } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';

/** Dashes and the spaces between them, mm; shorter round a small unit, so that its outline still reads as dashed. */
const DASH = 1.4;
const SPACE = 1;
const DASHES_A_SIDE = 3;

/** The places of units lifted out by hand: dashed, and crossed corner to corner, so that they tell in black and white. */
export function liftedCommands(laying: Laying, view: PlanView): readonly DrawCommand[] {
  const { lifted, motif } = laying;
  return liftedMarks(
    Array.from({ length: lifted.count }, (_, n) =>
      unitCorners(motif[lifted.k[n]], lifted.x[n], lifted.y[n]).map((corner) =>
        paperFromGround(view, corner),
      ),
    ),
  );
}

/** The mark of each four-cornered place. */
export function liftedMarks(places: readonly (readonly PaperPoint[])[]): readonly DrawCommand[] {
  if (places.length === 0) return [];
  const side = Math.min(
    ...places.map(([p, q, r]) =>
      Math.min(Math.hypot(q[0] - p[0], q[1] - p[1]), Math.hypot(r[0] - q[0], r[1] - q[1])),
    ),
  );
  const share = Math.min(1, side / (DASHES_A_SIDE * (DASH + SPACE)));
  const stroke = { width: PENS.thin, colour: INK };
  return [
    {
      kind: 'path',
      rings: places.flatMap(([p, q, r, s]) => [
        { points: [p, r], closed: false },
        { points: [q, s], closed: false },
      ]),
      stroke: { ...stroke, width: PENS.fine },
    },
    {
      kind: 'path',
      rings: places.map((points) => ({ points, closed: true })),
      stroke: {
        ...stroke,
        dash: [DASH, SPACE].map((length) => Number((length * share).toFixed(2))),
      },
    },
  ];
}
