import type { Letter, LetterBlock } from './letter';

/** Columns of a line: what RFC 5322 recommends to stay under, with room for quoting marks. */
const COLUMNS = 72;

/** Breaks text at spaces; a word longer than a line, such as an address, stays whole. */
const wrapped = (text: string, first = '', rest = first): string =>
  text
    .split('\n')
    .map((line, n) => {
      const lines: string[] = [];
      let current = n === 0 ? first : rest;
      let empty = true;
      for (const word of line.split(/\s+/).filter(Boolean)) {
        if (!empty && current.length + 1 + word.length > COLUMNS) {
          lines.push(current);
          [current, empty] = [rest, true];
        }
        current += empty ? word : ` ${word}`;
        empty = false;
      }
      return [...lines, current.trimEnd()].join('\n');
    })
    .join('\n');

const blockText = (block: LetterBlock, origin: string): string => {
  switch (block.kind) {
    case 'paragraph':
      return wrapped(block.text);
    case 'quote':
      return `${wrapped(`${block.by}:`)}\n${wrapped(block.text, '> ')}`;
    case 'action':
      return `${wrapped(`${block.label}:`)}\n${origin}${block.path}`;
    case 'list':
      return block.items
        .map(
          ({ text, path }) => `${wrapped(text, '- ', '  ')}${path ? `\n  ${origin}${path}` : ''}`,
        )
        .join('\n');
  }
};

/** A letter as plain text; links begin at `origin`. */
export const letterText = (letter: Letter, origin: string): string =>
  [
    letter.name ? wrapped(`Hello ${letter.name},`) : 'Hello,',
    ...letter.blocks.map((block) => blockText(block, origin)),
    `--\n${wrapped(letter.why)}`,
  ].join('\n\n') + '\n';
