import { formatLength, MM_PER_INCH, type Display } from '../length';
import type { Check, CheckKind } from '../set-out/set-out-types';

/** Readings are compared with limits to this, mm: a limit that prints as 3.2 mm is met by a tape that reads 3.2 mm. */
const READING_TOLERANCE_MM = 0.05;

const SIXTEENTH_MM = MM_PER_INCH / 16;
/** What a reading may differ from whole sixteenths through binary arithmetic, in sixteenths. */
const WHOLE = 1e-6;

const isInSixteenths = (mm: number): boolean =>
  Math.abs(mm / SIXTEENTH_MM - Math.round(mm / SIXTEENTH_MM)) < WHOLE;

/**
 * Whether a reading meets a limit that it is just past. Off a tape in inches, limits are read to the nearest sixteenth, as they
 * are printed: a reading of just that meets it.
 */
const meets = (measured: number, limit: number): boolean =>
  Math.abs(measured - limit) <= READING_TOLERANCE_MM ||
  (isInSixteenths(measured) &&
    Math.round(measured / SIXTEENTH_MM) === Math.round(limit / SIXTEENTH_MM));

/** What a reading says about its check. */
export interface Verdict {
  readonly within: boolean;
  /** Reading less expected, mm. */
  readonly off: number;
  /** By how much it is past the limit, mm; nought within. */
  readonly past: number;
}

/** How a reading stands to what a check allows, all in the measure of the check, mm. */
export const readingVerdict = (
  { expected, least, greatest }: Pick<Check, 'expected' | 'least' | 'greatest'>,
  measured: number,
): Verdict => {
  const under = least === null ? 0 : least - measured;
  const over = greatest === null ? 0 : measured - greatest;
  const past = Math.max(0, under, over);
  const within =
    past === 0 ||
    (under > 0 && least !== null && meets(measured, least)) ||
    (over > 0 && greatest !== null && meets(measured, greatest));
  return { within, off: measured - expected, past: within ? 0 : past };
};

/** What to do about a reading that will not do, by what was measured and which way it is off. */
const REMEDIES: Readonly<Record<CheckKind, (long: boolean) => string>> = {
  edge: (long) =>
    `Tape it again, pulled tight and level. If it stays ${long ? 'long' : 'short'}, the edge is not as drawn: do not lay yet, and send the reading to the designer, who can fit the floor anew.`,
  diagonal: (long) =>
    `Tape both diagonals again. If this one stays ${long ? 'long' : 'short'}, the corners are not as drawn: move the pegs if they are yours to move, else send the reading before laying.`,
  square: () =>
    'Swing the string about its first peg until it reads right, then tape the other side again before laying on.',
  gap: (long) =>
    long
      ? 'The field stands too far off here. Check the string and the side across from it; nothing is lost while the gap opposite keeps its least.'
      : 'The field has come too near to the edge here. Stop, close the joints of the next courses a little, and look at “Sizes” before laying on.',
  rows: (long) =>
    long
      ? 'The courses are running large. Close the joints of the next ones a little, and measure ten units laid tight under “Sizes”.'
      : 'The courses are running small. Open the joints of the next ones a little, and measure ten units laid tight under “Sizes”.',
  run: (long) =>
    long
      ? 'The units along this course run large. Close the joints along it a little, and look at “Sizes”.'
      : 'The units along this course run small. Open the joints along it a little, and look at “Sizes”.',
  joint: (long) =>
    long
      ? 'The joint is too wide. Close up the units from the string before the next course.'
      : 'The joint is too tight. Ease the units apart to the spacer before the next course.',
  flatness: () =>
    'Lift the units under the straightedge and bed them again before the joints are filled.',
  step: () =>
    'One unit stands proud of the next. Lift it, take off or add bedding, and bed both to one height.',
  line: () =>
    'The bond line wanders. Pull the string anew along this course, move the units back to it, and lay on from it.',
  layer: (long) =>
    long
      ? 'Too thick here. Take some off and compact again, so that the floor ends at its height.'
      : 'Too thin here. Add material, compact again and measure again.',
};

/** What to do about a reading that is out of its limits; null within them. */
export const readingRemedy = (check: Pick<Check, 'kind'>, verdict: Verdict): string | null =>
  verdict.within ? null : REMEDIES[check.kind](verdict.off > 0);

/** The verdict in words: "Within: 2 mm over what is drawn." What the display's own steps cannot show is not said as 0. */
export const verdictWords = (verdict: Verdict, display: Display): string => {
  const said = (mm: number) => formatLength(mm, display, { decimals: 1 });
  const [off, past, none] = [Math.abs(verdict.off), verdict.past, 0].map(said);
  const how =
    off === none ? 'just as drawn' : `${off} ${verdict.off > 0 ? 'over' : 'under'} what is drawn`;
  return verdict.within
    ? `Within: ${how}.`
    : `Not within: ${how}, ${past === none ? 'just' : past} past what will do.`;
};

/** What will do, in words: "2 995 mm to 3 005 mm". */
export const allowedWords = (
  { least, greatest }: Pick<Check, 'least' | 'greatest'>,
  display: Display,
): string | null => {
  const said = (mm: number) => formatLength(mm, display, { decimals: 1 });
  if (least !== null && greatest !== null) return `${said(least)} to ${said(greatest)}`;
  if (least !== null) return `at least ${said(least)}`;
  return greatest === null ? null : `at most ${said(greatest)}`;
};
