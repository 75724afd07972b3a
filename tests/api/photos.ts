import sharp from 'sharp';
import type { Answer, Visitor } from './site';

/** Two halves, left red and right blue, so that a turned photo can be told from one that is not. */
const halves = (width: number, height: number) =>
  sharp({ create: { width, height, channels: 3, background: '#c02020' } }).composite([
    {
      input: {
        create: {
          width: Math.floor(width / 2),
          height,
          channels: 3,
          background: '#2020c0',
        },
      },
      left: Math.ceil(width / 2),
      top: 0,
    },
  ]);

/** A JPEG with what a phone writes beside the pixels: where it was taken, by whom, and how it was held. */
export const phonePhoto = (
  { width = 64, height = 32 } = {},
  orientation: 1 | 3 | 6 | 8 = 1,
): Promise<Buffer> =>
  halves(width, height)
    .withExif({
      IFD0: { Make: 'Pocketcam', Artist: 'J. Winterpell', Copyright: 'J. Winterpell' },
      IFD3: {
        GPSLatitudeRef: 'N',
        GPSLatitude: '51/1 30/1 0/1',
        GPSLongitudeRef: 'W',
        GPSLongitude: '0/1 7/1 0/1',
      },
    })
    .withMetadata({ orientation })
    .jpeg({ quality: 95 })
    .toBuffer();

/** Sends an image as a phone does: as the body. */
export const sendPhoto = (visitor: Visitor, url: string, bytes: Uint8Array): Promise<Answer> => {
  const asked = visitor.request('POST', url, '', { 'content-type': 'image/jpeg' });
  return visitor.send(new Request(asked, { body: new Uint8Array(bytes) }));
};
