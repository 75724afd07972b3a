import { readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';

/**
 * Writes src/sheets/nunito-sans-metrics.ts: the advance widths of every character of Nunito Sans
 * in the three weights that sheets use, read from the TrueType files of
 * `@expo-google-fonts/nunito-sans` (the same files that the PDF embeds).
 * Run it by `npx tsx scripts/font-metrics.ts` when that package changes.
 */

const FACES = { 400: '400Regular', 600: '600SemiBold', 700: '700Bold' } as const;

export interface FaceMetrics {
  readonly unitsPerEm: number;
  readonly capHeight: number;
  readonly ascender: number;
  readonly descender: number;
  /** Advance width by code point, font units. */
  readonly advances: ReadonlyMap<number, number>;
}

export function faceFile(weight: keyof typeof FACES): string {
  const face = FACES[weight];
  return createRequire(import.meta.url).resolve(
    `@expo-google-fonts/nunito-sans/${face}/NunitoSans_${face}.ttf`,
  );
}

/** Tables `head`, `hhea`, `OS/2`, `hmtx` and `cmap` (format 4 or 12) of the OpenType specification. */
export function faceMetrics(file: Buffer): FaceMetrics {
  const tables = new Map<string, number>();
  for (let t = 0; t < file.readUInt16BE(4); t += 1) {
    const record = 12 + 16 * t;
    tables.set(file.toString('latin1', record, record + 4), file.readUInt32BE(record + 8));
  }
  const table = (tag: string): number => {
    const offset = tables.get(tag);
    if (offset === undefined) throw new Error(`The font has no ${tag} table.`);
    return offset;
  };
  const longMetrics = file.readUInt16BE(table('hhea') + 34);
  const advance = (glyph: number) =>
    file.readUInt16BE(table('hmtx') + 4 * Math.min(glyph, longMetrics - 1));
  const advances = new Map<number, number>();
  for (const [code, glyph] of characterGlyphs(file, table('cmap')))
    advances.set(code, advance(glyph));
  return {
    unitsPerEm: file.readUInt16BE(table('head') + 18),
    capHeight: file.readInt16BE(table('OS/2') + 88),
    ascender: file.readInt16BE(table('hhea') + 4),
    descender: file.readInt16BE(table('hhea') + 6),
    advances,
  };
}

function characterGlyphs(file: Buffer, cmap: number): Map<number, number> {
  const subtables = Array.from(
    { length: file.readUInt16BE(cmap + 2) },
    (_, n) => cmap + file.readUInt32BE(cmap + 4 + 8 * n + 4),
  );
  const glyphs = new Map<number, number>();
  for (const at of subtables) {
    const format = file.readUInt16BE(at);
    if (format === 12) {
      for (let group = 0; group < file.readUInt32BE(at + 12); group += 1) {
        const row = at + 16 + 12 * group;
        const [first, last, glyph] = [0, 4, 8].map((step) => file.readUInt32BE(row + step));
        for (let code = first; code <= last; code += 1) glyphs.set(code, glyph + code - first);
      }
    } else if (format === 4) {
      const twice = file.readUInt16BE(at + 6);
      for (let segment = 0; segment < twice; segment += 2) {
        const last = file.readUInt16BE(at + 14 + segment);
        const first = file.readUInt16BE(at + 16 + twice + segment);
        const delta = file.readInt16BE(at + 16 + 2 * twice + segment);
        const rangeAt = at + 16 + 3 * twice + segment;
        const range = file.readUInt16BE(rangeAt);
        for (let code = first; code <= last && code !== 0xffff; code += 1) {
          const raw = range === 0 ? code : file.readUInt16BE(rangeAt + range + 2 * (code - first));
          const glyph = range !== 0 && raw === 0 ? 0 : (raw + delta) & 0xffff;
          if (glyph !== 0) glyphs.set(code, glyph);
        }
      }
    }
  }
  return glyphs;
}

/** Runs of neighbouring code points: `first:width,width …`, so that the file stays small. */
function packed(advances: ReadonlyMap<number, number>): string {
  const codes = [...advances.keys()].filter((code) => code >= 32).sort((p, q) => p - q);
  const runs: string[][] = [];
  codes.forEach((code, n) => {
    if (n === 0 || code !== codes[n - 1] + 1) runs.push([`${code.toString(36)}:`]);
    runs[runs.length - 1].push(advances.get(code)!.toString(36));
  });
  return runs.map(([first, ...widths]) => first + widths.join(',')).join(' ');
}

if (process.argv[1]?.endsWith('font-metrics.ts')) {
  const weights = [400, 600, 700] as const;
  const faces = weights.map((weight) => faceMetrics(readFileSync(faceFile(weight))));
  const { unitsPerEm, capHeight, ascender, descender } = faces[0];
  const version = createRequire(import.meta.url)(
    '@expo-google-fonts/nunito-sans/package.json',
  ).version;
  const source = `/**
 * Advance widths of Nunito Sans, made by scripts/font-metrics.ts from the TrueType files of
 * @expo-google-fonts/nunito-sans ${version}. Do not edit.
 * Widths are in font units; runs are \`first:width,width …\`, all numbers in base 36.
 */
export const FONT_UNITS_PER_EM = ${unitsPerEm};
export const FONT_CAP_HEIGHT = ${capHeight};
export const FONT_ASCENDER = ${ascender};
export const FONT_DESCENDER = ${descender};
export const FONT_ADVANCES = {
${weights.map((weight, n) => `  ${weight}: '${packed(faces[n].advances)}',`).join('\n')}
} as const;
`;
  writeFileSync(join(import.meta.dirname, '../src/sheets/nunito-sans-metrics.ts'), source);
}
