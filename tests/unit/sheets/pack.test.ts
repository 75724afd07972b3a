import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { figuredText } from '@/paving/figured-words';
import { unitCorners } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { setOut } from '@/paving/set-out/set-out';
import { COURT_CHEQUER, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { numbersWords } from '@/sheets/course-groups';
import { courseSteps } from '@/sheets/course-rows';
import { drawingCommands, PENS } from '@/sheets/drawing';
import { packInput, packSheets } from '@/sheets/pack';
import { PAPER_NAMES } from '@/sheets/paper';
import { planParts } from '@/sheets/plan-parts';
import type { PlanInput } from '@/sheets/plan-input';
import { pointsBounds } from '@/sheets/plan-view';
import { pointsCsv } from '@/sheets/points-csv';
import { PREFERRED_SCALES } from '@/sheets/scales';
import { SHEET_KINDS, type NumberedSheet } from '@/sheets/sheet-draft';
import { takeOff } from '@/takeoff/take-off';
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
import { letteringFaults, sheetTexts } from './sheet-invariants';

/** With layers and levels entered, and spots of the ground. */
const levelled = (document: LayoutDocument): LayoutDocument => {
  const parsed = parseLayoutDocument({
    ...document,
    buildUp: { bedding: 30, base: 150, geotextile: true, overdig: 150 },
    levels: {
      finish: -5,
      proud: 4,
      fall: { kind: 'oneWay', direction: -90, percent: 1.5 },
      spots: [
        { at: [100, 100], level: -20 },
        { at: [7000, 100], level: -60 },
        { at: [100, 5000], level: 30 },
      ],
    },
  });
  if (!parsed.ok) throw new Error(parsed.problems.map(({ message }) => message).join(' '));
  return parsed.document;
};

const LONG = 'An uncommonly long name that nobody would want to letter on a drawing by hand';
const NAMED: LayoutDocument = {
  ...BAY,
  units: BAY.units.map((unit) => ({ ...unit, name: LONG })),
  ground: {
    ...BAY.ground,
    keepOuts: [{ name: LONG, ring: rectangle(1500, 1500, 700, 500) }],
  },
};

/** About 20 m by 20 m: 19 900 blocks. */
const PLAZA = floor(rectangle(0, 0, 20_060, 20_060), {
  units: [{ id: 'a', name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
  bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.5 },
  placement: { origin: [130, 80], turn: 0 },
});

/** Long and narrow, so that its plan is in parts: 1 600 blocks. */
const LANE = floor(rectangle(0, 0, 32_060, 1_060), {
  units: [{ id: 'a', name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
  bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.5 },
  placement: { origin: [130, 80], turn: 0 },
});

const FLOORS: Record<string, LayoutDocument> = {
  court: COURT,
  'court with levels': levelled(COURT),
  'bay in feet and inches': BAY,
  'bay with long names': NAMED,
  path: PATH,
  star: STAR,
  terrace: TERRACE,
  stairs: STAIRS,
  'demo chequer': COURT_CHEQUER,
  'demo terrace': ROUND_TERRACE,
  'demo yard': SIDE_YARD,
  plaza: PLAZA,
};

const stamp = {
  issuedAt: '2026-10-20T07:30:00.000Z',
  supersededBy: null,
  currentUrl: 'https://floors.example/current/abcdefghijkmnpqrstuvwxyz',
};

function pack(
  document: LayoutDocument,
  change: Partial<Omit<PlanInput, 'laying' | 'report'>> = {},
): readonly NumberedSheet[] {
  const input = planInput(document, { stamp, state: 'issued', ...change });
  return packSheets(packInput(input, takeOff(input.laying, input.report, null)));
}

const faults = (sheets: readonly NumberedSheet[]) =>
  sheets.flatMap((sheet, n) =>
    letteringFaults(sheet).map((fault) => `sheet ${n + 1}, ${sheet.type}: ${fault}`),
  );
const words = (sheet: NumberedSheet) => sheetTexts(sheet).map(({ text }) => text);

describe('the set-out pack', () => {
  for (const [name, document] of Object.entries(FLOORS))
    it(`letters the ${name} without a text over another, out of its frame or too small`, () => {
      expect(faults(pack(document))).toEqual([]);
    });

  it('does so on every paper', () => {
    for (const paper of PAPER_NAMES)
      for (const document of [levelled(COURT), NAMED, TERRACE])
        expect(faults(pack(document, { paper }))).toEqual([]);
  });

  it('does so for any floor', () => {
    fc.assert(
      fc.property(randomFloor, (document) => {
        expect(faults(pack(document))).toEqual([]);
      }),
      { numRuns: 12 },
    );
  });

  it('has every kind of sheet in the order of use, all on one paper, numbered through', () => {
    for (const document of [COURT, BAY, TERRACE]) {
      const sheets = pack(document);
      expect([...new Set(sheets.flatMap(({ kinds }) => kinds))]).toEqual(SHEET_KINDS);
      expect(new Set(sheets.map(({ paper }) => paper.name)).size).toBe(1);
      sheets.forEach((sheet, n) => expect(words(sheet)).toContain(`${n + 1}/${sheets.length}`));
    }
  });

  it('bears version, times, fingerprint and the QR code on every sheet', () => {
    for (const sheet of pack(COURT)) {
      expect(words(sheet)).toEqual(
        expect.arrayContaining([
          '3',
          '2026-10-14 09:30 UTC',
          '2026-10-20 07:30 UTC',
          'a1b2c3d4e5',
          'Still current? Scan.',
        ]),
      );
    }
  });

  it('says “Not for set-out” on every sheet of a version that is not issued, and on none that is', () => {
    const unissued = { ...stamp, issuedAt: null };
    const states = ['saved', 'shared', 'accepted', 'change_asked'] as const;
    // Every state on one floor; every kind of sheet, parts and compact lists among them, in one state.
    const lane = pack(LANE, { state: 'saved', stamp: unissued });
    expect(lane.some(({ type }) => type.includes(', part '))).toBe(true);
    for (const sheet of [
      ...states.flatMap((state) => pack(COURT, { state, stamp: unissued })),
      ...pack(levelled(STAR), { state: 'saved', stamp: unissued }),
      ...lane,
    ]) {
      expect(words(sheet), sheet.type).toContain('Not for set-out');
      expect(words(sheet), sheet.type).not.toContain('Issued for set-out');
    }
    for (const sheet of [...pack(COURT), ...pack(STAR)]) {
      expect(words(sheet), sheet.type).toContain('Issued for set-out');
      expect(words(sheet), sheet.type).not.toContain('Not for set-out');
    }
  });

  it('says by which version and when a superseded one was', () => {
    const superseded = { ...stamp, supersededBy: { number: 5, at: '2026-11-02T10:00:00.000Z' } };
    const sheets = pack(COURT, { state: 'superseded', stamp: superseded });
    for (const sheet of sheets) {
      const said = words(sheet).join(' ');
      expect(said).toContain('Superseded');
      expect(said).toContain('Version 5 was issued in its place on');
      expect(said).toContain('2026-11-02 10:00 UTC');
    }
  });

  it('has every control point with both tapes, and every course, in the tables', () => {
    for (const document of [COURT, STAIRS]) {
      const input = planInput(document);
      const { points, courses } = setOut(input.laying, input.report);
      const sheets = pack(document);
      const of = (kind: string) =>
        sheets
          .filter((sheet) => sheet.kinds.some((each) => each === kind))
          .flatMap((sheet) => words(sheet));
      const control = of('control');
      for (const { name } of points) expect(control).toContain(name);
      const said = of('courses');
      for (const { number } of courses) expect(said).toContain(`Course ${number}`);
    }
  });

  it('ticks every unit of every course of a floor of a usual size', () => {
    const sheets = pack(COURT).filter(({ type }) => type === 'Courses: running lengths');
    // A box to tick is a square of 3 mm.
    const boxes = sheets.flatMap(drawingCommands).filter((command) => {
      if (command.kind !== 'path' || command.rings.length !== 1) return false;
      const [[x0, y0], , [x1, y1]] = command.rings[0].points;
      return Math.abs(x1 - x0 - 3) < 1e-9 && Math.abs(y1 - y0 - 3) < 1e-9;
    });
    expect(boxes).toHaveLength(planInput(COURT).laying.laid.count);
  });

  /** A course's list read back: what it says of the course, and the near edges by the unit's number. */
  const courseLists = (document: LayoutDocument) =>
    pack(document)
      .filter(({ type }) => type === 'Courses: running lengths')
      .flatMap(words)
      .join(' | ')
      .replace(/(?<=\d)[\u202f\u2009](?=\d)/g, '')
      .split(/(?=Courses? \d)/)
      .filter((text) => / units?; strings? | units? \(/.test(text));

  it('prints every running length of a large floor, courses that are alike together', () => {
    // 2 000 blocks 200 mm long without a joint, in 50 courses, every second one half a block on: two ways to mark a string.
    const blocks = floor(rectangle(0, 0, 8_060, 5_030), {
      units: [{ id: 'a', name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
      bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.5 },
      placement: { origin: [130, 70], turn: 0 },
    });
    const { courses } = setOut(planInput(blocks).laying);
    expect(courses).toHaveLength(50);
    const lists = courseLists(blocks);
    expect(lists).toHaveLength(2);
    lists.forEach((text, n) => {
      expect(text).toContain(`Courses ${n + 1} to ${49 + n} every second`);
      const first = n === 0 ? courses[0].startGap : courses[1].startGap;
      const all = [
        ...text
          .split(' laid |')
          .at(-1)!
          .matchAll(/(?<![\d:])(\d+)(?= \||$)/g),
      ];
      // After the list comes the title strip of its sheet.
      expect(all.slice(0, courses[n].units).map(([, mm]) => Number(mm))).toEqual(
        Array.from({ length: courses[n].units }, (_, unit) => Math.round(first + 200 * unit)),
      );
      const boxes = [...text.matchAll(/(\d+) laid/g)].map(([, number]) => Number(number));
      expect(boxes).toEqual(Array.from({ length: 25 }, (_, m) => n + 1 + 2 * m));
    });
  });

  it('has the length of every unit of a large floor whose courses all differ', () => {
    const round = floor(
      [
        [3600, 0, Math.SQRT2 - 1],
        [0, 3600, Math.SQRT2 - 1],
        [-3600, 0, Math.SQRT2 - 1],
        [0, -3600, Math.SQRT2 - 1],
      ],
      {
        units: [{ id: 'a', name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
        bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.31 },
        placement: { origin: [13, 8], turn: 7 },
      },
    );
    const { laying } = planInput(round);
    expect(laying.laid.count).toBeGreaterThan(1500);
    const { courses } = setOut(laying);
    const lists = new Map(
      courseLists(round).map((text) => [Number(/^Courses? (\d+)/.exec(text)![1]), text]),
    );
    expect(lists.size).toBe(courses.length);
    for (const { number, runs } of courses) {
      const list = lists
        .get(number)!
        .split(/end\. \|/)
        .at(-1)!;
      const said = [...list.matchAll(/(?<![\d:])(\d+)(?= \||$)/g)].map(([, mm]) => Number(mm));
      for (const [near] of runs.flatMap(({ ticks }) => ticks))
        expect(said).toContain(Math.round(near));
    }
  });

  it('says which courses are alike in few words', () => {
    expect(numbersWords([1])).toBe('1');
    expect(numbersWords([1, 2])).toBe('1, 2');
    expect(numbersWords([4, 5, 6, 9])).toBe('4 to 6, 9');
    expect(numbersWords([1, 3, 5, 7, 8, 9])).toBe('1 to 7 every second, 8, 9');
    expect(numbersWords([2, 6, 10])).toBe('2 to 10 every 4th');
  });

  it('names steps only where they repeat: units of two lengths in turn, and not at random', () => {
    const course = (...runs: readonly (readonly number[])[]) => ({
      runs: runs.map((nears) => ({
        ...setOut(planInput(COURT).laying).courses[0].runs[0],
        ticks: nears.map((near) => [near, near + 90] as const),
      })),
    });
    expect(courseSteps(course([0, 100, 200], [450, 550]))).toEqual([100]);
    expect(courseSteps(course([0, 100, 300, 400, 600]))).toEqual([100, 200]);
    expect(courseSteps(course([0, 100, 300, 350, 700, 720, 950, 1000]))).toBeNull();
    expect(courseSteps(course([0, 100, 300], [500, 700, 800]))).toBeNull();
    expect(courseSteps(course([0]))).toBeNull();
  });

  it('puts what the control sheet’s panel has no room for over its table, not on a sheet of its own', () => {
    const sheets = pack(BAY, { paper: 'Letter' }).filter(({ kinds }) => kinds.includes('control'));
    expect(sheets.map(({ type }) => type)).not.toContain('Control points: tables');
    const said = sheets.map(words);
    expect(said[0].join(' ')).not.toContain('Figures rule over');
    expect(said[1].join(' ')).toContain('Figures rule over');
    expect(said[1]).toContain('What it is');
  });

  it('has the last checks over the words to sign under, on every paper and for floors of every length of list', () => {
    for (const paper of PAPER_NAMES)
      for (const document of [
        BAY,
        COURT,
        TERRACE,
        STAR,
        STAIRS,
        PATH,
        SIDE_YARD,
        levelled(COURT),
      ]) {
        const sheets = pack(document, { paper }).filter(({ kinds }) => kinds.includes('checks'));
        const { checks } = setOut(planInput(document).laying);
        const closing = sheets.map(words).filter((said) => said.join(' ').includes('Checked by'));
        expect(closing).toHaveLength(1);
        for (const number of [checks.length - 2, checks.length])
          expect(closing[0]).toContain(String(number));
        expect(closing[0]).toContain('What to measure');
      }
  });

  it('says what of the build-up is not entered yet, and figures what is', () => {
    const section = (document: LayoutDocument) =>
      pack(document)
        .filter(({ kinds }) => kinds.includes('section'))
        .flatMap(words);
    expect(
      section(COURT).filter((text) => text.includes('not entered yet')).length,
    ).toBeGreaterThan(2);
    const said = section(levelled(COURT));
    expect(said.some((text) => text.includes('not entered yet'))).toBe(false);
    expect(said).toEqual(
      expect.arrayContaining(['30\u2009mm', '150\u2009mm', '−235 bottom of the dig']),
    );
  });

  it('names the edge that the screed board is pulled along, however it lies', () => {
    const pulled = (perimeter: LayoutDocument['ground']['perimeter']) =>
      pack(floor(perimeter))
        .filter(({ kinds }) => kinds.includes('section'))
        .flatMap(words)
        .join(' ');
    expect(pulled(rectangle(0, 0, 4000, 2000))).toMatch(/along (AB|CD)/);
    const skew = (by: number): LayoutDocument['ground']['perimeter'] => [
      [0, 0],
      [3900, by],
      [3600, by + 2000],
      [-300, 2000],
    ];
    expect(pulled(skew(700))).toMatch(/along (AB|CD)/);
    expect(pulled(skew(-700))).toMatch(/along (AB|CD)/);
  });

  it('has the level map where a floor has spots or a fall, with every peg, and not otherwise', () => {
    const levels = (document: LayoutDocument) =>
      pack(document).filter(({ type }) => type === 'Levels');
    expect(levels(COURT)).toEqual([]);
    const [sheet] = levels(levelled(COURT));
    const said = words(sheet);
    // 5 mm below the edge, and 1.5 % down over the 5400 mm from E to B: 81 mm.
    expect(said).toEqual(
      expect.arrayContaining(['A −86', 'B −86', 'E −5', '1 −20', '2 −60', '3 +30', '1.5\u2009%']),
    );
    expect(said).toEqual(expect.arrayContaining(['Earth to dig', 'A spot and its level']));
    const unmeasured = levelled(COURT);
    const [dry] = levels({ ...unmeasured, levels: { ...unmeasured.levels!, spots: [] } });
    expect(words(dry)).toContain('A −86');
    expect(words(dry)).not.toContain('Earth to dig');
  });

  it('cautions of a heavy unit in the measures of the floor, by its maker where that is known', () => {
    const slab = { ...COURT.units[0], length: 600, width: 600, thickness: 50 };
    const said = (change: Partial<LayoutDocument>) =>
      pack(floor(rectangle(0, 0, 3000, 3000), { units: [slab], ...change }))
        .flatMap(words)
        .join(' ');
    // 0.018 m³ at 2 320 kg/m³; 23 kg or 51 lb: NIOSH publication 94-110.
    expect(said({})).toMatch(/about 41\.8.kg if of concrete: over 23.kg is/);
    expect(said({ display: 'imperial' })).toMatch(/about 92\.1.lb if of concrete: over 51.lb is/);
    expect(said({ units: [{ ...slab, mass: 30 }] })).toMatch(/about 30\.0.kg: over 23.kg is/);
    expect(said({ units: [{ ...slab, mass: 20 }] })).not.toContain('lift for two');
  });

  it('draws with the line widths of ISO 128 alone', () => {
    const widths: readonly number[] = Object.values(PENS);
    for (const sheet of pack(levelled(COURT)))
      for (const command of drawingCommands(sheet)) {
        const stroke = command.kind === 'text' ? undefined : command.stroke;
        if (stroke) expect(widths).toContain(stroke.width);
      }
  });
});

describe('a plan in parts', () => {
  const input = planInput(PLAZA);
  const { laying } = input;
  const bounds = pointsBounds(laying.ground.rings[0].outline);
  const made = planParts(laying, bounds, 'A4', 100)!;

  it('is made where units are too small to read, to a recommended scale of ISO 5455', () => {
    expect(PREFERRED_SCALES).toContain(made.scale);
    expect(100 / made.scale).toBeGreaterThanOrEqual(2);
    const court = planInput(COURT).laying;
    expect(planParts(court, pointsBounds(court.ground.rings[0].outline), 'A4', 50)).toBeNull();
  });

  it('shows every unit whole on some part, and all of it within that part’s window', () => {
    const { overlap, window, scale, parts } = made;
    const beyond = [
      ((window.right - window.left) * scale -
        (parts[0].ground.greatest[0] - parts[0].ground.least[0])) /
        2,
      ((window.bottom - window.top) * scale -
        (parts[0].ground.greatest[1] - parts[0].ground.least[1])) /
        2,
    ];
    beyond.forEach((each) => expect(each).toBeCloseTo(overlap, 6));
    for (let n = 0; n < laying.laid.count; n += 1) {
      const corners = unitCorners(
        laying.motif[laying.laid.k[n]],
        laying.laid.x[n],
        laying.laid.y[n],
      );
      const whole = parts.some(({ ground: { least, greatest } }) =>
        corners.every(
          ([x, y]) =>
            x >= least[0] - overlap &&
            x <= greatest[0] + overlap &&
            y >= least[1] - overlap &&
            y <= greatest[1] + overlap,
        ),
      );
      expect(whole, `unit ${n}`).toBe(true);
    }
  });

  it('names each neighbour on the edge that it goes on at, and is named there in turn', () => {
    const byName = new Map(made.parts.map((part) => [part.name, part]));
    const turned = { left: 'right', right: 'left', above: 'below', below: 'above' } as const;
    for (const part of made.parts)
      for (const side of ['left', 'right', 'above', 'below'] as const) {
        const neighbour = part[side];
        if (neighbour !== null) expect(byName.get(neighbour)?.[turned[side]]).toBe(part.name);
      }
    const sheets = pack(PLAZA, { paper: 'A4' }).filter(({ type }) => type.includes(', part '));
    expect(sheets).toHaveLength(made.parts.length);
    made.parts.forEach((part, n) => {
      const said = words(sheets[n]).filter((text) => text.startsWith('Match line'));
      const neighbours = [part.left, part.right, part.above, part.below].filter(Boolean);
      expect(said).toHaveLength(neighbours.length);
      neighbours.forEach((name) =>
        expect(said.some((text) => text.includes(`at part ${name}.`))).toBe(true),
      );
    });
  });

  it('is named on the whole plan, which is the key', () => {
    const [whole] = pack(PLAZA, { paper: 'A4' });
    for (const { name } of made.parts) expect(words(whole)).toContain(name);
  });
});

describe('the points as CSV', () => {
  const read = (document: LayoutDocument) => {
    const input = planInput(document);
    const made = setOut(input.laying, input.report);
    return {
      points: made.points,
      rows: Papa.parse<Record<string, string>>(pointsCsv(document, made), { header: true }).data,
    };
  };

  it('has every point by name, with its x and y to a tenth of a millimetre', () => {
    for (const document of [COURT, BAY, TERRACE]) {
      const { points, rows } = read(document);
      expect(rows.map(({ name }) => name)).toEqual(points.map(({ name }) => name));
      expect(rows.map(({ what }) => what)).toEqual(
        points.map(({ what }) => figuredText(what, document.display)),
      );
      points.forEach(({ at }, n) => {
        expect(Math.abs(Number(rows[n].x_mm) - at[0])).toBeLessThanOrEqual(0.051);
        expect(Math.abs(Number(rows[n].y_mm) - at[1])).toBeLessThanOrEqual(0.051);
        expect(rows[n].level_mm).toBe('');
      });
    }
  });

  it('has the finished level where levels are entered: 1.5 % down from the far side, 5 mm below the edge', () => {
    const { points, rows } = read(levelled(COURT));
    points.forEach(({ at }, n) =>
      // The court's far side is at y = 5 400.
      expect(Number(rows[n].level_mm)).toBeCloseTo(-5 - 0.015 * (5400 - at[1]), 0),
    );
  });

  it('gives a spreadsheet no formula to run', () => {
    const { rows } = read({
      ...COURT,
      ground: {
        ...COURT.ground,
        keepOuts: [{ name: '=HYPERLINK("x")', ring: rectangle(1500, 3600, 1000, 1000) }],
      },
    });
    for (const row of rows)
      for (const cell of Object.values(row)) expect(cell).not.toMatch(/^[=+@\t]/);
  });
});
