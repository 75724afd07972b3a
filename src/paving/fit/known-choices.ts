import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';

/** The origin of the cell with the most slack among those with a count. */
export interface CellChoice {
  readonly count: number;
  readonly slack: number;
  readonly u: number;
  readonly v: number;
}

/** No origin of the same count has this much more slack than the one that is given, mm. */
export const SLACK_TOLERANCE_MM = 0.004;

/** The best origin known so far of each count from `least` to `most`: place n is that of `least` + n units. */
export interface KnownChoices {
  readonly least: number;
  readonly most: number;
  /** −1 where none is known. */
  readonly slack: Float64Array;
  readonly u: Float64Array;
  readonly v: Float64Array;
  /** The most slack known of any origin with that count or more. */
  readonly atLeast: Float64Array;
  /** Places that have become better than any with more units since they were last moved about. */
  readonly fresh: Set<number>;
  /** The stair, until something better is known. */
  steps: readonly NewsStep[] | null;
}

/** An origin with more than the slack and at least the fewest units is news. */
export interface NewsStep {
  readonly slack: number;
  readonly fewest: number;
}

export function knownChoices(least: number, most: number): KnownChoices {
  const span = most - least + 1;
  return {
    least,
    most,
    slack: new Float64Array(span).fill(-1),
    u: new Float64Array(span),
    v: new Float64Array(span),
    atLeast: new Float64Array(span).fill(-1),
    fresh: new Set(),
    steps: null,
  };
}

/** Takes an origin in where it is the best of its count. */
export function choiceOffered(
  known: KnownChoices,
  count: number,
  slack: number,
  u: number,
  v: number,
): void {
  const at = count - known.least;
  if (at < 0 || count > known.most || slack <= known.slack[at]) return;
  known.slack[at] = slack;
  known.u[at] = u;
  known.v[at] = v;
  const { atLeast } = known;
  if (slack <= atLeast[at]) return;
  known.fresh.add(at);
  for (let n = at; n >= 0 && atLeast[n] < slack; n--) atLeast[n] = slack;
  known.steps = null;
}

/** With that many units, or as many as are of interest where those are more, an origin with more slack than this is news. */
export function newsSlack({ atLeast, least }: KnownChoices, count: number): number {
  const at = Math.min(count - least, atLeast.length - 1);
  return Math.max(0, atLeast[at] + SLACK_TOLERANCE_MM);
}

/**
 * What would be news, as a stair, fewest units first. Counts that are known with the same slack are one step, and the
 * fewest of them is the easiest to beat.
 */
export function newsStair(known: KnownChoices): readonly NewsStep[] {
  if (known.steps) return known.steps;
  const { atLeast, least } = known;
  const steps: NewsStep[] = [];
  for (let n = 0; n < atLeast.length; n++) {
    if (n === 0 || atLeast[n] !== atLeast[n - 1])
      steps.push({ slack: newsSlack(known, n + least), fewest: n + least });
  }
  known.steps = steps;
  return steps;
}

/** Slack of this share of the reach may be more. */
export const REACH_SHARE = 0.999;
/** No origin with a unit has more slack than this, in pitches: the unit's neighbour along the row that is not whole bounds it. */
const GREATEST_REACH = 1.001;

/** The farthest that pieces need be listed, mm. */
export const greatestReach = (pitch: number): number => GREATEST_REACH * pitch;

/** True when some origin has all of the slack that pieces out to `reach` can tell, so that it and others may have more. */
export function reachIsShort(slack: number, reach: number, pitch: number): boolean {
  return reach < greatestReach(pitch) && slack >= REACH_SHARE * reach;
}

/** The choices, most units first: each with more slack than all before it. */
export function choicesListed({ least, slack, u, v }: KnownChoices): CellChoice[] {
  const choices: CellChoice[] = [];
  let above = -Infinity;
  for (let at = slack.length - 1; at >= 0; at--) {
    if (slack[at] <= above + LENGTH_TOLERANCE_MM) continue;
    above = slack[at];
    choices.push({ count: at + least, slack: slack[at], u: u[at], v: v[at] });
  }
  return choices;
}
