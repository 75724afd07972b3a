import { act, fireEvent, render, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import { BestStart } from '@/components/drafting/fit/BestStart';
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

test('to a third hold the one that runs the same way gives way, else the older, and it is said which', () => {
  const table = createTableStore(parsed(documentOf({})));
  const held = (edge: number) => {
    holdStarted(table, 'edge');
    holdPointed(table, 0, edge);
  };
  held(1);
  held(0);
  held(2);
  expect(table.getState().hold).toEqual([{ edge: [0, 1] }, { edge: [0, 2] }]);
  expect(table.getState().said).toContain('a row along AB is let go');
  held(3);
  expect(table.getState().hold).toEqual([{ edge: [0, 2] }, { edge: [0, 3] }]);
  expect(table.getState().said).toContain('a row along BC is let go');
});

test('a hold goes with its edge when the ground gains a corner, and is dropped with a keep-out that is taken away', () => {
  const square = (x: number): [number, number][] => [
    [x, 1000],
    [x + 300, 1000],
    [x + 300, 1300],
    [x, 1300],
  ];
  const floor = parsed(documentOf({}));
  const ground = (perimeter: typeof floor.ground.perimeter, keepOuts: number[]) => ({
    ...floor.ground,
    perimeter,
    keepOuts: keepOuts.map((x) => ({ name: 'Post', ring: square(x) })),
  });
  const { perimeter } = floor.ground;
  const table = createTableStore({ ...floor, ground: ground(perimeter, [500, 1500]) });
  table.setState({ hold: [{ edge: [0, 1] }, { edge: [1, 0] }] });
  const [first, second, ...rest] = perimeter;
  const middle: [number, number] = [(first[0] + second[0]) / 2, (first[1] + second[1]) / 2];
  table.getState().edit((now) => ({
    ...now,
    ground: ground([first, middle, second, ...rest], [500, 1500]),
  }));
  expect(table.getState().hold).toEqual([{ edge: [0, 2] }, { edge: [1, 0] }]);
  table.getState().edit((now) => ({ ...now, ground: ground(now.ground.perimeter, [1500]) }));
  expect(table.getState().hold).toEqual([{ edge: [0, 2] }]);
});

test('a hold that the turn does not allow is said with what would do, and can be let go there', () => {
  const table = createTableStore(parsed(documentOf({ placement: { origin: [0, 0], turn: 20 } })));
  table.setState({ hold: [{ edge: [0, 0] }] });
  render(
    <TableProvider store={table}>
      <BestStart fit={createFitService(table, { sweeps: false })} />
    </TableProvider>,
  );
  expect(screen.getByRole('alert').textContent).toContain('a turn of 0° or 90° would do');
  expect(screen.getAllByRole('button').map(({ textContent }) => textContent)).toEqual([
    'Turn to 0°',
    'Turn to 90°',
    'Let go of a row along AB',
  ]);
  fireEvent.click(screen.getByRole('button', { name: /Let go/ }));
  expect(table.getState().hold).toEqual([]);
  expect(screen.queryByRole('alert')).toBeNull();
});
