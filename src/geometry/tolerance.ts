/**
 * Lengths are compared with this tolerance, mm: a unit that fits to within it fits, and corners
 * nearer than this are one corner. A hundredth of a millimetre is far below what a crew can
 * measure and far above what doubles lose on a floor 100 km from the origin.
 */
export const LENGTH_TOLERANCE_MM = 0.01;

/** Overlaps of up to this area, mm², count as touching: a 0.01 mm strip along a metre is ten of them. */
export const AREA_TOLERANCE_MM2 = 1;

/** An arc and its chords never part by more than this, mm. */
export const ARC_SAGITTA_MM = 0.05;
