import { formatAmount, formatMass, formatWorkedVolume } from '@/takeoff/measures';
import type { TakeOffLine } from '@/takeoff/take-off-line';
import type { TakeOffWithoutCosts } from '@/takeoff/without-costs';
import type { Display } from '@/paving/length';
import { floorCautions } from './cautions';
import { headingRow, itemRow, textRows } from './panel';
import type { PlanInput } from './plan-input';
import type { TableColumn } from './ruled-table';
import { ruledTable } from './ruled-table';
import type { TableContent, TableSection } from './table-sheet';

const TAKEN: readonly TableColumn[] = [
  { title: 'The floor takes', align: 'start', weight: 600, grow: 1 },
  { title: 'In place', align: 'end', weight: 600 },
  { title: 'Loose', align: 'end' },
  { title: 'Mass', align: 'end' },
  { title: 'How it is worked out', align: 'start', grow: 1.8 },
];

const ORDERED: readonly TableColumn[] = [
  { title: 'To order', align: 'start', weight: 600, grow: 1 },
  { title: 'Needed', align: 'end' },
  { title: 'As', align: 'start', grow: 1, weight: 600 },
  { title: 'Mass', align: 'end' },
  { title: 'Come', align: 'middle' },
];

/** Materials: what the floor takes, how it is ordered, what to look at before that. */
export function materialsTable(
  input: PlanInput,
  { lines, orders, warnings }: TakeOffWithoutCosts,
): TableContent {
  const { document } = input.laying;
  const { display } = document;
  const cautions = floorCautions(document, input.report).filter((text) =>
    /weighs|vehicles|route|Figures/.test(text),
  );
  return {
    kind: 'materials',
    type: 'Materials',
    title: 'Materials',
    sections: (width): readonly TableSection[] => [
      ruledTable(
        TAKEN,
        lines.map((line) => takenCells(line, display)),
        width,
      ),
      ...(orders.length === 0
        ? []
        : [
            ruledTable(
              ORDERED,
              orders.map((order) => orderCells(order, display)),
              width,
            ),
          ]),
      ...(document.buildUp
        ? []
        : [
            {
              header: null,
              rows: textRows(
                'Bedding and base are not entered yet: they are reckoned with the usual thicknesses for a floor that is walked on.',
                width,
              ),
            },
          ]),
      ...(warnings.length === 0
        ? []
        : [
            {
              header: headingRow('Look at before ordering', width),
              rows: warnings.map(({ words, source }) =>
                itemRow(source ? `${words} (${source})` : words, width),
              ),
            },
          ]),
      {
        header: headingRow('Take care', width),
        rows: cautions.map((text) => itemRow(text, width)),
      },
    ],
  };
}

const massText = (kg: number | null, display: Display): string =>
  kg === null ? '–' : formatMass(kg, display);

const takenCells = (
  { name, amount, measure, volume, massKg, formula }: TakeOffLine,
  display: Display,
) => [
  name,
  formatAmount(amount, measure, display),
  volume ? formatWorkedVolume(volume.loose, display) : '–',
  massText(massKg, display),
  formula,
];

const orderCells = (
  { name, needed, measure, words, massKg }: TakeOffWithoutCosts['orders'][number],
  display: Display,
) => [
  name,
  formatAmount(needed, measure, display),
  words,
  massText(massKg, display),
  { tick: true } as const,
];
