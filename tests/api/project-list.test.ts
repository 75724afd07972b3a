import { sql } from 'drizzle-orm';
import { drizzle as drizzlePglite } from 'drizzle-orm/pglite';
import { drizzle as drizzlePostgres } from 'drizzle-orm/postgres-js';
import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import type { ProjectPage, ProjectSummary } from '@/api-types/projects';
import type { Db } from '@/db/client';
import * as schema from '@/db/schema';
import { readAudit } from '@/server/audit';
import { layoutSummaries } from '@/server/layouts';
import { liveState } from '@/server/live';
import { projectPulse } from '@/server/project-pulse';
import { projectPage } from '@/server/project-list';
import { openProject, putOnProject } from '@/server/projects';
import { layoutThreads, versionThreads } from '@/server/threads';
import { projectTimeline } from '@/server/timeline';
import { unreadThreads } from '@/server/unread';
import { listVersions, openVersion } from '@/server/versions';
import { court, newFirm, newMember, newVersion, putEvent, type Signed } from './firm';
import { putManyProjects } from './many-projects';
import { db, rowsOf, useEmptyDatabase } from './site';

useEmptyDatabase();

const page = async ({ visitor }: Signed, query: string): Promise<ProjectPage> => {
  const answer = await visitor.get(`/api/projects?${query}`);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body;
};

const allPages = async (who: Signed, query: string, size: number): Promise<ProjectSummary[]> => {
  const all: ProjectSummary[] = [];
  for (let next: string | null = ''; next !== null;) {
    const one: ProjectPage = await page(who, `${query}&size=${size}&after=${next}`);
    expect(one.projects.length).toBeLessThanOrEqual(size);
    all.push(...one.projects);
    next = one.next;
  }
  return all;
};

describe('what lists hold', () => {
  let owner: Signed;
  let client: Signed;
  let all: ProjectSummary[];

  const NAMES = ['Yard', 'court', 'Court', 'Älvhof', 'Yard', "O'Dell's gate", 'North-east walk'];

  beforeAll(async () => {
    owner = await newFirm();
    client = await newMember(owner.actor.firmId, 'client');
    const stranger = await newFirm();
    await stranger.visitor.post('/api/projects', { name: 'Court of a stranger' });
    for (const [n, name] of NAMES.entries()) {
      const clientName = ['Marsh', 'Reed', ''][n % 3];
      const { id } = (await owner.visitor.post('/api/projects', { name, clientName })).body;
      if (n % 2 === 0) {
        await putOnProject(await db(), owner.actor.firmId, id, client.actor.personId);
      }
      if (n === 5) await owner.visitor.patch(`/api/projects/${id}`, { archived: true });
      if (n % 3 === 0) continue;
      const layout = (
        await owner.visitor.post(`/api/projects/${id}/layouts`, { name: 'One', document: court() })
      ).body;
      const version = await newVersion(owner.visitor, layout.id);
      if (n % 3 === 2) await putEvent(owner.actor, version.id, 'shared');
    }
    all = (await page(owner, '')).projects as ProjectSummary[];
  });

  test('asked for nothing: all of them, last touched first, archived ones too', () => {
    expect(all.map(({ name }) => name).sort()).toEqual([...NAMES].sort());
    const touched = all.map(({ updatedAt }) => updatedAt);
    expect(touched).toEqual([...touched].sort().reverse());
  });

  test('the first page says how many there are in all, of what is asked and seen', async () => {
    const total = async (who: Signed, query: string) => (await page(who, query)).total;
    expect(await total(owner, 'size=2')).toEqual({ count: NAMES.length, more: false });
    expect(await total(owner, 'size=2&archived=only')).toEqual({ count: 1, more: false });
    expect(await total(owner, 'size=1&search=court')).toEqual({ count: 2, more: false });
    expect((await total(client, 'size=1'))?.count).toBe((await page(client, '')).projects.length);
    const { next } = await page(owner, 'size=2');
    expect((await page(owner, `size=2&after=${next}`)).total).toBeNull();
  });

  test('page by page every project comes once, in the same order, whatever the list and the page', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom('no', 'only', 'all'),
        fc.constantFrom('updated', 'name', 'client', 'stage'),
        fc.constantFrom('', 'court', 'yard'),
        fc.integer({ min: 1, max: 4 }),
        fc.boolean(),
        async (archived, sort, search, size, asClient) => {
          const who = asClient ? client : owner;
          const query = `archived=${archived}&sort=${sort}&search=${search}`;
          const whole = await page(who, `${query}&size=100`);
          expect(whole.next).toBeNull();
          expect(await allPages(who, query, size)).toEqual(whole.projects);
        },
      ),
      { numRuns: 40 },
    );
  });

  const namesOf = async (query: string, who = owner) =>
    (await page(who, query)).projects.map(({ name }) => name);

  test('by name and by client, letters great and small alike', async () => {
    const named = (await namesOf('archived=no&sort=name')).map((name) => name.toLowerCase());
    expect(named.filter((name) => /^[a-z]/.test(name))).toEqual([
      'court',
      'court',
      'north-east walk',
      'yard',
      'yard',
    ]);
    const clients = (await page(owner, 'archived=no&sort=client')).projects.map(
      ({ clientName }) => clientName,
    );
    expect(clients).toEqual([...clients].sort());
  });

  test('by stage the furthest come first, and a stage alone gives its own', async () => {
    const stages = (await page(owner, 'archived=no&sort=stage')).projects.map(({ stage }) => stage);
    expect(stages).toEqual(['shared', 'saved', 'saved', 'draft', 'draft', 'draft']);
    const saved = await page(owner, 'archived=no&stage=saved');
    expect(saved.projects.map(({ stage }) => stage)).toEqual(['saved', 'saved']);
  });

  test('a client’s list shows the stage of what they see, and is filtered by that', async () => {
    const own = (await page(client, 'archived=all')).projects;
    expect(own.map(({ name, stage }) => [name, stage]).sort()).toEqual([
      ['Court', 'shared'],
      ['North-east walk', 'draft'],
      ['Yard', 'draft'],
      ['Yard', 'draft'],
    ]);
    expect(await namesOf('archived=no&stage=shared', client)).toEqual(['Court']);
    expect(await namesOf('archived=no&stage=saved', client)).toEqual([]);
  });

  test.each([
    ['cou', ['Court', 'court']],
    ['COURT reed', ['court']],
    ['älv', ['Älvhof']],
    ["o'dell", ["O'Dell's gate"]],
    ['dell', ["O'Dell's gate"]],
    ['north-east', ['North-east walk']],
    ['walk', ['North-east walk']],
    ['ourt', []],
    ["' | :* & !", [...NAMES]],
    ['\\', [...NAMES]],
  ])('a search for “%s” finds by beginnings of words', async (search, found) => {
    const names = await namesOf(`search=${encodeURIComponent(search)}`);
    expect(names.sort()).toEqual([...found].sort());
  });

  test('what is no query, or the key of no page, is refused or begins anew', async () => {
    for (const query of ['size=0', 'size=1000', 'sort=colour', 'archived=maybe', 'stage=built']) {
      expect((await owner.visitor.get(`/api/projects?${query}`)).status, query).toBe(422);
    }
    for (const after of [
      'x',
      '.x',
      '.W10',
      `.${Buffer.from('["now","a"]').toString('base64url')}`,
    ]) {
      expect((await page(owner, `after=${after}`)).projects).toHaveLength(NAMES.length);
    }
  });
});

