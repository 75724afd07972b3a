/** A point or vector in the plane, `[x, y]`, in millimetres; x grows to the right, y grows up. */
export type Point = readonly [number, number];
