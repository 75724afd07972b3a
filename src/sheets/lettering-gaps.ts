import type { PlanInput } from './plan-input';
import { charactersLacked } from './text-measure';

/** A text with characters that the typeface lacks. */
export interface LetteringGap {
  /** The text by its name in a sentence: `the project’s name`. */
  readonly of: string;
  readonly characters: readonly string[];
}

/** The texts on a plan that hold characters which the drawing's typeface lacks. */
export function letteringGaps(input: PlanInput): readonly LetteringGap[] {
  const { document } = input.laying;
  const texts: readonly (readonly [of: string, text: string])[] = [
    ['the firm’s name', input.firm],
    ['the project’s name', input.project],
    ['the layout’s name', input.layout],
    ['the version’s label', input.label],
    ['the name of who drew it', input.creator],
    ['the units’ names', document.units.map(({ name }) => name).join(' ')],
    ['the aggregate’s name', document.aggregate?.name ?? ''],
    ['the keep-outs’ names', document.ground.keepOuts.map(({ name }) => name).join(' ')],
    ['the notes', document.notes ?? ''],
  ];
  return texts
    .map(([of, text]) => ({ of, characters: charactersLacked(text) }))
    .filter(({ characters }) => characters.length > 0);
}