/**
 * Every query that a list or an opened version asks, as PostgreSQL plans it over 8,000 projects and 16,000 versions: none
 * reads a table from end to end that grows with the work of a firm.
 */
describe('plans', () => {
  const GROWING =
    /Seq Scan on (projects|layouts|versions|version_events|drafts|comments|audit_events|project_people|comment_reads)\b/;
  let owner: Signed;
  let installer: Signed;

  beforeAll(async () => {
    owner = await newFirm();
    const other = await newFirm();
    installer = await newMember(owner.actor.firmId, 'installer');
    const database = await db();
    await putManyProjects(database, owner.actor, { projects: 4000, versions: 2 });
    await putManyProjects(database, other.actor, { projects: 4000, versions: 2 });
    const [{ id: mine }] = (await projectPage(database, owner.actor, ALL)).projects;
    await putOnProject(database, owner.actor.firmId, mine, installer.actor.personId);
    await database.execute(sql`insert into comments
        (id, firm_id, project_id, layout_id, version_id, thread_id, person_id, body, at)
      select 'c-' || v.id, v.firm_id, l.project_id, l.id, v.id, 'c-' || v.id, v.created_by, 'So', v.created_at
      from versions v join layouts l on l.id = v.layout_id`);
    await database.execute(sql`insert into comment_reads (firm_id, thread_id, person_id, read_at)
      select c.firm_id, c.id, p.person_id, c.at from comments c join project_people p on p.project_id = c.project_id`);
    await database.execute(sql`insert into audit_events
        (id, firm_id, person_id, at, what, subject_type, subject_id, detail)
      select 'a-' || v.id, v.firm_id, v.created_by, v.created_at, 'version.saved', 'version', v.id, '{}'
      from versions v`);
    await database.execute(sql`analyze`);
  }, 120_000);

  const ALL = { archived: 'all', sort: 'updated', size: 50 } as const;

  /** Runs with a database that writes down every query, then asks how each is planned. */
  const plansOf = async (run: (db: Db) => Promise<unknown>): Promise<string[]> => {
    const asked: { query: string; params: unknown[] }[] = [];
    const logger = {
      logQuery: (query: string, params: unknown[]) => void asked.push({ query, params }),
    };
    const database = await db();
    const client = (database as unknown as { $client: never }).$client;
    const isPglite = 'dumpDataDir' in (client as object);
    const written = isPglite
      ? drizzlePglite(client, { schema, logger })
      : drizzlePostgres(client, { schema, logger });
    await run(written as unknown as Db);
    const plans: string[] = [];
    for (const { query, params } of asked.filter(({ query }) => /^select/i.test(query))) {
      // Parameters are set into the text: a plan for parameters unknown would be another one.
      const text = query.replace(/\$(\d+)/g, (_, n: string) => {
        const value = params[Number(n) - 1];
        return typeof value === 'number' || typeof value === 'boolean'
          ? String(value)
          : `'${String(value instanceof Date ? value.toISOString() : value).replaceAll("'", "''")}'`;
      });
      const plan = rowsOf<Record<string, string>>(
        await database.execute(sql.raw(`explain ${text}`)),
      );
      plans.push(plan.map((row) => row['QUERY PLAN']).join('\n'));
    }
    return plans;
  };

  const NO = { archived: 'no', size: 50 } as const;

  const lists: [string, (db: Db) => Promise<unknown>][] = [
    ['all projects', (db) => projectPage(db, owner.actor, ALL)],
    [
      'current, last touched first',
      (db) => projectPage(db, owner.actor, { ...NO, sort: 'updated' }),
    ],
    ['current, by name', (db) => projectPage(db, owner.actor, { ...NO, sort: 'name' })],
    ['current, by client', (db) => projectPage(db, owner.actor, { ...NO, sort: 'client' })],
    ['current, by stage', (db) => projectPage(db, owner.actor, { ...NO, sort: 'stage' })],
    [
      'of one stage',
      (db) => projectPage(db, owner.actor, { ...NO, sort: 'updated', stage: 'shared' }),
    ],
    ['archived', (db) => projectPage(db, owner.actor, { ...ALL, archived: 'only' })],
    [
      'searched',
      (db) => projectPage(db, owner.actor, { ...NO, sort: 'updated', search: 'orchard 111' }),
    ],
    [
      'a page far down',
      async (db) => {
        const { next } = await projectPage(db, owner.actor, { ...NO, sort: 'name' });
        return projectPage(db, owner.actor, { ...NO, sort: 'name', after: next ?? undefined });
      },
    ],
    ['an installer’s projects', (db) => projectPage(db, installer.actor, ALL)],
    [
      'an installer’s, of one stage',
      (db) => projectPage(db, installer.actor, { ...ALL, stage: 'issued' }),
    ],
    ['the audit', (db) => readAudit(db, owner.actor, { size: 50 })],
    [
      'the audit of one subject',
      (db) => readAudit(db, owner.actor, { size: 50, subject: 'x', what: 'version' }),
    ],
  ];

  test('unread comments: the newest are read by an index, and no more than those are looked at', async () => {
    // For 200 comments PostgreSQL may rather read the names of a few thousand projects at once than one by one.
    for (const { actor } of [owner, installer]) {
      const [plan] = await plansOf((db) => unreadThreads(db, actor));
      expect(plan).not.toMatch(/Seq Scan on (comments|comment_reads|versions|version_events)\b/);
      expect(plan).toMatch(/Limit/);
    }
  });

  test.each(lists)('%s: read by an index', async (_name, list) => {
    const plans = await plansOf(list);
    expect(plans.length).toBeGreaterThan(0);
    for (const plan of plans) expect(plan).not.toMatch(GROWING);
  });

  test('a project, its versions, comments, timeline and live state: read by an index', async () => {
    const database = await db();
    const [{ id }] = (await projectPage(database, owner.actor, ALL)).projects;
    const [layout] = await layoutSummaries(database, owner.actor, [id]);
    const version = layout.latest?.id ?? '';
    expect(version).not.toBe('');
    const { firmId } = owner.actor;
    const plans = await plansOf(async (db) => {
      for (const { actor } of [owner, installer]) {
        await openProject(db, actor, id);
        await listVersions(db, actor, layout.id);
        await openVersion(db, actor, version);
        await versionThreads(db, actor, version);
        await layoutThreads(db, actor, layout.id);
        await projectTimeline(db, actor, id, { size: 50 });
        await liveState(db, actor, id);
      }
      await projectPulse(db, firmId, id);
    });
    expect(plans.length).toBeGreaterThan(20);
    for (const plan of plans) expect(plan).not.toMatch(GROWING);
  });
});
