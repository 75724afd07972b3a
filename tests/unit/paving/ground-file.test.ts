import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  groundFile,
  groundFileKind,
  outlineGround,
  outlinesWithin,
} from '@/paving/ground-file/ground-file';
import { chained, strandTurned } from '@/paving/ground-file/chained';
import { layFloor } from '@/paving/laying';
import type { Vertex } from '@/paving/layout-document';
import { ringProblems, vertexRingArea } from '@/paving/ring-validation';
import { ROUND_TERRACE } from '@/server/demo-layouts';
import { drawingDxf } from '@/sheets/dxf-sink';
import { floorModel } from '@/sheets/floor-model';
import { BAY, COURT, STAIRS } from '../sheets/sample-floors';

const METRIC = { display: 'metric', bare: 'mm' } as const;

function opened(name: string, text: string, options: Parameters<typeof groundFile>[2] = METRIC) {
  const file = groundFile(name, text, options);
  if (!file.ok) throw new Error(file.messages.join(' '));
  return file;
}

const refused = (
  name: string,
  text: string,
  options: Parameters<typeof groundFile>[2] = METRIC,
) => {
  const file = groundFile(name, text, options);
  return file.ok ? null : file.messages;
};

/** Group codes and values, a line each, as the published DXF reference has them. */
const dxf = (...pairs: readonly (string | number)[]) => [...pairs, 0, 'EOF'].join('\n') + '\n';
const header = (units: number) => [
  0,
  'SECTION',
  2,
  'HEADER',
  9,
  '$INSUNITS',
  70,
  units,
  0,
  'ENDSEC',
];
const entities = (...pairs: readonly (string | number)[]) => [
  ...[0, 'SECTION', 2, 'ENTITIES'],
  ...pairs,
  ...[0, 'ENDSEC'],
];
const line = (x0: number, y0: number, x1: number, y1: number, layer = 'EDGE') => [
  ...[0, 'LINE', 8, layer, 10, x0, 20, y0, 11, x1, 21, y1],
];

describe('points', () => {
  test('a list of corners in order, with names or without, closed or not', () => {
    const court: Vertex[] = [
      [0, 0],
      [7200, 0],
      [7200, 3100],
    ];
    expect(opened('a.csv', 'A,0,0\nB,7200,0\nC,7200,3100\n').outlines[0].ring).toEqual(court);
    expect(
      opened('a.csv', '0;0\n7,2;0\n7,2;3,1\n0;0', { display: 'metric', bare: 'm' }).outlines[0]
        .ring,
    ).toEqual(court);
    expect(
      opened('a.txt', 'Name\tEasting\tNorthing\nA\t0\t0\nB\t7200\t0\nC\t7200\t3100').outlines[0]
        .ring,
    ).toEqual(court);
  });

  test('feet and inches as the trade writes them', () => {
    // 1 ft = 304.8 mm exactly (NIST SP 811, B.8).
    const { outlines } = opened('a.csv', `0,0\n10' 6",0\n10' 6",8'`, {
      display: 'imperial',
      bare: 'ft',
    });
    expect(outlines[0].ring).toEqual([
      [0, 0],
      [3200.4, 0],
      [3200.4, 2438.4],
    ]);
  });

  test('numbers of corners, as survey lists have them first, are no places; a height is left out', () => {
    const court = [
      [0, 0],
      [7200, 0],
      [7200, 3100],
    ];
    // Point number, across, up, height, code: the usual order of a list from a survey instrument (common practice).
    for (const text of [
      '1,0,0\n2,7200,0\n3,7200,3100',
      '101;0;0;12,5;K\n102;7200;0;12,4;K\n103;7200;3100;12,4;K',
    ]) {
      const { outlines, notes } = opened('a.csv', text);
      expect(outlines[0].ring).toEqual(court);
      expect(notes[0]).toMatch(/^The first column is taken for the numbers of the corners/);
    }
    const { outlines, notes } = opened('a.csv', '0,0,12\n7200,0,12\n7200,3100,12');
    expect(outlines[0].ring).toEqual(court);
    expect(notes[0]).toMatch(/third is left out/);
  });

  test('a corner that is written twice is one', () => {
    expect(opened('a.csv', '0,0\n7200,0\n7200,0\n7200,3100').outlines[0].ring).toHaveLength(3);
    expect(refused('a.csv', '0,0\n0.2,0\n0.2,0.2')![0]).toMatch(/unit may be wrong/);
  });

  test('says which line cannot be read, and takes nothing by halves', () => {
    expect(refused('a.csv', '0,0\n7200,\nfar,3100')).toEqual([
      `Line 2: up is missing. Write 3200, 3.2 m or 10' 6".`,
      `Line 3: across “far” is not a length. Write 3200, 3.2 m or 10' 6".`,
    ]);
    expect(refused('a.csv', '0,0\n10,10')).toEqual([
      'The list has 2 corners; an edge needs at least 3.',
    ]);
    expect(refused('a.csv', ' \n')).toEqual(['There is nothing in this list.']);
    expect(refused('a.csv', 'name,height\nA,3')).toHaveLength(1);
  });
});

