import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { describe, expect, it } from 'vitest';
import type { LayoutDocument } from '@/paving/layout-document';
import { nodePdf } from '@/server/pdf/node-pdf';
import { COURT_CHEQUER, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { packInput, packSheets } from '@/sheets/pack';
import type { PaperName } from '@/sheets/paper';
import { SHEET_KINDS } from '@/sheets/sheet-draft';
import { CAP_RATIO } from '@/sheets/text-measure';
import { takeOff } from '@/takeoff/take-off';
import { BAY, floor, planInput, rectangle } from '../sheets/sample-floors';
import { outlinesOverlap } from '../sheets/sheet-invariants';
import { MM_PER_POINT, strokedPaths } from './pdf-reading';

const stamp = {
  issuedAt: '2026-10-20T07:30:00.000Z',
  supersededBy: null,
  currentUrl: 'https://floors.example/current/abcdefghijkmnpqrstuvwxyz',
};

/** Blocks small enough on A4 that the plan is shown again in parts. */
const LARGE = floor(rectangle(0, 0, 9_000, 7_000), {
  units: [{ id: 'a', name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
  bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.5 },
});

async function packOf(document: LayoutDocument, paper: PaperName) {
  const input = planInput(document, { stamp, state: 'issued', paper });
  const sheets = packSheets(packInput(input, takeOff(input.laying, input.report, null)));
  const file = await nodePdf(sheets, { title: 'Pack', author: 'Hollin & Sedge' });
  const pdf = await getDocument({ data: file, verbosity: 0 }).promise;
  expect(pdf.numPages).toBe(sheets.length);
  return { sheets, pdf };
}

type Page = Awaited<ReturnType<Awaited<ReturnType<typeof packOf>>['pdf']['getPage']>>;

interface Read {
  readonly text: string;
  /** Of a capital, mm: the font size that the page sets, by the share of it that a capital is. */
  readonly height: number;
  readonly corners: readonly (readonly [number, number])[];
}

/** Every text of a page as pdf.js finds it, in mm from the paper's lower left corner. */
async function readTexts(page: Page): Promise<readonly Read[]> {
  const { items } = await page.getTextContent();
  return items.flatMap((item): Read[] => {
    if (!('str' in item) || item.str.trim() === '') return [];
    const [a, b, , , x, y] = item.transform.map((value: number) => value * MM_PER_POINT);
    const size = Math.hypot(a, b);
    const [ux, uy] = [a / size, b / size];
    const [width, cap] = [item.width * MM_PER_POINT, size * CAP_RATIO];
    const corner = (along: number, up: number) =>
      [x + ux * along - uy * up, y + uy * along + ux * up] as const;
    return [
      {
        text: item.str,
        height: cap,
        corners: [corner(0, 0), corner(width, 0), corner(width, cap), corner(0, cap)],
      },
    ];
  });
}

const PACKS: readonly (readonly [name: string, document: LayoutDocument, paper: PaperName])[] = [
  ['demo chequer', COURT_CHEQUER, 'A4'],
  ['demo terrace', ROUND_TERRACE, 'A4'],
  ['demo yard', SIDE_YARD, 'A4'],
  ['bay in feet and inches', BAY, 'Letter'],
  ['large floor in parts', LARGE, 'A4'],
];

describe.each(PACKS)('the pack of the %s as PDF, read by machine', (_name, document, paper) => {
  it('has no text out of the paper’s frame, none over another, none under 2.5 mm', async () => {
    const { sheets, pdf } = await packOf(document, paper);
    expect([...new Set(sheets.flatMap(({ kinds }) => kinds))]).toEqual(SHEET_KINDS);
    for (const [n, sheet] of sheets.entries()) {
      const texts = await readTexts(await pdf.getPage(n + 1));
      expect(texts.length, sheet.type).toBeGreaterThan(10);
      const { left, right, top, bottom } = sheet.paper.frame;
      texts.forEach(({ text, height, corners }, t) => {
        const where = `${sheet.type}: “${text}”`;
        // ISO 3098: lettering of at least 2.5 mm.
        expect(height, where).toBeGreaterThan(2.49);
        for (const [x, y] of corners) {
          expect(x, where).toBeGreaterThanOrEqual(left - 0.1);
          expect(x, where).toBeLessThanOrEqual(right + 0.1);
          expect(y, where).toBeGreaterThanOrEqual(sheet.height - bottom - 0.1);
          expect(y, where).toBeLessThanOrEqual(sheet.height - top + 0.1);
        }
        for (const other of texts.slice(t + 1))
          expect(outlinesOverlap(corners, other.corners), `${where} and “${other.text}”`).toBe(
            false,
          );
      });
    }
  });

  it('has every figured drawing to its stated scale: a unit, or the edge, as long on paper', async () => {
    const { sheets, pdf } = await packOf(document, paper);
    const input = planInput(document);
    const edges = input.laying.ground.rings[0].edges;
    const longest = edges.reduce((one, other) => (other.length > one.length ? other : one));
    const { unit } = input.laying.motif[0];
    const diagonal = Math.hypot(unit.length, unit.width);
    let measured = 0;
    for (const [n, sheet] of sheets.entries()) {
      if (!/^(Floor plan|Control points|Courses|Levels)(, part \w+)?$/.test(sheet.type)) continue;
      measured += 1;
      const page = await pdf.getPage(n + 1);
      const lines = (await strokedPaths(page as never)).flatMap((path) => path.lines);
      const spans = (length: number) =>
        lines.some((line) =>
          line.some((from, p) =>
            line
              .slice(p + 1, p + 3)
              .some((to) => Math.abs(Math.hypot(to[0] - from[0], to[1] - from[1]) - length) < 0.2),
          ),
        );
      // On a part a whole unit is measured, corner to corner; elsewhere the longest straight edge too.
      if (sheet.type !== 'Levels')
        expect(spans(diagonal / sheet.scale), `${sheet.type}: a unit`).toBe(true);
      if (!sheet.type.includes('part') && longest.bulge === 0)
        expect(spans(longest.length / sheet.scale), `${sheet.type}: the edge`).toBe(true);
    }
    expect(measured).toBeGreaterThanOrEqual(3);
  });

  it('has a scale bar as long as it says on every sheet that has one', async () => {
    const { sheets, pdf } = await packOf(document, paper);
    let bars = 0;
    for (const [n, sheet] of sheets.entries()) {
      const page = await pdf.getPage(n + 1);
      const length = barLength((await strokedPaths(page as never)).flatMap(({ lines }) => lines));
      if (length === null) continue;
      bars += 1;
      const said = (await readTexts(page))
        .map(({ text }) => /^([\d.]+)\s(m|ft)$/.exec(text))
        .find((match) => match !== null);
      expect(said, sheet.type).toBeTruthy();
      // A metre is 1 000 mm, a foot 304.8 mm (NIST SP 811, B.8).
      const ground = Number(said![1]) * (said![2] === 'm' ? 1000 : 304.8);
      expect(Math.abs(length - ground / sheet.scale), sheet.type).toBeLessThan(0.1);
    }
    expect(bars).toBeGreaterThanOrEqual(3);
  });
});

/** From end to end of the four boxes 1.6 mm high that make up a scale bar, on the page; null without. */
function barLength(lines: readonly (readonly (readonly [number, number])[])[]): number | null {
  const boxes = lines.filter((line) => {
    const ys = line.map(([, y]) => y);
    return line.length === 5 && Math.abs(Math.max(...ys) - Math.min(...ys) - 1.6) < 0.01;
  });
  if (boxes.length !== 4) return null;
  const xs = boxes.flat().map(([x]) => x);
  return Math.max(...xs) - Math.min(...xs);
}
