import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { feature } from 'topojson-client';
import type { GeometryCollection, Topology } from 'topojson-specification';
import { expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { Vertex } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../oracle/documents';
import { oracleFloor } from '../oracle/brute-force';
import { fillRegion } from '../oracle/fill-region';

// Outlines nobody drew for this test: counties of the United States (US Census Bureau, by the
// package us-atlas, counties-albers-10m.json, planar), each scaled to a court of 5 to 10 m. Every
// seventieth county with one ring takes part.

const file = createRequire(import.meta.url).resolve('us-atlas/counties-albers-10m.json');
const topology = JSON.parse(readFileSync(file, 'utf8')) as Topology<{
  counties: GeometryCollection<{ name: string }>;
}>;

function courts(): { name: string; perimeter: Vertex[] }[] {
  const counties = feature(topology, topology.objects.counties).features;
  return counties
    .filter(({ geometry }) => geometry?.type === 'Polygon' && geometry.coordinates.length === 1)
    .filter((_, n) => n % 70 === 0)
    .map(({ geometry, properties }, n) => {
      if (geometry.type !== 'Polygon') throw new Error('only polygons were kept');
      const ring = geometry.coordinates[0].slice(0, -1);
      const xs = ring.map(([x]) => x);
      const ys = ring.map(([, y]) => y);
      const across = Math.max(Math.max(...xs) - Math.min(...xs), Math.max(...ys) - Math.min(...ys));
      const scale = (5000 + (n % 6) * 1000) / across;
      return {
        name: `${properties.name} ${n}`,
        perimeter: ring.map(([x, y]): Vertex => [(x - xs[0]) * scale, (ys[0] - y) * scale]),
      };
    });
}

const outlines = courts();

test('there are a few dozen outlines', () => {
  expect(outlines.length).toBeGreaterThan(30);
});

test.each(outlines)('$name is laid as the oracle lays it, and its fill adds up', (court) => {
  const turn = (court.perimeter.length * 17) % 90;
  const document = parsed(
    documentOf({
      ground: { perimeter: court.perimeter, keepOuts: [] },
      units: [unitOf('a', 400, 198)],
      bond: { kind: 'herringbone', unit: 'a', joint: 4 },
      placement: { origin: [13, 7], turn },
      clearance: 5,
    }),
  );
  const laying = layFloor(document);
  const report = floorReport(laying);
  const oracle = oracleFloor(document);
  expect(oracle.undecided.size).toBe(0);
  expect(report.wholeUnits).toBe(oracle.laid.size);
  expect(report.leftOut).toBe(oracle.leftOut.size);
  expect(report.groundArea * 1e6).toBeCloseTo(oracle.groundArea, 1);
  if (oracle.leastGap === null) expect(report.leastGap).toBeNull();
  else expect(report.leastGap).toBeCloseTo(oracle.leastGap, 6);
  const fill = fillRegion(laying);
  if (!fill.ok) throw new Error(fill.reason);
  expect(Math.abs(fill.area - report.fillArea * 1e6)).toBeLessThan(
    0.001 * 1200 * laying.laid.count + 50,
  );
});
