import { readFileSync } from 'node:fs';
import { JSDOM } from 'jsdom';
import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import type { FontFile } from '@/components/version/plan-pdf';
import { sheetsPdf } from '@/components/version/plan-pdf';
import type { LayoutDocument } from '@/paving/layout-document';
import { COURT_CHEQUER, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import type { PaperName } from '@/sheets/paper';
import type { Sheet } from '@/sheets/plan-sheet';
import { planSheets } from '@/sheets/plan-sheet';
import { LETTERING, textWidth } from '@/sheets/text-measure';
import { faceFile } from '../../../scripts/font-metrics';
import { BAY, COURT, PATH, STAR, planInput } from './sample-floors';
import { sheetTexts } from './sheet-invariants';

/** A point of PostScript and PDF: 1/72 inch (ISO 32000-1, 8.3.2.3). */
const MM_PER_POINT = 25.4 / 72;

const fonts: readonly FontFile[] = ([400, 600, 700] as const).map((weight) => {
  const bytes = readFileSync(faceFile(weight));
  return {
    weight,
    data: bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer,
  };
});

/** svg2pdf.js wants a browser: jsdom with text boxes, which it lacks, from the font's own widths. */
beforeAll(() => {
  const { window } = new JSDOM('');
  const box = function (this: Element) {
    const size = Number.parseFloat(this.getAttribute('font-size') ?? '0');
    const width = textWidth(this.textContent ?? '', size * 0.705);
    return { x: 0, y: -size, width, height: size };
  };
  for (const name of ['SVGElement', 'SVGGraphicsElement'] as const)
    Object.defineProperty(window[name].prototype, 'getBBox', { value: box, configurable: true });
  window.HTMLCanvasElement.prototype.getContext = (() => null) as never;
  for (const name of ['window', 'document', 'DOMParser', 'CSSStyleSheet', 'CSSStyleRule'] as const)
    vi.stubGlobal(name, name === 'window' ? window : window[name as 'document']);
  return () => vi.unstubAllGlobals();
});

async function pdfOf(document: LayoutDocument, paper: PaperName | 'auto' = 'auto') {
  const sheets = planSheets(planInput(document, { paper }));
  const file = await sheetsPdf(
    sheets,
    { title: 'Court, version 3', author: 'Hollin & Sedge' },
    fonts,
  );
  const pdf = await getDocument({ data: new Uint8Array(file.slice(0)), verbosity: 0 }).promise;
  return { sheets, pdf, file };
}

type Matrix = readonly [number, number, number, number, number, number];
const times = (m: Matrix, n: Matrix): Matrix => [
  m[0] * n[0] + m[2] * n[1],
  m[1] * n[0] + m[3] * n[1],
  m[0] * n[2] + m[2] * n[3],
  m[1] * n[2] + m[3] * n[3],
  m[0] * n[4] + m[2] * n[5] + m[4],
  m[1] * n[4] + m[3] * n[5] + m[5],
];

interface Stroked {
  readonly width: number;
  /** Flattened subpaths in millimetres of the paper. */
  readonly lines: readonly (readonly (readonly [number, number])[])[];
}

/** Every path that the page strokes, by the operators of its content. */
async function strokedPaths(page: {
  getOperatorList(): Promise<{ fnArray: number[]; argsArray: unknown[][] }>;
}): Promise<readonly Stroked[]> {
  const { fnArray, argsArray } = await page.getOperatorList();
  const found: Stroked[] = [];
  let matrix: Matrix = [1, 0, 0, 1, 0, 0];
  let width = 1;
  const stack: { matrix: Matrix; width: number }[] = [];
  fnArray.forEach((op, n) => {
    const args = argsArray[n];
    if (op === OPS.save) stack.push({ matrix, width });
    else if (op === OPS.restore) ({ matrix, width } = stack.pop()!);
    else if (op === OPS.transform) matrix = times(matrix, args as unknown as Matrix);
    else if (op === OPS.setLineWidth) width = args[0] as number;
    else if (op === OPS.constructPath) {
      const [paint, data] = args as [number, [Float32Array | null]];
      const strokes: number[] = [OPS.stroke, OPS.closeStroke, OPS.fillStroke, OPS.eoFillStroke];
      if (!strokes.includes(paint) || !data[0]) return;
      const scale = Math.sqrt(Math.abs(matrix[0] * matrix[3] - matrix[1] * matrix[2]));
      found.push({
        width: width * scale * MM_PER_POINT,
        lines: flattened(data[0], matrix),
      });
    }
  });
  return found;
}

/** pdf.js' own path buffer: 0 move, 1 line, 2 cubic, 3 quadratic, 4 close. */
function flattened(data: Float32Array, m: Matrix) {
  const lines: [number, number][][] = [];
  const point = (x: number, y: number): [number, number] => [
    (m[0] * x + m[2] * y + m[4]) * MM_PER_POINT,
    (m[1] * x + m[3] * y + m[5]) * MM_PER_POINT,
  ];
  for (let at = 0; at < data.length;) {
    const op = data[at];
    const line = lines[lines.length - 1];
    if (op === 0) lines.push([point(data[at + 1], data[at + 2])]);
    else if (op === 1) line.push(point(data[at + 1], data[at + 2]));
    else if (op === 2) {
      const start = line[line.length - 1];
      const [p, q, r] = [1, 3, 5].map((step) => point(data[at + step], data[at + step + 1]));
      for (let n = 1; n <= 64; n += 1) {
        const [t, s] = [n / 64, 1 - n / 64];
        line.push(
          [0, 1].map(
            (axis) =>
              s ** 3 * start[axis] +
              3 * s * s * t * p[axis] +
              3 * s * t * t * q[axis] +
              t ** 3 * r[axis],
          ) as [number, number],
        );
      }
    } else if (op === 4) line.push(line[0]);
    else throw new Error(`Path operator ${op} was not expected.`);
    at += [3, 3, 7, 5, 1][op];
  }
  return lines;
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
    await expect(sheetsPdf(sheets, { title: '', author: '' }, [])).rejects.toThrow(/lettering/);
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
