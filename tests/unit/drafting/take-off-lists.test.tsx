import { cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { Beyond } from '@/components/drafting/takeoff/Beyond';
import { OrderList } from '@/components/drafting/takeoff/OrderList';
import { QuantityList } from '@/components/drafting/takeoff/QuantityList';
import { TakeOffBars } from '@/components/drafting/takeoff/TakeOffBars';
import { TableProvider, useSettledFloor } from '@/components/drafting/table-context';
import { Queries } from '@/components/ui/Queries';
import { createTableStore, type TableStore } from '@/components/drafting/table-store';
import type { PriceList } from '@/takeoff/price-list';
import { takeOff } from '@/takeoff/take-off';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

const COURT = parsed(
  documentOf({
    units: [unitOf('a', 300)],
    bond: { kind: 'chequer', unit: 'a', joint: 5 },
    aggregate: { name: 'Grey chippings', colour: '#b9bab6' },
  }),
);
const LIST: PriceList = {
  currency: 'GBP',
  on: '2026-03-01',
  items: [
    {
      id: 'pallet',
      kind: 'unit',
      name: 'Slab 300',
      supplier: 'Quarrybank Yard',
      pack: { name: 'pallet', holds: 20, measure: 'each', whole: true },
      costMinor: 12_000,
      from: '2026-02-01',
      massKg: null,
      looseDensity: null,
      stone: null,
    },
  ],
};

function Lists({ prices }: { prices: PriceList | null }) {
  const { laying, report, document } = useSettledFloor();
  const taken = takeOff(laying!, report!, prices);
  return (
    <>
      <TakeOffBars takeOff={taken} document={document} />
      <OrderList takeOff={taken} prices={prices} />
      <Beyond />
      <QuantityList takeOff={taken} />
    </>
  );
}

let table: TableStore;
const shown = (prices: PriceList | null = null) => {
  table = createTableStore(COURT);
  render(
    <Queries>
      <TableProvider store={table} layoutId="court">
        <Lists prices={prices} />
      </TableProvider>
    </Queries>,
  );
};
const past = () => table.temporal.getState().pastStates.length;
const finish = (field: HTMLElement, text: string) => {
  fireEvent.change(field, { target: { value: text } });
  fireEvent.keyDown(field, { key: 'Enter' });
};
/** The line whose heading begins with those words. */
const line = (section: string, name: RegExp) =>
  within(
    within(screen.getByRole('region', { name: section }))
      .getByText(name)
      .closest('li')!,
  );

describe('a line of the take-off', () => {
  beforeEach(() => shown());

  it('opens to its formula, and a typed figure is one undo step with a way back', () => {
    const voids = () => line('What the floor takes', /^Voids of the pattern/);
    expect(voids().getByText(/open places of the pattern/)).toBeTruthy();
    finish(voids().getByLabelText('Depth'), '40');
    expect(table.getState().document.materials).toEqual({ voids: { depth: 40 } });
    expect(past()).toBe(1);
    expect(voids().getByText(/× 40 mm ÷/)).toBeTruthy();
    fireEvent.click(voids().getByRole('button', { name: 'Put the usual back' }));
    expect(table.getState().document.materials).toBeUndefined();
    expect(past()).toBe(2);
  });

  it('says what would do where a figure will not', () => {
    const margin = line('What the floor takes', /^Margin/);
    finish(margin.getByLabelText('Loose for one in place'), '9');
    expect(margin.getByText(/at most 3/)).toBeTruthy();
    expect(table.getState().document.materials).toBeUndefined();
  });

  it('takes another kind of stone', () => {
    const base = line('What the floor takes', /^Base/);
    fireEvent.change(base.getByLabelText('Taken as'), { target: { value: 'gravel' } });
    expect(table.getState().document.materials).toEqual({ base: { kind: 'gravel' } });
  });
});

describe('an order', () => {
  it('comes another way when it is asked to', () => {
    shown();
    const base = () => line('To order', /^Crushed stone/);
    fireEvent.change(base().getByLabelText('How it comes'), { target: { value: 'load' } });
    expect(base().getByText(/lorry load/, { selector: 'summary span' })).toBeTruthy();
    expect(past()).toBe(1);
  });

  it('is priced once it is chosen from the catalogue', () => {
    shown(LIST);
    const units = () => line('To order', /^Unit a/);
    expect(units().getByText('no price')).toBeTruthy();
    fireEvent.change(units().getByLabelText('From your catalogue'), {
      target: { value: 'pallet' },
    });
    expect(table.getState().document.units[0].catalogueId).toBe('pallet');
    expect(units().getByText(/pallets? of 20/, { selector: 'summary span' })).toBeTruthy();
    expect(
      units().getByText(/£120.00 a pallet without tax, price of 1 February 2026/),
    ).toBeTruthy();
    expect(screen.getByRole('radio', { name: 'Cost' })).toBeTruthy();
  });

  it('takes a typed price where the catalogue has none, for the pack that is shown', async () => {
    const asked = vi.fn(async (_path: string, _init: RequestInit) => Response.json({ typed: [] }));
    vi.stubGlobal('fetch', asked);
    shown(LIST);
    const units = () => line('To order', /^Unit a/);
    finish(units().getByLabelText(/^Price of a /), '4.20');
    await vi.waitFor(() => expect(asked).toHaveBeenCalled());
    const [path, init] = asked.mock.calls[0];
    expect([path, init.method]).toEqual(['/api/layouts/court/price-list', 'PUT']);
    expect(JSON.parse(String(init.body))).toEqual({
      orderId: 'units:a:first-tone',
      price: { costMinor: 420, pack: { holds: 1, measure: 'each' } },
    });
    // It is the firm's, beside the document: nothing to undo.
    expect(past()).toBe(0);
    vi.unstubAllGlobals();
  });

  it('shows a typed price as such, and what is retired as that, with its last price', () => {
    const typed = [
      { orderId: 'units:a:first-tone', costMinor: 420, pack: { holds: 1, measure: 'each' } },
    ] as const;
    shown({ ...LIST, typed });
    const units = () => line('To order', /^Unit a/);
    expect(units().getByText(/Typed here, for this layout/)).toBeTruthy();
    cleanup();
    const retired = LIST.items.map((item) => ({ ...item, retired: true as const }));
    table = createTableStore({ ...COURT, units: [{ ...COURT.units[0], catalogueId: 'pallet' }] });
    render(
      <Queries>
        <TableProvider store={table} layoutId="court">
          <Lists prices={{ ...LIST, items: retired }} />
        </TableProvider>
      </Queries>,
    );
    expect(units().getByText('retired')).toBeTruthy();
    expect(units().getByText(/its last price still counts/)).toBeTruthy();
    expect(units().getByText(/£120.00 a pallet without tax/)).toBeTruthy();
    expect(units().getByRole('option', { name: /Slab 300.*\(retired\)/ })).toBeTruthy();
  });

  it('without a list says nothing of prices', () => {
    shown();
    expect(screen.queryByText('no price')).toBeNull();
    expect(screen.queryByLabelText('From your catalogue')).toBeNull();
  });
});

it('spares go by so many, and the order follows', () => {
  shown();
  fireEvent.click(screen.getByRole('radio', { name: 'So many' }));
  expect(table.getState().document.order).toEqual({ spares: { rule: 'count', value: 2 } });
  finish(screen.getByLabelText('Of each kind and tone'), '6');
  expect(table.getState().document.order).toEqual({ spares: { rule: 'count', value: 6 } });
  expect(line('To order', /^Unit a/).getByText(/\+ 6 spare =/)).toBeTruthy();
});
