import { fireEvent, render, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import { JointRange } from '@/components/drafting/fit/JointRange';
import { jointsTold, jointText } from '@/components/drafting/fit/joints-told';
import { TableProvider } from '@/components/drafting/table-context';
import { createTableStore } from '@/components/drafting/table-store';
import { fitJoints } from '@/paving/fit/joint-range';
import type { Display } from '@/paving/length';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

/** Ten 300 mm units and nine joints have 10 mm to spare in 3,010 mm: they close up to a joint of 10 / 9 mm (arithmetic). */
const SQUARE = parsed(
  documentOf({
    ground: {
      perimeter: [
        [0, 0],
        [3010, 0],
        [3010, 3010],
        [0, 3010],
      ],
      keepOuts: [],
    },
    units: [unitOf('a', 300)],
    bond: { kind: 'stack', unit: 'a', joint: 3 },
    clearance: 0,
  }),
);

function told(from: number, to: number, display: Display = 'metric'): string {
  const found = fitJoints(SQUARE, { from, to, step: 1 });
  if (!found.ok) throw new Error(found.message);
  return jointsTold(found.joints, display);
}

test('what a range of joints comes to is told in a sentence', () => {
  expect(told(0, 3)).toMatch(
    /^The most, 100 whole, still close with joints of 1\.11.mm; wider joints lay 81 or fewer\.$|^The most, 100 whole, still close with joints of 1\.11.mm; wider ones lay 81 or fewer\.$/,
  );
  expect(told(2, 3)).toBe(
    'Every joint of this range lays 81 whole, so none of them lets one more row close.',
  );
});

test('in inches a joint is told in millimetres too, or a row that just closes would not', () => {
  expect(jointText(10 / 9, 'imperial')).toMatch(/^1\/16" \(1\.11.mm\)$/);
  expect(told(0, 3, 'imperial')).toContain('(1.11');
});

test('a range that runs backwards is said to, with what was typed; in inches the first range is of sixteenths', () => {
  const table = createTableStore(SQUARE);
  const { unmount } = render(
    <TableProvider store={table}>
      <JointRange />
    </TableProvider>,
  );
  const from = screen.getByLabelText('From');
  fireEvent.change(from, { target: { value: '9' } });
  fireEvent.blur(from);
  fireEvent.click(screen.getByRole('button', { name: 'Try these joints' }));
  expect(screen.getByRole('alert').textContent).toMatch(/From 9.mm to 5.mm runs backwards/);
  unmount();

  render(
    <TableProvider store={createTableStore({ ...SQUARE, display: 'imperial' })}>
      <JointRange />
    </TableProvider>,
  );
  const shown = ['From', 'To', 'By'].map(
    (label) => (screen.getByLabelText(label) as HTMLInputElement).value,
  );
  expect(shown).toEqual(['1/16"', '3/16"', '1/16"']);
});
