import { arcIsStraight } from '@/geometry/arc';
import { documentEdgeName } from '../edge-names';
import type { GroundEdge } from '../ground';
import type { Laying } from '../laying';
import { figured } from '../figured-words';
import { MM_PER_FOOT } from '../length';
import { wholeReport, type Report } from '../report';
import { cornerLabel, cornerTurns } from './marks';
import type { Check, Course, Diagonal, SetOut } from './set-out-types';
import { TAPE_READING_MM } from './tape-cross';

/** Published by the trade's institute for interlocking concrete pavements, on one sheet; in mm where it has inches and mm. */
const ICPI = 'ICPI, Construction Tolerances for Interlocking Concrete Pavements';
const JOINT_MM = { least: 2, greatest: 5 } as const;
const FLATNESS_MM = 10;
/** The sheet names both, 10 ft (3 m): each tape has its own. */
const STRAIGHTEDGE_MM = { metric: 3000, imperial: 10 * MM_PER_FOOT } as const;
const STEP_MM = 3;
const BASE_MM = { under: 13, over: 20 } as const;
const BOND_LINE_MM = { off: 13, over: 16_000 } as const;

const PLAY = 'the play of this plan: more, and a unit comes too near to the edge';
const CLEARANCE = 'the clearance of this plan';
const SQUARE = '3-4-5 method, FAO Irrigation Training Manual 2; limit from the bond lines of ICPI';
const PRACTICE = 'common practice';

/** Checks of one kind are no more than this; then those that matter most. */
const MOST_OF_A_KIND = 24;
/** Edges shorter than this are not measured for themselves, mm. */
const LEAST_EDGE_MM = 300;
/** Strings are checked from the first to about every three metres, mm. */
const ROWS_EVERY_MM = 3000;
/** Units laid one after another that are measured together. */
const RUN_UNITS = 10;
/** How far a corner that is square may be off a right angle on paper, degrees. */
const SQUARE_DEG = 0.01;
/** A corner out by the play moves a diagonal by about this much of it: cos 45°. */
const DIAGONAL_SHARE = Math.SQRT1_2;

/** How near to its figure an edge or a run of strings is built, whatever the play: common practice, mm. */
const CAREFUL_MM = 10;

/** Sides of 3, 4 and 5 of these, the largest that fits along both edges, mm. */
const THREE_FOUR_FIVE = {
  metric: [2000, 1500, 1000, 600, 500, 300, 200],
  imperial: [8, 6, 4, 3, 2, 1].map((feet) => feet * MM_PER_FOOT),
} as const;

interface Floor {
  readonly laying: Laying;
  readonly report: Report;
  readonly courses: readonly Course[];
  readonly diagonals: readonly Diagonal[];
}

const around = (expected: number, off: number) => ({
  expected,
  least: expected - off,
  greatest: expected + off,
});

/**
 * What a length may be off: as much as the floor has play, never finer than a tape is read, and never more than
 * a careful edge is built to.
 */
function lengthLimit({ play }: Report, share = 1): { off: number; source: string } {
  const off = Math.max(TAPE_READING_MM, (play ?? 0) * share);
  return off > CAREFUL_MM ? { off: CAREFUL_MM, source: PRACTICE } : { off, source: PLAY };
}

const isStraight = ({ start, end, bulge }: GroundEdge) => arcIsStraight(start, end, bulge);

function edgeChecks({ laying, report }: Floor): Check[] {
  const limit = lengthLimit(report);
  return laying.ground.rings[0].edges
    .filter((edge) => isStraight(edge) && edge.length >= LEAST_EDGE_MM)
    .sort((one, other) => other.length - one.length)
    .slice(0, MOST_OF_A_KIND)
    .sort((one, other) => one.edge - other.edge)
    .map(({ edge, length }) => {
      const name = documentEdgeName(laying.document, 0, edge);
      return {
        id: `edge-${name}`,
        kind: 'edge',
        what: `Measure edge ${name}`,
        from: cornerLabel(0, edge),
        to: cornerLabel(0, (edge + 1) % laying.ground.rings[0].edges.length),
        ...around(length, limit.off),
        source: limit.source,
      };
    });
}

function diagonalChecks({ report, diagonals }: Floor): Check[] {
  const limit = lengthLimit(report, DIAGONAL_SHARE);
  return diagonals.map(({ from, to, length, sameAs }) => ({
    id: `diagonal-${from}-${to}`,
    kind: 'diagonal',
    what: `Measure from ${from} to ${to}${sameAs ? `; it must read the same as ${sameAs.join(' to ')}` : ''}`,
    from,
    to,
    ...around(length, limit.off),
    source: limit.source,
  }));
}

