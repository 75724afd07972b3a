import type { BareUnit } from '../cell-list';
import type { Display } from '../length';
import type { Vertex } from '../layout-document';

/** A closed ring found in a file, in the file's own place, mm; either direction. */
export interface Outline {
  /** What the file calls it: a layer, a name; empty where it has none. */
  readonly name: string;
  readonly ring: readonly Vertex[];
}

export interface GroundFileOptions {
  readonly display: Display;
  /** What a number without a unit means, where the file does not say. */
  readonly bare: BareUnit;
}

/** The rings of a file, or why there is none to take. */
export type GroundFile =
  | {
      readonly ok: true;
      readonly outlines: readonly Outline[];
      /** The unit that the file itself states; null where `bare` was used. */
      readonly stated: string | null;
      /** What else there is to know: what was left out, and why. */
      readonly notes: readonly string[];
    }
  | { readonly ok: false; readonly messages: readonly string[] };
