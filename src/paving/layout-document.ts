import { z } from 'zod';
import { buildUpSchema } from './build-up';
import { levelsSchema } from './levels';
import { materialsSchema, orderSchema } from './materials';
import { setOutChoiceSchema } from './set-out/datum-choice';
import { surveySchema } from './survey/survey';

/**
 * The layout document: all that is needed to lay a floor. It is what the table edits, what a
 * version freezes, and what the API and the `layout` command take. Lengths are millimetres and
 * angles degrees anticlockwise, whatever `display` says; x grows to the right and y up.
 *
 * This schema checks the shape of each field. What several fields must satisfy together (rings
 * that cross, units that do not fit their bond, floors too large to lay) is checked by
 * `parseLayoutDocument` in `layout-validation.ts`, the one way in for a document from outside.
 */

/** No length in a document may pass 10 m for a unit's side or joint. */
export const GREATEST_UNIT_MM = 10_000;
/** Ground coordinates may lie up to 100 km from the origin, where doubles still resolve 10⁻⁸ mm. */
export const GREATEST_COORDINATE_MM = 100_000_000;

const coordinate = z
  .number({ error: 'must be a number of millimetres' })
  .min(
    -GREATEST_COORDINATE_MM,
    'lies more than 100 km from the origin; move the ground nearer to it',
  )
  .max(
    GREATEST_COORDINATE_MM,
    'lies more than 100 km from the origin; move the ground nearer to it',
  );

const size = z
  .number({ error: 'must be a number of millimetres' })
  .positive('must be more than 0 mm')
  .max(GREATEST_UNIT_MM, 'is over 10 m; sizes are in millimetres');

const gap = z
  .number({ error: 'must be a number of millimetres' })
  .min(0, 'must be 0 mm or more')
  .max(GREATEST_UNIT_MM, 'is over 10 m; sizes are in millimetres');

const turn = z.number({ error: 'must be a number of degrees' }).min(-3600).max(3600);
const vector = z.tuple([coordinate, coordinate]);

/**
 * `[x, y]` or `[x, y, bulge]`. The bulge is tan(sweep / 4) of the arc from this vertex to the
 * next, positive anticlockwise: the published convention of polyline arcs.
 */
export const vertexSchema = z.union([
  vector,
  z.tuple([coordinate, coordinate, z.number().min(-100).max(100)]),
]);

/** Not closed by repeating the first corner; either direction, stored anticlockwise. */
const ring = z
  .array(vertexSchema)
  .refine(
    (corners) =>
      corners.length >= 3 || (corners.length === 2 && corners.some(([, , bulge]) => bulge)),
    'needs at least 3 corners, or 2 joined by arcs',
  );

const keepOutSchema = z.object({
  name: z.string().trim().min(1, 'needs a name').max(80),
  ring,
});