function squareChecks({ laying }: Floor): Check[] {
  const { display } = laying.document;
  const [ring] = laying.ground.rings;
  const turns = cornerTurns(ring);
  return ring.edges
    .flatMap((edge, n): Check[] => {
      const before = ring.edges[(n + ring.edges.length - 1) % ring.edges.length];
      if (!isStraight(edge) || !isStraight(before)) return [];
      if (Math.abs(turns[n] - 90) > SQUARE_DEG) return [];
      const longer = Math.max(edge.length, before.length);
      const shorter = Math.min(edge.length, before.length);
      const side = THREE_FOUR_FIVE[display].find((k) => 4 * k <= longer && 3 * k <= shorter);
      if (!side) return [];
      const corner = cornerLabel(0, n);
      const far = (n + 1) % ring.edges.length;
      const ends = [cornerLabel(0, far), cornerLabel(0, before.edge)];
      const [four, three] = edge.length >= before.length ? ends : [ends[1], ends[0]];
      // A right angle out by α moves the far mark by 4k·α, and the five by 3k/5k of that.
      const off = (2.4 * side * BOND_LINE_MM.off) / BOND_LINE_MM.over;
      return [
        {
          id: `square-${corner}`,
          kind: 'square',
          what: figured`From ${corner} mark ${{ mm: 3 * side }} towards ${three} and ${{ mm: 4 * side }} towards ${four}; measure between the marks`,
          from: corner,
          ...around(5 * side, Math.max(TAPE_READING_MM, off)),
          source: SQUARE,
        },
      ];
    })
    .slice(0, MOST_OF_A_KIND);
}

function gapChecks({ laying, report }: Floor): Check[] {
  const { clearance } = laying.document;
  return report.edges
    .filter(({ least }) => least !== null)
    .sort((one, other) => one.least! - other.least!)
    .slice(0, MOST_OF_A_KIND)
    .sort((one, other) => one.ring - other.ring || one.edge - other.edge)
    .map(({ ring, edge, least }) => {
      const name = documentEdgeName(laying.document, ring, edge);
      return {
        id: `gap-${name}`,
        kind: 'gap',
        what: `Smallest gap between the units and ${ring === 0 ? 'edge' : 'side'} ${name}`,
        expected: least!,
        least: clearance,
        greatest: null,
        source: CLEARANCE,
      };
    });
}

const rowsId = (from: Course, to: Course) => `rows-${from.row}-${to.row}`;

/** From one string to another; `span` is from the first string to the last, mm. */
function rowCheck(report: Report, from: Course, to: Course, apart: number, span: number): Check {
  const limit = lengthLimit(report, apart / span);
  return {
    id: rowsId(from, to),
    kind: 'rows',
    what: `From the string of course ${from.number} to that of course ${to.number}, square to them`,
    from: String(from.number),
    to: String(to.number),
    ...around(apart, limit.off),
    source: limit.source,
  };
}

/** How far each course's string is from the first one's, mm. */
const stringHeights = (courses: readonly Course[]): readonly number[] => {
  let height = 0;
  return courses.map(({ step }) => (height += step ?? 0));
};

function rowChecks({ report, courses }: Floor): Check[] {
  if (courses.length < 2) return [];
  const heights = stringHeights(courses);
  const all = heights[heights.length - 1];
  const every = Math.max(ROWS_EVERY_MM, all / MOST_OF_A_KIND);
  const checks: Check[] = [];
  let last = 0;
  courses.forEach((course, n) => {
    const final = n === courses.length - 1;
    if (n === 0 || (heights[n] - last < every && !final)) return;
    last = heights[n];
    checks.push(rowCheck(report, courses[0], course, heights[n], all));
  });
  return checks;
}

/** Whether an id is that of a check between two of so many rows, listed or not. */
export function isRowsCheck(id: string, rows: number): boolean {
  const [, from, to] = /^rows-([1-9]\d*)-([1-9]\d*)$/.exec(id) ?? [];
  return from !== undefined && from !== to && Number(from) <= rows && Number(to) <= rows;
}

/**
 * The check that a reading is of: one of the list, or, of strings that were measured from another start of the work than
 * the one of today, that of those two strings. Null when there is no such check on the floor.
 */
export function checkById(
  laying: Laying,
  { checks, courses }: Pick<SetOut, 'checks' | 'courses'>,
  id: string,
): Check | null {
  const listed = checks.find((check) => check.id === id);
  if (listed) return listed;
  if (!isRowsCheck(id, courses.length)) return null;
  const [from, to] = id
    .split('-')
    .slice(1)
    .map((row) => courses.findIndex((course) => course.row === Number(row)));
  const heights = stringHeights(courses);
  return rowCheck(
    wholeReport(laying),
    courses[from],
    courses[to],
    Math.abs(heights[to] - heights[from]),
    heights[heights.length - 1],
  );
}

