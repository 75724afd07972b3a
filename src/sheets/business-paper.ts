import type { DrawCommand, FontWeight, PaperBox, TextAnchor } from './drawing';
import { PENS, boxWidth } from './drawing';
import { INK, SECOND_INK } from './inks';
import { paperOf } from './paper';
import type { Sheet } from './sheet';
import { LETTERING, sheetText, textFitted, textLines, textWidth } from './text-measure';

/**
 * A paper that a firm sends out, such as a quote or an order: head, to whom, what, a table, sums and words, over as many pages
 * as it takes. Each part is rows; a row is never parted, and a table's headings are said again on each page.
 */
export interface BusinessPaper {
  readonly size: 'A4' | 'Letter';
  readonly firm: {
    readonly name: string;
    /** Address and ways to reach it. */
    readonly lines: readonly string[];
    /** Set at the foot of every page. */
    readonly registration: string;
  };
  readonly to: readonly string[];
  /** Such as `Quote Q-0001`. */
  readonly title: string;
  /** Number, day and the like, beside whom it is to. */
  readonly facts: readonly (readonly [name: string, value: string])[];
  readonly parts: readonly PaperPart[];
}

export type PaperPart =
  | { readonly kind: 'heading'; readonly text: string }
  | { readonly kind: 'paragraph'; readonly text: string }
  | { readonly kind: 'table'; readonly table: PaperTable }
  | { readonly kind: 'sums'; readonly sums: readonly PaperSum[] };

/** A table of a paper. */
export interface PaperTable {
  /** The first column takes what the others leave, and its words wrap; the others are figures or short words. */
  readonly headings: readonly string[];
  readonly anchors: readonly TextAnchor[];
  readonly rows: readonly (readonly string[])[];
}

/** A line of the sums under a table. */
export interface PaperSum {
  readonly name: string;
  readonly figure: string;
  /** The one that counts. */
  readonly strong?: boolean;
}

/** mm */
const SIDE = 20;
const TOP = 15;
const FOOT = 18;
const PITCH = 4.3;
const COLUMN_GAP = 5;
/** A table's first column is never narrower; figures beside it are then cut short. */
const LEAST_NAME = 50;
/** Sums stand at the right, this wide. */
const SUMS_WIDTH = 92;

interface Row {
  readonly height: number;
  /** The next row must be on the same page. */
  readonly keepsNext?: boolean;
  /** Drawn again at the head of the page that the row begins. */
  readonly head?: Row;
  readonly draw: (top: number, box: PaperBox) => readonly DrawCommand[];
}

const FRAME = 'page';

const text = (
  at: readonly [number, number],
  words: string,
  {
    height = LETTERING.small,
    weight = 400,
    anchor = 'start',
    colour = INK,
  }: { height?: number; weight?: FontWeight; anchor?: TextAnchor; colour?: string } = {},
): DrawCommand => ({
  kind: 'text',
  at,
  text: words,
  height,
  weight,
  anchor,
  turnDeg: 0,
  colour,
  frame: FRAME,
});

const rule = (y: number, from: number, to: number, width: number = PENS.fine): DrawCommand => ({
  kind: 'line',
  from: [from, y],
  to: [to, y],
  stroke: { width, colour: INK },
});

/** Where the first of lines stands below a row's top. */
const base = (top: number, line = 0): number => top + LETTERING.small + 0.7 + line * PITCH;

const space = (height: number): Row => ({ height, keepsNext: true, draw: () => [] });

const headRow = ({ firm }: BusinessPaper, width: number): Row => {
  const side = width * 0.42;
  const lines = firm.lines.flatMap((line) => textLines(line, side, LETTERING.small));
  const names = textLines(firm.name, width - side - COLUMN_GAP, LETTERING.large, 700);
  const height = Math.max(names.length * 8, lines.length * PITCH) + 3.5;
  return {
    height,
    keepsNext: true,
    draw: (top, box) => [
      ...names.map((line, n) =>
        text([box.left, top + LETTERING.large + 0.5 + n * 8], line, {
          height: LETTERING.large,
          weight: 700,
        }),
      ),
      ...lines.map((line, n) =>
        text([box.right, base(top, n)], line, { anchor: 'end', colour: SECOND_INK }),
      ),
      rule(top + height - 1, box.left, box.right, PENS.thick),
    ],
  };
};

