import sharp from 'sharp';

/** More pixels than any phone's usual photo; decoding as many takes some 150 MB, and no more is tried. */
const MOST_PIXELS = 50_000_000;

/** Longest side of each size, px, and how well it is kept. */
const SIZES = {
  full: { side: 2560, quality: 82 },
  phone: { side: 640, quality: 74 },
} as const;

/** What a camera or a phone makes. Drawings that run programs or reach for other files, such as SVG, are none of these. */
const KINDS: ReadonlySet<string> = new Set(['jpeg', 'png', 'webp', 'heif']);

/** A photo drawn anew as JPEG, whole and for phones; size of the whole one in pixels. */
export interface EncodedPhoto {
  readonly width: number;
  readonly height: number;
  readonly full: Uint8Array;
  readonly phone: Uint8Array;
}

export type Encoded =
  | { readonly ok: true; readonly photo: EncodedPhoto }
  | { readonly ok: false; readonly why: string };

const refused = (why: string): Encoded => ({ ok: false, why });

const NOT_AN_IMAGE = 'This is not a photo that can be read. Send a JPEG, PNG, WebP or AVIF.';

const resized = async (bytes: Uint8Array, size: keyof typeof SIZES) => {
  const { side, quality } = SIZES[size];
  return sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: 'error' })
    .autoOrient()
    .resize({ width: side, height: side, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .jpeg({ quality, mozjpeg: true })
    .toBuffer({ resolveWithObject: true });
};

/**
 * An image as it is kept: turned upright, in two sizes, as JPEG of its pixels alone. Where and when it was taken,
 * with what, and every other thing that a camera writes beside the pixels is dropped.
 */
export const encodePhoto = async (bytes: Uint8Array): Promise<Encoded> => {
  try {
    const { format, width, height, pages } = await sharp(bytes, {
      limitInputPixels: false,
    }).metadata();
    if (!format || !KINDS.has(format) || (pages ?? 1) > 1) return refused(NOT_AN_IMAGE);
    if (width * height > MOST_PIXELS) {
      return refused(
        `This photo has ${Math.round((width * height) / 1e6)} million points, and 50 million are the most. Take it again at a smaller size.`,
      );
    }
    const full = await resized(bytes, 'full');
    const phone = await resized(full.data, 'phone');
    return {
      ok: true,
      photo: {
        width: full.info.width,
        height: full.info.height,
        full: full.data,
        phone: phone.data,
      },
    };
  } catch {
    // sharp throws on whatever it cannot read to the end, and says so in words for programmers.
    return refused(NOT_AN_IMAGE);
  }
};
