import jsQR from 'jsqr';
import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { sheetsNumbered } from '@/sheets/sheet-draft';
import { packInput, packSheets } from '@/sheets/pack';
import { planDrafts } from '@/sheets/plan-sheet';
import type { Sheet } from '@/sheets/sheet';
import { drawingSvg } from '@/sheets/svg-sink';
import { takeOff } from '@/takeoff/take-off';
import { COURT, planInput } from './sample-floors';

const currentUrl = 'https://floors.example/current/abcdefghijkmnpqrstuvwxyz';
const stamp = { issuedAt: null, supersededBy: null, currentUrl };

/** What a camera reads off the sheet as it is printed at so many dots an inch, in grey. */
async function scanned(sheet: Sheet, dpi: number): Promise<string | null> {
  const { data, info } = await sharp(Buffer.from(drawingSvg(sheet)), {
    density: dpi,
    limitInputPixels: false,
  })
    .resize({ width: Math.round((sheet.width / 25.4) * dpi) })
    .flatten({ background: '#ffffff' })
    .toColourspace('b-w')
    .raw()
    .toBuffer({ resolveWithObject: true });
  const pixels = new Uint8ClampedArray(info.width * info.height * 4).fill(255);
  for (let n = 0; n < info.width * info.height; n += 1)
    pixels.fill(data[n * info.channels], 4 * n, 4 * n + 3);
  const found = jsQR(pixels, info.width, info.height);
  return found?.data ?? null;
}

describe('the QR code', () => {
  it('is read off every kind of sheet, printed in grey at 150 dots an inch', async () => {
    const input = planInput(COURT, { stamp });
    const sheets = packSheets(packInput(input, takeOff(input.laying, input.report, null)));
    const kinds = new Map(sheets.flatMap((sheet) => sheet.kinds.map((kind) => [kind, sheet])));
    expect(kinds.size).toBe(6);
    for (const [kind, sheet] of kinds) expect(await scanned(sheet, 150), kind).toBe(currentUrl);
  });

  it('is read off each paper, with a long address of the site', async () => {
    const long = `https://plans.hollin-and-sedge-paving-and-gardens.example/floors/current/${'x'.repeat(24)}`;
    for (const paper of ['A4', 'A3', 'Letter', 'Tabloid'] as const) {
      const input = planInput(COURT, { paper, stamp: { ...stamp, currentUrl: long } });
      const [sheet] = sheetsNumbered(planDrafts(input), input);
      expect(await scanned(sheet, 200), paper).toBe(long);
    }
  });

  it('is left out where there is no page to lead to', async () => {
    const input = planInput(COURT);
    const [sheet] = sheetsNumbered(planDrafts(input), input);
    expect(await scanned(sheet, 100)).toBeNull();
  });
});
