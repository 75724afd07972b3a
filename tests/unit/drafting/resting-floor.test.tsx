import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { useRestingFloor } from '@/components/drafting/levels/use-resting-floor';
import { TableProvider } from '@/components/drafting/table-context';
import { createTableStore } from '@/components/drafting/table-store';
import { spotChanged } from '@/paving/level-edits';
import { documentLevels } from '@/paving/levels';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

const spotted = (count: number) =>
  parsed(
    documentOf({
      units: [unitOf('a', 300)],
      levels: {
        finish: 0,
        proud: 0,
        fall: { kind: 'none' },
        spots: Array.from({ length: count }, (_, n) => ({ at: [n * 10, (n * 7) % 100], level: 0 })),
      },
    } as never),
  );

function Level() {
  const { document } = useRestingFloor();
  return <p>level {documentLevels(document).spots[0].level}</p>;
}

const dragged = (count: number) => {
  const table = createTableStore(spotted(count));
  render(
    <TableProvider store={table}>
      <Level />
    </TableProvider>,
  );
  const to = (level: number) =>
    act(() => table.getState().show(spotChanged(table.getState().document, 0, { level })));
  return { table, to };
};

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

it('of few spots figures follow the hand', () => {
  const { to } = dragged(20);
  to(5);
  expect(screen.getByText('level 5')).toBeTruthy();
});

it('of many they wait until it rests, and begin from what is settled at each gesture', () => {
  const { table, to } = dragged(400);
  to(5);
  expect(screen.getByText('level 0')).toBeTruthy();
  act(() => void vi.advanceTimersByTime(200));
  expect(screen.getByText('level 5')).toBeTruthy();
  to(9);
  expect(screen.getByText('level 5')).toBeTruthy();
  act(() => table.getState().settleShown());
  expect(screen.getByText('level 9')).toBeTruthy();
  to(12);
  expect(screen.getByText('level 9')).toBeTruthy();
});