describe('DXF', () => {
  test.each(Object.entries({ COURT, BAY, STAIRS, ROUND_TERRACE }))(
    'the edge and keep-outs of %s come back from our own drawing of it',
    (_, document) => {
      const { outlines, stated } = opened(
        'floor.dxf',
        drawingDxf(floorModel(layFloor(document), null)),
      );
      expect(stated).toBe('millimetres');
      const edges = outlines.filter(({ name }) => name === 'Perimeter');
      expect(edges).toHaveLength(1);
      const found = outlineGround(
        edges[0],
        outlines.filter(({ name }) => name === 'Keep-outs'),
      );
      expect(found.keepOuts).toHaveLength(document.ground.keepOuts.length);
      expect(vertexRingArea(found.perimeter)).toBeCloseTo(
        vertexRingArea(document.ground.perimeter),
        -1,
      );
      expect(ringProblems(found)).toEqual([]);
    },
  );

  test('units are those that the drawing states, else what is said of it', () => {
    // $INSUNITS of the DXF reference: 1 inches, 2 feet, 4 millimetres, 5 centimetres, 6 metres.
    const square = entities(
      ...line(0, 0, 2, 0),
      ...line(2, 0, 2, 2),
      ...line(2, 2, 0, 2),
      ...line(0, 2, 0, 0),
    );
    for (const [code, mm] of [
      [1, 25.4],
      [2, 304.8],
      [4, 1],
      [5, 10],
      [6, 1000],
    ]) {
      const { outlines } = opened('a.dxf', dxf(...header(code), ...square));
      expect(outlines[0].ring[1]).toEqual([2 * mm, 0]);
    }
    const { outlines, stated } = opened('a.dxf', dxf(...square), { display: 'metric', bare: 'm' });
    expect(stated).toBeNull();
    expect(outlines[0].ring[2]).toEqual([2000, 2000]);
  });

  test('lines and an arc that meet end to end are one ring, whichever way each was drawn', () => {
    const drawing = dxf(
      ...header(4),
      ...entities(
        ...line(0, 0, 4000, 0),
        ...line(0, 3000, 0, 0),
        ...line(4000, 3000, 4000, 0),
        // From (4000, 3000) over the top to (0, 3000): half a circle about (2000, 3000).
        ...[0, 'ARC', 8, 'EDGE', 10, 2000, 20, 3000, 40, 2000, 50, 0, 51, 180],
        ...line(9000, 9000, 9500, 9000, 'OTHER'),
        ...[0, 'SPLINE', 8, 'EDGE', 70, 8, 71, 3, 72, 0, 73, 0, 74, 0],
      ),
    );
    const { outlines, notes } = opened('a.dxf', drawing);
    expect(outlines).toHaveLength(1);
    // 4 m × 3 m and half a circle of 2 m: 12 + 2π m².
    expect(Math.abs(vertexRingArea(outlines[0].ring)) / 1e6).toBeCloseTo(12 + 2 * Math.PI, 6);
    expect(notes).toEqual([
      'One line does not close on itself and is left out.',
      'One thing in the drawing (blocks, curves of other kinds) cannot be read as an edge.',
    ]);
  });

  test('a circle is two arcs, and what lies in the edge may be a keep-out', () => {
    const drawing = dxf(
      ...header(6),
      ...entities(
        ...[0, 'CIRCLE', 8, 'EDGE', 10, 5, 20, 5, 40, 4],
        ...[0, 'CIRCLE', 8, 'PIT', 10, 5, 20, 6, 40, 0.5],
        ...[0, 'CIRCLE', 8, 'PIT', 10, 9, 20, 9, 40, 0.5],
      ),
    );
    const { outlines } = opened('a.dxf', drawing);
    expect(vertexRingArea(outlines[0].ring) / 1e6).toBeCloseTo(16 * Math.PI, 6);
    expect(outlinesWithin(outlines, outlines[0]).map(({ name }) => name)).toEqual(['PIT']);
  });

  test('a closed polyline that comes back to its first corner has it once', () => {
    const places = [
      [0, 0],
      [5, 0],
      [5, 4],
      [0, 4],
      [0, 0],
    ].flatMap(([x, y]) => [10, x, 20, y]);
    const { outlines } = opened(
      'a.dxf',
      dxf(...header(6), ...entities(0, 'LWPOLYLINE', 8, 'EDGE', 90, 5, 70, 1, ...places)),
    );
    expect(outlines[0].ring).toHaveLength(4);
    expect(ringProblems(outlineGround(outlines[0], []))).toEqual([]);
  });

  test('says what is wrong with a drawing that has no edge', () => {
    expect(
      refused('a.dxf', dxf(...entities(...line(0, 0, 1, 0), ...line(5, 5, 6, 5))))![0],
    ).toMatch(/closes on itself/);
    expect(refused('a.dxf', dxf(...entities()))).toEqual(['There is nothing drawn in this file.']);
    expect(refused('a.dxf', 'AutoCAD Binary DXF\r\n\x1a')![0]).toMatch(/binary/);
    expect(refused('a.dxf', 'no drawing at all')).not.toBeNull();
  });
});

