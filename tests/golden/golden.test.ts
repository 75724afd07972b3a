import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { oracleFacing, oracleFloor } from '../oracle/brute-force';
import { parsed } from '../oracle/documents';

/**
 * One folder a case, named after its topology. `expected.json` was worked out by the brute-force
 * oracle (JSTS, unit by unit; gaps by rays 0.25 mm apart), never by the core. To add a case, write
 * its layout.json and run this file with GOLDEN=write, which asks the oracle for what is missing.
 */

interface Expected {
  readonly wholeUnits: number;
  readonly leftOut: number;
  readonly lifted: number;
  readonly groundArea: number;
  readonly coveredArea: number;
  readonly leastGap: number | null;
  readonly edges: readonly { facing: number; least: number | null; greatest: number | null }[];
}

const folder = new URL('./', import.meta.url);
const read = (name: string, file: string): unknown =>
  JSON.parse(readFileSync(new URL(`${name}/${file}`, folder), 'utf8'));
const cases = readdirSync(folder, { withFileTypes: true })
  .filter((entry) => entry.isDirectory())
  .map(({ name }) => name);

const RAY_STEP_MM = 0.25;

function oracleExpects(name: string): Expected {
  const floor = oracleFloor(parsed(read(name, 'layout.json')));
  if (floor.undecided.size > 0) {
    throw new Error(`${name}: the oracle cannot decide ${[...floor.undecided].join(' ')}`);
  }
  return {
    wholeUnits: floor.laid.size,
    leftOut: floor.leftOut.size,
    lifted: floor.lifted.size,
    groundArea: floor.groundArea / 1e6,
    coveredArea: floor.coveredArea / 1e6,
    leastGap: floor.leastGap,
    edges: floor.edges.map((edge) => {
      const gaps = [...oracleFacing(floor, edge, RAY_STEP_MM).values()]
        .filter(({ rays }) => rays > 0)
        .map(({ gap }) => gap);
      return {
        facing: gaps.length,
        least: gaps.length ? Math.min(...gaps) : null,
        greatest: gaps.length ? Math.max(...gaps) : null,
      };
    }),
  };
}

function expectedOf(name: string): Expected {
  const file = new URL(`${name}/expected.json`, folder);
  if (process.env.GOLDEN === 'write') {
    writeFileSync(file, `${JSON.stringify(oracleExpects(name), null, 2)}\n`);
  }
  return read(name, 'expected.json') as Expected;
}

/** Arcs may be flattened in more than one way, apart by no more than this. */
const ARC_MM = 0.06;

test.each(cases)('%s', (name) => {
  const expected = expectedOf(name);
  const document = parsed(read(name, 'layout.json'));
  const laying = layFloor(document);
  const report = floorReport(laying);
  const arcs = laying.ground.edges.some(({ bulge }) => bulge !== 0);
  const near = (one: number | null, other: number | null, slack: number) => {
    if (one === null || other === null) expect(one).toBe(other);
    else expect(Math.abs(one - other)).toBeLessThanOrEqual(slack);
  };
  expect(report.wholeUnits).toBe(expected.wholeUnits);
  expect(report.leftOut).toBe(expected.leftOut);
  expect(report.lifted).toBe(expected.lifted);
  near(report.groundArea, expected.groundArea, arcs ? 0.002 : 1e-9);
  near(report.coveredArea, expected.coveredArea, 1e-9);
  near(report.leastGap, expected.leastGap, arcs ? ARC_MM : 1e-6);
  expect(report.edges).toHaveLength(expected.edges.length);
  report.edges.forEach((edge, n) => {
    expect([n, edge.facing]).toEqual([n, expected.edges[n].facing]);
    near(edge.least, expected.edges[n].least, arcs ? 0.3 : 1e-6);
    near(edge.greatest, expected.edges[n].greatest, arcs ? 0.3 : 1e-6);
  });
});
