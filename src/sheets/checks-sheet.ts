import type { Check } from '@/paving/set-out/set-out-types';
import type { Display } from '@/paving/length';
import { figuredText } from '@/paving/figured-words';
import { figureText, lengthText } from './figures';
import type { TableCell, TableColumn } from './ruled-table';
import { ruledTable } from './ruled-table';
import type { SetOutInput } from './set-out-input';
import type { TableContent } from './table-sheet';
import { keptTogether, textRows } from './panel';

const COLUMNS: readonly TableColumn[] = [
  { title: 'No.', align: 'end', weight: 600 },
  { title: 'What to measure', align: 'start', grow: 1.5 },
  { title: 'Expected', align: 'end', weight: 600 },
  { title: 'At least', align: 'end' },
  { title: 'At most', align: 'end' },
  { title: 'Measured', align: 'middle' },
  { title: 'Good', align: 'middle' },
  { title: 'Why these limits', align: 'start', grow: 1 },
];

const CLOSE =
  'A reading out of its limits: stop, find out why, and ask the designer before you go on. Checked by, and date:';
const CLOSE_SPACE = 3;
/** So many checks go on to the next sheet with the closing words. */
const LAST_WITH_CLOSE = 3;

/** Checks: what to measure, what it should read, and room for what it reads. */
export function checksTable(input: SetOutInput): TableContent {
  const { setOut, laying } = input;
  const { display } = laying.document;
  return {
    kind: 'checks',
    type: 'Checks',
    title: `Checks${display === 'metric' ? ', in mm' : ''}`,
    sections: (width) => {
      const { header, rows } = ruledTable(COLUMNS, checkCells(setOut.checks, display), width);
      const close = textRows(CLOSE, width);
      // Whoever signs has checks over the words, never a sheet of the words alone.
      return [
        {
          header,
          rows: [
            ...rows.slice(0, -LAST_WITH_CLOSE),
            ...keptTogether([
              ...rows.slice(-LAST_WITH_CLOSE),
              { height: CLOSE_SPACE, draw: () => [] },
              ...close,
            ]),
          ],
        },
      ];
    },
  };
}

function checkCells(checks: readonly Check[], display: Display): readonly (readonly TableCell[])[] {
  const limit = (mm: number | null) => (mm === null ? '–' : figureText(mm, display, 1));
  return checks.map(({ what, expected, least, greatest, source }, n) => [
    String(n + 1),
    figuredText(what, display, lengthText),
    figureText(expected, display, 1),
    limit(least),
    limit(greatest),
    { write: true },
    { tick: true },
    source,
  ]);
}
