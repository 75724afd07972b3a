import type { PaperBox } from './drawing';

/** ISO 216 and ANSI sizes that printers at home and in offices take. */
export const PAPER_NAMES = ['A4', 'A3', 'Letter', 'Tabloid'] as const;
export type PaperName = (typeof PAPER_NAMES)[number];
export type Orientation = 'portrait' | 'landscape';

/** Trimmed sizes of ISO 216 and ANSI/ASME Y14.1, portrait, mm. */
const PORTRAIT: Readonly<Record<PaperName, readonly [number, number]>> = {
  A4: [210, 297],
  A3: [297, 420],
  Letter: [215.9, 279.4],
  Tabloid: [279.4, 431.8],
};

/** Borders of ISO 5457: 20 mm at the left for filing, 10 mm elsewhere. */
const FILING_BORDER = 20;
const BORDER = 10;

/** A sheet of paper, mm. */
export interface Paper {
  readonly name: PaperName;
  readonly orientation: Orientation;
  readonly width: number;
  readonly height: number;
  /** Inside the borders. */
  readonly frame: PaperBox;
}

/** A size laid upright or across. */
export function paperOf(name: PaperName, orientation: Orientation): Paper {
  const [short, long] = PORTRAIT[name];
  const [width, height] = orientation === 'portrait' ? [short, long] : [long, short];
  return {
    name,
    orientation,
    width,
    height,
    frame: { left: FILING_BORDER, top: BORDER, right: width - BORDER, bottom: height - BORDER },
  };
}
