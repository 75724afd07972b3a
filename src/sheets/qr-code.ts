import { encode } from 'uqr';
import type { DrawCommand, PaperBox, PathRing } from './drawing';
import { boxRing, boxWidth } from './drawing';

/** White modules kept round the symbol, as ISO/IEC 18004 asks for. */
const QUIET_ZONE = 4;
/** Black as can be, in colour and in grey: the symbol is for cameras. */
const BLACK = '#000000';

/** `text` as a QR code that fills the square box, its quiet zone included. Recovers from 15 % of loss (level M). */
export function qrCommands(text: string, box: PaperBox): readonly DrawCommand[] {
  const { data, size } = encode(text, { ecc: 'M', border: 0 });
  const module = boxWidth(box) / (size + 2 * QUIET_ZONE);
  const [left, top] = [box.left + QUIET_ZONE * module, box.top + QUIET_ZONE * module];
  const rings: PathRing[] = [];
  data.forEach((row, y) => {
    for (let x = 0; x < size; x += 1) {
      if (!row[x]) continue;
      const first = x;
      while (x + 1 < size && row[x + 1]) x += 1;
      rings.push(
        boxRing({
          left: left + first * module,
          top: top + y * module,
          right: left + (x + 1) * module,
          bottom: top + (y + 1) * module,
        }),
      );
    }
  });
  return [{ kind: 'path', rings, fill: BLACK }];
}
