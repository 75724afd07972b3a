import type { Drawing, PaperBox } from './drawing';
import type { Paper } from './paper';

/** One sheet of paper: a drawing, and the frames that its texts stay inside. */
export interface Sheet extends Drawing {
  readonly paper: Paper;
  /** Denominator of the scale of what is drawn on it. */
  readonly scale: number;
  readonly frames: Readonly<Record<string, PaperBox>>;
}
