import type { FontWeight, PaperPoint, TextAnchor, TextCommand } from './drawing';
import { FONT_ADVANCES, FONT_CAP_HEIGHT, FONT_UNITS_PER_EM } from './nunito-sans-metrics';

/** Nominal lettering sizes of ISO 3098, mm: the height of a capital. */
export const LETTERING = { small: 2.5, medium: 3.5, large: 5 } as const;

/** A capital's height over the font size (em). */
export const CAP_RATIO = FONT_CAP_HEIGHT / FONT_UNITS_PER_EM;

/** How far letters such as g hang below the baseline, in heights of a capital. */
const DESCENT = 0.34;

type Advances = ReadonlyMap<number, number>;

function unpacked(packed: string): Advances {
  const advances = new Map<number, number>();
  for (const run of packed.split(' ')) {
    const [first, widths] = run.split(':');
    const start = Number.parseInt(first, 36);
    widths.split(',').forEach((width, n) => advances.set(start + n, Number.parseInt(width, 36)));
  }
  return advances;
}

const ADVANCES: Readonly<Record<FontWeight, Advances>> = {
  400: unpacked(FONT_ADVANCES[400]),
  600: unpacked(FONT_ADVANCES[600]),
  700: unpacked(FONT_ADVANCES[700]),
};

/** Characters that the font lacks, and what stands for them. */
const STANDS_FOR: Readonly<Record<string, string>> = {
  '\u202f': '\u2009',
  '\u2011': '-',
  '→': '>',
  '⌀': 'ø',
  '✓': 'yes',
};

const LACKED = '?';

/** What is drawn for a character: itself, what stands for it, or its letter without the accent; null where the font has none of these. */
function drawnFor(character: string): string | null {
  const has = (text: string) =>
    text !== '' && [...text].every((part) => ADVANCES[400].has(part.codePointAt(0)!));
  const drawn = STANDS_FOR[character] ?? character;
  if (has(drawn)) return drawn;
  const base = character.normalize('NFD').replace(/\p{M}/gu, '');
  return has(base) ? base : null;
}

const sheetCharacters = (text: string): readonly string[] => [
  ...text.normalize('NFC').replace(/\s*[\r\n\t]+\s*/g, ' '),
];

/**
 * Text with characters of the font only: accents it lacks are dropped, anything else it lacks
 * becomes `?`, for a PDF would leave such characters out without a word.
 */
export const sheetText = (text: string): string =>
  sheetCharacters(text)
    .map((character) => drawnFor(character) ?? LACKED)
    .join('');

/** The characters of a text that print as `?`, each once. */
export const charactersLacked = (text: string): readonly string[] => [
  ...new Set(sheetCharacters(text).filter((character) => drawnFor(character) === null)),
];

/** Width of a line of text, mm, by the font's own advance widths; `height` is that of a capital. */
export function textWidth(text: string, height: number, weight: FontWeight = 400): number {
  const advances = ADVANCES[weight];
  let units = 0;
  for (const character of text)
    units += advances.get(character.codePointAt(0)!) ?? FONT_UNITS_PER_EM;
  return (units * height) / FONT_CAP_HEIGHT;
}

/** The text's four corners on the paper, from its cap line to below its descenders. */
export function textCorners(command: TextCommand): readonly PaperPoint[] {
  return lineCorners(command, textWidth(command.text, command.height, command.weight));
}

/** Corners of the box about a line of text of this width, mm, its descenders included, turned as the line is. */
export function lineCorners(
  line: {
    readonly at: PaperPoint;
    readonly height: number;
    readonly anchor: TextAnchor;
    readonly turnDeg: number;
  },
  width: number,
): readonly PaperPoint[] {
  const start = { start: 0, middle: -width / 2, end: -width }[line.anchor];
  const turn = (-line.turnDeg * Math.PI) / 180;
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  const [top, bottom] = [-line.height * 1.04, line.height * DESCENT];
  const corner = (x: number, y: number): PaperPoint => [
    line.at[0] + x * cos - y * sin,
    line.at[1] + x * sin + y * cos,
  ];
  return [
    corner(start, top),
    corner(start + width, top),
    corner(start + width, bottom),
    corner(start, bottom),
  ];
}

/** The same text anchored at its start, for sinks that would measure it by some other font. */
export function textStarted(command: TextCommand): TextCommand {
  if (command.anchor === 'start') return command;
  const width = textWidth(command.text, command.height, command.weight);
  const back = command.anchor === 'end' ? width : width / 2;
  const turn = (command.turnDeg * Math.PI) / 180;
  const at: PaperPoint = [
    command.at[0] - back * Math.cos(turn),
    command.at[1] + back * Math.sin(turn),
  ];
  return { ...command, at, anchor: 'start' };
}

/** Words set in lines no wider than `width`; a word that is wider by itself is broken. */
export function textLines(
  text: string,
  width: number,
  height: number,
  weight: FontWeight = 400,
): readonly string[] {
  const fits = (line: string) => textWidth(line, height, weight) <= width;
  const lines: string[] = [];
  let line = '';
  for (const word of sheetText(text).split(' ').filter(Boolean)) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (fits(longer)) {
      line = longer;
      continue;
    }
    if (line !== '') lines.push(line);
    line = '';
    for (const character of word) {
      if (line !== '' && !fits(line + character)) {
        lines.push(line);
        line = '';
      }
      line += character;
    }
  }
  return line === '' ? lines : [...lines, line];
}

/** The text if it fits, else as much as does, with an ellipsis. */
export function textFitted(
  text: string,
  width: number,
  height: number,
  weight: FontWeight = 400,
): string {
  const whole = sheetText(text);
  if (textWidth(whole, height, weight) <= width) return whole;
  const characters = [...whole];
  while (
    characters.length > 0 &&
    textWidth(`${characters.join('').trimEnd()}…`, height, weight) > width
  )
    characters.pop();
  return `${characters.join('').trimEnd()}…`;
}
