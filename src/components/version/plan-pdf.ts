import type { jsPDF } from 'jspdf';
import boldUrl from '@expo-google-fonts/nunito-sans/700Bold/NunitoSans_700Bold.ttf?url';
import regularUrl from '@expo-google-fonts/nunito-sans/400Regular/NunitoSans_400Regular.ttf?url';
import semiboldUrl from '@expo-google-fonts/nunito-sans/600SemiBold/NunitoSans_600SemiBold.ttf?url';
import type { Layer } from '@/sheets/drawing';
import type { Sheet } from '@/sheets/plan-sheet';
import { drawingSvg } from '@/sheets/svg-sink';
import { textStarted } from '@/sheets/text-measure';

export type FontFile = { readonly weight: 400 | 600 | 700; readonly data: ArrayBuffer };
export interface PdfAbout {
  readonly title: string;
  readonly author: string;
}

const FONT_URLS = { 400: regularUrl, 600: semiboldUrl, 700: boldUrl } as const;

/** The fonts that sheets are lettered in, as TrueType files. */
export async function sheetFonts(): Promise<readonly FontFile[]> {
  const weights = [400, 600, 700] as const;
  return Promise.all(
    weights.map(async (weight) => {
      const answer = await fetch(FONT_URLS[weight]);
      if (!answer.ok) throw new Error('The lettering for the PDF could not be fetched.');
      return { weight, data: await answer.arrayBuffer() };
    }),
  );
}

/** The sheets as one PDF, a page each at its true size, in real text with its font embedded. */
export async function sheetsPdf(
  sheets: readonly Sheet[],
  about: PdfAbout,
  fonts: readonly FontFile[],
): Promise<ArrayBuffer> {
  const [{ jsPDF }, { svg2pdf }] = await Promise.all([import('jspdf'), import('svg2pdf.js')]);
  const [first] = sheets;
  const pdf = new jsPDF({
    unit: 'mm',
    format: [first.width, first.height],
    orientation: first.paper.orientation,
    compress: true,
    putOnlyUsedFonts: true,
  });
  pdf.setDocumentProperties({ title: about.title, author: about.author, creator: 'Evenlay' });
  addFonts(pdf, fonts);
  for (const [n, sheet] of sheets.entries()) {
    if (n > 0) pdf.addPage([sheet.width, sheet.height], sheet.paper.orientation);
    // Texts start where the sheet's own metrics put them, whatever font the browser would measure by.
    const started = { ...sheet, layers: sheet.layers.map(layerStarted) };
    const svg = new DOMParser().parseFromString(
      drawingSvg(started),
      'image/svg+xml',
    ).documentElement;
    await svg2pdf(svg, pdf, { x: 0, y: 0, width: sheet.width, height: sheet.height });
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
