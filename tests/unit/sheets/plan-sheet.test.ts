import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { COURT_CHEQUER, COURT_SQUARE, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { PENS, drawingCommands } from '@/sheets/drawing';
import { isInside } from '@/sheets/label-space';
import { PAPER_NAMES } from '@/sheets/paper';
import { planSheets } from '@/sheets/plan-sheet';
import { PREFERRED_SCALES } from '@/sheets/scales';
import { sheetText, textCorners } from '@/sheets/text-measure';
import {
  BAY,
  COURT,
  PATH,
  STAIRS,
  STAR,
  TERRACE,
  floor,
  planInput,
  randomFloor,
  rectangle,
} from './sample-floors';
import { letteringFaults, outlinesOverlap, sheetTexts } from './sheet-invariants';

const NAMED: Record<string, LayoutDocument> = {
  'the court': COURT,
  'the terrace': TERRACE,
  'the bay': BAY,
  'a path of 30 m by 1 m': PATH,
  'a star of 40 corners': STAR,
  stairs: STAIRS,
  'the court cut at its edge': { ...COURT, cutting: 'edge' as const },
  'demo: chequer': COURT_CHEQUER,
  'demo: square': COURT_SQUARE,
  'demo: terrace': ROUND_TERRACE,
  'demo: yard': SIDE_YARD,
  'a hand’s breadth of ground': floor(rectangle(0, 0, 100, 100)),
  'a hundred corners': floor(
    Array.from({ length: 100 }, (_, n) => [
      Math.round(5000 * Math.cos((2 * Math.PI * n) / 100)),
      Math.round(5000 * Math.sin((2 * Math.PI * n) / 100)),
    ]),
  ),
  'names of every length': {
    ...COURT,
    notes: 'A long note that goes on. '.repeat(120),
    aggregate: {
      name: 'Limestone chippings from the quarry over the hill, washed twice',
      colour: '#d9c7a0',
    },
  },
};

const outlineText = (text: { text: string }) => text.text;

describe('a plan sheet', () => {
  for (const [name, document] of Object.entries(NAMED))
    for (const paper of ['auto', ...PAPER_NAMES] as const)
      it(`letters ${name} on ${paper} without a text over another or out of its frame`, () => {
        for (const sheet of planSheets(planInput(document, { paper })))
          expect(letteringFaults(sheet)).toEqual([]);
      });

  it('letters any floor without a text over another or out of its frame', () => {
    fc.assert(
      fc.property(randomFloor, fc.constantFrom('auto', ...PAPER_NAMES), (document, paper) => {
        for (const sheet of planSheets(planInput(document, { paper })))
          expect(letteringFaults(sheet)).toEqual([]);
      }),
      { numRuns: 40, seed: 20261014 },
    );
  });

  it('takes long names, other scripts and signs that the font lacks', () => {
    const input = planInput(COURT, {
      firm: 'Wolfeschlegelsteinhausenbergerdorff und Söhne Pflasterbau Gesellschaft',
      project:
        'Двор 庭 → the courtyard behind the old dairy by the mill race at the very end of the lane',
      label: 'W'.repeat(80),
      creator: 'Łucja Őry\nand others',
    });
    const [sheet] = planSheets(input);
    expect(letteringFaults(sheet)).toEqual([]);
    expect(
      sheetTexts(sheet)
        .map(outlineText)
        .filter((text) => sheetText(text) !== text),
    ).toEqual([]);
    expect(sheetTexts(sheet).map(outlineText).join(' ')).toContain('Двор ? > the courtyard');
  });

  it('draws to a recommended scale of ISO 5455 and keeps the ground inside the drawing', () => {
    fc.assert(
      fc.property(randomFloor, (document) => {
        const [sheet] = planSheets(planInput(document));
        expect(PREFERRED_SCALES).toContain(sheet.scale);
        const ground = sheet.layers.find(({ name }) => name === 'ground')!.commands;
        const { drawing } = sheet.frames;
        for (const command of ground)
          if (command.kind === 'path')
            for (const [x, y] of command.rings[0].points) {
              expect(x).toBeGreaterThan(drawing.left);
              expect(x).toBeLessThan(drawing.right);
              expect(y).toBeGreaterThan(drawing.top);
              expect(y).toBeLessThan(drawing.bottom);
            }
      }),
      { numRuns: 20, seed: 7 },
    );
  });

  it('figures each edge of the court once outside it, and both distances of its tree pit', () => {
    const [sheet] = planSheets(planInput(COURT));
    const figures = sheet.layers.find(({ name }) => name === 'figures')!.commands;
    const texts = figures.flatMap((command) => (command.kind === 'text' ? [command.text] : []));
    const spaced = (text: string) => text.replace('\u2009', ' ');
    expect(texts.map(spaced)).toEqual(
      expect.arrayContaining([
        '7 200',
        '3 100',
        '2 900',
        '2 300',
        '4 300',
        '5 400',
        '1 500',
        '800',
      ]),
    );
    expect(texts).toEqual(expect.arrayContaining(['A', 'B', 'C', 'D', 'E', 'F', 'S']));
  });

  it('keeps dimension lines clear of figures and outside the ground', () => {
    for (const document of [COURT, STAIRS, STAR, PATH]) {
      const plain = { ...document, ground: { ...document.ground, keepOuts: [] } };
      const [sheet] = planSheets(planInput(plain));
      const layer = (wanted: string) => sheet.layers.find(({ name }) => name === wanted)!.commands;
      const perimeter = layer('ground').at(-1)!;
      if (perimeter.kind !== 'path') throw new Error('The perimeter is a path.');
      const fine = layer('figures').flatMap((command) =>
        command.kind === 'line' && command.stroke.width === PENS.fine ? [command] : [],
      );
      const texts = layer('figures').flatMap((command) =>
        command.kind === 'text' && command.text !== 'S' ? [textCorners(command)] : [],
      );
      expect(texts.length).toBeGreaterThan(7);
      for (const { from, to } of fine) {
        const crossed = texts.filter((corners) => outlinesOverlap(corners, [from, to]));
        expect(crossed).toEqual([]);
        const middle = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2] as const;
        // Edges of these lie along the paper's sides, and so do their dimension lines; the leader of a letter may cross the ground.
        const isDimension = from[0] === to[0] || from[1] === to[1];
        if (isDimension && (document === COURT || document === STAIRS))
          expect(isInside(middle, perimeter.rings[0].points)).toBe(false);
      }
    }
  });

  it('says whether it may be built from', () => {
    const head = (state: 'shared' | 'issued' | 'superseded') =>
      sheetTexts(planSheets(planInput(COURT, { state }))[0]).map(outlineText);
    expect(head('shared')).toContain('Not for set-out');
    expect(head('issued')).toContain('Issued for set-out');
    expect(head('issued')).not.toContain('Not for set-out');
    expect(head('superseded').join(' ')).toContain('Do not build');
  });

  it('draws every laid unit once, and the left-out ones not at all', () => {
    const laying = layFloor(COURT);
    const [sheet] = planSheets(planInput(COURT));
    const units = sheet.layers.find(({ name }) => name === 'units')!.commands;
    const rings = units.flatMap((command) =>
      command.kind === 'path' && command.fill ? command.rings : [],
    );
    expect(rings).toHaveLength(laying.laid.count);
    expect(outlinesOverlap(rings[0].points, rings[1].points)).toBe(false);
  });

  it('marks each place of a lifted unit by a dashed outline and two diagonals, and says so in the key', () => {
    const whole = layFloor(COURT).laid;
    const lifted = [5, 12, 30].map((n): [number, number, number] => [
      whole.i[n],
      whole.j[n],
      whole.k[n],
    ]);
    const [sheet] = planSheets(planInput({ ...COURT, lifted }));
    const marks = sheet.layers.find(({ name }) => name === 'lifted')!.commands;
    const rings = (dashed: boolean) =>
      marks.flatMap((command) =>
        command.kind === 'path' && (command.stroke?.dash !== undefined) === dashed
          ? command.rings
          : [],
      );
    expect(rings(true)).toHaveLength(3);
    expect(rings(false)).toHaveLength(6);
    // A 450 mm slab, and its diagonal of 450 √2, to the sheet’s scale.
    for (const { points } of rings(true))
      points.forEach(([x, y], n) => {
        const [toX, toY] = points[(n + 1) % 4];
        expect(Math.hypot(toX - x, toY - y) * sheet.scale).toBeCloseTo(450, 6);
      });
    for (const { points } of rings(false))
      expect(
        Math.hypot(points[1][0] - points[0][0], points[1][1] - points[0][1]) * sheet.scale,
      ).toBeCloseTo(450 * Math.SQRT2, 6);
    const texts = planSheets(planInput({ ...COURT, lifted })).flatMap(sheetTexts);
    expect(texts.map(outlineText).join(' ')).toContain('Lifted out by hand: leave open');
    expect(planSheets(planInput(COURT)).flatMap(sheetTexts).map(outlineText).join()).not.toContain(
      'leave open',
    );
  });

  it('says of a pattern turned right round that its rows run along the line taped from', () => {
    const said = (turn: number) =>
      sheetTexts(
        planSheets(
          planInput(
            floor(rectangle(0, 0, 4000, 3000), {
              placement: { origin: [240, 240], turn },
              setOut: {
                datums: [
                  [0, 0],
                  [0, 1],
                ],
              },
            }),
          ),
        )[0],
      )
        .map(outlineText)
        .join(' ');
    expect(said(180)).toContain('Rows run along A–B.');
    expect(said(-90)).toContain('Rows run square to A–B.');
    expect(said(-153.02)).toMatch(/Rows turn 26\.98° anticlockwise from A–B/);
  });

  it('takes Letter and a sheet of tables for an imperial court of 7 × 5 m, rather than Tabloid at the same scale', () => {
    const perimeter = rectangle(0, 0, 7000, 5000);
    const court = floor(perimeter, {
      display: 'imperial',
      ground: {
        perimeter,
        keepOuts: [
          { name: 'Tree pit', ring: rectangle(1500, 3000, 1000, 1000) },
          { name: 'Drain cover', ring: rectangle(4500, 1000, 600, 450) },
        ],
      },
      units: [{ id: 'a', name: 'Brick', length: 200, width: 100, thickness: 65 }],
    });
    const sheets = planSheets(planInput(court));
    const tabloid = planSheets(planInput(court, { paper: 'Tabloid' }));
    expect(sheets[0].paper.name).toBe('Letter');
    expect(sheets[0].scale).toBe(tabloid[0].scale);
    expect(sheets).toHaveLength(2);
  });

  it('keeps the list of what to take care of in one column where a sheet has the room', () => {
    for (const document of [COURT, BAY, COURT_CHEQUER, COURT_SQUARE]) {
      const sheets = planSheets(planInput(document));
      const places = sheets.flatMap((sheet, n) =>
        sheetTexts(sheet)
          .filter(({ text }) => /^(Take care|Call before|Not for vehicles|Figures are)/.test(text))
          .map(({ frame }) => `${n} ${frame}`),
      );
      expect(places).toHaveLength(4);
      expect(new Set(places).size).toBe(1);
    }
  });

  it('continues on a second sheet what the first has no room for, and numbers both', () => {
    const sheets = planSheets(planInput(NAMED['names of every length'], { paper: 'A4' }));
    expect(sheets.length).toBeGreaterThan(1);
    sheets.forEach((sheet, n) => {
      expect(sheetTexts(sheet).map(outlineText)).toContain(`Plan ${n + 1}/${sheets.length}`);
    });
    const notes = sheets.flatMap(sheetTexts).filter(({ text }) => text.includes('long note'));
    expect(notes.length).toBeGreaterThan(20);
  });

  it('takes the paper asked for, and by itself the smaller of the family that the display system uses', () => {
    for (const paper of PAPER_NAMES)
      expect(planSheets(planInput(COURT, { paper }))[0].paper.name).toBe(paper);
    expect(planSheets(planInput(COURT))[0].paper.name).toBe('A4');
    expect(planSheets(planInput(BAY))[0].paper.name).toBe('Letter');
  });

  it('holds only colours and sizes that every sink takes', () => {
    for (const command of drawingCommands(planSheets(planInput(TERRACE))[0])) {
      const colours =
        command.kind === 'text'
          ? [command.colour]
          : [command.kind === 'line' ? undefined : command.fill, command.stroke?.colour];
      for (const colour of colours) if (colour) expect(colour).toMatch(/^#[0-9a-f]{6}$/);
    }
  });
});