/** The list, and after it what else there are readings of. */
export function checksWithReadings(
  laying: Laying,
  plan: Pick<SetOut, 'checks' | 'courses'>,
  readings: Iterable<string>,
): readonly Check[] {
  const listed = new Set(plan.checks.map(({ id }) => id));
  const others = [...readings].filter((id) => !listed.has(id));
  return [...plan.checks, ...others.flatMap((id) => checkById(laying, plan, id) ?? [])];
}

function runChecks({ laying, report, courses }: Floor): Check[] {
  const longest = courses
    .flatMap((course) => course.runs.map((run) => ({ course, run })))
    .reduce<{ course: Course; run: Course['runs'][number] } | null>(
      (best, each) => (!best || each.run.units > best.run.units ? each : best),
      null,
    );
  if (!longest || longest.run.units < 2) return [];
  const { course, run } = longest;
  const count = Math.min(RUN_UNITS, run.units);
  const length = run.ticks[count - 1][1] - run.ticks[0][0];
  const { tolerance } = laying.motif[laying.laid.k[run.laid[0]]].unit;
  const limit = tolerance
    ? {
        off: Math.max(TAPE_READING_MM, count * tolerance),
        source: 'the tolerance of the unit, every unit off the same way',
      }
    : lengthLimit(report, length / course.length);
  return [
    {
      id: `run-${count}`,
      kind: 'run',
      what: `${count} units one after another along a string, from the near side of the first to the far side of the last`,
      from: String(course.number),
      ...around(length, limit.off),
      source: limit.source,
    },
  ];
}

function jointChecks({ laying }: Floor): Check[] {
  const { joint, document } = laying;
  if (document.bond.kind === 'stepping' || joint <= 0) return [];
  const byTrade = joint >= JOINT_MM.least && joint <= JOINT_MM.greatest;
  return [
    {
      id: 'joint',
      kind: 'joint',
      what: 'Width of any joint',
      ...(byTrade ? { expected: joint, ...JOINT_MM } : around(joint, TAPE_READING_MM)),
      source: byTrade ? ICPI : PRACTICE,
    },
  ];
}

function surfaceChecks({ laying, courses }: Floor): Check[] {
  const { buildUp } = laying.document;
  const longest = Math.max(...courses.map(({ length }) => length));
  const off = Math.max(TAPE_READING_MM, (BOND_LINE_MM.off * longest) / BOND_LINE_MM.over);
  const checks: Check[] = [
    {
      id: 'line',
      kind: 'line',
      what: 'Stretch a string along a course, end to end: how far the units stray from it',
      expected: 0,
      least: 0,
      greatest: off,
      source: ICPI,
    },
    {
      id: 'flatness',
      kind: 'flatness',
      what: figured`Widest gap under a ${{ mm: STRAIGHTEDGE_MM }} straightedge, anywhere, either way`,
      expected: 0,
      least: 0,
      greatest: FLATNESS_MM,
      source: ICPI,
    },
    {
      id: 'step',
      kind: 'step',
      what: 'Step from one unit to the next where people walk',
      expected: 0,
      least: 0,
      greatest: STEP_MM,
      source: ICPI,
    },
  ];
  if (buildUp && buildUp.base > 0) {
    checks.unshift(
      {
        id: 'base',
        kind: 'layer',
        what: 'Thickness of the base, compacted',
        expected: buildUp.base,
        least: buildUp.base - BASE_MM.under,
        greatest: buildUp.base + BASE_MM.over,
        source: ICPI,
      },
      {
        id: 'base-flatness',
        kind: 'layer',
        what: figured`Widest gap between the base and a ${{ mm: STRAIGHTEDGE_MM }} straightedge`,
        expected: 0,
        least: 0,
        greatest: FLATNESS_MM,
        source: ICPI,
      },
    );
  }
  return checks;
}

/** What to measure, in the order of the work. Nothing is checked of a floor without units but its ground. */
export function setOutChecks(floor: Floor): Check[] {
  const ground = [...edgeChecks(floor), ...diagonalChecks(floor), ...squareChecks(floor)];
  if (floor.courses.length === 0) return ground;
  return [
    ...ground,
    ...rowChecks(floor),
    ...runChecks(floor),
    ...jointChecks(floor),
    ...gapChecks(floor),
    ...surfaceChecks(floor),
  ];
}
