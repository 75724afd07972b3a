import { z } from 'zod';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { DocumentProblem } from '../document-problem';
import type { LayoutDocument, Vertex } from '../layout-document';

/** The set-out as the document keeps it: the two corners that somebody chose to tape from. */

const corner = z.tuple([z.number().int().min(0), z.number().int().min(0)], {
  error: 'must be a corner [ring, vertex], such as [0, 2]',
});

/** The corners that a person chose to tape from. */
export const setOutChoiceSchema = z.object({
  /** Ring (0 the perimeter, 1 the first keep-out …) and vertex of each; left out, the program picks. */
  datums: z.tuple([corner, corner], { error: 'must be two corners, each [ring, vertex]' }),
});

export type SetOutChoice = z.infer<typeof setOutChoiceSchema>;

/** Corners nearer than this are no baseline: a tape cannot tell its direction, mm. */
export const LEAST_BASELINE_MM = 300;

type Ground = LayoutDocument['ground'];

const ringOf = (ground: Ground, ring: number): readonly Vertex[] | undefined =>
  ring === 0 ? ground.perimeter : ground.keepOuts[ring - 1]?.ring;

/** The first tape's corner and the second's exist, and lie far enough apart to tape from. */
export function datumProblems({ ground, setOut }: LayoutDocument): DocumentProblem[] {
  if (!setOut) return [];
  const problems = setOut.datums.flatMap(([ring, vertex], n): DocumentProblem[] => {
    const path = ['setOut', 'datums', n];
    const vertices = ringOf(ground, ring);
    if (!vertices) {
      const { length } = ground.keepOuts;
      return [
        {
          path: [...path, 0],
          message: `there is no ring ${ring}; ${length === 0 ? 'the ground has only its perimeter, ring 0' : `rings run from 0, the perimeter, to ${length}`}`,
        },
      ];
    }
    if (vertex < vertices.length) return [];
    return [
      {
        path: [...path, 1],
        message: `ring ${ring} has no corner ${vertex}; its corners run from 0 to ${vertices.length - 1}`,
      },
    ];
  });
  if (problems.length > 0) return problems;
  const [first, second] = setOut.datums.map(([ring, vertex]) => ringOf(ground, ring)![vertex]);
  const apart = Math.hypot(second[0] - first[0], second[1] - first[1]);
  if (apart >= LEAST_BASELINE_MM) return [];
  return [
    {
      path: ['setOut', 'datums', 1],
      message:
        apart < LENGTH_TOLERANCE_MM
          ? 'is the same place as the first; tape from two different corners'
          : `lies only ${Math.round(apart)} mm from the first; take corners at least ${LEAST_BASELINE_MM} mm apart`,
      at: [second[0], second[1]],
    },
  ];
}

/** The choice for rings that were turned round about their first corner, as `ringAnticlockwise` does. */
export function choiceTurned(
  { datums: [first, second] }: SetOutChoice,
  ground: Ground,
  turned: (ring: number) => boolean,
): SetOutChoice {
  const one = ([ring, vertex]: SetOutChoice['datums'][0]): SetOutChoice['datums'][0] => {
    const count = ringOf(ground, ring)?.length ?? 0;
    return vertex < count && turned(ring) ? [ring, (count - vertex) % count] : [ring, vertex];
  };
  return { datums: [one(first), one(second)] };
}

/**
 * `after` with the choice that `before` had, by the corners that still stand where they stood where rings have
 * gained or lost corners; the choice is dropped where one of its corners is gone.
 */
export function choiceKept(before: LayoutDocument, after: LayoutDocument): LayoutDocument {
  if (!after.setOut || before.ground === after.ground || after.setOut !== before.setOut)
    return after;
  const rings = (ground: Ground) => [ground.perimeter, ...ground.keepOuts.map(({ ring }) => ring)];
  const old = rings(before.ground);
  const now = rings(after.ground);
  const sameCounts =
    old.length === now.length && old.every((ring, n) => ring.length === now[n].length);
  if (sameCounts) return after;
  const datums: SetOutChoice['datums'][0][] = [];
  for (const [ring, vertex] of after.setOut.datums) {
    const at = old[ring]?.[vertex];
    // The same ring first, then any: a keep-out taken away renumbers those after it.
    const order = [ring, ...now.keys()].filter((n) => n < now.length);
    const found = order
      .map((n) => [n, now[n].findIndex(([x, y]) => x === at?.[0] && y === at[1])] as const)
      .find(([, n]) => n >= 0);
    if (found) datums.push([found[0], found[1]]);
  }
  return datums.length === 2
    ? { ...after, setOut: { datums: [datums[0], datums[1]] } }
    : { ...after, setOut: undefined };
}
