import type { Stroke } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';

/** Where one sheet's part of a plan ends and the next begins, on the whole plan. */
export const PART_STROKE: Stroke = { width: PENS.medium, colour: INK, dash: [5, 1.4, 1, 1.4] };
