import type { Course, CourseRun } from '@/paving/set-out/set-out-types';
import type { Unit } from '@/paving/layout-document';
import type { Display } from '@/paving/length';
import { formatCount } from '@/paving/count';
import { numbersWords, type CourseGroup } from './course-groups';
import { figureText, lengthText } from './figures';
import type { PanelRow } from './panel';
import { LINE_PITCH, panelText, textRows } from './panel';
import { tickBox } from './ruled-table';
import { LETTERING, textLines, textWidth } from './text-measure';

/** A floor of more units has no box for each of them: a box for each course, and courses that are alike together. */
const MOST_BOXED = 1500;

/** Whether a floor of so many units has its courses in compact lists. */
export const isCompact = (units: number): boolean => units > MOST_BOXED;

/** A box to tick with the space after it, and between columns, mm. */
const BOX = 4.6;
const SPACE = 3;

export interface CourseWords {
  readonly display: Display;
  readonly units: readonly Unit[];
  /** Lengths in compact columns, without a box for each unit. */
  readonly compact: boolean;
  /** What is said once for all courses, and not again of each. */
  readonly common: CommonWords;
}

/** From near to far edge of every unit, and from unit to unit, as printed; null where courses differ. */
export interface CommonWords {
  readonly size: string | null;
  readonly steps: string | null;
}

const AFTER: Readonly<Record<CourseRun['after'], string>> = {
  start: '',
  outside: 'beyond what is in the way',
  lifted: 'past the place left open',
  'left-out': 'past the unit left out',
};

/** Most units after which steps repeat, for them to be said. */
const LONGEST_REPEAT = 6;
/** Steps that differ by less are the same, mm. */
const SAME_STEP = 0.05;

/** From each unit's near edge to the next one's along the string, in turn as they repeat, mm; null where they do not. */
export function courseSteps({ runs }: Pick<Course, 'runs'>): readonly number[] | null {
  const steps = runs.map(({ ticks }) => ticks.slice(1).map(([near], n) => near - ticks[n][0]));
  for (let every = 1; every <= LONGEST_REPEAT; every += 1) {
    // Each run begins anew: only one step holds from run to run.
    const parts = every === 1 ? [steps.flat()] : steps.filter((run) => run.length > 0);
    if (parts.length !== 1 || parts[0].length < every) continue;
    const [all] = parts;
    if (all.every((step, n) => Math.abs(step - all[n % every]) < SAME_STEP))
      return all.slice(0, every);
  }
  return null;
}

/**
 * Courses that are alike: what they are made of, then the running lengths of their units, every one of them; each with a
 * box to tick, or in a compact list.
 */
export function courseRows(
  group: CourseGroup,
  words: CourseWords,
  width: number,
): readonly PanelRow[] {
  const [course] = group;
  const { display, compact } = words;
  const figure = (mm: number) => figureText(mm, display);
  const steps = compact ? courseSteps(course) : null;
  const size = compact ? alikeSize(course) : null;
  const numbers = group.map(({ number }) => number);
  const many = group.length > 1;
  const head = [
    `${many ? 'each ' : ''}${formatCount(course.units)} ${course.units === 1 ? 'unit' : 'units'}${kinds(course, words)}`,
    many
      ? `strings ${lengthText(course.length, display)} long`
      : `string ${course.number}a to ${course.number}b, ${lengthText(course.length, display)} long`,
    ...apartWords(group, display),
    `first unit ${lengthText(course.startGap, display)} from its start`,
    ...(steps === null || stepWords(steps, display) === words.common.steps
      ? []
      : [`then ${stepWords(steps, display)}`]),
    ...(size === null || size < 0.5 || sizeWords(size, display) === words.common.size
      ? []
      : [sizeWords(size, display)]),
    `last unit ${lengthText(course.endGap, display)} from its end`,
  ].join('; ');
  const outside = course.outside.map(
    ({ from, to, over }) => `${figure(from)} to ${figure(to)} is over ${over}`,
  );
  const lengths = (run: CourseRun, before: number) =>
    compact
      ? compactRows(run, { display, first: before + 1, nearOnly: size !== null }, width)
      : tickRows(run, words, width);
  const before = course.runs.map((_, n) =>
    course.runs.slice(0, n).reduce((sum, { units }) => sum + units, 0),
  );
  return [
    ...headRows(
      `${many ? 'Courses' : 'Course'} ${numbersWords(numbers)}`,
      `${head}.`,
      width,
      compact && !many,
    ),
    ...(compact && many ? laidRows(numbers, width) : []),
    ...(outside.length === 0 ? [] : kept(textRows(`On the string, ${outside.join('; ')}.`, width))),
    ...course.runs.flatMap((run, n) => [
      ...(n === 0 || AFTER[run.after] === ''
        ? []
        : kept(
            textRows(
              `Then ${formatCount(run.units)} more, ${AFTER[run.after]}, from ${figure(run.from)}:`,
              width,
            ),
          )),
      ...lengths(run, before[n]),
    ]),
    { height: 2, draw: () => [] },
  ];
}

