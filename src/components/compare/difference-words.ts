import type { FigureComparison } from '@/paving/comparison';
import { bondPattern, documentUnit } from '@/paving/bond';
import { BOND_NAMES, bondJoint } from '@/paving/bond-edits';
import { formatArea, M2_PER_SQUARE_FOOT } from '@/paving/area';
import { formatLength, formatSize, type Display } from '@/paving/length';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatCount } from '@/paving/count';
import { formatRun } from '@/takeoff/measures';

/** What is compared, as the words need it. */
export interface Side {
  readonly name: string;
  readonly document: LayoutDocument;
}

export interface UnitCounts {
  readonly kept: number;
  readonly moved: number;
  readonly gone: number;
  readonly added: number;
  /** How far the corner that moved furthest came, mm. */
  readonly furthest: number;
  /** Whether what lies near a unit tells nothing of it. */
  readonly anew: boolean;
}

const same = (p: unknown, q: unknown) => JSON.stringify(p) === JSON.stringify(q);

const unitsUsed = (document: LayoutDocument): string =>
  [...new Set(bondPattern(document).motif.map(({ unit }) => unit))]
    .map((id) => documentUnit(document, id))
    .map((unit) => formatSize(unit.length, unit.width, document.display))
    .join(' and ');

const bondWords = (document: LayoutDocument): string =>
  BOND_NAMES[document.bond.kind].toLowerCase();

const fillName = (document: LayoutDocument): string =>
  document.aggregate?.name?.toLowerCase() ?? 'fill';

/** What kind of difference it is, for the head of the page. */
export function differenceHeading(a: LayoutDocument, b: LayoutDocument, units: UnitCounts): string {
  if (!same(a.ground, b.ground)) return 'Two floors on different ground';
  if (unitsUsed(a) !== unitsUsed(b)) return 'Two units on the same ground';
  if (a.bond.kind !== b.bond.kind) return 'Two patterns on the same ground';
  if (units.moved + units.gone + units.added === 0)
    return a.cutting === b.cutting ? 'The same floor twice' : 'The same floor, whole and cut';
  if (a.placement.turn !== b.placement.turn) return 'The same pattern, turned';
  if (bondJoint(a) !== bondJoint(b)) return 'The same pattern with another joint';
  if (!same(a.placement, b.placement)) return 'Two ways to start the same pattern';
  return 'Two floors in the same pattern';
}

const listed = (parts: readonly string[]): string =>
  parts.length < 2
    ? (parts[0] ?? '')
    : `${parts.slice(0, -1).join(', ')} and ${parts[parts.length - 1]}`;

/** Differences smaller than these are not worth words: they print alike. mm, and m². */
const LEAST_MM = 0.5;
const LEAST_M2 = 0.005;

/** What B does at the edge that A does not, or the other way round; nothing where both do alike. */
function cuttingWords(
  a: LayoutDocument,
  b: LayoutDocument,
  { cut }: FigureComparison,
  display: Display,
): string | null {
  if (a.cutting === b.cutting || !cut) return null;
  if (b.cutting === 'none') return 'cuts nothing at the edge';
  const pieces = cut.pieces.b ?? 0;
  return `cuts ${formatCount(pieces)} ${pieces === 1 ? 'piece' : 'pieces'} at the edge and throws ${formatArea(cut.waste.b ?? 0, display)} away`;
}

