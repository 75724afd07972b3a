import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { compileFunction } from 'node:vm';
import type { DOMWindow } from 'jsdom';
import type { svg2pdf } from 'svg2pdf.js';
import type { FontFile, PdfMeans } from '@/pdf/sheets-pdf';
import { FONT_WEIGHTS, sheetsPdf, type PdfAbout } from '@/pdf/sheets-pdf';
import type { Sheet } from '@/sheets/sheet';
import { CAP_RATIO, textWidth } from '@/sheets/text-measure';

const packages = createRequire(import.meta.url);

const FACES = { 400: '400Regular', 600: '600SemiBold', 700: '700Bold' } as const;

const fontFile = async (weight: FontFile['weight']): Promise<FontFile> => {
  const face = FACES[weight];
  const bytes = await readFile(
    packages.resolve(`@expo-google-fonts/nunito-sans/${face}/NunitoSans_${face}.ttf`),
  );
  return { weight, data: Uint8Array.from(bytes).buffer };
};

/** A window for svg2pdf.js: jsdom with text boxes, which it lacks, from the font's own widths. */
async function drawingWindow(): Promise<DOMWindow> {
  // Large, and needed by few: not read when the server starts.
  const { JSDOM } = await import('jsdom');
  const { window } = new JSDOM('');
  const box = function (this: Element) {
    const size = Number.parseFloat(this.getAttribute('font-size') ?? '0');
    const width = textWidth(this.textContent ?? '', size * CAP_RATIO);
    return { x: 0, y: -size, width, height: size };
  };
  for (const name of ['SVGElement', 'SVGGraphicsElement'] as const)
    Object.defineProperty(window[name].prototype, 'getBBox', { value: box, configurable: true });
  window.HTMLCanvasElement.prototype.getContext = () => null;
  return window;
}

/**
 * svg2pdf.js finds its window in globals. They are handed to the file as it is compiled, and not set: a server with
 * a global `document` makes libraries that it renders pages with take it for a browser.
 */
async function svg2pdfIn(window: DOMWindow): Promise<typeof svg2pdf> {
  const file = packages.resolve('svg2pdf.js/dist/svg2pdf.umd.js');
  const globals = {
    exports: {} as { svg2pdf: typeof svg2pdf },
    module: {},
    require: createRequire(file),
    window,
    document: window.document,
    DOMParser: window.DOMParser,
    CSSStyleSheet: window.CSSStyleSheet,
    CSSStyleRule: window.CSSStyleRule,
  };
  const run = compileFunction(await readFile(file, 'utf8'), Object.keys(globals), {
    filename: file,
  });
  run(...Object.values(globals));
  return globals.exports.svg2pdf;
}

let means: Promise<PdfMeans> | null = null;

/** What the server makes PDFs with; made once, when the first is asked for. */
export const nodePdfMeans = (): Promise<PdfMeans> => (means ??= newMeans());

async function newMeans(): Promise<PdfMeans> {
  const window = await drawingWindow();
  const parser = new window.DOMParser();
  return {
    fonts: await Promise.all(FONT_WEIGHTS.map(fontFile)),
    svg2pdf: await svg2pdfIn(window),
    svgElement: (svg) => parser.parseFromString(svg, 'image/svg+xml').documentElement,
  };
}

/** Sheets as a PDF, in the thread that calls: about a tenth of a second a page. The server asks `threadPdf`. */
export const nodePdf = async (
  sheets: readonly Sheet[],
  about: PdfAbout,
): Promise<Uint8Array<ArrayBuffer>> =>
  new Uint8Array(await sheetsPdf(sheets, about, await nodePdfMeans()));
