import { formatLength, type Display } from './length';

/** A length within a sentence, mm. */
export interface FiguredLength {
  /** One length; or, where a rule names a round one for either tape, both. */
  readonly mm: number | Readonly<Record<Display, number>>;
  /** Places of a millimetre to show in metric; none where left out. */
  readonly decimals?: number;
}

/**
 * A sentence whose lengths are not written out yet: whoever shows it writes them, off the tape of the one who
 * reads it, whatever the floor was drawn in.
 */
export type FiguredWords = string | readonly (string | FiguredLength)[];

export type FiguredPart =
  { readonly text: string } | { readonly mm: number; readonly decimals: number };

/** The sentence piece by piece, with each length as that display has it. */
export function figuredParts(words: FiguredWords, display: Display): readonly FiguredPart[] {
  return (typeof words === 'string' ? [words] : words).map((part) =>
    typeof part === 'string'
      ? { text: part }
      : {
          mm: typeof part.mm === 'number' ? part.mm : part.mm[display],
          decimals: part.decimals ?? 0,
        },
  );
}

const plainLength = (mm: number, display: Display, decimals: number): string =>
  formatLength(mm, display, { decimals });

/** The sentence as text. `write` is for whoever sets lengths in another way, as the sheets do. */
export function figuredText(
  words: FiguredWords,
  display: Display,
  write: (mm: number, display: Display, decimals: number) => string = plainLength,
): string {
  return figuredParts(words, display)
    .map((part) => ('text' in part ? part.text : write(part.mm, display, part.decimals)))
    .join('');
}

/** A sentence with these lengths in its gaps: `` figured`Measure ${{ mm: 3000 }} along` ``. */
export function figured(
  texts: TemplateStringsArray,
  ...parts: readonly (string | number | FiguredLength)[]
): FiguredWords {
  return texts.flatMap((text, n) => {
    const part = parts[n];
    if (part === undefined) return [text];
    return [text, typeof part === 'number' ? String(part) : part];
  });
}
