import type { UnitSet } from './laying';

/** A unit set while it is being filled; `along` is each unit's place along its row. */
export interface UnitSetRoom {
  count: number;
  i: Int32Array;
  j: Int32Array;
  k: Uint8Array;
  x: Float64Array;
  y: Float64Array;
  along: Int32Array;
}

export function unitSetRoom(capacity: number): UnitSetRoom {
  return {
    count: 0,
    i: new Int32Array(capacity),
    j: new Int32Array(capacity),
    k: new Uint8Array(capacity),
    x: new Float64Array(capacity),
    y: new Float64Array(capacity),
    along: new Int32Array(capacity),
  };
}

/** Makes room for `more` units beyond those there are. */
export function unitSetReserve(room: UnitSetRoom, more: number): void {
  if (room.count + more <= room.i.length) return;
  const larger = unitSetRoom(Math.max(room.count + more, 2 * room.i.length));
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

/** The units so far as a set of their own, and their places along their rows. */
export function unitSetClosed(room: UnitSetRoom): { set: UnitSet; along: Int32Array } {
  const { count } = room;
  return {
    set: {
      count,
      i: room.i.slice(0, count),
      j: room.j.slice(0, count),
      k: room.k.slice(0, count),
      x: room.x.slice(0, count),
      y: room.y.slice(0, count),
    },
    along: room.along.slice(0, count),
  };
}
