import type { NumberedSheet } from '@/sheets/sheet-draft';
import { drawingSvg } from '@/sheets/svg-sink';

/** Name of a sheet's own file: `back-court-v3-sheet-02`. */
const sheetFile = (name: string, sheet: number, of: number): string =>
  `${name}-sheet-${String(sheet).padStart(String(of).length, '0')}.svg`;

/** Lets the page draw between two sheets. */
const breath = () => new Promise<void>((resolve) => setTimeout(resolve));

/** The chosen sheets as one PDF. */
export async function packPdf(
  sheets: readonly NumberedSheet[],
  about: { readonly title: string; readonly author: string },
  told: (share: number) => void,
  stopped: () => boolean,
): Promise<Blob> {
  const { browserPdfMeans, sheetsPdf } = await import('../version/browser-pdf');
  const file = await sheetsPdf(sheets, about, await browserPdfMeans(), async (done) => {
    told(done / sheets.length);
    await breath();
    if (stopped()) throw new Stopped();
  });
  return new Blob([file], { type: 'application/pdf' });
}

/** Thrown when the person stops what is being made. */
export class Stopped extends Error {}

/** The chosen sheets as SVG: a file of its own for one, an archive for more. Numbers are those of the whole pack. */
export async function packSvg(
  sheets: readonly { readonly sheet: NumberedSheet; readonly number: number }[],
  of: number,
  title: string,
  name: string,
): Promise<{ readonly blob: Blob; readonly file: string }> {
  const files = sheets.map(({ sheet, number }) => ({
    file: sheetFile(name, number, of),
    text: drawingSvg(sheet, { title: `${title}, sheet ${number}` }),
  }));
  if (files.length === 1)
    return { blob: new Blob([files[0].text], { type: 'image/svg+xml' }), file: files[0].file };
  const { strToU8, zipSync } = await import('fflate');
  const zip = zipSync(
    Object.fromEntries(files.map(({ file, text }) => [file, strToU8(text)] as const)),
  );
  return {
    blob: new Blob([zip as Uint8Array<ArrayBuffer>], { type: 'application/zip' }),
    file: `${name}-sheets-svg.zip`,
  };
}
