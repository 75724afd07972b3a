import { expect, test } from 'vitest';
import { documentBuildUp } from '@/paving/build-up';
import { layFloor } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import { wholeReport } from '@/paving/report';
import { startingDocument } from '@/server/starting-document';
import { takeOff } from '@/takeoff/take-off';
import { parsed } from '../../oracle/documents';

test('a new layout in feet and inches begins with whole inches under it, in metres with whole millimetres', () => {
  // Common practice: 4 in of base and 1 in of bedding; 100 mm and 25 mm where millimetres are used.
  const { base, bedding } = documentBuildUp(parsed(startingDocument('imperial')));
  expect([base, bedding].map((mm) => formatLength(mm, 'imperial'))).toEqual(['4"', '1"']);
  expect([base, bedding]).toEqual([4 * 25.4, 25.4]);
  expect(documentBuildUp(parsed(startingDocument('metric')))).toMatchObject({ base: 100, bedding: 25 }); // prettier-ignore
});

test('in neither has anybody said what the layers are, until somebody does', () => {
  for (const display of ['metric', 'imperial'] as const) {
    const document = parsed(startingDocument(display));
    const looked = (part: typeof document) => {
      const laying = layFloor(part);
      const { warnings, lines } = takeOff(laying, wholeReport(laying), null);
      const base = lines.find(({ id }) => id === 'layer:base')!;
      return [warnings.some(({ id }) => id === 'no-build-up'), base.assumptions.find(({ name }) => name === 'Thickness')!.source]; // prettier-ignore
    };
    expect(looked(document)[0]).toBe(true);
    expect(looked(document)[1]).toMatch(/^not looked at yet/);
    const said = { ...document, buildUp: { ...documentBuildUp(document), base: 150 } };
    expect(looked(said)).toEqual([false, 'typed in under Levels']);
  }
});
