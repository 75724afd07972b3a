import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { describe, expect, it } from 'vitest';
import type { LayoutDocument } from '@/paving/layout-document';
import { sheetsPdf } from '@/pdf/sheets-pdf';
import { COURT_CHEQUER, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { nodePdf, nodePdfMeans } from '@/server/pdf/node-pdf';
import type { PaperName } from '@/sheets/paper';
import type { Sheet } from '@/sheets/sheet';
import { planSheets } from '@/sheets/plan-sheet';
import { LETTERING, textWidth } from '@/sheets/text-measure';
import { BAY, COURT, PATH, STAR, planInput } from '../sheets/sample-floors';
import { sheetTexts } from '../sheets/sheet-invariants';
import { MM_PER_POINT, strokedPaths } from './pdf-reading';

async function pdfOf(document: LayoutDocument, paper: PaperName | 'auto' = 'auto') {
  const sheets = planSheets(planInput(document, { paper }));
  const file = await nodePdf(sheets, { title: 'Court, version 3', author: 'Hollin & Sedge' });
  const pdf = await getDocument({ data: file.slice(), verbosity: 0 }).promise;
  return { sheets, pdf, file };
}

/** Lengths between the corners of the stroked outline nearest to the perimeter drawn, mm of paper. */
async function measuredEdges(
  pdf: { getPage(n: number): Promise<never> },
  sheet: Sheet,
): Promise<readonly number[]> {
  const ground = sheet.layers.find(({ name }) => name === 'ground')!.commands;
  const outline = ground[ground.length - 1];
  if (outline.kind !== 'path') throw new Error('The perimeter is a path.');
  const corners = outline.rings[0].points.map(([x, y]) => [x, sheet.height - y] as const);
  const paths = await strokedPaths(await pdf.getPage(1));
  const near = (p: readonly number[], q: readonly number[]) => Math.hypot(p[0] - q[0], p[1] - q[1]);
  const ring = paths
    .filter(({ width }) => Math.abs(width - 0.5) < 0.01)
    .flatMap(({ lines }) => lines)
    .find((line) => corners.every((corner) => line.some((point) => near(point, corner) < 0.3)));
  if (!ring) throw new Error('The perimeter is not among the paths of the PDF.');
  const at = corners.map((corner) =>
    ring.reduce((best, point, n) => (near(point, corner) < near(ring[best], corner) ? n : best), 0),
  );
  return at.map((from, n) => {
    const to = at[(n + 1) % at.length];
    const count = (to - from + ring.length) % ring.length || ring.length;
    let length = 0;
    for (let step = 0; step < count; step += 1)
      length += near(ring[(from + step) % ring.length], ring[(from + step + 1) % ring.length]);
    return length;
  });
}

const FLOORS: Record<string, LayoutDocument> = {
  court: COURT,
  bay: BAY,
  path: PATH,
  star: STAR,
  'demo chequer': COURT_CHEQUER,
  'demo terrace': ROUND_TERRACE,
  'demo yard': SIDE_YARD,
};

describe('the plan as PDF', () => {
  for (const [name, document] of Object.entries(FLOORS))
    it(`draws every edge of the ${name} at the stated scale, within 0.2 mm on paper`, async () => {
      const { sheets, pdf } = await pdfOf(document);
      const measured = await measuredEdges(pdf as never, sheets[0]);
      const { report } = planInput(document);
      const perimeter = report.edges.filter(({ ring }) => ring === 0);
      expect(measured).toHaveLength(perimeter.length);
      perimeter.forEach((edge, n) =>
        expect(Math.abs(measured[n] - edge.length / sheets[0].scale)).toBeLessThan(0.2),
      );
    });

  it('has pages of the paper’s own size (ISO 216; ANSI/ASME Y14.1)', async () => {
    // Letter is 8.5 by 11 inches, Tabloid 11 by 17.
    const sizes = {
      A4: [210, 297],
      A3: [297, 420],
      Letter: [215.9, 279.4],
      Tabloid: [279.4, 431.8],
    };
    for (const [paper, size] of Object.entries(sizes)) {
      const { pdf } = await pdfOf(COURT, paper as PaperName);
      const [x, y, right, top] = (await pdf.getPage(1)).view;
      const sides = [(right - x) * MM_PER_POINT, (top - y) * MM_PER_POINT].sort((p, q) => p - q);
      sides.forEach((side, n) => expect(side).toBeCloseTo(size[n], 1));
    }
  });

  it('holds every text of the sheet, selectable, where the sheet has it and as wide', async () => {
    for (const document of [COURT, BAY, ROUND_TERRACE]) {
      const { sheets, pdf } = await pdfOf(document);
      const { items } = await (await pdf.getPage(1)).getTextContent();
      const inPdf = items.flatMap((item) => ('str' in item && item.str !== '' ? [item] : []));
      let alone = 0;
      const plain = (text: string) => text.replace(/\s+/g, ' ').trim();
      for (const text of sheetTexts(sheets[0])) {
        const same = inPdf.filter(({ str }) => plain(str) === plain(text.text));
        // pdf.js joins texts that stand close on one line: then the text is part of an item.
        const within = inPdf.some(({ str }) => plain(str).includes(plain(text.text)));
        expect(within, text.text).toBe(true);
        if (same.length === 0) continue;
        alone += 1;
        // The embedded font's widths, read by pdf.js, against the sheet's own table of them.
        const width = textWidth(text.text, text.height, text.weight);
        const nearest = Math.min(
          ...same.map((item) => Math.abs(item.width * MM_PER_POINT - width)),
        );
        expect(nearest, text.text).toBeLessThan(0.1);
        if (text.turnDeg !== 0) continue;
        const start = { start: 0, middle: width / 2, end: width }[text.anchor];
        const away = same.map(({ transform }) =>
          Math.hypot(
            transform[4] * MM_PER_POINT - (text.at[0] - start),
            sheets[0].height - transform[5] * MM_PER_POINT - text.at[1],
          ),
        );
        expect(Math.min(...away), text.text).toBeLessThan(0.2);
      }
      expect(alone).toBeGreaterThan(0.6 * sheetTexts(sheets[0]).length);
    }
  });

  it('is lettered in Nunito Sans alone, embedded', async () => {
    const { file } = await pdfOf(COURT);
    const raw = Buffer.from(file).toString('latin1');
    const names = [...raw.matchAll(/\/BaseFont\s*\/([^\s/]+)/g)].map(([, font]) => font);
    expect(names.length).toBeGreaterThan(0);
    expect(names.filter((font) => !font.includes('Nunito'))).toEqual([]);
    expect(raw).toMatch(/\/FontFile2 /);
  });

  it('refuses to make a PDF without its font', async () => {
    const sheets = planSheets(planInput(COURT));
    const means = { ...(await nodePdfMeans()), fonts: [] };
    await expect(sheetsPdf(sheets, { title: '', author: '' }, means)).rejects.toThrow(/lettering/);
  });

  it('is made without a browser’s globals, and leaves none', async () => {
    await pdfOf(COURT);
    for (const name of ['window', 'document', 'DOMParser']) expect(name in globalThis).toBe(false);
  });

  it('carries the title block and the document’s title', async () => {
    const { pdf } = await pdfOf(COURT);
    const { items } = await (await pdf.getPage(1)).getTextContent();
    const texts = items.flatMap((item) => ('str' in item ? [item.str] : []));
    expect(texts).toEqual(
      expect.arrayContaining([
        'Hollin & Sedge Paving',
        'Court behind the dairy',
        'Diamond chequer: Most slabs',
        '2026-10-14 09:30 UTC',
        'a1b2c3d4e5',
        '1:50 on A4',
        'P-4K2M7-3',
        'Tess Aldine',
        'Not for set-out',
      ]),
    );
    const { info } = await pdf.getMetadata();
    expect((info as { Title: string }).Title).toBe('Court, version 3');
    expect(LETTERING.small).toBeGreaterThanOrEqual(2.5);
  });
});
