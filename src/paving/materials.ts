import { z } from 'zod';

/**
 * What goes into a floor besides its units, and how it is ordered, as the document keeps it: only what
 * somebody chose or typed. What is left out takes the defaults of the take-off, each of which says where
 * it comes from.
 */

/** Kinds of stone and sand; what each is reckoned with is in the take-off's table of them. */
export const MATERIAL_KINDS = [
  'jointingSand',
  'sharpSand',
  'fineChippings',
  'chippings',
  'coarseChippings',
  'gravel',
  'crushedStone',
  'openBase',
  'stoneDust',
] as const;
export type MaterialKind = (typeof MATERIAL_KINDS)[number];

/** Kinds of ground that is dug. */
export const GROUND_KINDS = ['sand', 'earth', 'clay', 'rock'] as const;
export type GroundKind = (typeof GROUND_KINDS)[number];

const depth = z
  .number({ error: 'must be a number of millimetres' })
  .positive('must be more than 0 mm')
  .max(2000, 'is over 2 m; depths are in millimetres');

/** Loose volume for one volume in place. */
const bulk = z
  .number({ error: 'must be a number, such as 1.15' })
  .min(0.5, 'must be at least 0.5: so much loose for one in place')
  .max(3, 'must be at most 3: so much loose for one in place');

const density = z
  .number({ error: 'must be a number of kilograms in a cubic metre' })
  .min(100, 'must be at least 100 kg/m³')
  .max(10_000, 'must be at most 10 000 kg/m³');

const percent = z
  .number({ error: 'must be a number of per cent' })
  .min(0, 'must be 0 % or more')
  .max(100, 'must be at most 100 %');

const stoneSize = z
  .number({ error: 'must be a number of millimetres' })
  .min(0, 'must be 0 mm or more')
  .max(500, 'is over 500 mm; stone sizes are in millimetres');

const material = {
  kind: z.enum(MATERIAL_KINDS).optional(),
  name: z.string().trim().min(1, 'needs a name').max(80).optional(),
  /** The entry of the firm's catalogue that it was taken from. */
  catalogueId: z.string().max(80).optional(),
  /** Smallest and largest stone, mm. */
  stone: z
    .tuple([stoneSize, stoneSize])
    .refine(([small, large]) => small <= large, 'the smallest stone comes first')
    .optional(),
  /** As delivered, loose, kg/m³. */
  density: density.optional(),
  bulk: bulk.optional(),
};

const fill = z.object({
  ...material,
  /** How deep it lies; the unit's thickness where it is left out. */
  depth: depth.optional(),
});
const layer = z.object(material);

/** What joints, voids, margin and layers are of; what is left out is chosen by the take-off. */
export const materialsSchema = z.object({
  joints: fill.optional(),
  voids: fill.optional(),
  margin: fill.optional(),
  bedding: layer.optional(),
  base: layer.optional(),
  spoil: z
    .object({
      ground: z.enum(GROUND_KINDS).optional(),
      bulk: bulk.optional(),
      density: density.optional(),
    }) // prettier-ignore
    .optional(),
  /** Of the units themselves, for those whose mass is not given, kg/m³. */
  unitDensity: density.optional(),
  geotextile: z
    .object({
      /** By how much strips overlap, mm. */
      lap: depth.optional(),
      /** Width of a roll, mm. */
      rollWidth: z
        .number()
        .min(200, 'must be at least 200 mm')
        .max(20_000, 'is over 20 m; widths are in millimetres')
        .optional(),
      catalogueId: z.string().max(80).optional(),
    })
    .refine(
      ({ lap = 300, rollWidth = 4500 }) => lap < rollWidth,
      'must have rolls wider than their lap',
    )
    .optional(),
  /** Edging to be bought along the perimeter; a floor inside a standing edge buys none. */
  edging: z
    .object({ wanted: z.boolean().default(false), catalogueId: z.string().max(80).optional() }) // prettier-ignore
    .optional(),
});

const ORDER_WAYS = ['pack', 'each', 'volume', 'mass', 'bag', 'bulkBag', 'load', 'length', 'area'] as const; // prettier-ignore
/** How a thing is ordered. */
export type OrderWay = (typeof ORDER_WAYS)[number];

/** Orders of which a document may keep a choice. */
const GREATEST_CHOICES = 200;

/** How things are ordered, and what is bought beyond what is laid. */
export const orderSchema = z.object({
  /** Units beyond those laid: per cent of each kind, or so many of each. */
  spares: z
    .discriminatedUnion(
      'rule',
      [
        z.object({ rule: z.literal('percent'), value: percent }),
        z.object({ rule: z.literal('count'), value: z.number().int('must be a whole number').min(0, 'must be none or more').max(1_000_000, 'must be at most a million') }), // prettier-ignore
      ],
      { error: 'must be by percent or by count' },
    )
    .optional(),
  /** Stone and sand beyond what is worked out, per cent. */
  extra: percent.optional(),
  /** How each thing is ordered, by the id of its order. */
  ways: z
    .record(z.string().max(200), z.enum(ORDER_WAYS))
    .refine(
      (ways) => Object.keys(ways).length <= GREATEST_CHOICES,
      `are more than ${GREATEST_CHOICES}`,
    ) // prettier-ignore
    .optional(),
  /** What a bag, a bulk bag and a lorry hold, kg. */
  bag: z.number().min(1, 'must be at least 1 kg').max(100, 'is over 100 kg; no one lifts that').optional(), // prettier-ignore
  bulkBag: z.number().min(100, 'must be at least 100 kg').max(3000, 'is over 3 000 kg').optional(),
  load: z.number().min(200, 'must be at least 200 kg').max(60_000, 'is over 60 t').optional(),
});

export type Materials = z.infer<typeof materialsSchema>;
export type Order = z.infer<typeof orderSchema>;
/** The places of a floor that take stone or sand. */
export type MaterialPlace = 'joints' | 'voids' | 'margin' | 'bedding' | 'base';
