import { act, fireEvent, render, screen, within } from '@testing-library/react';
import { beforeAll, expect, test, vi } from 'vitest';
import { LevelsPanel } from '@/components/drafting/panels/LevelsPanel';
import { placePointed, placingStarted, spotNudged } from '@/components/drafting/level-actions';
import { TableProvider } from '@/components/drafting/table-context';
import { createTableStore } from '@/components/drafting/table-store';
import { levelsSchema } from '@/paving/levels';
import { parsed, documentOf } from '../../oracle/documents';

beforeAll(() => {
  // jsdom lays nothing out, so that there is nothing to scroll to.
  Element.prototype.scrollIntoView = vi.fn();
});

function panel() {
  const table = createTableStore(parsed(documentOf({})));
  table.getState().goTo('levels');
  render(
    <TableProvider store={table}>
      <LevelsPanel />
    </TableProvider>,
  );
  return table;
}
const type = (label: string | RegExp, text: string) => {
  const field = screen.getByLabelText(label);
  fireEvent.change(field, { target: { value: text } });
  fireEvent.blur(field);
};
const pastSteps = (table: ReturnType<typeof createTableStore>) =>
  table.temporal.getState().pastStates.length;

test('without spots the figures say what they assume, and the panel how to measure', () => {
  panel();
  // 4 × 3 m, 50 + 25 + 100 mm: 12 × 0.175 = 2.10 m³.
  expect(screen.getByTestId('earth-cut').textContent).toBe('2.10\u202fm³');
  expect(screen.getByText(/as if the ground were level with the edge/)).toBeTruthy();
  expect(screen.getByText(/No spot is measured yet/)).toBeTruthy();
});

test('layers, finish and fall change the figures, one undo step each', () => {
  const table = panel();
  type('Base, compacted', '150');
  expect(screen.getByTestId('earth-base').textContent).toBe('1.80\u202fm³');
  type(/Finish above the edge/, '-10');
  expect(screen.getByTestId('earth-cut').textContent).toBe('2.82\u202fm³');
  fireEvent.change(screen.getByLabelText('Fall'), { target: { value: 'oneWay' } });
  expect(table.getState().document.levels!.fall).toEqual({
    kind: 'oneWay',
    direction: 0,
    percent: 2,
  });
  // A plane of 2 % over 4 m lies 40 mm lower on the mean: 12 × 0.040 = 0.48 m³ more.
  expect(screen.getByTestId('earth-cut').textContent).toBe('3.30\u202fm³');
  expect(pastSteps(table)).toBe(3);
  type(/How steep/, '40');
  expect(screen.getByText(/Steeper than 25 %/)).toBeTruthy();
  expect(pastSteps(table)).toBe(3);
});

test('a base thinner than published is said, with who published it', () => {
  panel();
  type('Base, compacted', '60');
  const look = screen.getByTestId('level-warnings');
  expect(within(look).getByText(/at least 100/)).toBeTruthy();
  expect(within(look).getAllByText(/ICPI/).length).toBeGreaterThan(0);
});

test('a spot pointed at is picked and its level typed; what is shown and not settled says what it was', () => {
  const table = panel();
  act(() => {
    placingStarted(table, 'spots');
    placePointed(table, [1000, 1000]);
  });
  expect(table.getState().document.levels!.spots).toEqual([{ at: [1000, 1000], level: 0 }]);
  expect(table.getState().spot).toBe(0);
  act(() => placePointed(table, [1000, 1000]));
  expect(table.getState().document.levels!.spots).toHaveLength(1);
  type('Level of spot 1', '-75');
  expect(screen.getByTestId('earth-cut').textContent).toBe('1.20\u202fm³');
  expect(screen.getByText(/One spot says how high the ground is/)).toBeTruthy();
  act(() => placePointed(table, [3000, 1000]));
  type('Level of spot 2', '25');
  const figures = () => screen.getByLabelText('What is dug and laid').textContent;
  const before = screen.getByTestId('earth-cut').textContent;
  act(() => {
    table.getState().set({ tool: 'spot', placing: null, spot: 1 });
    spotNudged(table, [-500, 0]);
  });
  expect(figures()).toContain(`was ${before}`);
  act(() => table.getState().settleShown());
  expect(figures()).not.toContain('was ');
});

test('a fall is pointed at: the way, a point, a line', () => {
  const table = panel();
  const fallOf = () => table.getState().document.levels!.fall;
  const start = (kind: string) =>
    fireEvent.change(screen.getByLabelText('Fall'), { target: { value: kind } });
  start('oneWay');
  placingStarted(table, 'fallDirection');
  placePointed(table, [0, 0]);
  placePointed(table, [0, -700]);
  expect(fallOf()).toMatchObject({ kind: 'oneWay', direction: -90 });
  start('toPoint');
  placingStarted(table, 'fallPoint');
  placePointed(table, [900, 800]);
  expect(fallOf()).toMatchObject({ kind: 'toPoint', at: [900, 800] });
  start('toLine');
  placingStarted(table, 'fallLine');
  placePointed(table, [0, 500]);
  placePointed(table, [4000, 500]);
  expect(fallOf()).toMatchObject({ from: [0, 500], to: [4000, 500] });
  expect(table.getState().tool).toBe('spot');
});

test('a list with a bad line is not taken by halves; a good one is one undo step', () => {
  const table = createTableStore(
    parsed(documentOf({ levels: levelsSchema.parse({ spots: [{ at: [5, 5], level: -1 }] }) })),
  );
  table.getState().goTo('levels');
  table.getState().set({ size: { width: 800, height: 600 } });
  render(
    <TableProvider store={table}>
      <LevelsPanel />
    </TableProvider>,
  );
  fireEvent.click(screen.getByText('Paste a list'));
  const list = screen.getByLabelText('The list');
  fireEvent.change(list, { target: { value: '0,0,-40\nwet,1,2' } });
  fireEvent.click(screen.getByText('Take the spots'));
  expect(screen.getByRole('alert').textContent).toContain('Line 2');
  expect(table.getState().document.levels!.spots).toHaveLength(1);
  fireEvent.change(list, { target: { value: '0,0,-40\n4000,0,-60\n0,3000,-50' } });
  fireEvent.click(screen.getByText('Take the spots'));
  expect(table.getState().document.levels!.spots.map(({ level }) => level)).toEqual([
    -40, -60, -50,
  ]);
  expect(pastSteps(table)).toBe(1);
});