const colour = z.string().regex(/^#[0-9a-f]{6}$/i, 'must be a colour such as #e9e4d8');

const unitSchema = z.object({
  id: z.string().min(1, 'needs an id').max(40),
  name: z.string().trim().min(1, 'needs a name').max(80),
  /** Along the unit's own x axis, mm. */
  length: size,
  /** Along the unit's own y axis, mm. */
  width: size,
  thickness: size,
  /** The face's colour on the drawing. */
  colour: colour.optional(),
  /** How far a side may be from its nominal length, either way, mm; as its maker or standard states. */
  tolerance: gap.optional(),
  /** Of one unit, kg; worked out from its size where it is not given. */
  mass: z.number({ error: 'must be a number of kilograms' }).positive().max(20_000).optional(),
  /** The entry of the firm's catalogue that it was taken from. */
  catalogueId: z.string().max(80).optional(),
});

const unitId = z.string().min(1, 'names a unit of the document');
const shift = z.number().min(0, 'must be at least 0').lt(1, 'must be below 1');

const motifEntrySchema = z.object({ unit: unitId, at: vector, turn: turn.default(0) });

const bondSchema = z.discriminatedUnion(
  'kind',
  [
    z.object({ kind: z.literal('stack'), unit: unitId, joint: gap }),
    z.object({ kind: z.literal('running'), unit: unitId, joint: gap, shift }),
    z.object({ kind: z.literal('chequer'), unit: unitId, joint: gap }),
    z.object({ kind: z.literal('stepping'), unit: unitId, pitch: z.tuple([size, size]), shift }),
    z.object({ kind: z.literal('basket'), unit: unitId, joint: gap }),
    z.object({ kind: z.literal('herringbone'), unit: unitId, joint: gap }),
    z.object({ kind: z.literal('pinwheel'), unit: unitId, small: unitId, joint: gap }),
    z.object({
      kind: z.literal('custom'),
      a: vector,
      b: vector,
      motif: z.array(motifEntrySchema).min(1, 'needs at least one unit').max(64),
      joint: gap.optional(),
    }),
  ],
  {
    error:
      'must be one of stack, running, chequer, stepping, basket, herringbone, pinwheel or custom',
  },
);

const placementSchema = z.object({ origin: vector, turn });

/** How two tones of a unit are spread over the floor. */
const tonesSchema = z.object({
  /** `single`: one tone. `alternate`: neighbours differ. `course`: by course. `random`: spread without clumps. */
  rule: z.enum(['single', 'alternate', 'course', 'random']),
  /** Second tone's colour; the first is the unit's own. */
  second: colour,
  /** Share of units in the second tone, for `random`. */
  share: z.number().min(0).max(1).default(0.5),
  /** Which of the random spreads. */
  seed: z.number().int().min(0).max(999_999).default(1),
});

const aggregateSchema = z.object({
  name: z.string().trim().min(1).max(80),
  colour,
  /** The entry of the firm's catalogue that it was taken from. */
  catalogueId: z.string().max(80).optional(),
});

const address = z.tuple([z.number().int(), z.number().int(), z.number().int().min(0)]);

export const layoutDocumentSchema = z.object({
  schema: z.literal('evenlay/layout@1', { error: 'must be "evenlay/layout@1"' }),
  /** How lengths are shown, nothing else. */
  display: z.enum(['metric', 'imperial']),
  ground: z.object({ perimeter: ring, keepOuts: z.array(keepOutSchema).max(200).default([]) }),
  units: z.array(unitSchema).min(1, 'needs at least one unit').max(40),
  bond: bondSchema,
  placement: placementSchema,
  /** Least distance from any laid unit to the perimeter and to keep-outs, mm. */
  clearance: gap,
  /** Addresses `[i, j, k]` of units taken out by hand. */
  lifted: z.array(address).max(100_000).default([]),
  cutting: z.enum(['none', 'edge']).default('none'),
  tones: tonesSchema.optional(),
  /** What fills joints, voids and margin. */
  aggregate: aggregateSchema.optional(),
  /** The layers under the units; without it nothing is known of them yet. */
  buildUp: buildUpSchema.optional(),
  /** What fills, beds and carries the floor, where it is not the usual. */
  materials: materialsSchema.optional(),
  /** Spares, and how things are ordered. */
  order: orderSchema.optional(),
  /** Finish, falls and spot levels; without it the floor is flat and flush with the edge. */
  levels: levelsSchema.optional(),
  /** The two corners to set out from; without it the program picks them. */
  setOut: setOutChoiceSchema.optional(),
  /** Tapes between the corners, from which the ground was taken. */
  survey: surveySchema.optional(),
  notes: z.string().max(10_000).optional(),
});

export type Vertex = z.infer<typeof vertexSchema>;
export type KeepOut = z.infer<typeof keepOutSchema>;
export type Unit = z.infer<typeof unitSchema>;
export type Bond = z.infer<typeof bondSchema>;
export type BondKind = Bond['kind'];
export type MotifEntry = z.infer<typeof motifEntrySchema>;
export type Placement = z.infer<typeof placementSchema>;
export type Tones = z.infer<typeof tonesSchema>;
export type Aggregate = z.infer<typeof aggregateSchema>;
export type Address = z.infer<typeof address>;
export type LayoutDocument = z.infer<typeof layoutDocumentSchema>;
