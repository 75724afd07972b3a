import { expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { takeOff } from '@/takeoff/take-off';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

test('pieces of each tone are ordered in that tone', () => {
  // Ten slabs in a row, every other one dark, and ten strips of 190 mm along the top, dark beside light the other
  // way round. Two strips come out of a slab: five of a tone take three slabs.
  const laying = layFloor(
    parsed(
      documentOf({
        ground: { perimeter: [[0, 0], [4000, 0], [4000, 590], [0, 590]], keepOuts: [] }, // prettier-ignore
        units: [unitOf('a', 400)],
        bond: { kind: 'stack', unit: 'a', joint: 0 },
        placement: { origin: [200, 200], turn: 0 },
        clearance: 0,
        cutting: 'edge',
        tones: { rule: 'alternate', second: '#444444', share: 0.5, seed: 1 },
        order: { spares: { rule: 'count', value: 0 } },
      }),
    ),
  );
  const { lines, orders } = takeOff(laying, floorReport(laying), null);
  const units = lines.filter(({ group }) => group === 'units');
  expect(units.map(({ id, amount, orderId }) => [id, amount, orderId])).toEqual([
    ['units:a:first-tone', 5, 'units:a:first-tone'],
    ['units:a:second-tone', 5, 'units:a:second-tone'],
    ['units:a:to-cut', 3, 'units:a:first-tone'],
    ['units:a:to-cut-second-tone', 3, 'units:a:second-tone'],
  ]);
  expect(
    orders.filter(({ kind }) => kind === 'unit').map(({ id, needed }) => [id, needed]),
  ).toEqual([
    ['units:a:first-tone', 8],
    ['units:a:second-tone', 8],
  ]);
});
