import { svg2pdf } from 'svg2pdf.js';
import boldUrl from '@expo-google-fonts/nunito-sans/700Bold/NunitoSans_700Bold.ttf?url';
import regularUrl from '@expo-google-fonts/nunito-sans/400Regular/NunitoSans_400Regular.ttf?url';
import semiboldUrl from '@expo-google-fonts/nunito-sans/600SemiBold/NunitoSans_600SemiBold.ttf?url';
import type { FontFile, PdfMeans } from '@/pdf/sheets-pdf';
import { FONT_WEIGHTS } from '@/pdf/sheets-pdf';

export { sheetsPdf } from '@/pdf/sheets-pdf';

const FONT_URLS = { 400: regularUrl, 600: semiboldUrl, 700: boldUrl } as const;

/** What the browser makes PDFs with. Import this module only when one is asked for: it is large. */
export async function browserPdfMeans(): Promise<PdfMeans> {
  const fonts = await Promise.all(
    FONT_WEIGHTS.map(async (weight): Promise<FontFile> => {
      const answer = await fetch(FONT_URLS[weight]);
      if (!answer.ok) throw new Error('The lettering for the PDF could not be fetched.');
      return { weight, data: await answer.arrayBuffer() };
    }),
  );
  return {
    fonts,
    svg2pdf,
    svgElement: (svg) => new DOMParser().parseFromString(svg, 'image/svg+xml').documentElement,
  };
}
