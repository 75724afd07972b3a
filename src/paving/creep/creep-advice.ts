import { formatCount } from '../count';
import type { LayoutDocument } from '../layout-document';
import { formatLength } from '../length';
import type { Creep } from './creep-types';

/** Growth below this is none that a tape could show, mm. */
const NO_GROWTH_MM = 0.05;

/** What the figures come to, in plain sentences, the gravest first. */
export function creepAdvice(
  { display, bond }: LayoutDocument,
  { units, joints, courses, across, capacity, edges, lost }: Omit<Creep, 'advice'>,
  refused: string | null,
): string[] {
  const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
  const advice: string[] = [];
  if (refused) advice.push(`With units of this size the pattern cannot be laid: ${refused}.`);
  const broken = edges.filter(({ holds }) => !holds);
  if (lost > 0 && !refused) {
    const at = broken.map(({ name }) => name);
    advice.push(
      `With the joints kept, ${lost === 1 ? '1 unit' : `${formatCount(lost)} units`} would no longer fit whole${at.length > 0 ? `, at ${at.slice(0, 4).join(', ')}` : ''}. Change the joint before you go on.`,
    );
  }
  const steady = bond.kind === 'stepping' || bond.kind === 'custom';
  const worst = courses.reduce(
    (most, course) => (Math.abs(course.growth) > Math.abs(most.growth) ? course : most),
    courses[0],
  );
  const moved = Math.max(Math.abs(worst.growth), Math.abs(across.growth));
  if (units.every(({ lengthDoubt, widthDoubt }) => lengthDoubt === 0 && widthDoubt === 0))
    advice.push(
      'Nothing is measured yet. Lay ten units tight, side against side, and measure them.',
    );
  else if (moved < NO_GROWTH_MM) advice.push('The units are as planned. Go on as you are.');
  else if (!steady) {
    const way = (growth: number) => (growth > 0 ? 'longer' : 'shorter');
    advice.push(
      `The longest change along a string is in course ${worst.number}: ${shown(Math.abs(worst.growth))} ${way(worst.growth)}, give or take ${shown(worst.doubt)}.${
        courses.length > 1
          ? ` From the first string to the last the floor comes ${shown(Math.abs(across.growth))} ${way(across.growth)}.`
          : ''
      }`,
    );
    const joint = (value: number | null, does: boolean, where: string) => {
      if (value === null) return;
      advice.push(
        does
          ? `A joint of ${shown(value)} ${where} brings it back to the plan.`
          : `To bring it back, joints ${where} would have to be ${shown(value)}, outside ${shown(joints.least)} to ${shown(joints.greatest)}: the joints alone cannot take it.`,
      );
    };
    if (Math.abs(worst.growth) >= NO_GROWTH_MM)
      joint(worst.joint, worst.jointDoes, 'along the courses');
    if (Math.abs(across.growth) >= NO_GROWTH_MM)
      joint(across.joint, across.jointDoes, 'between the courses');
  }
  const narrowest = edges.find(
    ({ planned, coming, holds }) => holds && coming < planned - NO_GROWTH_MM,
  );
  if (narrowest)
    advice.push(
      `The gap at ${narrowest.name} goes from ${shown(narrowest.planned)} to ${shown(narrowest.coming)}.`,
    );
  for (const { direction, units: count, each, from, worst: all, chance } of capacity) {
    if (from !== 'tolerance') continue;
    const where = direction === 'along' ? 'in a course' : 'across the courses';
    advice.push(
      `Units up to ${shown(each)} off, ${formatCount(count)} ${where}: ${
        all.does
          ? 'the joints take it even if every one is off the same way'
          : chance.does
            ? 'the joints take what is likely, but not every unit off the same way; sort them, or mix from several packs'
            : 'the joints take neither the worst nor what is likely'
      }.`,
    );
  }
  return advice;
}
