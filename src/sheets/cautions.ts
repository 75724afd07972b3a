import type { LayoutDocument, Unit } from '@/paving/layout-document';
import { aggregateArea, type Report } from '@/paving/report';

/** Density of plain concrete, kg/m³: ASCE 7 gives 144 lb/ft³ for plain stone concrete; 145 lb/ft³ is the usual low figure. */
const CONCRETE_KG_PER_M3 = 2320;
/** NIOSH's load constant: a heavier unit is for two people or a machine. */
const ONE_PERSON_KG = 23;

export const unitMassKg = (unit: Unit): number =>
  (unit.length * unit.width * unit.thickness * CONCRETE_KG_PER_M3) / 1e9;

/** The cautions that apply to this floor, each a short sentence or two. */
export function floorCautions(document: LayoutDocument, report: Report): readonly string[] {
  const laid = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const heavy = laid.filter((unit) => unitMassKg(unit) > ONE_PERSON_KG);
  const heaviest = Math.max(0, ...heavy.map(unitMassKg));
  const openShare = report.groundArea > 0 ? aggregateArea(report) / report.groundArea : 0;
  return [
    'Call before you dig: have buried services marked.',
    ...(heavy.length > 0
      ? [
          `A unit weighs about ${heaviest.toFixed(1)}\u00a0kg if of concrete: over 23\u00a0kg is a lift for two or for a machine.`,
        ]
      : []),
    ...(document.cutting === 'edge'
      ? ['Never cut dry: wet cut or extract the dust, and wear a mask.']
      : []),
    'Plate compactors: keep feet clear, and share the time for the sake of hands.',
    ...(openShare > 0 ? ['With voids or loose aggregate this is not an accessible route.'] : []),
    'Not for vehicles without a designed pavement.',
    'Frost, drainage, footings and falls near buildings: local codes and licensed practice.',
    'Figures are aids to planning, not a design certificate.',
  ];
}
