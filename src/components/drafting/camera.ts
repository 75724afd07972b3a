import type { Point } from '@/geometry/point';

/** Where the table looks: the ground point at the middle of the window, and pixels a millimetre. */
export interface Camera {
  readonly centre: Point;
  readonly scale: number;
}

export interface ScreenSize {
  readonly width: number;
  readonly height: number;
}

export interface Box {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
}

/** From a hundred metres in view to a tenth of a millimetre a pixel. */
const LEAST_SCALE = 0.0005;
const GREATEST_SCALE = 10;

/** The one place where y flips: up on the ground, down on the screen. */
export function screenFromGround(camera: Camera, size: ScreenSize, [x, y]: Point): Point {
  return [
    size.width / 2 + (x - camera.centre[0]) * camera.scale,
    size.height / 2 - (y - camera.centre[1]) * camera.scale,
  ];
}

export function groundFromScreen(camera: Camera, size: ScreenSize, [x, y]: Point): Point {
  return [
    camera.centre[0] + (x - size.width / 2) / camera.scale,
    camera.centre[1] - (y - size.height / 2) / camera.scale,
  ];
}

export const cameraPanned = (camera: Camera, dx: number, dy: number): Camera => ({
  ...camera,
  centre: [camera.centre[0] - dx / camera.scale, camera.centre[1] + dy / camera.scale],
});

/** Camera zoomed by `factor` with the ground under screen point `at` held still. */
export function cameraZoomed(camera: Camera, size: ScreenSize, at: Point, factor: number): Camera {
  const scale = Math.min(GREATEST_SCALE, Math.max(LEAST_SCALE, camera.scale * factor));
  const held = groundFromScreen(camera, size, at);
  return {
    scale,
    centre: [
      held[0] - (at[0] - size.width / 2) / scale,
      held[1] + (at[1] - size.height / 2) / scale,
    ],
  };
}

/**
 * Camera that shows the whole box, with a border of `border` pixels for figures round it and `foot`
 * more below, where the buttons stand.
 */
export function cameraFitted(box: Box, size: ScreenSize, border: number, foot = 0): Camera {
  const across = Math.max(box.maxX - box.minX, 1);
  const up = Math.max(box.maxY - box.minY, 1);
  const scale = Math.min(
    Math.max(size.width - 2 * border, 40) / across,
    Math.max(size.height - 2 * border - foot, 40) / up,
  );
  const kept = Math.min(GREATEST_SCALE, Math.max(LEAST_SCALE, scale));
  return {
    centre: [(box.minX + box.maxX) / 2, (box.minY + box.maxY) / 2 - foot / 2 / kept],
    scale: kept,
  };
}
