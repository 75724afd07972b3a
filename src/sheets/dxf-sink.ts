import {
  Colors,
  DxfWriter,
  LWPolylineFlags,
  TextHorizontalAlignment,
  TextVerticalAlignment,
  Units,
  point3d,
} from '@tarikjabiri/dxf';
import type { DrawCommand, Drawing, PaperPoint, PathRing, TextCommand } from './drawing';

/**
 * The drawing as DXF text (AC1021, which is UTF-8) in millimetres: a layer for each of the drawing's,
 * arcs as bulges, texts by the height of a capital. Fills, dashes and line widths are left to the reader's own
 * layers. y grows up there, so that it flips here.
 */
export function drawingDxf(drawing: Drawing): string {
  const dxf = new DxfWriter();
  dxf.setUnits(Units.Millimeters);
  drawing.layers.forEach(({ name, commands }, n) => {
    dxf.addLayer(name, LAYER_COLOURS[n % LAYER_COLOURS.length]);
    dxf.setCurrentLayerName(name);
    for (const command of commands) addCommand(dxf, command);
  });
  return dxf.stringify();
}

/** Numbers of the reader's own colours: black or white by its background, and five that show on either. */
const LAYER_COLOURS = [
  Colors.White,
  Colors.Red,
  Colors.Green,
  Colors.Blue,
  Colors.Magenta,
  Colors.Cyan,
];

/** A millionth of a millimetre: finer than the layout document is. */
const rounded = (value: number): number => Math.round(value * 1e6) / 1e6 + 0;

const groundPoint = ([x, y]: PaperPoint) => ({ x: rounded(x), y: rounded(-y) });

const spacePoint = (point: PaperPoint) => {
  const { x, y } = groundPoint(point);
  return point3d(x, y);
};

function addCommand(dxf: DxfWriter, command: DrawCommand): void {
  switch (command.kind) {
    case 'line':
      dxf.addLine(spacePoint(command.from), spacePoint(command.to));
      break;
    case 'path':
      command.rings.forEach((ring) => addRing(dxf, ring));
      break;
    case 'circle':
      dxf.addCircle(spacePoint(command.centre), rounded(command.radius));
      break;
    case 'text':
      addText(dxf, command);
  }
}

/** Bulges need no flip: positive is anticlockwise as seen, here as there. */
function addRing(dxf: DxfWriter, { points, bulges, closed }: PathRing): void {
  const vertices = points.map((point, n) => ({
    point: groundPoint(point),
    ...(bulges?.[n] ? { bulge: bulges[n] } : {}),
  }));
  dxf.addLWPolyline(vertices, { flags: closed ? LWPolylineFlags.Closed : LWPolylineFlags.None });
}

const ALIGNED = {
  start: TextHorizontalAlignment.Left,
  middle: TextHorizontalAlignment.Center,
  end: TextHorizontalAlignment.Right,
} as const;

function addText(dxf: DxfWriter, { at, text, height, anchor, turnDeg }: TextCommand): void {
  const place = spacePoint(at);
  dxf.addText(place, rounded(height), text, {
    rotation: rounded(turnDeg),
    // An anchor other than the start goes by the second point.
    ...(anchor === 'start'
      ? {}
      : {
          horizontalAlignment: ALIGNED[anchor],
          verticalAlignment: TextVerticalAlignment.BaseLine,
          secondAlignmentPoint: place,
        }),
  });
}
