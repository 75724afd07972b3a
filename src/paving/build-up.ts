import { z } from 'zod';

/**
 * The layers that a floor is laid on, as the document keeps them: from the top the unit, the bedding
 * and the base. Thicknesses are compacted and in millimetres.
 */

/** No layer of a dry floor is thicker than this, mm. */
export const GREATEST_LAYER_MM = 2000;

const layer = z
  .number({ error: 'must be a number of millimetres' })
  .min(0, 'must be 0 mm or more')
  .max(GREATEST_LAYER_MM, 'is over 2 m; thicknesses are in millimetres');

/** Layers under the units, and what decides them. */
export const buildUpSchema = z.object({
  /** What goes over the floor: decides the least thicknesses that are advised. */
  use: z.enum(['foot', 'driveway']).default('foot'),
  /** Whether the ground freezes to below the base in winter. */
  frost: z.boolean().default(false),
  /** Under the thickest unit, screeded, mm. */
  bedding: layer.default(25),
  /** Compacted, mm. */
  base: layer.default(100),
  /** A geotextile between base and ground. */
  geotextile: z.boolean().default(false),
  /** How far the excavation and the base go beyond the perimeter, mm. */
  overdig: layer.default(0),
});

export type BuildUp = z.infer<typeof buildUpSchema>;

/** What a document without a build-up is reckoned with: a foot-traffic floor. */
const PLAIN_BUILD_UP: BuildUp = buildUpSchema.parse({});

/**
 * What a new layout in feet and inches begins with, in whole inches: 4 in of base, 1 in of bedding (common practice). It is in
 * the layout's document, so that how lengths are shown decides nothing but that.
 */
export const INCH_BUILD_UP: BuildUp = { ...PLAIN_BUILD_UP, bedding: 25.4, base: 101.6 };

/** Whether somebody said what the layers are: a document that says nothing, or what a new one begins with, has them from nobody. */
export const buildUpSaid = ({ buildUp }: { readonly buildUp?: BuildUp }): boolean =>
  buildUp !== undefined &&
  Object.entries(INCH_BUILD_UP).some(([key, usual]) => buildUp[key as keyof BuildUp] !== usual);

/** The build-up of a document, or what stands for one that says nothing. */
export const documentBuildUp = (document: { readonly buildUp?: BuildUp }): BuildUp =>
  document.buildUp ?? PLAIN_BUILD_UP;
