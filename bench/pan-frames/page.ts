import Konva from 'konva';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { createFloorCache } from '@/components/drafting/floor-cache';
import { screenFromGround, type Camera } from '@/components/drafting/camera';
import { wavyFloor } from '../floors';
import { drawingColours } from '@/components/ui/drawing-colours';

const size = { width: 1200, height: 800 };
const FRAMES = 90;
/** Every frame sees all units: the hand sways this far either way, px. */
const SWAY_PX = 90;

// 168 × 120 units of 100 × 100 mm with a 3 mm joint: 20,160, all in view.
const document_: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: [
      [0, 0],
      [17310, 0],
      [17310, 12366],
      [0, 12366],
    ],
    keepOuts: [],
  },
  units: [{ id: 'a', name: 'Sett 100 × 100', length: 100, width: 100, thickness: 100 }],
  bond: { kind: 'stack', unit: 'a', joint: 3 },
  placement: { origin: [55, 55], turn: 0 },
  clearance: 0,
  lifted: [],
  cutting: 'none',
};
const laying = layFloor(document_);
const scale = 0.058;
const cameraAt = (frame: number): Camera => ({
  scale,
  centre: [
    8655 + (SWAY_PX * Math.sin(frame / 7)) / scale,
    6183 + ((SWAY_PX / 3) * Math.cos(frame / 5)) / scale,
  ],
});

/** Reading a pixel back waits until the frame is truly painted. */
const painted = (layer: Konva.Layer) =>
  layer.getNativeCanvasElement().getContext('2d')!.getImageData(0, 0, 1, 1);

/** Mean frame of a pan over a floor that is on the screen already: its first frame is not counted. */
function mean(layer: Konva.Layer, frame: (n: number) => void): number {
  frame(0);
  layer.draw();
  painted(layer);
  const start = performance.now();
  for (let n = 0; n < FRAMES; n++) {
    frame(n);
    layer.draw();
    painted(layer);
  }
  return (performance.now() - start) / FRAMES;
}

function shapeFrames(): number {
  const stage = new Konva.Stage({ container: 'shape', ...size, listening: false });
  const layer = new Konva.Layer({ listening: false });
  stage.add(layer);
  const cache = createFloorCache(() => {});
  const colours = drawingColours();
  let camera = cameraAt(0);
  layer.add(
    new Konva.Shape({
      listening: false,
      perfectDrawEnabled: false,
      sceneFunc: (context) =>
        cache.paint(
          context._context as CanvasRenderingContext2D,
          document_,
          laying,
          camera,
          size,
          colours,
          1,
        ),
    }),
  );
  const time = mean(layer, (n) => (camera = cameraAt(n)));
  stage.destroy();
  return time;
}

function nodeFrames(): number {
  const stage = new Konva.Stage({ container: 'nodes', ...size, listening: false });
  const layer = new Konva.Layer({ listening: false });
  stage.add(layer);
  const { laid } = laying;
  const side = 100 * scale;
  const [x0, y0] = screenFromGround(cameraAt(0), size, [0, 0]);
  for (let n = 0; n < laid.count; n++) {
    const [x, y] = screenFromGround(cameraAt(0), size, [laid.x[n], laid.y[n]]);
    layer.add(
      new Konva.Rect({
        x: x - side / 2,
        y: y - side / 2,
        width: side,
        height: side,
        fill: '#e9e4d8',
        stroke: '#6b6558',
        strokeWidth: 0.6,
        listening: false,
        perfectDrawEnabled: false,
        shadowForStrokeEnabled: false,
      }),
    );
  }
  const time = mean(layer, (n) => {
    const [x, y] = screenFromGround(cameraAt(n), size, [0, 0]);
    layer.position({ x: x - x0, y: y - y0 });
  });
  stage.destroy();
  return time;
}

/** 180,000 units of 200 mm in a round ground, turned by 17°, all in view; pushed along a little from step to step. */
const plaza = wavyFloor(180_000);
const STEPS = 12;
const pushed = Array.from({ length: STEPS }, (_, n) => {
  const [x, y] = plaza.placement.origin;
  const document = { ...plaza, placement: { ...plaza.placement, origin: [x + 7 * n, y] } };
  return layFloor(document as LayoutDocument);
});
const plazaCamera: Camera = { scale: 740 / 114_000, centre: [0, 0] };

const median = (times: number[]) => times.sort((one, other) => one - other)[times.length >> 1];

/** Median of what painting one step of a drag takes, as the hand moves and as it is painted once it rests, each step in turn. */
function dragSteps(): { readonly moving: number; readonly resting: number } {
  const [moving, resting]: [number[], number[]] = [[], []];
  const colours = drawingColours();
  const screen = document.createElement('canvas');
  Object.assign(screen, size);
  const ctx = screen.getContext('2d', { willReadFrequently: false })!;
  const cache = createFloorCache(() => {});
  for (const laid of pushed) {
    for (const [times, kept] of [
      [moving, cache],
      [resting, createFloorCache(() => {})],
    ] as const) {
      const from = performance.now();
      kept.paint(ctx, laid.document, laid, plazaCamera, size, colours, 1);
      ctx.getImageData(0, 0, 1, 1);
      times.push(performance.now() - from);
    }
  }
  cache.dispose();
  // The first step is a floor that was not there before: painted sharp at once.
  return { moving: median(moving.slice(1)), resting: median(resting.slice(1)) };
}

// Each once to warm up, then measured.
shapeFrames();
const shape = shapeFrames();
const nodes = nodeFrames();
Object.assign(window, {
  measured: {
    units: laying.laid.count,
    shape,
    nodes,
    dragged: pushed[0].laid.count,
    ...dragSteps(),
  },
});
