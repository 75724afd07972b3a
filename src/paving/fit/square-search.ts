import { newsSlack, reachIsShort, type KnownChoices } from './known-choices';
import { freshClimbed, originClimbed, type ClimbedCell } from './known-climbs';
import { SPLIT } from './most';
import { originSquares, type OriginSquares } from './origin-squares';
import { pieceGapsRoom, pointSlack } from './slack';
import type { OriginBox } from './strip-bound';

/** Promising squares are climbed from this many times, */
const ROUNDS = 3;
/** or until no more squares than these may hold news. */
const FEW_SQUARES = 100;
/** Those climbs end with steps of this share of the slack that is hoped for. */
const ROUGH_SHARE = 0.05;
/** Squares of a block of so many by so many are given their pieces together. */
const BLOCK = 4;

/** A square that may hold news, with the pieces that may be nearer to it than it has slack at most, in order. */
export type SquareVisit = (box: OriginBox, depth: number, slack: number, list: Int32Array) => void;

/**
 * Looks a cell over in so many squares: takes in what is found by climbing from those that promise most, and
 * visits each square that may hold something better yet. Outside those no origin is news.
 */
export function squaresSearched(
  cell: ClimbedCell,
  known: KnownChoices,
  start: { readonly count: number; readonly u: number; readonly v: number },
  number: number,
  visit: SquareVisit,
  stop?: () => boolean,
): void {
  const { near, every, pitch, rise, reach, about } = cell;
  const squares = originSquares(near, pitch, rise, reach, start, number);
  const { columns, width, height, depth, slack } = squares;
  const room = pieceGapsRoom(near.count);
  const order = new Int32Array(near.count);
  const boxOf = (at: number): OriginBox => {
    const ax = (at % columns) * width;
    const ay = Math.floor(at / columns) * height;
    return { ax, ay, bx: ax + width, by: ay + height };
  };
  const piecesIn = ({ ax, ay, bx, by }: OriginBox, within: number): Int32Array =>
    about
      ? about(ax - within, ay - within, bx + within, by + within)
          .slice()
          .sort()
      : every;

  const tried = new Uint8Array(depth.length);
  let left: Int32Array | null = null;
  for (let round = 0; round < ROUNDS; round++) {
    for (const at of promisingSquares(squares, known, left, tried)) {
      tried[at] = 1;
      if (stop?.() || !squareIsNews(squares, at, known)) continue;
      const { ax, ay } = boxOf(at);
      const u = ax + width * SPLIT;
      const v = ay + height * SPLIT;
      const list = piecesIn({ ax: u, ay: v, bx: u, by: v }, slack[at]);
      const here = pointSlack(near, list, 0, list.length, u, v, slack[at], room, order);
      if (here >= 0) originClimbed(cell, known, depth[at], here, u, v, ROUGH_SHARE * slack[at]);
    }
    freshClimbed(cell, known);
    if (reachIsShort(known.atLeast[0], reach, pitch) || stop?.()) return;
    left = newsSquares(squares, known, left);
    if (left.length < FEW_SQUARES) break;
  }

  const blocks = new Map<number, number[]>();
  for (const at of left ?? []) {
    const row = Math.floor(at / columns / BLOCK);
    const block = row * columns + Math.floor((at % columns) / BLOCK);
    const others = blocks.get(block);
    if (others) others.push(at);
    else blocks.set(block, [at]);
  }
  for (const own of blocks.values()) {
    if (stop?.()) return;
    const boxes = own.map(boxOf);
    const all = {
      ax: Math.min(...boxes.map(({ ax }) => ax)),
      ay: Math.min(...boxes.map(({ ay }) => ay)),
      bx: Math.max(...boxes.map(({ bx }) => bx)),
      by: Math.max(...boxes.map(({ by }) => by)),
    };
    const list = piecesIn(all, Math.max(...own.map((at) => slack[at])));
    own.forEach((at, n) => visit(boxes[n], depth[at], slack[at], list));
  }
}

/**
 * False when no origin of the square is news. An origin that has a unit which the square's point has not is no
 * farther from losing it than from that point: so with more slack than that it has no more units.
 */
export function squareIsNews(
  { depth, gains, slack, far }: OriginSquares,
  at: number,
  known: KnownChoices,
): boolean {
  const own = depth[at];
  if (own >= known.least && slack[at] > newsSlack(known, own)) return true;
  const most = own + gains[at];
  return most >= known.least && Math.min(slack[at], far) > newsSlack(known, most);
}

/** Those of the squares, or of all, that may hold news. */
function newsSquares(
  squares: OriginSquares,
  known: KnownChoices,
  among: Int32Array | null,
): Int32Array {
  const total = among ? among.length : squares.depth.length;
  const news = new Int32Array(total);
  let count = 0;
  for (let n = 0; n < total; n++) {
    const at = among ? among[n] : n;
    if (squareIsNews(squares, at, known)) news[count++] = at;
  }
  return news.subarray(0, count);
}

/**
 * The squares from which a climb promises most, most units first: of each count the one that may have most slack, where
 * that is more than with any more units. Squares that were tried are passed over.
 */
function promisingSquares(
  { depth, slack }: OriginSquares,
  { least, most }: KnownChoices,
  among: Int32Array | null,
  tried: Uint8Array,
): number[] {
  const best = new Int32Array(most - least + 1).fill(-1);
  const total = among ? among.length : depth.length;
  for (let n = 0; n < total; n++) {
    const at = among ? among[n] : n;
    const own = depth[at] - least;
    if (own < 0 || own >= best.length || tried[at] !== 0) continue;
    if (best[own] < 0 || slack[at] > slack[best[own]]) best[own] = at;
  }
  const promising: number[] = [];
  let above = 0;
  for (let own = best.length - 1; own >= 0; own--) {
    if (best[own] < 0 || slack[best[own]] <= above) continue;
    above = slack[best[own]];
    promising.push(best[own]);
  }
  return promising;
}
