import fc from 'fast-check';
import { expect, test } from 'vitest';
import { groundFromScreen } from '@/components/drafting/camera';
import { rasterUnits, unitColours } from '@/components/drafting/floor-raster';
import { ringHolds } from '@/geometry/ring';
import { layFloor, unitCorners } from '@/paving/laying';
import { bondOf, documentOf, parsed, real } from '../../oracle/documents';

const WINDOW = { width: 64, height: 48 };

const floors = fc
  .record({ bond: bondOf, turn: real(0, 360), x: real(-500, 500), y: real(-500, 500) })
  .map(({ bond, turn, x, y }) =>
    layFloor(parsed(documentOf({ ...bond, placement: { origin: [x, y], turn } }))),
  )
  .filter(({ laid }) => laid.count > 0);

test('a pixel takes the colour of the unit that its middle lies on, and none where no unit lies', () => {
  const looks = fc.record({ scale: real(0.008, 0.08), x: real(-1000, 3000), y: real(-1000, 3000) });
  fc.assert(
    fc.property(floors, looks, (laying, { scale, x, y }) => {
      const camera = { scale, centre: [x, y] as [number, number] };
      const pixels = new Uint32Array(WINDOW.width * WINDOW.height);
      rasterUnits(pixels, laying, camera, WINDOW);
      const bytes = new Uint8Array(pixels.buffer);
      const { palette, of } = unitColours(laying);
      const { laid, motif } = laying;
      const shrunk = (by: number) =>
        Array.from({ length: laid.count }, (_, n) => {
          const { halfLength, halfWidth, ...entry } = motif[laid.k[n]];
          const part = ([px, py]: readonly [number, number]): [number, number] => [
            px * by,
            py * by,
          ];
          const smaller = { ...entry, halfLength: part(halfLength), halfWidth: part(halfWidth) };
          return unitCorners(smaller, laid.x[n], laid.y[n]);
        });
      const inner = shrunk(1 - 1e-9);
      const outer = shrunk(1 + 1e-9);
      for (let at = 0; at < pixels.length; at += 7) {
        const middle: [number, number] = [
          (at % WINDOW.width) + 0.5,
          Math.floor(at / WINDOW.width) + 0.5,
        ];
        const point = groundFromScreen(camera, WINDOW, middle);
        const on = inner.findIndex((ring) => ringHolds(ring, point));
        // A middle that lies on an edge to within rounding may go either way.
        if (on < 0 && outer.some((ring) => ringHolds(ring, point))) continue;
        const [red, green, blue, alpha] = bytes.subarray(4 * at, 4 * at + 4);
        const hex = [red, green, blue].map((part) => part.toString(16).padStart(2, '0')).join('');
        expect(alpha === 0 ? 'none' : `#${hex}`).toBe(on < 0 ? 'none' : palette[of[on]]);
      }
    }),
    { numRuns: 40 },
  );
});
