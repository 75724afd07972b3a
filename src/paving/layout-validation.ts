import { z } from 'zod';
import { arcLength } from '@/geometry/arc';
import { latticeCell } from '@/geometry/lattice';
import { bondPattern, documentUnit } from './bond';
import { bondProblems } from './bond-validation';
import type { DocumentProblem } from './document-problem';
import { ringEdges } from './ground';
import { levelProblems } from './levels';
import { layoutDocumentSchema, type LayoutDocument } from './layout-document';
import { ringAnticlockwise, ringProblems, vertexRingArea } from './ring-validation';
import { choiceTurned, datumProblems } from './set-out/datum-choice';

export type { DocumentProblem } from './document-problem';

/** A floor of more candidate units than this is refused. */
const GREATEST_CANDIDATES = 2_000_000;
/** Addresses are kept as 32-bit whole numbers. */
const GREATEST_ADDRESS = 2 ** 31 - 1;

export type ParsedDocument =
  | { readonly ok: true; readonly document: LayoutDocument }
  | { readonly ok: false; readonly problems: DocumentProblem[] };

type Issue = z.core.$ZodIssue;

/** A choice of shapes is reported by the shape that the input came nearest to. */
function nearestIssues(issue: Issue): Issue[] {
  if (issue.code !== 'invalid_union' || issue.errors.length === 0) return [issue];
  const deepest = (issues: readonly Issue[]) =>
    issues.reduce((depth, { path }) => Math.max(depth, path.length), 0);
  const nearest = [...issue.errors].sort(
    (one, other) => deepest(other) - deepest(one) || one.length - other.length,
  )[0];
  return nearest.flatMap((inner) =>
    nearestIssues({ ...inner, path: [...issue.path, ...inner.path] }),
  );
}

/** The schema's own words where it has them, else plain ones for what the library says. */
function issueMessage(issue: Issue): string {
  if (!/^(Invalid|Too|Unrecognized)/.test(issue.message)) return issue.message;
  switch (issue.code) {
    case 'invalid_type':
      return issue.message.endsWith('received undefined')
        ? 'is missing'
        : `must be ${/^[aeio]/.test(issue.expected) ? 'an' : 'a'} ${issue.expected === 'int' ? 'whole number' : issue.expected}`;
    case 'invalid_value':
      return `must be one of ${issue.values.map(String).join(', ')}`;
    case 'too_big':
      return `must be at most ${issue.maximum}${issue.origin === 'number' ? '' : ' long'}`;
    case 'too_small':
      return `must be at least ${issue.minimum}${issue.origin === 'number' ? '' : ' long'}`;
    default:
      return issue.message;
  }
}

/** A corner of a ring that is not one says what a corner is. */
function issueProblem(issue: Issue): DocumentProblem {
  const path = issue.path.map((step) => (typeof step === 'symbol' ? String(step) : step));
  const ring = path[1] === 'perimeter' ? 2 : path[1] === 'keepOuts' && path[3] === 'ring' ? 4 : -1;
  return path[0] === 'ground' && path.length === ring + 1
    ? { path, message: 'must be a corner [x, y] or [x, y, bulge]' }
    : { path, message: issueMessage(issue) };
}

const shownCount = (count: number) =>
  count >= 1e6
    ? `${(Math.ceil(count / 1e5) / 10).toLocaleString('en-GB')} million`
    : Math.ceil(count).toLocaleString('en-GB');

/**
 * How many units may have to be looked at, whatever the turn and the start: those that the
 * ground's area holds and those along its edges.
 */
function candidateUnits(document: LayoutDocument): number {
  const pattern = bondPattern(document);
  const cell = Math.abs(latticeCell(pattern));
  const rings = [document.ground.perimeter, ...document.ground.keepOuts.map(({ ring }) => ring)];
  const length = rings.reduce(
    (sum, ring) =>
      ringEdges(ring).reduce(
        (along, { start, end, bulge }) => along + arcLength(start, end, bulge),
        sum,
      ),
    0,
  );
  const area = Math.abs(vertexRingArea(document.ground.perimeter));
  return pattern.motif.reduce((sum, { unit }) => {
    const { length: long, width } = documentUnit(document, unit);
    return sum + (area + length * (Math.hypot(long, width) / 2 + Math.sqrt(cell))) / cell;
  }, 0);
}

