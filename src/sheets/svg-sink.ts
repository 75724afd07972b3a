import type { DrawCommand, Drawing, PaperPoint, PathRing, Stroke } from './drawing';
import { CAP_RATIO } from './text-measure';

/**
 * The drawing as SVG text. Only attributes are used (no style sheet, no class, no clip path, no
 * pattern), so that browsers, svg2pdf.js and cutters read it alike.
 * `unit` is that of the drawing: `mm` for a sheet, `px` for a thumbnail.
 */
export function drawingSvg(
  drawing: Drawing,
  { unit = 'mm', title }: { readonly unit?: 'mm' | 'px'; readonly title?: string } = {},
): string {
  const { width, height } = drawing;
  const write = commandWriter(unit === 'mm' ? PAPER_DECIMALS : PIXEL_DECIMALS);
  const size = unit === 'mm' ? `width="${width}mm" height="${height}mm"` : '';
  const named = title ? `<title>${escaped(title)}</title>` : '';
  const layers = drawing.layers
    .filter((layer) => layer.commands.length > 0)
    .map((layer) => `<g data-layer="${layer.name}">${layer.commands.map(write).join('\n')}</g>`);
  return `<svg xmlns="http://www.w3.org/2000/svg" ${size} viewBox="0 0 ${width} ${height}">${named}\n${layers.join('\n')}\n</svg>`;
}

/** A micrometre on paper: finer than any printer, and short to write. */
const PAPER_DECIMALS = 3;
/** A twentieth of a pixel or better is not seen. */
const PIXEL_DECIMALS = 1;
/** With this many rings each is written in steps from its first point, which is much shorter. */
const MANY_RINGS = 50;

const escaped = (text: string): string =>
  text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');

function commandWriter(decimals: number): (command: DrawCommand) => string {
  const power = 10 ** decimals;
  const rounded = (value: number): number => Math.round(value * power) / power;
  const figure = (value: number): string => String(rounded(value));
  const pair = ([x, y]: PaperPoint): string => `${figure(x)} ${figure(y)}`;

  function strokeSvg(stroke: Stroke | undefined): string {
    if (!stroke) return '';
    const dash = stroke.dash ? ` stroke-dasharray="${stroke.dash.join(' ')}"` : '';
    return ` stroke="${stroke.colour}" stroke-width="${stroke.width}" stroke-linejoin="round" stroke-linecap="round"${dash}`;
  }

  /** Two arcs of half the sweep: an arc near a full circle is lost when its two ends round together. */
  function arcPath(from: PaperPoint, to: PaperPoint, bulge: number): string {
    const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
    const radius = (Math.hypot(dx, dy) * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
    // Positive bulges stand to the right of the chord as seen, for y grows down.
    const middle: PaperPoint = [
      (from[0] + to[0]) / 2 - (bulge * dy) / 2,
      (from[1] + to[1]) / 2 + (bulge * dx) / 2,
    ];
    const flags = `${figure(radius)} ${figure(radius)} 0 0 ${bulge > 0 ? 0 : 1}`;
    return `A${flags} ${pair(middle)}A${flags} ${pair(to)}`;
  }

  function ringPath({ points, bulges, closed }: PathRing): string {
    const count = closed ? points.length : points.length - 1;
    let path = `M${pair(points[0])}`;
    for (let n = 0; n < count; n += 1) {
      const bulge = bulges?.[n] ?? 0;
      const next = points[(n + 1) % points.length];
      if (bulge !== 0) path += arcPath(points[n], next, bulge);
      else if (!closed || n < count - 1) path += `L${pair(next)}`;
    }
    return closed ? `${path}Z` : path;
  }

  function ringSteps(ring: PathRing): string {
    const steps = ring.points.slice(1).map(([x, y], n) => {
      const [fromX, fromY] = ring.points[n];
      return pair([rounded(x) - rounded(fromX), rounded(y) - rounded(fromY)]);
    });
    return `M${pair(ring.points[0])}l${steps.join(' ')}${ring.closed ? 'z' : ''}`;
  }

  return (command) => {
    switch (command.kind) {
      case 'line': {
        const [[x1, y1], [x2, y2]] = [command.from, command.to];
        return `<line x1="${figure(x1)}" y1="${figure(y1)}" x2="${figure(x2)}" y2="${figure(y2)}"${strokeSvg(command.stroke)}/>`;
      }
      case 'path': {
        const rings = command.rings.filter((ring) => ring.points.length > 0);
        const write =
          rings.length < MANY_RINGS || rings.some((ring) => ring.bulges) ? ringPath : ringSteps;
        const rule = command.fill && rings.length > 1 ? ' fill-rule="evenodd"' : '';
        return `<path d="${rings.map(write).join('')}" fill="${command.fill ?? 'none'}"${rule}${strokeSvg(command.stroke)}/>`;
      }
      case 'circle':
        return `<circle cx="${figure(command.centre[0])}" cy="${figure(command.centre[1])}" r="${figure(command.radius)}" fill="${command.fill ?? 'none'}"${strokeSvg(command.stroke)}/>`;
      case 'text': {
        const [x, y] = command.at.map(figure);
        const turned =
          command.turnDeg === 0 ? '' : ` transform="rotate(${figure(-command.turnDeg)} ${x} ${y})"`;
        const size = String(Math.round((command.height / CAP_RATIO) * 1000) / 1000);
        return `<text x="${x}" y="${y}"${turned} font-family="Nunito Sans" font-size="${size}" font-weight="${command.weight}" text-anchor="${command.anchor}" fill="${command.colour}">${escaped(command.text)}</text>`;
      }
    }
  };
}