const addressRow = ({ to, facts }: BusinessPaper, width: number): Row => {
  const side = width * 0.48;
  const lines = to.flatMap((line) => textLines(line, width - side - COLUMN_GAP, LETTERING.small));
  const names = Math.max(0, ...facts.map(([name]) => textWidth(sheetText(name), LETTERING.small)));
  const nameWidth = Math.min(names + 4, side * 0.5);
  const values = facts.map(
    ([name, value]) => [name, textLines(value, side - nameWidth, LETTERING.small, 600)] as const,
  );
  const count = values.reduce((sum, [, value]) => sum + Math.max(1, value.length), 0);
  return {
    height: Math.max(lines.length, count) * PITCH + 4,
    keepsNext: true,
    draw: (top, box) => {
      let line = 0;
      const left = box.right - side;
      return [
        ...lines.map((words, n) =>
          text([box.left, base(top, n)], words, { weight: n === 0 ? 600 : 400 }),
        ),
        ...values.flatMap(([name, value]) => {
          const at = line;
          line += Math.max(1, value.length);
          return [
            text([left, base(top, at)], textFitted(name, nameWidth - 2, LETTERING.small), {
              colour: SECOND_INK,
            }),
            ...value.map((words, n) =>
              text([left + nameWidth, base(top, at + n)], words, { weight: 600 }),
            ),
          ];
        }),
      ];
    },
  };
};

const titleRows = ({ title }: BusinessPaper, width: number): readonly Row[] =>
  textLines(title, width, LETTERING.large, 700).map((line) => ({
    height: 8.5,
    keepsNext: true,
    draw: (top, box) => [
      text([box.left, top + LETTERING.large + 0.5], line, { height: LETTERING.large, weight: 700 }),
    ],
  }));

const headingRows = (words: string, width: number): readonly Row[] => [
  space(2.5),
  ...textLines(words, width, LETTERING.medium, 700).map((line) => ({
    height: 6.2,
    keepsNext: true,
    draw: (top: number, box: PaperBox) => [
      text([box.left, top + LETTERING.medium + 0.9], line, {
        height: LETTERING.medium,
        weight: 700,
      }),
    ],
  })),
];

/** Lines as they were typed, each wrapped. */
const paragraphRows = (words: string, width: number): readonly Row[] =>
  words.split(/\r\n|\r|\n/).flatMap((line) => {
    const lines = textLines(line, width, LETTERING.small);
    return (lines.length === 0 ? [''] : lines).map((part) => ({
      height: PITCH,
      draw: (top: number, box: PaperBox) => (part ? [text([box.left, base(top)], part)] : []),
    }));
  });

/** @param alike all tables of the paper with the same headings: their columns stand under each other */
const tableRows = (
  { headings, anchors, rows }: PaperTable,
  alike: readonly PaperTable[],
  width: number,
): readonly Row[] => {
  const widest = (column: number) =>
    Math.max(
      textWidth(sheetText(headings[column]), LETTERING.small),
      ...alike.flatMap((table) =>
        table.rows.map((cells) => textWidth(sheetText(cells[column]), LETTERING.small)),
      ),
    );
  const others = headings.slice(1).map((_, n) => widest(n + 1) + COLUMN_GAP);
  const room = width - LEAST_NAME;
  const taken = others.reduce((sum, own) => sum + own, 0);
  const widths = others.map((own) => (taken > room ? (own * room) / taken : own));
  const nameWidth = width - widths.reduce((sum, own) => sum + own, 0);
  const ends = widths.map((_, n) => nameWidth + widths.slice(0, n + 1).reduce((a, b) => a + b, 0));
  const cell = (box: PaperBox, column: number, words: string, y: number, weight: FontWeight) => {
    const own = widths[column - 1] - COLUMN_GAP;
    const right = box.left + ends[column - 1];
    const fitted = textFitted(words, own + 0.01, LETTERING.small, weight);
    return anchors[column] === 'end'
      ? text([right, y], fitted, { anchor: 'end', weight })
      : text([right - own, y], fitted, { weight });
  };
  const head: Row = {
    height: PITCH + 1.8,
    keepsNext: true,
    draw: (top, box) => [
      text([box.left, base(top)], textFitted(headings[0], nameWidth - 2, LETTERING.small), {
        colour: SECOND_INK,
      }),
      ...(headings.slice(1).map((words, n) => ({
        ...cell(box, n + 1, words, base(top), 400),
        colour: SECOND_INK,
      })) as DrawCommand[]),
      rule(top + PITCH + 0.9, box.left, box.right, PENS.medium),
    ],
  };
  const body = rows.map((cells): Row => {
    const names = textLines(cells[0], nameWidth - 2, LETTERING.small);
    const height = Math.max(1, names.length) * PITCH + 1.8;
    return {
      height,
      head,
      draw: (top, box) => [
        ...names.map((line, n) => text([box.left, base(top + 0.5, n)], line)),
        ...cells.slice(1).map((words, n) => cell(box, n + 1, words, base(top + 0.5), 400)),
        rule(top + height, box.left, box.right),
      ],
    };
  });
  return [head, ...body, space(2)];
};

