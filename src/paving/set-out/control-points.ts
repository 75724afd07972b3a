import type { Ground } from '../ground';
import { secondPairs, type DatumPair } from './datums';
import type { Mark } from './marks';
import type { ControlPoint } from './set-out-types';
import { runningOffsets, TAPE_READING_MM, tapeCross } from './tape-cross';

/** Points this near to the baseline's string are ticked along it, if their tapes will not do, mm. */
const ON_BASELINE_MM = 5;
/** Pairs of corners beside the datums that a crew is asked to tape from. */
const MOST_SECOND_PAIRS = 3;

/** Two measures square to each other, each read to ±2 mm: the farthest corner of the square of errors, mm. */
const OFFSETS_DOUBT_MM = Math.hypot(TAPE_READING_MM, TAPE_READING_MM);

/** How each mark is set out from the pair: by its tapes, or what is better where they meet badly. */
export function controlPoints(
  ground: Ground,
  marks: readonly Mark[],
  { datums, failing, sight }: DatumPair,
): ControlPoint[] {
  const [a, b] = datums;
  const baseline = Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]);
  const sighted = sight.inside && sight.crosses.length === 0;
  const onLine = (n: number) => {
    const [along, square] = runningOffsets(a.at, b.at, marks[n].at);
    return (
      sighted &&
      Math.abs(square) <= ON_BASELINE_MM &&
      along >= -ON_BASELINE_MM &&
      along <= baseline + ON_BASELINE_MM
    );
  };
  const pairs = secondPairs(
    ground,
    marks,
    failing.filter((n) => !onLine(n)),
    MOST_SECOND_PAIRS,
  );
  const fails = new Set(failing);
  return marks.map((mark, n): ControlPoint => {
    const { corner, ...rest } = mark;
    const cross = tapeCross(a.at, b.at, mark.at);
    const [along, square] = runningOffsets(a.at, b.at, mark.at);
    const point = { ...rest, ...cross, along, square, secondPair: null };
    const isDatum = datums.some(
      ({ ring, vertex }) => corner !== null && corner[0] === ring && corner[1] === vertex,
    );
    // A datum's own tape has no direction.
    if (isDatum) return { ...point, clean: false, uncertainty: null, by: 'datum', doubt: 0 };
    if (!fails.has(n) && cross.uncertainty !== null) {
      return { ...point, by: 'tapes', doubt: cross.uncertainty };
    }
    const pair = pairs.get(n);
    if (!pair) return { ...point, by: 'offsets', doubt: OFFSETS_DOUBT_MM };
    const second = tapeCross(pair[0].at, pair[1].at, mark.at);
    return {
      ...point,
      by: 'second-pair',
      secondPair: { ...second, datums: pair },
      doubt: second.uncertainty!,
    };
  });
}