describe('strands', () => {
  test('of a large drawing are joined, the ring among them found', () => {
    // 20 000 loose lines and, among them, a square of 4 × 5 000 lines end to end.
    const loose = Array.from({ length: 20_000 }, (_, n): Vertex[] => [
      [n * 10, -50_000],
      [n * 10 + 5, -40_000],
    ]);
    const around = (n: number): Vertex => {
      const along = (n % 5_000) * 4;
      return (
        [
          [along, 0],
          [20_000, along],
          [20_000 - along, 20_000],
          [0, 20_000 - along],
        ] as const
      )[Math.floor(n / 5_000) % 4] as Vertex;
    };
    const edge = Array.from({ length: 20_000 }, (_, n): Vertex[] => [around(n), around(n + 1)]);
    const { rings, left } = chained([...loose, ...edge]);
    expect(left).toBe(20_000);
    expect(rings.map((ring) => ring.length)).toEqual([20_000]);
    expect(vertexRingArea(rings[0])).toBeCloseTo(20_000 ** 2, 0);
  });

  test('of any ring, cut up, mixed and turned about, come back as that ring', () => {
    const ring = fc
      .array(fc.integer({ min: 1000, max: 9000 }), { minLength: 3, maxLength: 12 })
      .map((reach) =>
        reach.map((r, n): Vertex => {
          const angle = (n / reach.length) * 2 * Math.PI;
          return [Math.round(r * Math.cos(angle)), Math.round(r * Math.sin(angle)), (n % 3) * 0.1];
        }),
      );
    fc.assert(
      fc.property(ring, fc.infiniteStream(fc.nat()), (corners, random) => {
        const strands = corners.map((corner, n): Vertex[] => {
          const [x, y] = corners[(n + 1) % corners.length];
          const strand: Vertex[] = [corner, [x, y]];
          return random.next().value! % 2 ? strandTurned(strand) : strand;
        });
        const keys = new Map(strands.map((strand) => [strand, random.next().value!]));
        strands.sort((one, other) => keys.get(one)! - keys.get(other)!);
        const { rings, left } = chained(strands);
        expect(left).toBe(0);
        expect(rings).toHaveLength(1);
        expect(Math.abs(vertexRingArea(rings[0]))).toBeCloseTo(
          Math.abs(vertexRingArea(corners)),
          3,
        );
      }),
    );
  });
});

