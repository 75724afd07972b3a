import { jsPDF } from 'jspdf';
import type { svg2pdf } from 'svg2pdf.js';
import type { Layer } from '@/sheets/drawing';
import type { Sheet } from '@/sheets/sheet';
import { drawingSvg } from '@/sheets/svg-sink';
import { textStarted } from '@/sheets/text-measure';

/** The weights of Nunito Sans that sheets are lettered in. */
export const FONT_WEIGHTS = [400, 600, 700] as const;
/** Nunito Sans as a TrueType file. */
export interface FontFile {
  readonly weight: (typeof FONT_WEIGHTS)[number];
  readonly data: ArrayBuffer;
}

/** What a browser has and Node has not; each side brings its own. */
export interface PdfMeans {
  readonly fonts: readonly FontFile[];
  /** The root element of an SVG text. */
  readonly svgElement: (svg: string) => Element;
  readonly svg2pdf: typeof svg2pdf;
}

/** What the PDF says of itself. */
export interface PdfAbout {
  readonly title: string;
  readonly author: string;
}

/**
 * The sheets as one PDF, a page each at its true size, in real text with its font embedded. `onSheet` hears how many
 * are done; throwing there stops the rest.
 */
export async function sheetsPdf(
  sheets: readonly Sheet[],
  about: PdfAbout,
  means: PdfMeans,
  onSheet: (done: number) => void | Promise<void> = () => {},
): Promise<ArrayBuffer> {
  const [first] = sheets;
  const pdf = new jsPDF({
    unit: 'mm',
    format: [first.width, first.height],
    orientation: first.paper.orientation,
    compress: true,
    putOnlyUsedFonts: true,
  });
  pdf.setDocumentProperties({ title: about.title, author: about.author, creator: 'Evenlay' });
  addFonts(pdf, means.fonts);
  for (const [n, sheet] of sheets.entries()) {
    if (n > 0) pdf.addPage([sheet.width, sheet.height], sheet.paper.orientation);
    // Texts start where the sheet's own metrics put them, whatever font the reader of the SVG would measure by.
    const started = { ...sheet, layers: sheet.layers.map(layerStarted) };
    const svg = means.svgElement(drawingSvg(started));
    await means.svg2pdf(svg, pdf, { x: 0, y: 0, width: sheet.width, height: sheet.height });
    await onSheet(n + 1);
  }
  const file = pdf.output('arraybuffer');
  assertEmbedded(new TextDecoder('latin1').decode(file));
  return file;
}

const layerStarted = (layer: Layer): Layer => ({
  ...layer,
  commands: layer.commands.map((command) =>
    command.kind === 'text' ? textStarted(command) : command,
  ),
});

function addFonts(pdf: jsPDF, fonts: readonly FontFile[]): void {
  for (const { weight, data } of fonts) {
    const name = `NunitoSans-${weight}.ttf`;
    pdf.addFileToVFS(name, base64(new Uint8Array(data)));
    pdf.addFont(name, 'Nunito Sans', 'normal', weight);
  }
  const listed = Object.keys(pdf.getFontList());
  if (!listed.includes('Nunito Sans'))
    throw new Error('The lettering for the PDF could not be read.');
}

/** jsPDF falls back to an unembedded font without a word when it cannot use the one asked for. */
function assertEmbedded(file: string): void {
  const names = [...file.matchAll(/\/BaseFont\s*\/([^\s/<>[\]()]+)/g)].map((match) => match[1]);
  if (names.length === 0 || !names.every((name) => /nunito/i.test(name)))
    throw new Error(`The PDF is not lettered in Nunito Sans alone (${names.join(', ')}).`);
}

function base64(bytes: Uint8Array): string {
  const CHUNK = 0x8000;
  let binary = '';
  for (let at = 0; at < bytes.length; at += CHUNK)
    binary += String.fromCharCode(...bytes.subarray(at, at + CHUNK));
  return btoa(binary);
}