/** One sentence in plain words that says what differs from A to B. */
export function differenceSentence(
  a: Side,
  b: Side,
  figures: FigureComparison,
  units: UnitCounts,
  display: Display,
): string {
  const cutting = cuttingWords(a.document, b.document, figures, display);
  if (units.moved + units.gone + units.added === 0 && same(a.document.ground, b.document.ground))
    return `Every unit of ${b.name} lies where it lies in ${a.name}${cutting ? `; ${b.name} ${cutting}` : ''}.`;
  const parts: string[] = [];
  if (unitsUsed(a.document) !== unitsUsed(b.document))
    parts.push(`takes units of ${unitsUsed(b.document)} instead of ${unitsUsed(a.document)}`);
  if (a.document.bond.kind !== b.document.bond.kind)
    parts.push(`changes the bond from ${bondWords(a.document)} to ${bondWords(b.document)}`);
  if (units.anew)
    parts.push(units.kept > 0 ? 'lays nearly all of its units anew' : 'lays all of its units anew');
  const more = figures.wholeUnits.change ?? 0;
  parts.push(
    more === 0
      ? 'has as many whole units'
      : `has ${formatCount(Math.abs(more))} ${more > 0 ? 'more' : 'fewer'} whole ${Math.abs(more) === 1 ? 'unit' : 'units'}`,
  );
  if (cutting) parts.push(cutting);
  const fill = figures.fillArea.change ?? 0;
  if (Math.abs(fill) >= LEAST_M2)
    parts.push(
      `leaves ${formatArea(Math.abs(fill), display)} ${fill > 0 ? 'more' : 'less'} for ${fillName(b.document)}`,
    );
  const gap = figures.leastGap.change;
  if (gap !== null && Math.abs(gap) >= LEAST_MM)
    parts.push(
      `keeps its nearest unit ${formatLength(Math.abs(gap), display)} ${gap > 0 ? 'further from' : 'closer to'} the edge`,
    );
  if (parts.length === 1 && units.moved > 0)
    parts.push(`has units lying up to ${formatLength(units.furthest, display)} elsewhere`);
  const start = same(a.document.ground, b.document.ground) ? '' : 'The ground is not the same. ';
  const than = more === 0 ? ` as ${a.name}` : ` than ${a.name}`;
  const said = parts.map((part) => (part.includes(' whole ') ? part + than : part));
  return `${start}${capital(b.name)} ${listed(said)}.`;
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

export interface FigureRow {
  readonly name: string;
  readonly hint?: string;
  readonly a: string;
  readonly b: string;
  /** Empty when nothing changed. */
  readonly change: string;
}

const signed = (value: number, text: string) => `${value < 0 ? '−' : '+'}${text}`;

/** The figures as rows of a table, each with its difference. */
export function figureRows(
  a: LayoutDocument,
  b: LayoutDocument,
  figures: FigureComparison,
  display: Display,
): readonly FigureRow[] {
  const count = (name: string, { a: from, b: to }: { a: number | null; b: number | null }) => ({
    name,
    a: formatCount(from ?? 0),
    b: formatCount(to ?? 0),
    change:
      (to ?? 0) === (from ?? 0)
        ? ''
        : signed((to ?? 0) - (from ?? 0), formatCount(Math.abs((to ?? 0) - (from ?? 0)))),
  });
  const length = (
    name: string,
    change: { a: number | null; b: number | null; change: number | null },
    prefix = '',
  ): FigureRow => {
    const text = (mm: number | null) =>
      mm === null ? 'none' : `${prefix}${formatLength(mm, display)}`;
    const difference =
      change.change === null || text(change.a) === text(change.b)
        ? ''
        : signed(change.change, formatLength(Math.abs(change.change), display));
    return { name, a: text(change.a), b: text(change.b), change: difference };
  };
  const area = (name: string, { a: from, b: to }: { a: number | null; b: number | null }) => {
    const [p, q] = [formatArea(from ?? 0, display), formatArea(to ?? 0, display)];
    const change = (to ?? 0) - (from ?? 0);
    return { name, a: p, b: q, change: p === q ? '' : signed(change, areaStep(change, display)) };
  };
  const run = (name: string, { a: from, b: to }: { a: number | null; b: number | null }) => {
    const [p, q] = [from ?? 0, to ?? 0].map((mm) => formatRun(mm / 1000, display));
    const change = ((to ?? 0) - (from ?? 0)) / 1000;
    return { name, a: p, b: q, change: p === q ? '' : signed(change, formatRun(Math.abs(change), display)) }; // prettier-ignore
  };
  const text = (name: string, from: string, to: string): FigureRow => ({
    name,
    a: from,
    b: to,
    change: from === to ? '' : 'other',
  });
  const turn = (document: LayoutDocument) => `${Number(document.placement.turn.toFixed(2))}°`;
  const fills = [...new Set([a, b].map((document) => document.aggregate?.name ?? 'Fill'))];
  return [
    count('Whole units', figures.wholeUnits),
    ...(figures.kinds.length > 1
      ? figures.kinds.map((kind) => count(kind.names.join(' / '), { a: kind.a, b: kind.b }))
      : []),
    count(figures.cut ? 'Not whole at the edge' : 'Left out at the edge', figures.leftOut),
    ...((figures.lifted.a ?? 0) + (figures.lifted.b ?? 0) > 0
      ? [count('Lifted out by hand', figures.lifted)]
      : []),
    ...(figures.cut
      ? [
          count('Pieces cut at the edge', figures.cut.pieces),
          count('Whole units to saw them from', figures.cut.sawnUnits),
          area('Thrown away', figures.cut.waste),
          run('To saw', figures.cut.sawLength),
        ]
      : []),
    length('Least gap', figures.leastGap),
    length('Play', figures.play, '±'),
    area(fills.join(' / '), figures.fillArea),
    area(figures.cut ? 'Under whole units' : 'Under units', figures.coveredArea),
    area('Ground', figures.groundArea),
    text('Bond', BOND_NAMES[a.bond.kind], BOND_NAMES[b.bond.kind]),
    text('Turn', turn(a), turn(b)),
  ];
}

/** A difference of areas at the places that the areas themselves are printed to. */
const areaStep = (squareMetres: number, display: Display): string =>
  display === 'metric'
    ? `${Math.abs(squareMetres).toFixed(2)}\u202fm²`
    : `${(Math.abs(squareMetres) / M2_PER_SQUARE_FOOT).toFixed(1)}\u202fft²`;