function sizeProblems(document: LayoutDocument): DocumentProblem[] {
  const candidates = candidateUnits(document);
  if (!(candidates <= GREATEST_CANDIDATES)) {
    const pattern = bondPattern(document);
    const used = new Set(pattern.motif.map(({ unit }) => unit));
    const smallest = document.units
      .map((unit, n) => ({ n, unit }))
      .filter(({ unit }) => used.has(unit.id))
      .reduce((least, each) =>
        each.unit.length * each.unit.width < least.unit.length * least.unit.width ? each : least,
      );
    const { length, width } = smallest.unit;
    const times = candidates / GREATEST_CANDIDATES;
    const area = Math.abs(vertexRingArea(document.ground.perimeter)) / 1e6;
    return [
      {
        path: ['units', smallest.n],
        message: `a floor of about ${shownCount(candidates)} units is more than the ${shownCount(GREATEST_CANDIDATES)} that can be laid at once; use units larger than ${length} × ${width} mm (about ${Math.ceil(Math.sqrt(times) * 10) / 10} times each way), or split the ground of ${Math.round(area).toLocaleString('en-GB')} m² into floors of ${Math.floor(area / times).toLocaleString('en-GB')} m² or less`,
      },
    ];
  }
  return addressProblems(document);
}

/** Patterns that start so far from the ground that its addresses would not fit. */
function addressProblems(document: LayoutDocument): DocumentProblem[] {
  const { a, b } = bondPattern(document);
  const cell = Math.abs(latticeCell({ a, b }));
  const [ox, oy] = document.placement.origin;
  const far = document.ground.perimeter.reduce(
    (most, [x, y]) => Math.max(most, Math.hypot(x - ox, y - oy)),
    0,
  );
  const most =
    ((far + GREATEST_CELL_REACH_MM) * Math.max(Math.hypot(...a), Math.hypot(...b))) / cell;
  if (most < GREATEST_ADDRESS) return [];
  return [
    {
      path: ['placement', 'origin'],
      message:
        'lies too far from the ground for units this small to be numbered from it; move it nearer',
    },
  ];
}

/** Motif and unit together reach no farther than this from a lattice point that matters, mm. */
const GREATEST_CELL_REACH_MM = 200_000;

/**
 * The one way in for a document from outside. Checks the shape of each field, then what fields
 * must satisfy together; every problem has the path of the field, the reason and what would do,
 * and the place on the ground where there is one. A document that passes has its rings
 * anticlockwise (the first corner stays first) and unknown fields left out.
 */
export function parseLayoutDocument(input: unknown): ParsedDocument {
  const parsed = layoutDocumentSchema.safeParse(input);
  if (!parsed.success) {
    return { ok: false, problems: parsed.error.issues.flatMap(nearestIssues).map(issueProblem) };
  }
  const { ground, setOut } = parsed.data;
  const turned = (ring: number) =>
    vertexRingArea(ring === 0 ? ground.perimeter : ground.keepOuts[ring - 1].ring) < 0;
  const document: LayoutDocument = {
    ...parsed.data,
    ...(setOut && { setOut: choiceTurned(setOut, ground, turned) }),
    ground: {
      perimeter: ringAnticlockwise(ground.perimeter),
      keepOuts: ground.keepOuts.map((keepOut) => ({
        ...keepOut,
        ring: ringAnticlockwise(keepOut.ring),
      })),
    },
  };
  const bond = bondProblems(document);
  // A floor too large to lay is said to be so before its outlines are looked into.
  const size = bond.length === 0 ? sizeProblems(document) : [];
  const problems =
    size.length > 0
      ? size
      : [
          ...ringProblems(document.ground),
          ...bond,
          ...levelProblems(document),
          ...datumProblems(document),
        ];
  return problems.length > 0 ? { ok: false, problems } : { ok: true, document };
}
