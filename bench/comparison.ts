import { floorComparison } from '@/paving/comparison';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { unitsMatched } from '@/paving/unit-matching';
import { wavyFloor } from './floors';
import { medianMs, type Bench } from './ratio';

const UNITS = 20_000;

const placed = (document: LayoutDocument, dx: number, dy: number, turn: number) => ({
  ...document,
  placement: {
    origin: [document.placement.origin[0] + dx, document.placement.origin[1] + dy] as [
      number,
      number,
    ],
    turn: document.placement.turn + turn,
  },
});

/** Comparing two floors of 20,000 units, against laying the two: no more than a person waits for anyway. */
export const comparison: Bench = {
  name: 'comparison',
  run() {
    const document = wavyFloor(UNITS);
    const laying = layFloor(document);
    const cases = [
      ['the same floor', placed(document, 0, 0, 0)],
      [
        'pushed by half a pitch both ways, each unit with four at one distance',
        placed(document, 101.5, 101.5, 0),
      ],
      ['turned by 45°', placed(document, 0, 0, 45)],
    ] as const;
    return cases.map(([name, changed]) => {
      const other = layFloor(changed);
      const layMs = medianMs(() => [layFloor(document), layFloor(changed)], 20, 5);
      const matchMs = medianMs(() => unitsMatched(laying, other), 20, 5);
      const ms = medianMs(() => floorComparison(laying, other), 20, 5);
      const { kept, moved, gone, added } = unitsMatched(laying, other);
      return {
        name: `matching ÷ laying, ${name}`,
        value: matchMs / layMs,
        greatest: 10,
        detail: `${laying.laid.count} and ${other.laid.count} units (${kept} kept, ${moved} moved, ${gone} gone, ${added} new) in ${matchMs.toFixed(1)} ms, ${ms.toFixed(1)} ms with both reports; laying both ${layMs.toFixed(1)} ms`,
      };
    });
  },
};
