import { formatCount } from '../count';
import { figured, type FiguredWords } from '../figured-words';
import type { DatumPair } from './datums';
import type { Advice, ControlPoint, Course } from './set-out-types';
import { TAPE_READING_MM } from './tape-cross';

/** Names that a sentence can hold before it is a list. */
const MOST_NAMES = 8;
/** Beyond this a fibre tape's stretch is no longer small beside ±2 mm, mm: common practice. */
const LONG_TAPE_MM = 30_000;

/** `A, B and C`, or `A, B, C and 12 more`. */
function nameList(names: readonly string[]): string {
  if (names.length === 0) return '';
  if (names.length === 1) return names[0];
  if (names.length > MOST_NAMES)
    return `${names.slice(0, MOST_NAMES - 1).join(', ')} and ${formatCount(names.length - MOST_NAMES + 1)} more`;
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}

const points = (count: number) => (count === 1 ? '1 point' : `${formatCount(count)} points`);

/** What to know before setting out, in plain sentences; the most pressing first. */
export function setOutAdvice(
  pair: DatumPair,
  best: DatumPair,
  all: readonly ControlPoint[],
  courses: readonly Course[],
): Advice[] {
  const [a, b] = pair.datums;
  const advice: Advice[] = [];
  const say = (kind: Advice['kind'], text: FiguredWords, about: readonly string[] = []) =>
    advice.push({ kind, text, points: about });
  const names = (list: readonly ControlPoint[]) => list.map(({ name }) => name);

  if (courses.length === 0)
    say('floor', 'No unit is laid yet, so there are only the corners to set out.');

  const taped = all.filter(({ by }) => by === 'tapes');
  const failing = all.filter(({ by }) => by === 'second-pair' || by === 'offsets');
  if (failing.length > 0) {
    const better = best.failing.length < pair.failing.length;
    say(
      'points',
      `${points(failing.length)} cannot be taped well from ${a.name} and ${b.name}: there the tapes meet at less than 30° or more than 150°, and a little error goes a long way.${
        better
          ? ` From ${best.datums[0].name} and ${best.datums[1].name} ${best.failing.length === 0 ? 'all can be' : `only ${points(best.failing.length)} cannot be`}.`
          : ' No two corners do better.'
      }`,
      names(failing),
    );
    const pairs = new Map<string, ControlPoint[]>();
    for (const point of failing) {
      if (!point.secondPair) continue;
      const key = point.secondPair.datums.map(({ name }) => name).join(' and ');
      pairs.set(key, [...(pairs.get(key) ?? []), point]);
    }
    for (const [key, list] of pairs)
      say('points', `Tape ${nameList(names(list))} from ${key} instead.`, names(list));
    const offsets = failing.filter(({ by }) => by === 'offsets');
    if (offsets.length > 0)
      say(
        'points',
        `Measure ${nameList(names(offsets))} along the line from ${a.name} to ${b.name} and square to it.`,
        names(offsets),
      );
  }
  if (taped.length > 0) {
    const worst = taped.reduce((one, other) => (other.doubt > one.doubt ? other : one));
    const angles = taped.map(({ crossingDeg }) => crossingDeg);
    say(
      'datums',
      figured`From ${a.name} and ${b.name} the tapes${failing.length > 0 ? ' to the others' : ''} meet at ${Math.round(Math.min(...angles))}° to ${Math.round(Math.max(...angles))}°. Read to ±${{ mm: TAPE_READING_MM }}, no point comes to lie more than ${{ mm: worst.doubt, decimals: 1 }} off; the worst is ${worst.name}.`,
      [worst.name],
    );
    const right = taped.filter(({ side }) => side === 'right');
    if (right.length > 0 && right.length < taped.length)
      say(
        'points',
        `${points(right.length)} ${right.length === 1 ? 'lies' : 'lie'} right of the line from ${a.name} to ${b.name}, the others left of it, and two arcs cross on both sides: go by the side given for each.`,
        names(right),
      );
  }
  const { inside, crosses } = pair.sight;
  if (crosses.length > 0)
    say('baseline', `The line from ${a.name} to ${b.name} passes over ${nameList(crosses)}.`);
  if (!inside)
    say('baseline', `The line from ${a.name} to ${b.name} runs outside the edge for a part.`);
  if (pair.unseen > 0)
    say(
      'datums',
      'The edge has no corner to be seen at one or both of the two: drive a peg there first, and measure between the pegs twice.',
    );
  const longest = all.reduce((most, { tapes }) => Math.max(most, ...tapes), 0);
  if (longest > LONG_TAPE_MM)
    say(
      'datums',
      figured`The longest tape is ${{ mm: longest, decimals: 1 }}: take a steel tape and pull it each time as hard.`,
    );
  return advice;
}
