/**
 * A drawing as commands, in paper millimetres (in pixels for a thumbnail): x grows to the right and
 * y **down** from the sheet's top left corner, as on a screen. One drawing, many sinks: SVG here,
 * PDF by way of SVG, DXF and canvas from the same commands. Colours are `#rrggbb`.
 */

/** `[x, y]` on the paper. */
export type PaperPoint = readonly [number, number];

/** An upright rectangle on the paper: left, top, right, bottom. */
export interface PaperBox {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Line widths of ISO 128-2, mm. */
export const PENS = { fine: 0.18, thin: 0.25, medium: 0.35, thick: 0.5 } as const;

/** How a line is drawn; width and dashes in paper mm. */
export interface Stroke {
  readonly width: number;
  readonly colour: string;
  /** Dash and space lengths; solid without. */
  readonly dash?: readonly number[];
}

/**
 * Points joined in order. `bulges[n]` bends the stretch from point n to the next: tan(sweep / 4),
 * positive anticlockwise as seen on the paper, the convention of polyline arcs.
 */
export interface PathRing {
  readonly points: readonly PaperPoint[];
  readonly bulges?: readonly number[];
  readonly closed: boolean;
}

export type FontWeight = 400 | 600 | 700;
export type TextAnchor = 'start' | 'middle' | 'end';

/** One line of text. */
export interface TextCommand {
  readonly kind: 'text';
  /** Where the baseline is anchored. */
  readonly at: PaperPoint;
  readonly text: string;
  /** Height of a capital, the nominal size of ISO 3098. */
  readonly height: number;
  readonly weight: FontWeight;
  readonly anchor: TextAnchor;
  /** Degrees anticlockwise as seen. */
  readonly turnDeg: number;
  readonly colour: string;
  /** Name of the sheet's frame that the text must stay inside. */
  readonly frame: string;
}

export type DrawCommand =
  | {
      readonly kind: 'line';
      readonly from: PaperPoint;
      readonly to: PaperPoint;
      readonly stroke: Stroke;
    }
  | {
      readonly kind: 'path';
      /** Filled by the even-odd rule, so that inner rings are holes. */
      readonly rings: readonly PathRing[];
      readonly fill?: string;
      readonly stroke?: Stroke;
    }
  | {
      readonly kind: 'circle';
      readonly centre: PaperPoint;
      readonly radius: number;
      readonly fill?: string;
      readonly stroke?: Stroke;
    }
  | TextCommand;

/** What belongs together: a group in SVG, a layer in DXF. */
export interface Layer {
  readonly name: string;
  readonly commands: readonly DrawCommand[];
}

/** Layers of commands on an area of paper, mm, y down. */
export interface Drawing {
  readonly width: number;
  readonly height: number;
  readonly layers: readonly Layer[];
}

/** mm. */
export const boxWidth = (box: PaperBox): number => box.right - box.left;
/** mm. */
export const boxHeight = (box: PaperBox): number => box.bottom - box.top;

/** A box smaller by so many mm on each side. */
export function boxInset(box: PaperBox, by: number): PaperBox {
  return {
    left: box.left + by,
    top: box.top + by,
    right: box.right - by,
    bottom: box.bottom - by,
  };
}

/** The outline of a box, closed. */
export function boxRing(box: PaperBox): PathRing {
  const { left, top, right, bottom } = box;
  return {
    points: [
      [left, top],
      [right, top],
      [right, bottom],
      [left, bottom],
    ],
    closed: true,
  };
}

/** Everything drawn, in order: the sink that tests read. */
export function drawingCommands(drawing: Drawing): readonly DrawCommand[] {
  return drawing.layers.flatMap((layer) => layer.commands);
}
