import { describe, expect, test } from 'vitest';
import { SLOPING_COURT } from '@/components/guide/level-pictures';
import type { LayoutDocument } from '@/paving/layout-document';
import { levelsSchema } from '@/paving/levels';
import type { DrawCommand, PaperBox } from '@/sheets/drawing';
import { layerSection } from '@/sheets/layer-section';
import { levelMapDrawing, levelMapKey, mapKeySample } from '@/sheets/level-map-drawing';
import { paperOf } from '@/sheets/paper';
import { pointsBounds, viewCentred } from '@/sheets/plan-view';
import { PREFERRED_SCALES } from '@/sheets/scales';
import { screedPicture } from '@/sheets/screed-picture';
import { earthModel } from '@/takeoff/earth-cells';
import { levelMap } from '@/takeoff/level-map';
import { letteringFaults, sheetTexts } from './sheet-invariants';

const FRAME = 'picture';
const sheetOf = (commands: readonly DrawCommand[], box: PaperBox) => ({
  width: box.right,
  height: box.bottom,
  layers: [{ name: 'picture', commands }],
  paper: paperOf('A4', 'landscape'),
  scale: 1,
  frames: { [FRAME]: box },
});
const textsOf = (commands: readonly DrawCommand[], box: PaperBox) =>
  sheetTexts(sheetOf(commands, box)).map(({ text }) => text);

const floors: readonly (readonly [string, LayoutDocument])[] = [
  ['as the guide has it', SLOPING_COURT],
  [
    'deep, with overdig, in inches',
    {
      ...SLOPING_COURT,
      display: 'imperial',
      buildUp: {
        use: 'driveway',
        frost: true,
        bedding: 25.4,
        base: 304.8,
        geotextile: true,
        overdig: 150,
      },
      levels: levelsSchema.parse({ finish: -12.7, proud: 6 }),
    },
  ],
  [
    'on no base and hardly any bedding',
    {
      ...SLOPING_COURT,
      buildUp: { use: 'foot', frost: false, bedding: 3, base: 0, geotextile: true, overdig: 0 },
      levels: levelsSchema.parse({ finish: -2 }),
    },
  ],
  ['above the edge', { ...SLOPING_COURT, levels: levelsSchema.parse({ finish: 30, proud: 5 }) }],
];
const boxes: readonly PaperBox[] = [
  { left: 1, top: 1, right: 83, bottom: 59 },
  { left: 10, top: 20, right: 180, bottom: 100 },
];

describe.each(floors)('a floor %s', (_, document) => {
  test.each(boxes)(
    'the section’s lettering stays in its box and apart, as it should on $right mm',
    (box) => {
      const { commands } = layerSection(document, box, FRAME, 'screen');
      expect(letteringFaults(sheetOf(commands, box))).toEqual([]);
      const texts = textsOf(commands, box);
      expect(texts.some((text) => text.startsWith('Unit '))).toBe(true);
      expect(texts.includes('Geotextile')).toBe(document.buildUp!.geotextile);
    },
  );

  test('a sheet’s section is to a preferred scale, in full words', () => {
    const box = boxes[1];
    const { commands, scale } = layerSection(document, box, FRAME, 'sheet');
    expect(letteringFaults(sheetOf(commands, box))).toEqual([]);
    expect(PREFERRED_SCALES).toContain(scale);
    const texts = textsOf(commands, box);
    expect(texts.some((text) => text.startsWith(`${document.units[0].name}: `))).toBe(true);
    expect(texts.some((text) => text.startsWith('Bedding, screeded: '))).toBe(true);
    expect(texts.includes('Geotextile on the ground')).toBe(document.buildUp!.geotextile);
  });

  test.each(boxes)('the screed board’s too, on $right mm', (box) => {
    const high = { ...box, bottom: box.top + (box.right - box.left) * 0.5 };
    const commands = screedPicture(document, high, FRAME);
    expect(letteringFaults(sheetOf(commands, high))).toEqual([]);
  });
});

test('layers on the section are as thick as they are figured', () => {
  const { commands, scale } = layerSection(SLOPING_COURT, boxes[1], FRAME, 'sheet');
  const heights = commands.flatMap((command) =>
    command.kind === 'path' &&
    command.rings[0].points.length === 4 &&
    command.fill &&
    command.stroke
      ? [Math.abs(command.rings[0].points[2][1] - command.rings[0].points[0][1]) * scale]
      : [],
  );
  // The guide's court: 25 mm of bedding on 100 mm of base.
  for (const thickness of [25, 100])
    expect(heights.some((height) => Math.abs(height - thickness) < 0.01)).toBe(true);
});

test('a sheet says which layers are not entered yet; a screen shows what stands in for them', () => {
  const bare: LayoutDocument = { ...SLOPING_COURT, buildUp: undefined };
  const texts = (place: 'sheet' | 'screen') =>
    textsOf(layerSection(bare, boxes[1], FRAME, place).commands, boxes[1]);
  const unknown = texts('sheet').filter((text) => text.includes('not entered yet'));
  expect(unknown).toEqual([
    'Bedding, screeded: not entered yet',
    'Base, compacted: not entered yet',
  ]);
  expect(texts('sheet').some((text) => text.includes('bottom of the dig'))).toBe(false);
  expect(texts('screen')).toEqual(expect.arrayContaining(['Bedding 25', 'Base 100']));
});

test('the board is drawn within the floor’s own strips', () => {
  // The court is an L: of its two strips, 4700 mm across, the upper ends at x = 4100 of 6400 mm.
  const box: PaperBox = { left: 1, top: 1, right: 201, bottom: 61 };
  const commands = screedPicture(SLOPING_COURT, box, FRAME);
  const heads = commands.flatMap((command) =>
    command.kind === 'path' && command.rings[0].points.length === 3
      ? [command.rings[0].points[0][0]]
      : [],
  );
  const outline = commands[0].kind === 'path' ? commands[0].rings[0].points : [];
  const [left, right] = [
    Math.min(...outline.map(([x]) => x)),
    Math.max(...outline.map(([x]) => x)),
  ];
  const shares = heads.map((x) => (x - left) / (right - left)).sort();
  expect(shares).toHaveLength(2);
  expect(shares[0]).toBeLessThan(4100 / 6400);
  expect(shares[1]).toBeGreaterThan(4100 / 6400);
});

describe('the level map', () => {
  const model = earthModel(SLOPING_COURT);
  const map = levelMap(model, 'metric');
  const box: PaperBox = { left: 5, top: 5, right: 165, bottom: 130 };
  const view = viewCentred(pointsBounds(model.ground.rings[0].outline), 48, box);
  const { commands, unfigured } = levelMapDrawing(
    SLOPING_COURT,
    model,
    view,
    { box, frame: FRAME },
    map,
  );

  test('figures every peg, every spot and every contour that has room, none over another', () => {
    expect(letteringFaults(sheetOf(commands, box))).toEqual([]);
    expect(unfigured).toEqual([]);
    const texts = textsOf(commands, box);
    // 2 % over the 4700 mm from F to A is 94 mm.
    for (const text of ['A −94', 'F 0', '8 −215', '−200', '2\u2009%'])
      expect(texts).toContain(text);
  });

  test('has a sample for each row of its key', () => {
    for (const { sample } of levelMapKey(model, map, '25 mm', true))
      expect(mapKeySample(sample, { left: 0, top: 0, right: 9, bottom: 5 }).length).toBeGreaterThan(
        0,
      );
  });
});
