import type { CellPieces } from './cell-pieces';
import { choiceOffered, type KnownChoices } from './known-choices';
import { slackPolished, type PolishedWithin } from './slack-polish';

/** What is climbed over: all the pieces, and where they are complete. */
export interface ClimbedCell extends PolishedWithin {
  readonly near: CellPieces;
  /** Numbers of all the pieces, in order. */
  readonly every: Int32Array;
}

/** Climbs from an origin to where the slack about it is greatest, by steps down to `leastStep`, and takes in what is found on the way. */
export function originClimbed(
  cell: ClimbedCell,
  known: KnownChoices,
  count: number,
  slack: number,
  fromU: number,
  fromV: number,
  leastStep?: number,
): void {
  const within = leastStep === undefined ? cell : { ...cell, leastStep };
  const found = slackPolished(cell.near, cell.every, fromU, fromV, slack, within);
  for (const { u, v, gained, slack: there } of found)
    choiceOffered(known, count + gained, there, u, v);
}

/** Climbs from each origin that has become the best of its count since the last time. */
export function freshClimbed(cell: ClimbedCell, known: KnownChoices): void {
  for (const at of [...known.fresh]) {
    if (known.slack[at] < known.atLeast[at]) continue;
    originClimbed(cell, known, at + known.least, known.slack[at], known.u[at], known.v[at]);
  }
  known.fresh.clear();
}
