import DxfParser from 'dxf-parser';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Point } from '@/geometry/point';
import { layFloor, unitCorners, type Laying, type UnitSet } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { drawingCommands } from '@/sheets/drawing';
import { drawingDxf } from '@/sheets/dxf-sink';
import { MODEL_LAYERS, floorModel } from '@/sheets/floor-model';
import { BAY, COURT, STAIRS, TERRACE, randomFloor } from './sample-floors';

interface Vertex {
  readonly x: number;
  readonly y: number;
  readonly bulge?: number;
}
interface Entity {
  readonly type: string;
  readonly layer: string;
  readonly vertices?: readonly Vertex[];
  readonly shape?: boolean;
  readonly text?: string;
  readonly startPoint?: Vertex;
  readonly endPoint?: Vertex;
  readonly textHeight?: number;
}

function readBack(document: LayoutDocument) {
  const laying = layFloor(document);
  const model = floorModel(laying, null);
  const dxf = new DxfParser().parseSync(drawingDxf(model))!;
  const entities = dxf.entities as unknown as readonly Entity[];
  const on = (layer: string) => entities.filter((entity) => entity.layer === layer);
  return { laying, model, dxf, on };
}

/** To a thousandth of a millimetre. */
const near = (value: number | undefined, expected: number, what: string) =>
  expect(Math.abs((value ?? NaN) - expected), what).toBeLessThan(1e-3);

function sameRing(entity: Entity, corners: readonly (readonly number[])[]) {
  expect(entity.type).toBe('LWPOLYLINE');
  expect(entity.shape).toBe(true);
  expect(entity.vertices).toHaveLength(corners.length);
  corners.forEach(([x, y, bulge = 0], n) => {
    near(entity.vertices![n].x, x, `x of corner ${n}`);
    near(entity.vertices![n].y, y, `y of corner ${n}`);
    expect(entity.vertices![n].bulge ?? 0).toBeCloseTo(bulge, 9);
  });
}

const cornersOf = ({ motif }: Laying, units: UnitSet): readonly (readonly Point[])[] =>
  Array.from({ length: units.count }, (_, n) =>
    unitCorners(motif[units.k[n]], units.x[n], units.y[n]),
  );

function sameAsTheDocument(document: LayoutDocument) {
  const { laying, on } = readBack(document);
  const [perimeter] = on('Perimeter');
  sameRing(perimeter, document.ground.perimeter);
  const keepOuts = on('Keep-outs');
  expect(keepOuts).toHaveLength(document.ground.keepOuts.length);
  document.ground.keepOuts.forEach(({ ring }, n) => sameRing(keepOuts[n], ring));
  for (const [layer, units] of [
    ['Units', laying.laid],
    ['Lifted units', laying.lifted],
  ] as const) {
    const drawn = on(layer);
    const expected = cornersOf(laying, units);
    expect(drawn).toHaveLength(expected.length);
    expected.forEach((corners, n) => sameRing(drawn[n], corners));
  }
}

describe('the floor as DXF, read back by dxf-parser', () => {
  const floors = { COURT, TERRACE, BAY, STAIRS, ROUND_TERRACE, SIDE_YARD };
  for (const [name, document] of Object.entries(floors))
    it(`has every corner, arc and unit of ${name} where the document has it`, () => {
      sameAsTheDocument(document);
    });

  it('has every corner, arc and unit of any floor where the document has it', () => {
    fc.assert(fc.property(randomFloor, sameAsTheDocument), { numRuns: 15 });
  });

  it('has every text, where the drawing has it', () => {
    for (const document of [COURT, BAY]) {
      const { model, dxf } = readBack(document);
      const drawn = drawingCommands(model).filter((command) => command.kind === 'text');
      const read = (dxf.entities as unknown as readonly Entity[]).filter(
        ({ type }) => type === 'TEXT',
      );
      expect(drawn.length).toBeGreaterThan(4);
      expect(read.map(({ text }) => text)).toEqual(drawn.map(({ text }) => text));
      drawn.forEach(({ at, anchor, height }, n) => {
        const place = anchor === 'start' ? read[n].startPoint : read[n].endPoint;
        near(place?.x, at[0], 'x');
        near(place?.y, -at[1], 'y');
        near(read[n].textHeight, height, 'height');
      });
    }
  });

  it('is in millimetres, its layers named as the trade names them', () => {
    const { dxf } = readBack(COURT);
    // $INSUNITS 4 is millimetres (DXF Reference, HEADER section).
    expect(dxf.header.$INSUNITS).toBe(4);
    expect(Object.keys(dxf.tables.layer.layers)).toEqual(expect.arrayContaining([...MODEL_LAYERS]));
  });
});
