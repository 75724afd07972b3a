import fc from 'fast-check';
import { expect, test } from 'vitest';
import { mostPairs } from '@/paving/cutting/matching';

type Edge = readonly [number, number];

function pairs(count: number, edges: readonly Edge[]): number {
  const near: number[][] = Array.from({ length: count }, () => []);
  for (const [a, b] of edges) {
    near[a].push(b);
    near[b].push(a);
  }
  const mate = mostPairs(near);
  mate.forEach((other, n) => {
    if (other < 0) return;
    expect(mate[other]).toBe(n);
    expect(near[n]).toContain(other);
  });
  return mate.reduce((sum, other) => sum + (other >= 0 ? 0.5 : 0), 0);
}

/** Every choice of edges tried. */
function bruteForce(edges: readonly Edge[], taken: ReadonlySet<number> = new Set()): number {
  if (edges.length === 0) return 0;
  const [[a, b], ...rest] = edges;
  const without = bruteForce(rest, taken);
  if (taken.has(a) || taken.has(b)) return without;
  return Math.max(without, 1 + bruteForce(rest, new Set([...taken, a, b])));
}

const ring = (count: number): Edge[] =>
  Array.from({ length: count }, (_, n) => [n, (n + 1) % count] as const);

test('rings, complete graphs and the Petersen graph have the pairs that graph theory gives them', () => {
  // ⌊n/2⌋ for rings and complete graphs; the Petersen graph has a perfect matching (Petersen 1891).
  for (const count of [3, 4, 5, 8, 9])
    expect(pairs(count, ring(count))).toBe(Math.floor(count / 2));
  for (const count of [4, 5, 7]) {
    const all = ring(count).flatMap((_, a) =>
      Array.from({ length: count - a - 1 }, (_, n): Edge => [a, a + n + 1]),
    );
    expect(pairs(count, all)).toBe(Math.floor(count / 2));
  }
  const inner = Array.from({ length: 5 }, (_, n): Edge => [5 + n, 5 + ((n + 2) % 5)]);
  const spokes = Array.from({ length: 5 }, (_, n): Edge => [n, 5 + n]);
  expect(pairs(10, [...ring(5), ...inner, ...spokes])).toBe(5);
});

test('two triangles joined by an edge need the odd rings drawn together', () => {
  const edges: Edge[] = [[0, 1], [1, 2], [2, 0], [2, 3], [3, 4], [4, 5], [5, 3]]; // prettier-ignore
  expect(pairs(6, edges)).toBe(3);
});

test('whatever the graph, no other choice of pairs has more', () => {
  const graph = fc.integer({ min: 2, max: 10 }).chain((count) =>
    fc.record({
      count: fc.constant(count),
      edges: fc.uniqueArray(
        fc
          .tuple(fc.nat(count - 1), fc.nat(count - 1))
          .filter(([a, b]) => a < b)
          .map(([a, b]): Edge => [a, b]),
        { maxLength: 15, selector: (edge) => edge.join() },
      ),
    }),
  );
  fc.assert(
    fc.property(graph, ({ count, edges }) => {
      expect(pairs(count, edges)).toBe(bruteForce(edges));
    }),
    { numRuns: 400, seed: 11 },
  );
});
