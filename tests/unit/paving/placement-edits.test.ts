import fc from 'fast-check';
import { expect, it } from 'vitest';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import {
  groundMiddle,
  placementSlid,
  placementTurned,
  slideToEdge,
  turnAlongEdge,
  turnNormal,
} from '@/paving/placement-edits';
import { COURT_CHEQUER, COURT_SQUARE, SIDE_YARD } from '@/server/demo-layouts';

it('keeps the pivot in its place in the pattern, whatever the turn', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -720, max: 720, noNaN: true }),
      fc.double({ min: -1e4, max: 1e4, noNaN: true }),
      fc.double({ min: -1e4, max: 1e4, noNaN: true }),
      (turn, x, y) => {
        const before = COURT_CHEQUER.placement;
        const after = placementTurned(before, turn, [x, y]);
        const own = (p: typeof before) => {
          const radians = (-p.turn * Math.PI) / 180;
          const [dx, dy] = [x - p.origin[0], y - p.origin[1]];
          return [
            dx * Math.cos(radians) - dy * Math.sin(radians),
            dx * Math.sin(radians) + dy * Math.cos(radians),
          ];
        };
        const [ax, ay] = own(before);
        const [bx, by] = own(after);
        expect(bx).toBeCloseTo(ax, 3);
        expect(by).toBeCloseTo(ay, 3);
      },
    ),
  );
});

it('brings turns into one circle', () => {
  expect([-90, 360, 725, -0, 359.9999999].map(turnNormal)).toEqual([270, 0, 5, 0, 0]);
});

it('starts a row exactly at the clearance along any straight edge of a court', () => {
  for (const document of [COURT_CHEQUER, COURT_SQUARE, SIDE_YARD])
    document.ground.perimeter.forEach((_, edge) => {
      const turned = {
        ...document,
        lifted: [],
        placement: placementTurned(
          document.placement,
          turnAlongEdge(document, 0, edge)!,
          groundMiddle(document),
        ),
      };
      const by = slideToEdge(layFloor(turned), 0, edge);
      const placed = { ...turned, placement: placementSlid(turned.placement, by) };
      const gap = floorReport(layFloor(placed)).edges.find((e) => e.ring === 0 && e.edge === edge)!;
      // A short edge may face no unit of that row; where units face it, the nearest stands at the clearance.
      if (gap.least !== null && gap.length > 1000)
        expect(gap.least).toBeCloseTo(document.clearance, 3);
    });
});
