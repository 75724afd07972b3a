import { bondPattern, documentUnit } from './bond';
import type { CutFigures } from './cutting/cut-report';
import type { LayoutDocument } from './layout-document';
import { aggregateArea, type Report } from './report';
import { unitKind } from './unit-matching';

/** A report without its edges and its pieces, as lists of versions carry it. */
export type Figures = Omit<Report, 'edges' | 'cut'> & { readonly cut?: CutFigures };

/** One figure on both floors; `change` is b − a, null where either floor has none. */
export interface FigureChange {
  readonly a: number | null;
  readonly b: number | null;
  readonly change: number | null;
}

/** Laid units of one kind on both floors. */
export interface KindChange {
  /** Longer and shorter side and thickness, mm. */
  readonly length: number;
  readonly width: number;
  readonly thickness: number;
  /** What the documents call it, each name once, floor A's first. */
  readonly names: readonly string[];
  readonly a: number;
  readonly b: number;
  readonly change: number;
}

/** Areas in m², lengths in mm, nothing rounded, as in the report. */
export interface FigureComparison {
  readonly kinds: readonly KindChange[];
  readonly wholeUnits: FigureChange;
  readonly leftOut: FigureChange;
  readonly lifted: FigureChange;
  readonly leastGap: FigureChange;
  readonly play: FigureChange;
  readonly groundArea: FigureChange;
  readonly coveredArea: FigureChange;
  /** What aggregate takes: less where the edge is laid with cut pieces. */
  readonly fillArea: FigureChange;
  /** Where either floor is cut at its edge; 0 on one that is not. */
  readonly cut: {
    readonly pieces: FigureChange;
    /** Whole units that the pieces are sawn from. */
    readonly sawnUnits: FigureChange;
    readonly waste: FigureChange;
    /** mm */
    readonly sawLength: FigureChange;
  } | null;
}

function figureChange(a: number | null, b: number | null): FigureChange {
  return { a, b, change: a === null || b === null ? null : b - a };
}

function usedUnits(document: LayoutDocument) {
  const ids = new Set(bondPattern(document).motif.map(({ unit }) => unit));
  return [...ids].map((id) => documentUnit(document, id));
}

function kindChanges(
  documentA: LayoutDocument,
  a: Figures,
  documentB: LayoutDocument,
  b: Figures,
): KindChange[] {
  const kinds = new Map<string, KindChange>();
  const add = (document: LayoutDocument, figures: Figures, side: 'a' | 'b') => {
    for (const unit of usedUnits(document)) {
      const key = unitKind(unit);
      const before = kinds.get(key) ?? {
        length: Math.max(unit.length, unit.width),
        width: Math.min(unit.length, unit.width),
        thickness: unit.thickness,
        names: [],
        a: 0,
        b: 0,
        change: 0,
      };
      const counted = { ...before, [side]: before[side] + (figures.byUnit[unit.id] ?? 0) };
      kinds.set(key, {
        ...counted,
        names: [...new Set([...before.names, unit.name])],
        change: counted.b - counted.a,
      });
    }
  };
  add(documentA, a, 'a');
  add(documentB, b, 'b');
  return [...kinds.values()];
}

/** Two floors' figures side by side with their differences, from their documents and reports. */
export function figuresCompared(
  documentA: LayoutDocument,
  a: Figures,
  documentB: LayoutDocument,
  b: Figures,
): FigureComparison {
  return {
    kinds: kindChanges(documentA, a, documentB, b),
    wholeUnits: figureChange(a.wholeUnits, b.wholeUnits),
    leftOut: figureChange(a.leftOut, b.leftOut),
    lifted: figureChange(a.lifted, b.lifted),
    leastGap: figureChange(a.leastGap, b.leastGap),
    play: figureChange(a.play, b.play),
    groundArea: figureChange(a.groundArea, b.groundArea),
    coveredArea: figureChange(a.coveredArea, b.coveredArea),
    fillArea: figureChange(aggregateArea(a), aggregateArea(b)),
    cut:
      a.cut || b.cut
        ? {
            pieces: figureChange(a.cut?.count ?? 0, b.cut?.count ?? 0),
            sawnUnits: figureChange(a.cut?.wholeUnits ?? 0, b.cut?.wholeUnits ?? 0),
            waste: figureChange(a.cut?.waste ?? 0, b.cut?.waste ?? 0),
            sawLength: figureChange(a.cut?.sawLength ?? 0, b.cut?.sawLength ?? 0),
          }
        : null,
  };
}
