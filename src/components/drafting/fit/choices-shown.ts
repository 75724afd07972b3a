import type { FitChoice } from '@/paving/fit/fit';

/** Plays nearer than this look the same, mm. */
const TOLD_APART_MM = 0.1;

/**
 * So many of a trade-off's choices, most units first, as show all of it: the first, the last, and between them the most
 * units that have at least so much play, for plays that grow by one share from step to step.
 */
export function choicesShown(choices: readonly FitChoice[], shown: number): readonly FitChoice[] {
  const apart = choices.reduce<FitChoice[]>((kept, choice) => {
    const before = kept.at(-1);
    if (!before || choice.play >= before.play + TOLD_APART_MM) kept.push(choice);
    return kept;
  }, []);
  if (apart.length <= shown) return apart;
  const grown = (play: number) => Math.log(1 + Math.max(0, play));
  const [least, most] = [grown(apart[0].play), grown(apart[apart.length - 1].play)];
  const picked = [apart[0]];
  for (let n = 1; n < shown; n++) {
    const wanted = least + ((most - least) * n) / (shown - 1);
    // Rounding may not pass the last one over.
    const choice = apart.find(({ play }) => grown(play) >= wanted - 1e-9)!;
    if (!picked.includes(choice)) picked.push(choice);
  }
  return picked;
}