/** How far the strings are from those before them: once where it is always the same. */
function apartWords(group: CourseGroup, display: Display): readonly string[] {
  const after = group.flatMap(({ number, step }) => (step === null ? [] : [{ number, step }]));
  if (after.length === 0) return [];
  if (group.length === 1)
    return [
      `${lengthText(after[0].step, display)} from the string of course ${after[0].number - 1}`,
    ];
  const said = [...new Set(after.map(({ step }) => lengthText(step, display)))];
  return said.length === 1
    ? [`${said[0]} from the string of the course before`]
    : said.map(
        (step) =>
          `${step} from the string of the course before: ${numbersWords(
            after
              .filter((each) => lengthText(each.step, display) === step)
              .map((each) => each.number),
          )}`,
      );
}

const sizeWords = (size: number, display: Display): string =>
  `each unit ${lengthText(size, display, 1)} from its near edge to its far edge`;

/** What may be said of all courses at once. */
export function commonWords(courses: readonly Course[], display: Display): CommonWords {
  const one = (all: readonly (string | null)[]) =>
    all.length > 0 && all.every((words) => words === all[0]) ? all[0] : null;
  // A course of one unit has no step to say.
  const stepped = courses.filter(({ units }) => units > 1);
  return {
    size: one(
      courses.map((course) => {
        const size = alikeSize(course);
        return size === null || size < 0.5 ? null : sizeWords(size, display);
      }),
    ),
    steps: one(
      stepped.map((course) => {
        const steps = courseSteps(course);
        return steps?.length === 1 ? stepWords(steps, display) : null;
      }),
    ),
  };
}

/** From near to far edge where that is the same of every unit of the course, mm; 0 where strings touch corners. */
function alikeSize({ runs }: Course): number | null {
  const sizes = runs.flatMap(({ ticks }) => ticks.map(([near, far]) => far - near));
  return sizes.every((size) => Math.abs(size - sizes[0]) < SAME_STEP) ? sizes[0] : null;
}

const stepWords = (steps: readonly number[], display: Display): string =>
  steps.length === 1
    ? `a unit every ${lengthText(steps[0], display, 1)}`
    : `units in steps of ${steps.map((step) => lengthText(step, display, 1)).join(', ')} in turn`;

const kept = (rows: readonly PanelRow[]): readonly PanelRow[] =>
  rows.map((row) => ({ ...row, keepsNext: 'needed' as const }));

/** How many of each unit, where there is more than one kind. */
function kinds({ byUnit }: Course, { units }: CourseWords): string {
  const used = units.filter(({ id }) => (byUnit[id] ?? 0) > 0);
  return units.length === 1
    ? ''
    : ` (${used.map(({ id, name }) => `${formatCount(byUnit[id])} ${name}`).join(', ')})`;
}

