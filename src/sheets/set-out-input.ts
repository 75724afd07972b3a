import type { SetOut } from '@/paving/set-out/set-out-types';
import type { PlanInput } from './plan-input';

/** What the sheets for the crew are drawn from. */
export interface SetOutInput extends PlanInput {
  readonly setOut: SetOut;
}

/** The line between the datums by its two corners, as `A–F`. */
export const baselineName = ({ datums: [from, to] }: SetOut): string => `${from.name}–${to.name}`;
