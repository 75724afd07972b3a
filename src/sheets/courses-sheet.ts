import { coursesAlike } from './course-groups';
import { commonWords, courseRows, isCompact } from './course-rows';
import type { FiguredContent } from './figured-sheet';
import { figuredAndTabled } from './figured-sheet';
import { formatCount } from '@/paving/count';
import { workSide } from '@/paving/set-out/course-numbers';
import { lengthText } from './figures';
import { markRows } from './mark-row';
import type { PanelRow } from './panel';
import { headingRow, itemRow, keptTogether, pairRow, textRows } from './panel';
import type { PaperName } from './paper';
import { pointsBounds } from './plan-view';
import { scaleBarRow } from './scale-bar';
import { setOutDrawing } from './set-out-drawing';
import type { SetOutInput } from './set-out-input';
import { baselineName } from './set-out-input';
import type { SheetDraft } from './sheet-draft';
import type { TableContent } from './table-sheet';

const ROOM: PanelRow = { height: 2, draw: () => [] };

/** Courses: where their strings are, then each course with the running lengths of its units. None without units. */
export function coursesDrafts(input: SetOutInput, paper: PaperName): readonly SheetDraft[] {
  const { laying, setOut } = input;
  if (setOut.courses.length === 0) return [];
  const content: FiguredContent = {
    bounds: pointsBounds(laying.ground.rings[0].edges.flatMap((edge) => edge.chords)),
    head: (width) => markRows(input, width),
    rows: (scale, width) => coursesPanel(input, scale, width),
    draw: (view, frame) => ({
      layers: setOutDrawing(laying, setOut, view, { figures: 'courses', frame }),
      rows: (width) => coursesPanel(input, view.scale, width),
    }),
  };
  const { display, units } = laying.document;
  const compact = isCompact(laying.laid.count);
  const common = compact ? commonWords(setOut.courses, display) : { size: null, steps: null };
  const said = [common.steps, common.size].filter((words) => words !== null).join('; ');
  const words = { display, units, compact, common };
  const groups = compact
    ? coursesAlike(setOut.courses, display)
    : setOut.courses.map((course) => [course]);
  const table: TableContent = {
    kind: 'courses',
    type: 'Courses: running lengths',
    title: `Courses${display === 'metric' ? ', running lengths in mm' : ', running lengths'}`,
    sections: (width) => [
      {
        header: null,
        rows: [
          ...(said === '' ? [] : [...textRows(`In every course ${said}.`, width), ROOM]),
          ...groups.flatMap((group) => courseRows(group, words, width)),
        ],
      },
    ],
  };
  return figuredAndTabled(content, table, 'Courses', input, paper);
}

function coursesPanel(input: SetOutInput, scale: number, width: number): readonly PanelRow[] {
  const { laying, setOut } = input;
  const { display } = laying.document;
  const { firstUnit: first, courses } = setOut;
  const compact = isCompact(laying.laid.count);
  const turn = first ? Math.round(Math.abs(first.turnDeg) * 100) / 100 : 0;
  const way = first && first.turnDeg > 0 ? 'anticlockwise' : 'clockwise';
  return [
    ...markRows(input, width),
    headingRow('Strings', width),
    ...keptTogether(
      textRows(
        `A number stands at the start of a course’s string, or at its end where the start is crowded. Strings run from left to right on the plan${turn === 0 ? `, along ${baselineName(setOut)}` : `, turned ${turn}° ${way} from ${baselineName(setOut)}`}.`,
        width,
      ),
    ),
    pairRow('Courses', formatCount(courses.length), width),
    pairRow('Units', formatCount(laying.laid.count), width),
    ...(first
      ? [
          headingRow('First unit', width),
          ...textRows(
            `In course ${first.course}, unit ${first.place} from the string’s start: drawn heavy. Its corners are U1 to U4 of the control points.${courses.length > 1 ? ` Go on from there: each further string lies to the ${workSide(courses) === 1 ? 'left' : 'right'} of the one before, as you look from its point a to its point b.` : ''}`,
            width,
          ),
        ]
      : []),
    headingRow('How to lay a course', width),
    itemRow(
      'Stretch the string from point a to point b of the course, and pull it tight. The units stand to its left as you look along it.',
      width,
    ),
    itemRow(
      compact
        ? 'Hold the tape’s end at the string’s start. The list has the running length of every unit’s near edge; where units differ in size, of both edges.'
        : 'Hold the tape’s end at the string’s start. Each unit has two running lengths: its near and its far edge.',
      width,
    ),
    ...(compact
      ? [
          itemRow(
            'Courses that are alike share one list: mark a lath or the tape once, and use it for each of them.',
            width,
          ),
        ]
      : []),
    itemRow(
      `${compact ? 'Tick each course once it lies.' : 'Tick each unit as it goes down.'} Lengths run from one zero, so that errors do not add up.`,
      width,
    ),
    scaleBarRow(scale, display, width),
    headingRow('Joint', width),
    pairRow('Between units', lengthText(laying.joint, display, 1), width),
    ...keptTogether(
      [
        headingRow('Take care', width),
        itemRow(
          'Keep the string clear of the units: a string that is pushed bends the course.',
          width,
        ),
      ],
      'wished',
    ),
  ];
}
