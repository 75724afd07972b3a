import type { LayoutDocument, Unit } from '@/paving/layout-document';
import { aggregateArea, type Report } from '@/paving/report';
import { formatMass, KG_PER_POUND } from '@/takeoff/measures';

/** Density of plain concrete, kg/m³: ASCE 7 gives 144 lb/ft³ for plain stone concrete; 145 lb/ft³ is the usual low figure. */
const CONCRETE_KG_PER_M3 = 2320;
/** NIOSH's load constant, as its publication 94-110 has it in each system: a heavier unit is for two people or a machine. */
const ONE_PERSON_KG = { metric: 23, imperial: 51 * KG_PER_POUND } as const;

/** As its maker states, else reckoned as concrete. */
const unitMassKg = ({ mass, length, width, thickness }: Unit): number =>
  mass ?? (length * width * thickness * CONCRETE_KG_PER_M3) / 1e9;

/** The cautions that apply to this floor, each a short sentence or two. */
export function floorCautions(document: LayoutDocument, report: Report): readonly string[] {
  const laid = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const { display } = document;
  const most = ONE_PERSON_KG[display];
  const [heaviest] = laid
    .filter((unit) => unitMassKg(unit) > most)
    .sort((one, other) => unitMassKg(other) - unitMassKg(one));
  const openShare = report.groundArea > 0 ? aggregateArea(report) / report.groundArea : 0;
  return [
    'Call before you dig: have buried services marked.',
    ...(heaviest
      ? [
          `A unit weighs about ${formatMass(unitMassKg(heaviest), display)}${heaviest.mass ? '' : ' if of concrete'}: over ${display === 'metric' ? '23\u202fkg' : '51\u202flb'} is a lift for two or for a machine.`,
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
