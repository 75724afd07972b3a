import { act, render, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import { HoldFields } from '@/components/drafting/fit/HoldFields';
import { createFitService } from '@/components/drafting/fit/fit-service';
import { TableProvider } from '@/components/drafting/table-context';
import { createTableStore } from '@/components/drafting/table-store';
import { holdPointed, holdStarted } from '@/components/drafting/tools/hold-edge';
import { documentOf, parsed } from '../../oracle/documents';

test('a second hold that runs the same way is refused as soon as it is pointed at, and another edge may be', () => {
  // 4 × 3 m: edges 0 and 2 are parallel, edge 1 is square to both.
  const table = createTableStore(parsed(documentOf({})));
  render(
    <TableProvider store={table}>
      <HoldFields fit={createFitService(table, { sweeps: false })} />
    </TableProvider>,
  );
  act(() => {
    holdStarted(table, 'edge');
    holdPointed(table, 0, 0);
    holdStarted(table, 'edge');
    holdPointed(table, 0, 2);
  });
  expect(table.getState().hold).toEqual([{ edge: [0, 0] }]);
  expect(screen.getByRole('alert').textContent).toContain('run the same way');
  act(() => holdPointed(table, 0, 1));
  expect(table.getState().hold).toEqual([{ edge: [0, 0] }, { edge: [0, 1] }]);
  expect(screen.queryByRole('alert')).toBeNull();
});
