import Papa from 'papaparse';
import type { ImportProblem } from '@/api-types/catalogue';
import { stepsRun, type Steps } from '../steps';
import { cellText, columnNamed, type Column, type Field } from './csv-columns';

/** A row of a file that could be read cell by cell; what the file has no column for is not in `values`. */
export interface ReadRow {
  /** Of the file, counted from 1. */
  readonly line: number;
  readonly values: Readonly<Partial<Record<Field, unknown>>>;
  /** Of its cells. */
  readonly problems: readonly ImportProblem[];
}

/** A file as it was read, row by row. */
export interface ReadFile {
  readonly rows: readonly ReadRow[];
  /** Of the file as a whole: with any, there are no rows. */
  readonly problems: readonly ImportProblem[];
  readonly unknownColumns: readonly string[];
}

const lineBreaks = (text: string): number => text.match(/\r\n|\r|\n/g)?.length ?? 0;

/** Rows with the line that each begins on: a quoted cell may hold several lines. */
const linedRows = (rows: readonly (readonly string[])[]) => {
  let line = 1;
  return rows.map((cells) => {
    const at = line;
    line += 1 + cells.reduce((sum, cell) => sum + lineBreaks(cell), 0);
    return { line: at, cells };
  });
};

const fileWrong = (line: number, message: string): ReadFile => ({
  rows: [],
  problems: [{ line, column: null, message }],
  unknownColumns: [],
});

const DELIMITERS = [',', ';', '\t'] as const;

/** What parts the cells: that by which the first line names the most columns. What cells hold has no say. */
const delimiterOf = (csv: string): string => {
  const named = (delimiter: string) => {
    const [head = []] = Papa.parse<string[]>(csv, {
      delimiter,
      preview: 1,
      skipEmptyLines: 'greedy',
    }).data;
    return head.filter((heading) => columnNamed(heading)).length;
  };
  return DELIMITERS.reduce((best, other) => (named(other) > named(best) ? other : best));
};

/** Takes a catalogue's file apart: commas, semicolons or tabs between cells, headings in the first line. */
export const catalogueFileRead = (csv: string, currency: string): ReadFile =>
  stepsRun(catalogueFileSteps(csv, currency));

/** The same, a row a step. */
export function* catalogueFileSteps(csv: string, currency: string): Steps<ReadFile> {
  const text = csv.replace(/^\ufeff/, '');
  yield;
  const parsed = Papa.parse<string[]>(text, { delimiter: delimiterOf(text) });
  const lined = linedRows(parsed.data);
  const broken = parsed.errors.find(({ type }) => type === 'Quotes');
  if (broken) {
    return fileWrong(
      lined[broken.row ?? 0]?.line ?? 1,
      'A quotation mark is opened here and not closed, so what follows cannot be told apart.',
    );
  }
  const full = lined.filter(({ cells }) => cells.some((cell) => cell.trim() !== ''));
  const [head, ...body] = full;
  if (!head) return fileWrong(1, 'The file is empty.');
  const columns = head.cells.map((heading) => columnNamed(heading));
  if (!columns.some((column) => column?.field === 'name')) {
    return fileWrong(
      head.line,
      'The first line must name the columns, with “Name” among them. Export the catalogue to see all of them.',
    );
  }
  const twice = columns.find((column, n) => column && columns.indexOf(column) !== n);
  if (twice) return fileWrong(head.line, `There are two columns for “${twice.heading}”.`);
  const rows: ReadRow[] = [];
  for (const { line, cells } of body) {
    rows.push(rowRead(line, cells, columns, currency));
    yield;
  }
  return {
    rows,
    problems: [],
    unknownColumns: head.cells.filter((heading, n) => !columns[n] && heading.trim() !== ''),
  };
}

const rowRead = (
  line: number,
  cells: readonly string[],
  columns: readonly (Column | undefined)[],
  currency: string,
): ReadRow => {
  const values: Partial<Record<Field, unknown>> = {};
  const problems: ImportProblem[] = [];
  const surplus = cells.slice(columns.length).some((cell) => cell.trim() !== '');
  if (surplus) {
    problems.push({
      line,
      column: null,
      message:
        'has more cells than there are columns. Is a cell with a comma in it without quotation marks?',
    });
  }
  columns.forEach((column, n) => {
    if (!column) return;
    const text = cellText(cells[n] ?? '');
    if (text === '') {
      values[column.field] = column.empty;
      return;
    }
    const cell = column.read(text, currency);
    if (cell.ok) values[column.field] = cell.value;
    else problems.push({ line, column: column.heading, message: cell.message });
  });
  return { line, values, problems };
};
