import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import { entriesInOrder, siteRecord, type RecordedEntry } from '@/paving/site/site-record';

const T = Date.UTC(2026, 4, 4, 7);
const at = (minutes: number) => new Date(T + minutes * 60_000).toISOString();

const entry = (
  id: string,
  device: string,
  place: number,
  made: number,
  content: SiteEntryContent,
  received: number | null = made,
): RecordedEntry => ({
  id,
  device,
  place,
  madeAt: at(made),
  receivedAt: received === null ? null : at(received),
  by: null,
  content,
});
const course = (number: number, laid: boolean): SiteEntryContent => ({
  kind: 'course',
  course: number,
  laid,
});

describe('how the ground stands by its entries', () => {
  test('a course ticked and taken back is not laid, and the last reading of a check stands', () => {
    const record = siteRecord([
      entry('a', 'p', 1, 0, course(1, true)),
      entry('b', 'p', 2, 1, course(2, true)),
      entry('c', 'p', 3, 2, course(1, false)),
      entry('d', 'p', 4, 3, { kind: 'check', check: 'edge-AB', measured: 3000 }),
      entry('e', 'p', 5, 4, { kind: 'check', check: 'edge-AB', measured: 3002 }),
      entry('f', 'p', 6, 5, { kind: 'check', check: 'edge-BC', measured: 10 }),
      entry('g', 'p', 7, 6, { kind: 'check', check: 'edge-BC', measured: null }),
      entry('h', 'p', 8, 7, { kind: 'note', text: 'Wet' }),
    ]);
    expect([...record.laid.keys()]).toEqual([2]);
    expect([...record.readings].map(([id, { measured }]) => [id, measured])).toEqual([
      ['edge-AB', 3002],
    ]);
    expect(record.notes.map(({ id }) => id)).toEqual(['h']);
  });

  test('an entry made earlier on another phone and sent later does not undo a later one', () => {
    const later = entry('a', 'p', 1, 10, course(3, true), 10);
    const heldUp = entry('b', 'q', 1, 5, course(3, false), 60);
    expect(siteRecord([later, heldUp]).laid.has(3)).toBe(true);
    expect(siteRecord([heldUp, later]).laid.has(3)).toBe(true);
  });

  test('a phone whose clock runs a day ahead has no lasting say: what it sent counts from when it came in', () => {
    const ahead = entry('a', 'p', 1, 24 * 60, course(3, true), 0);
    const after = entry('b', 'q', 1, 5, course(3, false), 6);
    expect(siteRecord([ahead, after]).laid.has(3)).toBe(false);
  });

  test('entries of one phone keep its own order when its clock was put back', () => {
    const first = entry('a', 'p', 1, 30, course(3, true), 40);
    const second = entry('b', 'p', 2, 10, course(3, false), 41);
    expect(entriesInOrder([second, first]).map(({ id }) => id)).toEqual(['a', 'b']);
    expect(siteRecord([second, first]).laid.has(3)).toBe(false);
  });
});

const entries = fc
  .array(
    fc.record({
      device: fc.constantFrom('p', 'q', 'r'),
      made: fc.integer({ min: 0, max: 50 }),
      held: fc.integer({ min: -20, max: 50 }),
      course: fc.integer({ min: 1, max: 4 }),
      laid: fc.boolean(),
    }),
    { maxLength: 30 },
  )
  .map((all) => {
    const places = new Map<string, number>();
    return all.map(({ device, made, held, course: number, laid }, n) => {
      places.set(device, (places.get(device) ?? 0) + 1);
      return entry(
        `e${n}`,
        device,
        places.get(device)!,
        made,
        course(number, laid),
        Math.max(0, made + held),
      );
    });
  });

test('in whatever order, and however often, entries come in, the ground stands the same', () => {
  fc.assert(
    fc.property(
      entries.chain((all) =>
        fc.tuple(
          fc.constant(all),
          fc.shuffledSubarray([...all, ...all], {
            minLength: 2 * all.length,
            maxLength: 2 * all.length,
          }),
        ),
      ),
      ([all, shuffled]) => {
        expect([...siteRecord(shuffled).laid].sort()).toEqual([...siteRecord(all).laid].sort());
      },
    ),
  );
});

test('the entries of each phone stand in its own order', () => {
  fc.assert(
    fc.property(entries, (all) => {
      const order = entriesInOrder(all);
      for (const device of ['p', 'q', 'r']) {
        const places = order.filter((each) => each.device === device).map(({ place }) => place);
        expect(places).toEqual([...places].sort((a, b) => a - b));
      }
    }),
  );
});