const sumRows = (sums: readonly PaperSum[]): readonly Row[] =>
  sums.map(({ name, figure, strong }, n): Row => {
    const weight = strong ? 700 : 400;
    const height = strong ? LETTERING.medium : LETTERING.small;
    const figures = sheetText(figure);
    return {
      height: strong ? 7.5 : 5.2,
      keepsNext: n < sums.length - 1,
      draw: (top, box) => {
        const left = box.right - SUMS_WIDTH;
        const y = top + height + 1.2;
        const room = SUMS_WIDTH - textWidth(figures, height, weight) - 3;
        return [
          ...(strong ? [rule(top, left, box.right, PENS.medium)] : []),
          text([left, y], textFitted(name, room, height, weight), { height, weight }),
          text([box.right, y], figures, { height, weight, anchor: 'end' }),
        ];
      },
    };
  });

const partRows = (
  part: PaperPart,
  tables: readonly PaperTable[],
  width: number,
): readonly Row[] => {
  switch (part.kind) {
    case 'heading':
      return headingRows(part.text, width);
    case 'paragraph':
      return part.text.trim() === '' ? [] : [...paragraphRows(part.text, width), space(2)];
    case 'table':
      return tableRows(
        part.table,
        tables.filter(({ headings }) => headings.join('\n') === part.table.headings.join('\n')),
        width,
      );
    case 'sums':
      return [space(1), ...sumRows(part.sums), space(2)];
  }
};

/** Rows shared out over pages; rows that keep their next go over together, as long as they fit on a page at all. */
const paged = (rows: readonly Row[], room: number): readonly (readonly Row[])[] => {
  const pages: Row[][] = [[]];
  let used = 0;
  for (let at = 0; at < rows.length;) {
    let end = at + 1;
    let height = rows[at].height;
    while (rows[end - 1].keepsNext && end < rows.length && height + rows[end].height <= room) {
      height += rows[end].height;
      end += 1;
    }
    if (used > 0 && used + height > room) {
      pages.push([]);
      used = 0;
      const head = rows[at].head;
      if (head) {
        pages[pages.length - 1].push(head);
        used += head.height;
      }
    }
    pages[pages.length - 1].push(...rows.slice(at, end));
    used += height;
    at = end;
  }
  return pages;
};

/** The paper's pages, each a sheet of its own. */
export function businessSheets(paper: BusinessPaper): readonly Sheet[] {
  const size = paperOf(paper.size, 'portrait');
  const box: PaperBox = {
    left: SIDE,
    top: TOP,
    right: size.width - SIDE,
    bottom: size.height - FOOT,
  };
  const foot: PaperBox = { ...box, top: box.bottom, bottom: size.height - 8 };
  const width = boxWidth(box);
  const tables = paper.parts.flatMap((part) => (part.kind === 'table' ? [part.table] : []));
  const rows = [
    headRow(paper, width),
    space(4),
    addressRow(paper, width),
    space(3),
    ...titleRows(paper, width),
    space(1.5),
    ...paper.parts.flatMap((part) => partRows(part, tables, width)),
  ];
  const pages = paged(rows, box.bottom - box.top);
  return pages.map((own, n) => {
    let top = box.top;
    const commands = own.flatMap((row) => {
      const drawn = row.draw(top, box);
      top += row.height;
      return drawn;
    });
    const count = `Page ${n + 1} of ${pages.length}`;
    const countWidth = textWidth(count, LETTERING.small);
    const left = [paper.firm.name, paper.firm.registration, paper.title]
      .filter(Boolean)
      .join(' · ');
    const y = foot.top + 6.5;
    const inFoot = (command: DrawCommand): DrawCommand =>
      command.kind === 'text' ? { ...command, frame: 'foot' } : command;
    return {
      width: size.width,
      height: size.height,
      paper: size,
      scale: 1,
      frames: { [FRAME]: box, foot },
      layers: [
        { name: 'text', commands },
        {
          name: 'foot',
          commands: [
            rule(foot.top + 2, foot.left, foot.right),
            inFoot(
              text([foot.left, y], textFitted(left, width - countWidth - 6, LETTERING.small), {
                colour: SECOND_INK,
              }),
            ),
            inFoot(text([foot.right, y], count, { anchor: 'end', colour: SECOND_INK })),
          ],
        },
      ],
    };
  });
}
