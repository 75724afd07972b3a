import type { CutPieces } from '@/paving/cutting/cut-pieces';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Laying } from '@/paving/laying';
import type { DrawingColours } from '../ui/drawing-colours';
import type { Camera, ScreenSize } from './camera';
import { paintFloor } from './floor-picture';

/** How much more than the window is painted, on each side, so that a pan has something to show. */
const MARGIN = 0.5;
/** From this many units on, a zoom shows the picture stretched until the hand rests. */
const HEAVY_UNITS = 3000;
/** From this many units on, a floor that changes is painted coarsely, and no wider than the window, until the hand rests. */
const COARSE_UNITS = 10_000;
/** How long the hand rests before a stretched picture is painted sharp, ms. */
const REST_MS = 120;
/** And before a coarse one is: painting so many units sharp takes longer than a hand stops on its way. */
const COARSE_REST_MS = 250;

/**
 * A picture of the floor larger than the window, kept from frame to frame: panning copies it, and it
 * is painted anew only when the floor, the zoom or the theme changes or the pan runs past its border.
 */
export interface FloorCache {
  /** Paints the floor as `camera` sees it. Calls `again` later if a sharper picture will be due. */
  paint(
    ctx: CanvasRenderingContext2D,
    document: LayoutDocument,
    laying: Laying | null,
    camera: Camera,
    size: ScreenSize,
    colours: DrawingColours,
    pixelRatio: number,
    cut?: CutPieces | null,
  ): void;
  dispose(): void;
}

export function createFloorCache(again: () => void): FloorCache {
  let picture: HTMLCanvasElement | null = null;
  let painted: {
    document: LayoutDocument;
    laying: Laying | null;
    camera: Camera;
    size: ScreenSize;
    colours: DrawingColours;
    pixelRatio: number;
    cut: CutPieces | null;
    /** How far beyond the window it reaches, as a part of it; none where it is coarse. */
    margin: number;
  } | null = null;
  let rest: ReturnType<typeof setTimeout> | undefined;
  let sharpDue = false;

  const repaint = (now: NonNullable<typeof painted>) => {
    picture ??= window.document.createElement('canvas');
    const width = Math.ceil(now.size.width * (1 + 2 * now.margin));
    const height = Math.ceil(now.size.height * (1 + 2 * now.margin));
    const coarse = now.margin === 0;
    picture.width = width * now.pixelRatio;
    picture.height = height * now.pixelRatio;
    const ctx = picture.getContext('2d')!;
    ctx.scale(now.pixelRatio, now.pixelRatio);
    paintFloor(
      ctx,
      now.document,
      now.laying,
      now.camera,
      { width, height },
      now.colours,
      now.cut,
      coarse,
    );
    painted = now;
    sharpDue = false;
  };
  const sharpSoon = (after: number) => {
    clearTimeout(rest);
    rest = setTimeout(() => {
      sharpDue = true;
      again();
    }, after);
  };

  return {
    paint(ctx, document, laying, camera, size, colours, pixelRatio, cut = null) {
      const now = { document, laying, camera, size, colours, pixelRatio, cut, margin: MARGIN };
      const same =
        painted !== null &&
        painted.document === document &&
        painted.laying === laying &&
        painted.cut === cut &&
        painted.colours === colours &&
        painted.pixelRatio === pixelRatio &&
        painted.size.width === size.width &&
        painted.size.height === size.height;
      const stretch = same ? camera.scale / painted!.camera.scale : 1;
      const heavy = (laying?.laid.count ?? 0) > HEAVY_UNITS;
      const shiftX = same ? (painted!.camera.centre[0] - camera.centre[0]) * camera.scale : 0;
      const shiftY = same ? (camera.centre[1] - painted!.camera.centre[1]) * camera.scale : 0;
      const inside =
        Math.abs(shiftX) <= size.width * (painted?.margin ?? 0) &&
        Math.abs(shiftY) <= size.height * (painted?.margin ?? 0);
      const isCoarse = painted?.margin === 0;
      // A floor that is another than a moment ago is in somebody's hand.
      const inHand =
        painted !== null && painted.laying !== laying && (laying?.laid.count ?? 0) > COARSE_UNITS;
      if (inHand) {
        repaint({ ...now, margin: 0 });
        sharpSoon(COARSE_REST_MS);
      } else if (!same || (isCoarse && (sharpDue || !inside))) repaint(now);
      else if (stretch === 1 ? !inside : !heavy || sharpDue) repaint(now);
      else if (stretch !== 1) sharpSoon(isCoarse ? COARSE_REST_MS : REST_MS);
      if (!picture || !painted) return;
      const ratio = camera.scale / painted.camera.scale;
      const width = (picture.width / painted.pixelRatio) * ratio;
      const height = (picture.height / painted.pixelRatio) * ratio;
      const x =
        size.width / 2 + (painted.camera.centre[0] - camera.centre[0]) * camera.scale - width / 2;
      const y =
        size.height / 2 + (camera.centre[1] - painted.camera.centre[1]) * camera.scale - height / 2;
      if (ratio !== 1) {
        ctx.drawImage(picture, x, y, width, height);
        return;
      }
      // A copy of whole pixels needs no interpolation: quicker, and as sharp as it was painted.
      const left = Math.round(-x * pixelRatio);
      const top = Math.round(-y * pixelRatio);
      const across = size.width * pixelRatio;
      const down = size.height * pixelRatio;
      ctx.imageSmoothingEnabled = false;
      ctx.drawImage(picture, left, top, across, down, 0, 0, size.width, size.height);
    },
    dispose() {
      clearTimeout(rest);
      picture = null;
      painted = null;
    },
  };
}
