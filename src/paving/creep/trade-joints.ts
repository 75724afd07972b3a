import { bondPattern } from '../bond';
import type { LayoutDocument } from '../layout-document';
import type { JointLimits } from './creep-types';

/** ICPI, Construction Tolerances for Interlocking Concrete Pavements: 1/16 in (2 mm) to 3/16 in (5 mm). */
const ICPI_MM: JointLimits = { least: 2, greatest: 5 };
/** Where another joint is planned, what spacers and eye allow either way: common practice, mm. */
const PRACTICE_MM = 2;
/** The gaps of stepping stones may be this much off, either way: common practice, mm. */
const STEPPING_MM = 10;

/** The joints that may be laid where this one is planned, and whence that is known. */
export function tradeJoints(document: LayoutDocument): JointLimits & { readonly source: string } {
  const { joint } = bondPattern(document);
  if (document.bond.kind !== 'stepping' && joint >= ICPI_MM.least && joint <= ICPI_MM.greatest)
    return {
      ...ICPI_MM,
      source: 'ICPI, Construction Tolerances for Interlocking Concrete Pavements',
    };
  const off = document.bond.kind === 'stepping' ? STEPPING_MM : PRACTICE_MM;
  return { least: Math.max(0, joint - off), greatest: joint + off, source: 'common practice' };
}
