import { describe, expect, it } from 'vitest';
import { sawnRuns, unitMiddle } from '@/paving/cutting/piece-edges';
import { cutReport } from '@/paving/cutting/cut-report';
import { layFloor, unitCorners } from '@/paving/laying';
import { drawingCommands, type DrawCommand, type PaperPoint } from '@/sheets/drawing';
import { hatchLines } from '@/sheets/piece-drawing';
import { planSheets } from '@/sheets/plan-sheet';
import { COURT, floor, planInput, rectangle } from './sample-floors';

const length = (points: readonly (readonly [number, number])[]) =>
  points
    .slice(1)
    .reduce((sum, [x, y], n) => sum + Math.hypot(x - points[n][0], y - points[n][1]), 0);

/** True where both points are within a hundredth of a millimetre of one side of a ring. */
const alongSide = (corners: readonly PaperPoint[], a: PaperPoint, b: PaperPoint) =>
  corners.some(([px, py], n) => {
    const [qx, qy] = corners[(n + 1) % corners.length];
    return [a, b].every(
      ([x, y]) =>
        Math.abs((qx - px) * (y - py) - (qy - py) * (x - px)) < 0.01 * Math.hypot(qx - px, qy - py),
    );
  });

describe('pieces cut at the edge, drawn', () => {
  it('dash just the edges that are sawn', () => {
    for (const document of [
      COURT,
      floor(rectangle(0, 0, 4000, 3000)),
      floor([[-2000, 0, 1], [2000, 0, 1]]), // prettier-ignore
    ]) {
      const laying = layFloor(document);
      const { pieces } = cutReport(laying);
      const dashed = pieces.flatMap((piece) => sawnRuns(laying, piece)).map(length);
      // All that does not lie along a side of the piece's own unit.
      const sawn = pieces.reduce((sum, { unit, polygon, holes = [] }) => {
        const [cx, cy] = unitMiddle(laying, unit);
        const corners = unitCorners(laying.motif[unit[2]], cx, cy);
        return [polygon, ...holes].reduce(
          (all, ring) =>
            ring.reduce((part, a, n) => {
              const b = ring[(n + 1) % ring.length];
              return alongSide(corners, a, b) ? part : part + length([a, b]);
            }, all),
          sum,
        );
      }, 0);
      expect(dashed.reduce((sum, run) => sum + run, 0)).toBeCloseTo(sawn, 0);
    }
  });

  it('hatch a shape by its own area, and leave its hole out', () => {
    const square = (from: number, to: number): PaperPoint[] => [
      [from, from],
      [to, from],
      [to, to],
      [from, to],
    ];
    // Lines `spacing` apart have the shape's area over their spacing in all.
    const lines = hatchLines([square(0, 30), square(10, 20)], 0.5);
    const all = lines.reduce((sum, { points }) => sum + length(points), 0);
    expect(all * 0.5).toBeGreaterThan(0.98 * (900 - 100));
    expect(all * 0.5).toBeLessThan(1.02 * (900 - 100));
    for (const { points } of lines) {
      const [x, y] = [(points[0][0] + points[1][0]) / 2, (points[0][1] + points[1][1]) / 2];
      expect(x > 10 && x < 20 && y > 10 && y < 20).toBe(false);
    }
  });

  it('are on the plan with what they come to, and nowhere on the plan of whole units', () => {
    const texts = (document: typeof COURT) =>
      planSheets(planInput(document))
        .flatMap(drawingCommands)
        .flatMap((command: DrawCommand) => (command.kind === 'text' ? [command.text] : []));
    const cut = texts({ ...COURT, cutting: 'edge' });
    const { count, wholeUnits } = cutReport(layFloor(COURT));
    expect(cut).toContain('Pieces cut at the edge');
    expect(cut).toContain(String(count));
    expect(cut).toContain(String(wholeUnits));
    expect(cut.join(' ')).toContain('Never cut dry');
    expect(texts(COURT).join(' ')).not.toMatch(/[Cc]ut piece|Pieces cut|cut dry/);
  });
});
