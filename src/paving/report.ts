import { cutReport, type CutReport } from './cutting/cut-report';
import { gapProfile } from './gap-profile';
import type { Laying } from './laying';
import { leastGapAt } from './least-gap';

/** Gaps at one edge of the ground, mm; null where no unit faces it. */
export interface EdgeReport {
  readonly ring: number;
  readonly edge: number;
  readonly length: number;
  readonly facing: number;
  readonly least: number | null;
  readonly greatest: number | null;
  readonly mean: number | null;
}

/** What a floor comes to. Areas in m², lengths in mm, nothing rounded. */
export interface Report {
  /** Laid units. */
  readonly wholeUnits: number;
  /** The same by unit id: every unit that the bond uses, with 0 where none is laid. */
  readonly byUnit: Readonly<Record<string, number>>;
  /** Units that overlap the ground but are not whole. */
  readonly leftOut: number;
  /** Addresses in `lifted` that would otherwise be laid. */
  readonly lifted: number;
  readonly groundArea: number;
  readonly coveredArea: number;
  /** `groundArea` − `coveredArea`: what aggregate takes. Of a floor cut at its edge, `cut.fillArea` is. */
  readonly fillArea: number;
  /** Least distance from a laid unit to the perimeter or a keep-out; null if none is laid. */
  readonly leastGap: number | null;
  /** How far the whole field may drift, in any direction, before a laid unit breaks the clearance. */
  readonly play: number | null;
  readonly edges: readonly EdgeReport[];
  /** Only where the document has units cut at the edge. */
  readonly cut?: CutReport;
}

export type { CutReport };

const MM2_PER_M2 = 1e6;

/** The report of a laying, as the layout document defines it. */
export function floorReport(laying: Laying): Report {
  const whole = wholeReport(laying);
  return laying.document.cutting === 'edge' ? { ...whole, cut: cutReport(laying) } : whole;
}

/** What aggregate takes of a floor, m²: pieces cut at the edge leave it less. */
export const aggregateArea = ({
  cut,
  fillArea,
}: Pick<Report, 'fillArea'> & { readonly cut?: Pick<CutReport, 'fillArea'> }): number =>
  cut?.fillArea ?? fillArea;

/** The report of the whole units alone: all of it but `cut`, which takes longer. */
export function wholeReport(laying: Laying): Omit<Report, 'cut'> {
  const { document, ground, laid, motif } = laying;
  const byMotif = new Array<number>(motif.length).fill(0);
  for (let n = 0; n < laid.count; n++) byMotif[laid.k[n]]++;
  const byUnit = new Map<string, number>();
  let covered = 0;
  motif.forEach(({ unit }, k) => {
    byUnit.set(unit.id, (byUnit.get(unit.id) ?? 0) + byMotif[k]);
    covered += byMotif[k] * unit.length * unit.width;
  });
  const leastGap = leastGapAt(laying)?.gap ?? null;
  return {
    wholeUnits: laid.count,
    // Object.fromEntries defines own fields, so an id such as "__proto__" is a field like any other.
    byUnit: Object.fromEntries(byUnit),
    leftOut: laying.leftOut.count,
    lifted: laying.lifted.count,
    groundArea: ground.area / MM2_PER_M2,
    coveredArea: covered / MM2_PER_M2,
    fillArea: (ground.area - covered) / MM2_PER_M2,
    leastGap,
    play: leastGap === null ? null : leastGap - document.clearance,
    edges: gapProfile(laying).map(({ ring, edge, length, facing, least, greatest, mean }) => ({
      ring,
      edge,
      length,
      facing,
      least,
      greatest,
      mean,
    })),
  };
}
