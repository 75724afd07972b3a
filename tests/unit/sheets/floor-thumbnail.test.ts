import { describe, expect, it } from 'vitest';
import { layFloor } from '@/paving/laying';
import { floorThumbnailSvg } from '@/sheets/floor-thumbnail';
import { COURT, TERRACE, floor, rectangle } from './sample-floors';

const subpaths = (svg: string): number => (svg.match(/M/g) ?? []).length;

describe('a floor’s thumbnail', () => {
  it('draws every unit of a usual floor in a picture of the size asked for', () => {
    const svg = floorThumbnailSvg(COURT, 240, 160);
    expect(svg).toContain('viewBox="0 0 240 160"');
    expect(subpaths(svg)).toBeGreaterThanOrEqual(layFloor(COURT).laid.count);
  });

  it('stays small for a floor of a hundred thousand units', () => {
    const large = floor(rectangle(0, 0, 46_000, 46_000), {
      units: [{ id: 'a', name: 'Block', length: 200, width: 100, thickness: 60 }],
      bond: { kind: 'herringbone', unit: 'a', joint: 0 },
      placement: { origin: [0, 0], turn: 17 },
    });
    expect(layFloor(large).laid.count).toBeGreaterThan(100_000);
    expect(floorThumbnailSvg(large, 240, 160).length).toBeLessThan(150_000);
  });

  it('keeps within its box, to the pixel', () => {
    for (const document of [COURT, TERRACE]) {
      const svg = floorThumbnailSvg(document, 120, 90);
      for (const [, x, y] of svg.matchAll(/M(-?[\d.]+) (-?[\d.]+)/g)) {
        expect(Number(x)).toBeGreaterThanOrEqual(0);
        expect(Number(x)).toBeLessThanOrEqual(120);
        expect(Number(y)).toBeGreaterThanOrEqual(0);
        expect(Number(y)).toBeLessThanOrEqual(90);
      }
    }
  });

  it('is an empty picture for ground that crosses itself, as a draft may', () => {
    const crossed = {
      ...COURT,
      ground: {
        perimeter: [
          [0, 0],
          [1000, 1000],
          [1000, 0],
          [0, 1000],
        ] as [number, number][],
        keepOuts: [],
      },
    };
    expect(subpaths(floorThumbnailSvg(crossed, 120, 90))).toBe(0);
  });

  it('holds attributes only, which every reader of SVG takes', () => {
    const svg = floorThumbnailSvg(TERRACE, 240, 160, 'A & <B>');
    expect(svg).not.toMatch(/<style|class=|style=|clip-path|NaN|Infinity/);
    expect(svg).toContain('<title>A &amp; &lt;B&gt;</title>');
  });
});
