/**
 * Text in a cell of a CSV file. A spreadsheet takes a cell that begins with one of these for a formula and runs it
 * (CWE-1236); an apostrophe before it makes it text. Cells that begin with apostrophes and then such a sign get one more,
 * so that what was written is read back exactly.
 */
const WOULD_RUN = /^'*[=+\-@\t\r\n＝＋－＠]/;
const WAS_MADE_SAFE = /^'+[=+\-@\t\r\n＝＋－＠]/;

/** A text as a cell that no spreadsheet runs: one that would be run gets an apostrophe before it. */
export const textCellWritten = (text: string): string => (WOULD_RUN.test(text) ? `'${text}` : text);

/** The text of a cell, without the apostrophe that `textCellWritten` put before it. */
export const textCellRead = (cell: string): string =>
  WAS_MADE_SAFE.test(cell) ? cell.slice(1) : cell;
