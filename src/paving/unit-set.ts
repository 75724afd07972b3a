import type { UnitSet } from './laying';

/**
 * A unit set while it is being filled; `along` is each unit's place along its row, and is `i`
 * itself where rows run along the lattice's own `a`.
 */
export interface UnitSetRoom {
  count: number;
  i: Int32Array;
  j: Int32Array;
  k: Uint8Array;
  x: Float64Array;
  y: Float64Array;
  along: Int32Array;
}

/** Room for so many units, to be filled row by row. */
export function unitSetRoom(capacity: number, alongIsI: boolean): UnitSetRoom {
  const i = new Int32Array(capacity);
  return {
    count: 0,
    i,
    j: new Int32Array(capacity),
    k: new Uint8Array(capacity),
    x: new Float64Array(capacity),
    y: new Float64Array(capacity),
    along: alongIsI ? i : new Int32Array(capacity),
  };
}

/** Makes room for `more` units beyond those there are. */
export function unitSetReserve(room: UnitSetRoom, more: number): void {
  if (room.count + more <= room.i.length) return;
  const larger = unitSetRoom(Math.max(room.count + more, 2 * room.i.length), room.along === room.i);
  larger.i.set(room.i.subarray(0, room.count));
  larger.j.set(room.j.subarray(0, room.count));
  larger.k.set(room.k.subarray(0, room.count));
  larger.x.set(room.x.subarray(0, room.count));
  larger.y.set(room.y.subarray(0, room.count));
  larger.along.set(room.along.subarray(0, room.count));
  room.i = larger.i;
  room.j = larger.j;
  room.k = larger.k;
  room.x = larger.x;
  room.y = larger.y;
  room.along = larger.along;
}

/** Arrays at least this full are handed over as they are, as views of their used part. */
const FULL_ENOUGH = 0.9;

/** The units so far as a set of their own, and their places along their rows. */
export function unitSetClosed(room: UnitSetRoom): { set: UnitSet; along: Int32Array } {
  const { count } = room;
  const full = count >= FULL_ENOUGH * room.i.length;
  const closed = <T extends Int32Array | Uint8Array | Float64Array>(array: T): T =>
    (full ? array.subarray(0, count) : array.slice(0, count)) as T;
  const i = closed(room.i);
  return {
    set: {
      count,
      i,
      j: closed(room.j),
      k: closed(room.k),
      x: closed(room.x),
      y: closed(room.y),
    },
    along: room.along === room.i ? i : closed(room.along),
  };
}
