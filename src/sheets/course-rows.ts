import type { Course, CourseRun } from '@/paving/set-out/set-out-types';
import type { Unit } from '@/paving/layout-document';
import type { Display } from '@/paving/length';
import { formatCount } from '@/paving/count';
import { figureText, lengthText } from './figures';
import type { PanelRow } from './panel';
import { LINE_PITCH, panelText, textRows } from './panel';
import { tickBox } from './ruled-table';
import { LETTERING, textLines, textWidth } from './text-measure';

/** Of a floor with more units than the first of each, only every so many are given, and a run's first and last. */
const SPARSER: readonly (readonly [units: number, every: number])[] = [
  [1500, 1],
  [8000, 5],
  [Infinity, 10],
];

/** Every how many units a running length is given. */
export const ticksEvery = (units: number): number =>
  SPARSER.find(([most]) => units <= most)?.[1] ?? 1;

export interface CourseWords {
  readonly display: Display;
  readonly units: readonly Unit[];
  /** Every how many units a running length is given, in courses whose steps repeat. */
  readonly every: number;
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

/** One course: what it is made of, then the running lengths of its units, each with a box to tick. */
export function courseRows(course: Course, words: CourseWords, width: number): readonly PanelRow[] {
  const { display } = words;
  const figure = (mm: number) => figureText(mm, display);
  const steps = words.every === 1 ? null : courseSteps(course);
  // Without a step to go by, every unit has its length.
  const given = steps === null ? { ...words, every: 1 } : words;
  const head = [
    `${formatCount(course.units)} ${course.units === 1 ? 'unit' : 'units'}${kinds(course, words)}`,
    `string ${course.number}a to ${course.number}b, ${lengthText(course.length, display)} long`,
    ...(course.step === null
      ? []
      : [`${lengthText(course.step, display)} from the string of course ${course.number - 1}`]),
    `first unit ${lengthText(course.startGap, display)} from its start`,
    ...(steps === null ? [] : [stepWords(steps, display)]),
    `last unit ${lengthText(course.endGap, display)} from its end`,
  ].join('; ');
  const outside = course.outside.map(
    ({ from, to, over }) => `${figure(from)} to ${figure(to)} is over ${over}`,
  );
  const title = `Course ${course.number}`;
  return [
    headRow(title, `${head}.`, width),
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
      ...tickRows(run, given, width),
    ]),
    { height: 2, draw: () => [] },
  ];
}

const stepWords = (steps: readonly number[], display: Display): string =>
  steps.length === 1
    ? `then a unit every ${lengthText(steps[0], display, 1)}`
    : `then units in steps of ${steps.map((step) => lengthText(step, display, 1)).join(', ')} in turn`;

const kept = (rows: readonly PanelRow[]): readonly PanelRow[] =>
  rows.map((row) => ({ ...row, keepsNext: 'needed' as const }));

/** How many of each unit, where there is more than one kind. */
function kinds({ byUnit }: Course, { units }: CourseWords): string {
  const used = units.filter(({ id }) => (byUnit[id] ?? 0) > 0);
  return units.length === 1
    ? ''
    : ` (${used.map(({ id, name }) => `${formatCount(byUnit[id])} ${name}`).join(', ')})`;
}

function headRow(title: string, words: string, width: number): PanelRow {
  const indent = 24;
  const lines = textLines(words, width - indent, LETTERING.small);
  return {
    height: Math.max(lines.length * LINE_PITCH, 5) + 0.8,
    keepsNext: 'needed',
    draw: ([x, y], _width, frame) => [
      panelText([x, y + 0.65 + LETTERING.small], title, frame, { weight: 700 }),
      ...lines.map((line, n) =>
        panelText([x + indent, y + 0.65 + LETTERING.small + n * LINE_PITCH], line, frame),
      ),
    ],
  };
}

/** Which of a run's units have their running length given. */
const givenTicks = ({ ticks }: CourseRun, every: number): readonly number[] =>
  ticks.map((_, n) => n).filter((n) => n === 0 || n === ticks.length - 1 || (n + 1) % every === 0);

/** Boxes to tick in columns of one width, a few lines of them. */
function tickRows(
  run: CourseRun,
  { display, every }: CourseWords,
  width: number,
): readonly PanelRow[] {
  const BOX = 4.6;
  const SPACE = 3;
  const figure = (mm: number) => figureText(mm, display);
  const labels = givenTicks(run, every).map((n) => {
    const [near, far] = run.ticks[n];
    const length = far - near < 0.5 ? figure(near) : `${figure(near)}–${figure(far)}`;
    return every === 1 ? length : `${n + 1}: ${length}`;
  });
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
