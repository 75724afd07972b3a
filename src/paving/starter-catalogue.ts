import { MM_PER_INCH } from './length';
import type { Unit } from './layout-document';

/** General trade sizes to begin from; a firm's own catalogue follows. Sizes are the units' own, without joints. */
export interface CatalogueUnit extends Omit<Unit, 'id'> {
  readonly system: 'metric' | 'imperial';
}

const metric = (
  name: string,
  length: number,
  width: number,
  thickness: number,
  colour: string,
): CatalogueUnit => ({
  system: 'metric',
  name,
  length,
  width,
  thickness,
  colour,
});

const inches = (
  name: string,
  length: number,
  width: number,
  thickness: number,
  colour: string,
): CatalogueUnit => ({
  system: 'imperial',
  name,
  length: length * MM_PER_INCH,
  width: width * MM_PER_INCH,
  thickness: thickness * MM_PER_INCH,
  colour,
});

/** Common sizes of paving units, to begin with: common practice, no maker’s list. Sizes as they come, without a joint. */
export const STARTER_CATALOGUE: readonly CatalogueUnit[] = [
  metric('Block 200 × 100', 200, 100, 60, '#b5755c'),
  metric('Block 200 × 100, thick', 200, 100, 80, '#a86a55'),
  metric('Block 160 × 160', 160, 160, 60, '#b9a48f'),
  metric('Brick 215 × 102.5', 215, 102.5, 65, '#a5593f'),
  metric('Clay paver 203 × 100', 203, 100, 60, '#ad6348'),
  metric('Sett 100 × 100', 100, 100, 100, '#8e8f8c'),
  metric('Slab 300 × 300', 300, 300, 50, '#d8d2c4'),
  metric('Slab 400 × 400', 400, 400, 40, '#dcd6c9'),
  metric('Slab 450 × 450', 450, 450, 50, '#efebe1'),
  metric('Slab 600 × 300', 600, 300, 50, '#d3cfc5'),
  metric('Slab 600 × 600', 600, 600, 50, '#e2ddd2'),
  metric('Slab 900 × 600', 900, 600, 50, '#d9d8d3'),
  inches('Paver 4 × 8 in', 8, 4, 2.375, '#b0705a'),
  inches('Paver 6 × 6 in', 6, 6, 2.375, '#b9a48f'),
  inches('Paver 6 × 9 in', 9, 6, 2.375, '#a99a8a'),
  inches('Slab 12 × 12 in', 12, 12, 2, '#d8d2c4'),
  inches('Slab 16 × 16 in', 16, 16, 2, '#dcd6c9'),
  inches('Slab 18 × 18 in', 18, 18, 2, '#efebe1'),
  inches('Slab 24 × 12 in', 24, 12, 2, '#d3cfc5'),
  inches('Slab 24 × 24 in', 24, 24, 2, '#e2ddd2'),
];
