import { and, asc, count, desc, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import {
  MOST_COUNTED,
  projectStages,
  type ProjectPage,
  type projectQuerySchema,
  type ProjectSummary,
  type ProjectTotal,
} from '@/api-types/projects';
import { projects } from '@/db/schema';
import type { Db } from './database';
import { exactly, keyRead, keyWritten, MOMENT, type Key } from './keyset';
import type { Actor } from './permissions';
import { projectSummaries, seenStage } from './projects';
import { projectSeen } from './visibility';
import { wordsMatch } from './word-search';

type Query = z.output<typeof projectQuerySchema>;
type Stage = ProjectSummary['stage'];

/** Ways to order a list: by moment, newest first, or by text from its beginning; `id` settles what is level. */
const ORDERS = {
  updated: { by: sql`${projects.updatedAt}`, moment: true },
  archived: { by: sql`${projects.archivedAt}`, moment: true },
  name: { by: sql`lower(${projects.name})`, moment: false },
  client: { by: sql`lower(${projects.clientName})`, moment: false },
} as const;

/** Only current projects can be put in any order; others come as they were archived or last touched. */
const orderOf = ({ archived, sort }: Query): keyof typeof ORDERS => {
  if (archived === 'only') return 'archived';
  if (archived === 'all' || sort === 'stage') return 'updated';
  return sort;
};

const ARCHIVED = {
  no: sql`${projects.archivedAt} is null`,
  only: sql`${projects.archivedAt} is not null`,
  all: undefined,
} as const;

/** Of `projects` rows: those that the list asks for, and that the actor sees. */
const asked = (actor: Actor, query: Query, stage: Stage | undefined) =>
  and(
    projectSeen(actor),
    ARCHIVED[query.archived],
    stage === undefined ? undefined : eq(seenStage(actor), stage),
    wordsMatch(projects.words, query.search),
  );

const rowsOf = async (
  db: Db,
  actor: Actor,
  query: Query,
  stage: Stage | undefined,
  key: Key | null,
  limit: number,
) => {
  const { by, moment } = ORDERS[orderOf(query)];
  const after =
    key &&
    (moment
      ? sql`(${by}, ${projects.id}) < (${key.at}::timestamptz, ${key.id})`
      : sql`(${by}, ${projects.id}) > (${key.at}, ${key.id})`);
  const direction = moment ? desc : asc;
  return db
    .select({ project: projects, key: exactly(sql`${by}`) })
    .from(projects)
    .where(and(asked(actor, query, stage), after ?? undefined))
    .orderBy(direction(by), direction(projects.id))
    .limit(limit);
};

/** A page's key holds the stage it had come to, when it is sorted by stage, before the key of the row. */
const readKey = (query: Query): { stage: Stage | undefined; key: Key | null } => {
  const [stage, row] = (query.after ?? '').split('.', 2);
  const key = keyRead(row);
  const fits = key !== null && (!ORDERS[orderOf(query)].moment || MOMENT.test(key.at));
  return { stage: projectStages.find((known) => known === stage), key: fits ? key : null };
};

/** Counts no further than to `MOST_COUNTED`, in the order of an index of all. */
const totalOf = async (db: Db, actor: Actor, query: Query): Promise<ProjectTotal> => {
  const { by, moment } = ORDERS[orderOf(query)];
  const some = db
    .select({ id: projects.id })
    .from(projects)
    .where(asked(actor, query, query.stage))
    .orderBy(moment ? desc(by) : asc(by))
    .limit(MOST_COUNTED + 1)
    .as('some');
  const [{ found }] = await db.select({ found: count() }).from(some);
  return { count: Math.min(found, MOST_COUNTED), more: found > MOST_COUNTED };
};

/** One page of the projects that the actor sees. */
export const projectPage = async (db: Db, actor: Actor, query: Query): Promise<ProjectPage> => {
  const furthestFirst = [...projectStages].reverse();
  const byStage = query.archived === 'no' && query.sort === 'stage';
  const stages: readonly (Stage | undefined)[] =
    query.stage !== undefined ? [query.stage] : byStage ? furthestFirst : [undefined];
  const from = readKey(query);
  const rows: { project: typeof projects.$inferSelect; key: string; stage: Stage | undefined }[] =
    [];
  // Stage by stage, furthest first: each is one run of an index, and a page seldom needs more than two.
  for (const stage of stages.slice(Math.max(0, from.key ? stages.indexOf(from.stage) : 0))) {
    const limit = query.size + 1 - rows.length;
    if (limit <= 0) break;
    const key = from.key && (stage === from.stage || stages.length === 1) ? from.key : null;
    const found = await rowsOf(db, actor, query, stage, key, limit);
    rows.push(...found.map((row) => ({ ...row, stage })));
  }
  const page = rows.slice(0, query.size);
  const last = page.at(-1);
  return {
    projects: await projectSummaries(
      db,
      actor,
      page.map(({ project }) => project),
    ),
    total: from.key ? null : await totalOf(db, actor, query),
    next:
      rows.length > query.size && last
        ? `${last.stage ?? ''}.${keyWritten({ at: last.key, id: last.project.id })}`
        : null,
  };
};

/** The projects that the actor sees, last touched first: the first hundred. */
export const listProjects = async (db: Db, actor: Actor): Promise<readonly ProjectSummary[]> =>
  (await projectPage(db, actor, { archived: 'all', sort: 'updated', size: 100 })).projects;