/** The course's name before what is said of it; a name too long for that has lines of its own. */
function headRows(
  title: string,
  words: string,
  width: number,
  boxed: boolean,
): readonly PanelRow[] {
  const box = boxed ? BOX : 0;
  const indent = 24 + box;
  const beside = box + textWidth(title, LETTERING.small, 700) <= indent - 2;
  const titles = beside ? [title] : textLines(title, width, LETTERING.small, 700);
  const lines = textLines(words, beside ? width - indent : width, LETTERING.small);
  const above = beside ? 0 : titles.length;
  return [
    {
      height: Math.max((above + lines.length) * LINE_PITCH, 5) + 0.8,
      keepsNext: 'needed',
      draw: ([x, y], _width, frame) => {
        const line = (n: number) => y + 0.65 + LETTERING.small + n * LINE_PITCH;
        return [
          ...(boxed ? [tickBox([x + 1.5, line(0) - 1.25])] : []),
          ...titles.map((text, n) => panelText([x + box, line(n)], text, frame, { weight: 700 })),
          ...lines.map((text, n) =>
            panelText([beside ? x + indent : x, line(above + n)], text, frame),
          ),
        ];
      },
    },
  ];
}

/** Boxes to tick in columns of one width, with what stands beside each. */
function boxRows(labels: readonly string[], width: number): readonly PanelRow[] {
  const pitch = BOX + SPACE + Math.max(...labels.map((label) => textWidth(label, LETTERING.small)));
  const across = Math.max(1, Math.floor((width + SPACE) / pitch));
  const lines = Array.from({ length: Math.ceil(labels.length / across) }, (_, n) =>
    labels.slice(n * across, (n + 1) * across),
  );
  return lines.map((line) => ({
    height: LINE_PITCH + 0.6,
    draw: ([x, y], _width, frame) =>
      line.flatMap((label, n) => [
        tickBox([x + n * pitch + 1.5, y + 0.5 + LETTERING.small - 1.25]),
        panelText([x + n * pitch + BOX, y + 0.5 + LETTERING.small], label, frame),
      ]),
  }));
}

/** A run's running lengths: near and far edge of each unit beside a box. */
const tickRows = (
  { ticks }: CourseRun,
  { display }: CourseWords,
  width: number,
): readonly PanelRow[] => {
  const figure = (mm: number) => figureText(mm, display);
  return boxRows(
    ticks.map(([near, far]) =>
      far - near < 0.5 ? figure(near) : `${figure(near)}–${figure(far)}`,
    ),
    width,
  );
};

/** A box for each of the courses, to tick when it lies. */
const laidRows = (numbers: readonly number[], width: number): readonly PanelRow[] =>
  kept(
    boxRows(
      numbers.map((number) => `${number} laid`),
      width,
    ),
  );

/** Lengths on a line of a compact list: round numbers, so that a unit's place is found by counting. */
const ACROSS = [25, 20, 15, 10, 5, 4, 2, 1] as const;
const NUMBER_SPACE = 3;

/** A run's running lengths in columns, each line with the number of its first unit in the course. */
function compactRows(
  { ticks }: CourseRun,
  { display, first, nearOnly }: { display: Display; first: number; nearOnly: boolean },
  width: number,
): readonly PanelRow[] {
  const figure = (mm: number) => figureText(mm, display);
  const labels = ticks.map(([near, far]) =>
    nearOnly || far - near < 0.5 ? figure(near) : `${figure(near)}–${figure(far)}`,
  );
  const numbered = (n: number) => `${formatCount(first + n)}:`;
  const name = NUMBER_SPACE + textWidth(numbered(ticks.length - 1), LETTERING.small, 600);
  const widest = Math.max(...labels.map((label) => textWidth(label, LETTERING.small)));
  const room = width - name;
  const across = ACROSS.find((count) => count * (widest + SPACE) <= room + SPACE) ?? 1;
  const pitch = Math.min(room / across, widest + 2 * SPACE);
  return Array.from({ length: Math.ceil(labels.length / across) }, (_, l): PanelRow => {
    const line = labels.slice(l * across, (l + 1) * across);
    return {
      height: LINE_PITCH,
      draw: ([x, y], _width, frame) => {
        const at = y + 0.65 + LETTERING.small;
        return [
          panelText([x + name - NUMBER_SPACE, at], numbered(l * across), frame, {
            weight: 600,
            anchor: 'end',
          }),
          ...line.map((label, n) =>
            panelText([x + name + n * pitch + widest, at], label, frame, { anchor: 'end' }),
          ),
        ];
      },
    };
  });
}