describe('GeoJSON', () => {
  const square = (longitude: number, latitude: number, degrees: number) => [
    [longitude, latitude],
    [longitude + degrees, latitude],
    [longitude + degrees, latitude + degrees],
    [longitude, latitude + degrees],
    [longitude, latitude],
  ];

  test.each([0, 30, 45, 60])(
    'a degree at latitude %d is as long as the ellipsoid of WGS 84 has it',
    (latitude) => {
      // Textbook: a = 6 378 137 m, f = 1 / 298.257223563; radii of curvature M along the meridian and N across it.
      const [a, f] = [6_378_137, 1 / 298.257223563];
      const e2 = f * (2 - f);
      const phi = (latitude * Math.PI) / 180;
      const w = Math.sqrt(1 - e2 * Math.sin(phi) ** 2);
      const meridian = (a * (1 - e2)) / w ** 3;
      const across = (a / w) * Math.cos(phi);
      const step = 0.001;
      const small = square(11, latitude - step / 2, step);
      const { outlines, stated } = opened(
        'a.geojson',
        JSON.stringify({
          type: 'Feature',
          properties: { name: 'Court' },
          geometry: { type: 'Polygon', coordinates: [small] },
        }),
      );
      const [[x0, y0], , [x2, y2]] = outlines[0].ring;
      const degree = (mm: number) => mm / 1000 / ((step * Math.PI) / 180);
      expect(degree(y2 - y0) / meridian).toBeCloseTo(1, 6);
      expect(degree(x2 - x0) / across).toBeCloseTo(1, 4);
      expect({ name: outlines[0].name, stated }).toEqual({
        name: 'Court',
        stated: 'degrees of longitude and latitude',
      });
    },
  );

  test('collections, several polygons and holes are all outlines; open lines are left out', () => {
    const file = {
      type: 'FeatureCollection',
      features: [
        {
          type: 'Feature',
          properties: null,
          geometry: {
            type: 'MultiPolygon',
            coordinates: [[square(7, 45, 1e-4), square(7.00002, 45.00002, 2e-5)]],
          },
        },
        {
          type: 'Feature',
          properties: {},
          geometry: {
            type: 'LineString',
            coordinates: [
              [7, 45],
              [7, 45.1],
            ],
          },
        },
        { type: 'Feature', properties: {}, geometry: null },
      ],
    };
    const { outlines, notes } = opened('a.json', JSON.stringify(file));
    expect(outlines).toHaveLength(2);
    expect(outlinesWithin(outlines, outlines[0])).toEqual([outlines[1]]);
    expect(notes[1]).toBe('One line does not close on itself and is left out.');
    const ground = outlineGround(outlines[0], [outlines[1]]);
    expect(ringProblems(ground)).toEqual([]);
    expect(ground.keepOuts[0].name).toBe('Keep-out 1');
    expect(Math.min(...ground.perimeter.map(([x]) => x))).toBe(0);
  });

  test('what is not in degrees, too wide or cut off is refused in words', () => {
    const polygon = (ring: number[][]) => JSON.stringify({ type: 'Polygon', coordinates: [ring] });
    expect(refused('a.geojson', polygon(square(500_000, 4_600_000, 10)))![0]).toMatch(/degrees/);
    expect(refused('a.geojson', polygon(square(7, 45, 2)))![0]).toMatch(/kilometres/);
    expect(refused('a.geojson', '{"type":"Polygon","coord')![0]).toMatch(/cut off/);
    expect(refused('a.geojson', '{"type":"Point","coordinates":[7,45]}')![0]).toMatch(/no outline/);
  });
});

test('the kind of a file is told by its name, else by how it begins', () => {
  expect(groundFileKind('edge.DXF', '')).toBe('dxf');
  expect(groundFileKind('edge', '  0\nSECTION\n  2\nHEADER')).toBe('dxf');
  expect(groundFileKind('edge', '{"type":"Polygon"}')).toBe('geojson');
  expect(groundFileKind('edge.csv', '0,0')).toBe('points');
});
