import { figured, type FiguredWords } from '../figured-words';
import type { Display } from '../length';
import { misreading, type Misreading } from './misreading';
import { readTapes, surveyPointName, tapeName, type Survey, type Tape } from './survey';
import type { SurveyAnswer, TapeDoubt } from './survey-answer';
import { tapeError } from './tape-adjustment';

/** What is said of a survey: `short` of readings, `bare` of checks, checked in `part`, agreeing, or in doubt. */
export interface SurveyWords {
  readonly state: 'short' | 'bare' | 'part' | 'agrees' | 'doubt';
  readonly words: readonly FiguredWords[];
}

const guessWords = (slip: Misreading, display: Display): string =>
  slip === 'miscounted'
    ? `A whole ${display === 'metric' ? 'metre' : 'foot'} may have been counted too many or too few.`
    : GUESSES[slip];

const GUESSES: Readonly<Record<Exclude<Misreading, 'miscounted'>, string>> = {
  'digits swapped': 'Two digits may have changed places.',
  'burned tape': 'The tape may have been held at a mark rather than at its end.',
  'one digit': 'One digit may have been misread.',
};

/** A tape's name within a sentence: no line ends in the middle of it. */
const tapeWord = (survey: Survey, tape: Pick<Tape, 'from' | 'to'>): string =>
  tapeName(survey, tape).replaceAll(' ', '\u00a0');

/** `A`, `A and B`, `A, B and C`. */
function listed(names: readonly string[], last = 'and'): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} ${last} ${names[names.length - 1]}`;
}

/** So many names are written out. */
const MOST_NAMES = 6;

function looseWords(survey: Survey, { places }: SurveyAnswer): FiguredWords {
  const loose = places.flatMap((place, n) => (place ? [] : [n]));
  const names = loose.slice(0, MOST_NAMES).map((n) => surveyPointName(survey, n));
  if (loose.length > MOST_NAMES) names.push(`${loose.length - MOST_NAMES} more`);
  const read = readTapes(survey);
  if (read.length === 0)
    return 'Read the tapes in any order and type what they say. The shape shows as soon as three points hang together.';
  if (loose.length === 1)
    return `${names[0]} is not fixed yet. It needs tapes from two points that are.`;
  return `${listed(names)} are not fixed yet. Each needs tapes from two points that are.`;
}

/** How a tape in doubt may have been misread. */
function slipOf(
  survey: Survey,
  tape: number,
  should: number | null,
  display: Display,
): Misreading | null {
  const { length } = survey.tapes[tape];
  if (length === undefined || should === null) return null;
  return misreading(length, should, 2 * tapeError(length), display);
}

function doubtWords(
  survey: Survey,
  answer: SurveyAnswer,
  doubt: TapeDoubt,
  display: Display,
): FiguredWords {
  const [tape] = doubt.tapes;
  const [should] = doubt.should;
  const name = tapeWord(survey, survey.tapes[tape]);
  if (doubt.tapes.length > 1) {
    const names = doubt.tapes.map((n) => tapeWord(survey, survey.tapes[n]));
    const more = answer.telling
      ? `${tapeWord(survey, answer.telling)} would tell: tape it too.`
      : 'Read them again.';
    // Where one of them looks like a usual slip and no other does, it comes first.
    const slips = doubt.tapes.filter((n, at) => slipOf(survey, n, doubt.should[at], display));
    if (slips.length === 1) {
      const at = doubt.tapes.indexOf(slips[0]);
      const { length = 0 } = survey.tapes[slips[0]];
      const slip = slipOf(survey, slips[0], doubt.should[at], display)!;
      return figured`One of ${listed(names, 'or')} is wrong. It looks like ${names[at]}: it reads ${{ mm: length }}, and ${{ mm: doubt.should[at]! }} would agree. ${guessWords(slip, display)} ${more}`;
    }
    return answer.spare === 1
      ? `One of the tapes is wrong, and with one to check by nobody can tell which. ${more}`
      : `One of ${listed(names, 'or')} is wrong, and the other tapes cannot tell which. ${more}`;
  }
  const length = survey.tapes[tape].length ?? 0;
  if (should === null)
    return `${name} does not agree with the other tapes. Read it again, or leave it out.`;
  const guess = slipOf(survey, tape, should, display);
  return figured`${name} does not agree with the others: it reads ${{ mm: length }}, they say ${{ mm: should }}. ${guess ? `${guessWords(guess, display)} ` : ''}Read it again, or leave it out.`;
}

/** Several readings are wrong, and what is left does not tell them apart: no length is given for any of them. */
function muddleWords(survey: Survey, { doubts }: SurveyAnswer): string {
  const tapes = [...new Set(doubts.flatMap((doubt) => doubt.tapes))];
  const names = tapes.slice(0, MOST_NAMES).map((tape) => tapeWord(survey, survey.tapes[tape]));
  return `More than one reading is wrong, and the tapes cannot tell what each should be. Read these again, the most doubtful first: ${listed(names)}.`;
}

function uncheckedWords(survey: Survey, { unchecked }: SurveyAnswer): string {
  const names = unchecked.slice(0, MOST_NAMES).map((n) => surveyPointName(survey, n));
  if (unchecked.length > MOST_NAMES) names.push(`${unchecked.length - MOST_NAMES} more`);
  return unchecked.length === 1
    ? `Nothing checks ${names[0]}: a wrong reading to it would not show. Tape one more to it.`
    : `Nothing checks ${listed(names)}: a wrong reading to one of them would not show. Tape one more to each.`;
}

/** What the tapes come to, in sentences for whoever holds them. */
export function surveyWords(survey: Survey, answer: SurveyAnswer, display: Display): SurveyWords {
  const words: FiguredWords[] = [];
  const loose = answer.places.some((place) => place === null);
  const one = answer.doubts.length === 1 && answer.doubts[0].tapes.length > 1;
  if (answer.doubts.length > 0 && !answer.restAgrees && !one)
    words.push(muddleWords(survey, answer));
  else for (const doubt of answer.doubts) words.push(doubtWords(survey, answer, doubt, display));
  if (loose) words.push(looseWords(survey, answer));
  if (answer.doubts.length > 0) return { state: 'doubt', words };
  if (loose) return { state: 'short', words };
  const count = readTapes(survey).length;
  if (answer.spare === 0) {
    words.push(
      `All ${answer.places.length} points are fixed by ${count} tapes, but nothing checks these. One more tape would show a wrong reading.`,
    );
    return { state: 'bare', words };
  }
  const sure = 2 * Math.max(...answer.error);
  words.push(
    figured`${count} tapes fix ${answer.places.length} points with ${answer.spare} to check by. They agree to ${{ mm: answer.greatest, decimals: 1 }}; each point is sure to about ±${{ mm: sure }}.`,
  );
  if (answer.unchecked.length === 0) return { state: 'agrees', words };
  words.push(uncheckedWords(survey, answer));
  return { state: 'part', words };
}
