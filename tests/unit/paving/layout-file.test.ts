import { describe, expect, test } from 'vitest';
import { layoutFileRead, layoutFileWritten } from '@/paving/layout-file';
import { documentOf, parsed } from '../../oracle/documents';

const COURT = parsed(documentOf({ notes: 'By the gate' }));
const reasons = (text: string): string => {
  const read = layoutFileRead(text);
  return read.ok ? '' : read.reasons.join('|');
};

describe('a layout file', () => {
  test('that was written comes back as the same document', () => {
    expect(layoutFileRead(layoutFileWritten(COURT))).toEqual({ ok: true, document: COURT });
    expect(layoutFileRead(`\ufeff${layoutFileWritten(COURT)}`)).toEqual({
      ok: true,
      document: COURT,
    });
  });

  test('of an archive, which holds the document among other things, is read', () => {
    const kept = JSON.stringify({ layoutId: 'x', revision: 3, document: COURT });
    expect(layoutFileRead(kept)).toEqual({ ok: true, document: COURT });
  });

  test.each(['', 'Kind,Name\nunit,Slab', '[1, 2]', '"court"', '{"name": "court"}', 'null'])(
    'is not what holds %j',
    (text) => expect(reasons(text)).toMatch(/^This is no layout file/),
  );

  test('that cannot be laid says what is wrong and where, counted from one', () => {
    const crossed = { ...COURT, ground: { ...COURT.ground, perimeter: [[0, 0], [4000, 3000], [4000, 0], [0, 3000]] } }; // prettier-ignore
    expect(reasons(JSON.stringify(crossed))).toMatch(/perimeter/i);
    const thin = { ...COURT, units: [{ ...COURT.units[0], thickness: -5 }] };
    expect(reasons(JSON.stringify(thin))).toMatch(/^Unit 1, thickness must be more than 0 mm\.$/);
    const newer = { ...COURT, schema: 'evenlay/layout@9' };
    expect(reasons(JSON.stringify(newer))).toMatch(/must be "evenlay\/layout@1"/);
  });
});
