import { z } from 'zod';
import type { LayoutDocument } from '@/paving/layout-document';
import type { LayoutSummary } from './layouts';
import type { PersonName, Role } from './people';
import type { VersionState } from './versions';

const projectFields = z.object({
  name: z
    .string({ error: 'Give the project a name' })
    .trim()
    .min(1, 'Give the project a name')
    .max(120, 'Keep the name to 120 characters'),
  clientName: z.string().trim().max(120, 'Keep it to 120 characters'),
  siteNote: z.string().trim().max(4000, 'Keep the site note to 4,000 characters'),
});

/** POST /api/projects. 201 → `ProjectSummary`. */
export const newProjectSchema = projectFields.extend({
  clientName: projectFields.shape.clientName.default(''),
  siteNote: projectFields.shape.siteNote.default(''),
});
/** PATCH /api/projects/{id}. 200 → `ProjectSummary`. */
export const projectChangeSchema = projectFields.extend({ archived: z.boolean() }).partial();
export type ProjectChange = z.input<typeof projectChangeSchema>;

export const projectSorts = ['updated', 'name', 'client', 'stage'] as const;
export type ProjectSort = (typeof projectSorts)[number];

export const projectStages = [
  'draft',
  'superseded',
  'saved',
  'shared',
  'change_asked',
  'accepted',
  'issued',
] as const satisfies readonly (VersionState | 'draft')[];

/**
 * GET /api/projects?search=…&stage=…&archived=…&sort=…&size=…&after=… → `ProjectPage`. Asked for nothing it
 * gives the first page of all, last touched first, archived ones included. `search` finds the beginnings of words of
 * name and client, all of them. `updated` and `stage` sort the newest and furthest first.
 */
export const projectQuerySchema = z.object({
  search: z.string().trim().max(120).optional(),
  stage: z.enum(projectStages).optional(),
  archived: z.enum(['no', 'only', 'all']).default('all'),
  sort: z.enum(projectSorts).default('updated'),
  size: z.coerce.number().int().min(1).max(100).default(50),
  after: z.string().max(600).optional(),
});
export type ProjectQuery = z.input<typeof projectQuerySchema>;

export interface ProjectPage {
  readonly projects: readonly ProjectSummary[];
  /** How many there are on all pages together, counted with the first page; null with those after it. */
  readonly total: ProjectTotal | null;
  /** Ask for the next page `after` this; null at the end. */
  readonly next: string | null;
}

/** No more than these are counted: counting must not grow with a firm. */
export const MOST_COUNTED = 1000;

export interface ProjectTotal {
  readonly count: number;
  /** Whether there are more than `count`. */
  readonly more: boolean;
}

/** A project in a list. */
export interface ProjectSummary {
  readonly id: string;
  readonly name: string;
  readonly clientName: string;
  readonly siteNote: string;
  readonly archivedAt: string | null;
  readonly createdAt: string;
  readonly updatedAt: string;
  /** How many layouts this person may see. */
  readonly layouts: number;
  /** The furthest state of a version that this person may see; `draft` when there is none. */
  readonly stage: VersionState | 'draft';
  /** What to draw it from: its layout last worked on, if it has one. */
  readonly document: LayoutDocument | null;
}

/** GET /api/projects/{id}. */
export interface ProjectDetail extends Omit<ProjectSummary, 'layouts'> {
  readonly layouts: readonly LayoutSummary[];
  readonly people: readonly (PersonName & { readonly role: Role })[];
}
