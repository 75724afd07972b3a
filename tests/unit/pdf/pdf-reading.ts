import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs';

/** A point of PostScript and PDF: 1/72 inch (ISO 32000-1, 8.3.2.3). */
export const MM_PER_POINT = 25.4 / 72;

type Matrix = readonly [number, number, number, number, number, number];
const times = (m: Matrix, n: Matrix): Matrix => [
  m[0] * n[0] + m[2] * n[1],
  m[1] * n[0] + m[3] * n[1],
  m[0] * n[2] + m[2] * n[3],
  m[1] * n[2] + m[3] * n[3],
  m[0] * n[4] + m[2] * n[5] + m[4],
  m[1] * n[4] + m[3] * n[5] + m[5],
];

export interface Stroked {
  readonly width: number;
  /** Flattened subpaths in millimetres of the paper. */
  readonly lines: readonly (readonly (readonly [number, number])[])[];
}

/** Every path that the page strokes, by the operators of its content. */
export async function strokedPaths(page: {
  getOperatorList(): Promise<{ fnArray: number[]; argsArray: unknown[][] }>;
}): Promise<readonly Stroked[]> {
  const { fnArray, argsArray } = await page.getOperatorList();
  const found: Stroked[] = [];
  let matrix: Matrix = [1, 0, 0, 1, 0, 0];
  let width = 1;
  const stack: { matrix: Matrix; width: number }[] = [];
  fnArray.forEach((op, n) => {
    const args = argsArray[n];
    if (op === OPS.save) stack.push({ matrix, width });
    else if (op === OPS.restore) ({ matrix, width } = stack.pop()!);
    else if (op === OPS.transform) matrix = times(matrix, args as unknown as Matrix);
    else if (op === OPS.setLineWidth) width = args[0] as number;
    else if (op === OPS.constructPath) {
      const [paint, data] = args as [number, [Float32Array | null]];
      const strokes: number[] = [OPS.stroke, OPS.closeStroke, OPS.fillStroke, OPS.eoFillStroke];
      if (!strokes.includes(paint) || !data[0]) return;
      const scale = Math.sqrt(Math.abs(matrix[0] * matrix[3] - matrix[1] * matrix[2]));
      found.push({
        width: width * scale * MM_PER_POINT,
        lines: flattened(data[0], matrix),
      });
    }
  });
  return found;
}

/** pdf.js' own path buffer: 0 move, 1 line, 2 cubic, 3 quadratic, 4 close. */
function flattened(data: Float32Array, m: Matrix) {
  const lines: [number, number][][] = [];
  const point = (x: number, y: number): [number, number] => [
    (m[0] * x + m[2] * y + m[4]) * MM_PER_POINT,
    (m[1] * x + m[3] * y + m[5]) * MM_PER_POINT,
  ];
  for (let at = 0; at < data.length;) {
    const op = data[at];
    const line = lines[lines.length - 1];
    if (op === 0) lines.push([point(data[at + 1], data[at + 2])]);
    else if (op === 1) line.push(point(data[at + 1], data[at + 2]));
    else if (op === 2) {
      const start = line[line.length - 1];
      const [p, q, r] = [1, 3, 5].map((step) => point(data[at + step], data[at + step + 1]));
      for (let n = 1; n <= 64; n += 1) {
        const [t, s] = [n / 64, 1 - n / 64];
        line.push(
          [0, 1].map(
            (axis) =>
              s ** 3 * start[axis] +
              3 * s * s * t * p[axis] +
              3 * s * t * t * q[axis] +
              t ** 3 * r[axis],
          ) as [number, number],
        );
      }
    } else if (op === 4) line.push(line[0]);
    else throw new Error(`Path operator ${op} was not expected.`);
    at += [3, 3, 7, 5, 1][op];
  }
  return lines;
}

/** The texts of each page of a PDF, a page a string. */
export async function pdfTexts(file: Uint8Array): Promise<readonly string[]> {
  const pdf = await getDocument({ data: file.slice(), verbosity: 0 }).promise;
  const pages: string[] = [];
  for (let n = 1; n <= pdf.numPages; n += 1) {
    const { items } = await (await pdf.getPage(n)).getTextContent();
    pages.push(items.map((item) => ('str' in item ? item.str : '')).join('\n'));
  }
  return pages;
}
