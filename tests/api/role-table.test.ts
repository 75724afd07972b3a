import { beforeAll, describe, expect, test } from 'vitest';
import { putOnProject } from '@/server/projects';
import {
  court,
  moved,
  newFirm,
  newMember,
  newProject,
  newVersion,
  PASSWORD,
  putEvent,
  type Signed,
} from './firm';
import { askers, statuses, type Asker, type Row, type World } from './role-rows';
import { peopleRows } from './role-rows-people';
import { pricingRows } from './role-rows-pricing';
import { siteRows } from './role-rows-site';
import { db, endpoints, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

let world: World;

beforeAll(async () => {
  const owner = await newFirm();
  const { firmId } = owner.actor;
  const member = (role: 'designer' | 'installer' | 'client') => newMember(firmId, role);
  const designer = await member('designer');
  const [installer, installerElsewhere] = [await member('installer'), await member('installer')];
  const [client, clientElsewhere] = [await member('client'), await member('client')];
  const stranger = await newFirm();
  await newProject(stranger.visitor);
  const { projectId: project, layoutId: layout } = await newProject(owner.visitor);
  const other = await newProject(owner.visitor);
  const unshown = await owner.visitor.post(`/api/projects/${project}/layouts`, { name: 'Unshown' });
  const [saved, shared, issued] = [
    await newVersion(owner.visitor, layout, 'Saved'),
    await newVersion(owner.visitor, layout, 'Shared'),
    await newVersion(owner.visitor, layout, 'Issued'),
  ];
  const database = await db();
  await putEvent(owner.actor, shared.id, 'shared');
  await putEvent(owner.actor, issued.id, 'issued');
  const steps = await newProject(owner.visitor);
  for (const { actor } of [installer, client]) {
    await putOnProject(database, firmId, project, actor.personId);
    await putOnProject(database, firmId, steps.projectId, actor.personId);
  }
  const seenByAll = await newVersion(owner.visitor, steps.layoutId, 'Seen by all');
  for (const kind of ['shared', 'accepted', 'issued'] as const) {
    await putEvent(owner.actor, seenByAll.id, kind);
  }
  const thread = await owner.visitor.post(`/api/versions/${seenByAll.id}/comments`, { body: 'So' });
  for (const { actor } of [installerElsewhere, clientElsewhere]) {
    await putOnProject(database, firmId, other.projectId, actor.personId);
  }
  const draft = `/api/layouts/${layout}/draft`;
  await designer.visitor.put(draft, { baseRevision: 1, document: moved(court(), 3) });
  const stale = await owner.visitor.put(draft, { baseRevision: 1, document: moved(court(), 4) });
  const people: Record<Asker, Pick<Signed, 'visitor' | 'email'>> = {
    owner,
    designer,
    installer,
    client,
    'installer elsewhere': installerElsewhere,
    'client elsewhere': clientElsewhere,
    stranger,
    nobody: { visitor: new Visitor(), email: 'nobody@firm.example' },
  };
  world = {
    people,
    firmId,
    installerId: installer.actor.personId,
    project,
    layout,
    unshown: unshown.body.id,
    saved: saved.id,
    shared: shared.id,
    issued: issued.id,
    aside: stale.body.setAside.id,
    stepsProject: steps.projectId,
    stepsLayout: steps.layoutId,
    seenByAll: seenByAll.id,
    thread: thread.body.id,
  };
});

const revision = async (layout: string): Promise<number> =>
  (await world.people.owner.visitor.get(`/api/layouts/${layout}/draft`)).body.revision;

/** A new version of the layout for steps, brought to where it stands through the endpoints. */
const versionThatIs = async (state: 'saved' | 'shared' | 'accepted'): Promise<string> => {
  const { owner, client } = world.people;
  const { id } = await newVersion(owner.visitor, world.stepsLayout, state);
  if (state !== 'saved') await owner.visitor.post(`/api/versions/${id}/share`);
  if (state === 'accepted') {
    await client.visitor.post(`/api/versions/${id}/accept`, await acceptanceOf(id));
  }
  return id;
};

const acceptanceOf = async (version: string) => {
  const { fingerprint } = (await world.people.owner.visitor.get(`/api/versions/${version}`)).body;
  return { typedName: 'A. Client', fingerprint, terms: '' };
};

const DRAFTS = 'projects, drafts, saving and sharing versions';
const SEE_PROJECT = 'see a project';
const SEE_VERSION = 'see a version';
const drafting = (success: number) => statuses([success, success, 403, 403, 404, 404, 404, 401]);

const rows: readonly Row[] = [
  ...peopleRows,
  ...pricingRows,
  ...siteRows,
  {
    row: 'open to all',
    endpoint: 'GET /api/health',
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 200]),
  },
  {
    row: 'open to all: makes a firm of one’s own',
    endpoint: 'POST /api/sign-up',
    body: (_world, asker) => ({
      firmName: 'Own firm',
      name: 'New',
      email: `new-${asker.replace(' ', '-')}@firm.example`,
      password: PASSWORD,
    }),
    expected: statuses([201, 201, 201, 201, 201, 201, 201, 201]),
  },
  {
    row: 'open to all: the right password signs in',
    endpoint: 'POST /api/sign-in',
    body: ({ people }, asker) => ({ email: people[asker].email, password: PASSWORD }),
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: 'open to all: ends one’s own session',
    endpoint: 'POST /api/sign-out',
    expected: statuses([204, 204, 204, 204, 204, 204, 204, 204]),
  },
  {
    row: 'one’s own account',
    endpoint: 'GET /api/account',
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: 'one’s own account',
    endpoint: 'PATCH /api/account',
    body: () => ({ display: 'metric' }),
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: 'computes from what is sent, stores and shows nothing',
    endpoint: 'POST /api/report',
    body: () => ({ document: court() }),
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/projects',
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/projects',
    body: () => ({ name: 'Another' }),
    expected: statuses([201, 201, 403, 403, 403, 403, 201, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/projects/[id]',
    id: ({ project }) => project,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_PROJECT}: what its client chooses from, as far as one sees it`,
    endpoint: 'GET /api/projects/[id]/choices',
    id: ({ project }) => project,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${DRAFTS}: which of them the client chooses from`,
    endpoint: 'PUT /api/projects/[id]/choices',
    id: ({ project }) => project,
    body: ({ shared }) => ({ versionIds: [shared] }),
    expected: drafting(200),
  },
  {
    row: `${DRAFTS}: which of them the client chooses from`,
    endpoint: 'DELETE /api/projects/[id]/choices',
    id: ({ project }) => project,
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'PATCH /api/projects/[id]',
    id: ({ project }) => project,
    body: () => ({ siteNote: 'Gate code at the door' }),
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/projects/[id]/layouts',
    id: ({ project }) => project,
    body: () => ({ name: 'Another' }),
    expected: drafting(201),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/layouts/[id]',
    id: ({ layout }) => layout,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: a layout with none is not seen`,
    endpoint: 'GET /api/layouts/[id]',
    id: ({ unshown }) => unshown,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'PATCH /api/layouts/[id]',
    id: ({ layout }) => layout,
    body: () => ({ name: 'Chequer' }),
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'PATCH /api/layouts/[id]',
    id: ({ unshown }) => unshown,
    body: () => ({ name: 'Unshown' }),
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'GET /api/layouts/[id]/draft',
    id: ({ layout }) => layout,
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'PUT /api/layouts/[id]/draft',
    id: ({ layout }) => layout,
    body: async ({ layout }) => ({
      baseRevision: await revision(layout),
      document: moved(court(), 7),
    }),
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/layouts/[id]/draft/from-version',
    id: ({ layout }) => layout,
    body: async ({ layout, saved }) => ({
      baseRevision: await revision(layout),
      versionId: saved,
    }),
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'GET /api/layouts/[id]/set-aside',
    id: ({ layout }) => layout,
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'GET /api/set-aside/[id]',
    id: ({ aside }) => aside,
    expected: drafting(200),
  },
  {
    row: SEE_VERSION,
    endpoint: 'GET /api/layouts/[id]/versions',
    id: ({ layout }) => layout,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/layouts/[id]/versions',
    id: ({ unshown }) => unshown,
    body: async ({ unshown }) => ({ baseRevision: await revision(unshown), label: 'Saved' }),
    expected: statuses([201, 201, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/layouts/[id]/versions',
    id: ({ layout }) => layout,
    body: async ({ layout }) => ({ baseRevision: await revision(layout), label: 'Saved' }),
    expected: drafting(201),
  },
  {
    row: `${SEE_VERSION}: one only saved`,
    endpoint: 'GET /api/versions/[id]',
    id: ({ saved }) => saved,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: a shared one`,
    endpoint: 'GET /api/versions/[id]',
    id: ({ shared }) => shared,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: an issued one`,
    endpoint: 'GET /api/versions/[id]',
    id: ({ issued }) => issued,
    expected: statuses([200, 200, 200, 404, 404, 404, 404, 401]),
  },
  {
    row: 'set-out pack: of one only saved',
    endpoint: 'GET /api/versions/[id]/sheets',
    id: ({ saved }) => saved,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: 'set-out pack: the plan sheet of a shared one',
    endpoint: 'GET /api/versions/[id]/sheets',
    id: ({ shared }) => shared,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: 'set-out pack: of an issued one',
    endpoint: 'GET /api/versions/[id]/sheets',
    id: ({ issued }) => issued,
    expected: statuses([200, 200, 200, 404, 404, 404, 404, 401]),
  },
  {
    row: 'open to all who hold a sheet: whether its plan is current, and nothing else',
    endpoint: 'GET /api/current/[id]',
    id: ({ saved }) => saved,
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 200]),
  },
  {
    row: `${DRAFTS}: one not shared yet`,
    endpoint: 'POST /api/versions/[id]/share',
    id: () => versionThatIs('saved'),
    body: () => ({ note: 'Have a look' }),
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: `${DRAFTS}: one shared already, refused with a reason`,
    endpoint: 'POST /api/versions/[id]/share',
    id: ({ seenByAll }) => seenByAll,
    body: () => ({ note: 'Have a look' }),
    expected: statuses([409, 409, 403, 403, 404, 404, 404, 401]),
  },
  {
    row: 'accept, ask for a change, pay',
    endpoint: 'POST /api/versions/[id]/accept',
    id: () => versionThatIs('shared'),
    body: (_world, _asker, id) => acceptanceOf(id),
    expected: statuses([403, 403, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: 'accept, ask for a change, pay: one that is issued already',
    endpoint: 'POST /api/versions/[id]/accept',
    id: ({ seenByAll }) => seenByAll,
    body: (_world, _asker, id) => acceptanceOf(id),
    expected: statuses([403, 403, 403, 409, 404, 404, 404, 401]),
  },
  {
    row: 'accept, ask for a change, pay',
    endpoint: 'POST /api/versions/[id]/ask-change',
    id: () => versionThatIs('shared'),
    body: () => ({ note: 'Turn it' }),
    expected: statuses([403, 403, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: 'issue an accepted version for set-out',
    endpoint: 'POST /api/versions/[id]/issue',
    id: () => versionThatIs('accepted'),
    body: () => ({ note: '' }),
    expected: statuses([200, 200, 404, 403, 404, 404, 404, 401]),
  },
  {
    row: 'issue an accepted version for set-out: one not accepted yet',
    endpoint: 'POST /api/versions/[id]/issue',
    id: () => versionThatIs('shared'),
    body: () => ({ note: '' }),
    expected: statuses([409, 409, 404, 403, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: where it stands`,
    endpoint: 'GET /api/versions/[id]/agreement',
    id: ({ shared }) => shared,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: the record of its acceptance`,
    endpoint: 'GET /api/versions/[id]/acceptance',
    id: () => versionThatIs('accepted'),
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: comments on a shared one`,
    endpoint: 'GET /api/versions/[id]/comments',
    id: ({ shared }) => shared,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: 'comment on a version: a shared one',
    endpoint: 'POST /api/versions/[id]/comments',
    id: ({ shared }) => shared,
    body: () => ({ body: 'Here', pin: [100, 200] }),
    expected: statuses([201, 201, 404, 201, 404, 404, 404, 401]),
  },
  {
    row: 'comment on a version: an issued one',
    endpoint: 'POST /api/versions/[id]/comments',
    id: ({ issued }) => issued,
    body: () => ({ body: 'Here', pin: [100, 200] }),
    expected: statuses([201, 201, 201, 404, 404, 404, 404, 401]),
  },
  {
    row: 'comment on a version: whom to mention',
    endpoint: 'GET /api/versions/[id]/mentionable',
    id: ({ issued }) => issued,
    expected: statuses([200, 200, 200, 404, 404, 404, 404, 401]),
  },
  {
    row: SEE_VERSION,
    endpoint: 'GET /api/layouts/[id]/comments',
    id: ({ layout }) => layout,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: 'comment on a version',
    endpoint: 'POST /api/threads/[id]/replies',
    id: ({ thread }) => thread,
    body: () => ({ body: 'Yes' }),
    expected: statuses([201, 201, 201, 201, 404, 404, 404, 401]),
  },
  {
    row: 'comment on a version: somebody else’s is resolved by the firm’s drafters',
    endpoint: 'PATCH /api/threads/[id]',
    id: ({ thread }) => thread,
    body: () => ({ resolved: true }),
    expected: statuses([200, 200, 403, 403, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: one’s own mark of what was read`,
    endpoint: 'PUT /api/threads/[id]/read',
    id: ({ thread }) => thread,
    body: ({ thread }) => ({ upTo: thread }),
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: one’s own unread comments`,
    endpoint: 'GET /api/unread',
    expected: statuses([200, 200, 200, 200, 200, 200, 200, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/projects/[id]/timeline',
    id: ({ project }) => project,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/layouts/[id]/timeline',
    id: ({ layout }) => layout,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/projects/[id]/live',
    id: ({ project }) => project,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: SEE_PROJECT,
    endpoint: 'GET /api/projects/[id]/live/stream',
    id: ({ project }) => project,
    query: () => '?for=0',
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: DRAFTS,
    endpoint: 'PUT /api/layouts/[id]/presence',
    id: ({ layout }) => layout,
    body: () => ({ state: 'editing' }),
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/layouts/[id]/duplicate',
    id: ({ layout }) => layout,
    body: () => ({}),
    expected: drafting(201),
  },
  {
    row: `${SEE_VERSION}: both`,
    endpoint: 'GET /api/comparison',
    query: ({ shared }) => `?a=${shared}&b=${shared}`,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SEE_VERSION}: one of the two not`,
    endpoint: 'GET /api/comparison',
    query: ({ shared, saved }) => `?a=${shared}&b=${saved}`,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: 'people, roles, firm settings: who did what',
    endpoint: 'GET /api/audit',
    expected: statuses([200, 403, 403, 403, 403, 403, 200, 401]),
  },
  {
    row: 'people, roles, firm settings: all that the firm has',
    endpoint: 'GET /api/firm/export',
    expected: statuses([200, 403, 403, 403, 403, 403, 200, 401]),
  },
];

/** Signing in, up and out change who asks; each of those is asked by a browser of its own. */
const ENTERING = /sign-(in|up|out)$/;

describe.each(rows)('$endpoint ($row)', (row) => {
  const { endpoint, id, query, body, expected } = row;
  test.each(askers)('asked by %s', async (asker) => {
    const [method, address] = endpoint.split(' ');
    const own = (await id?.(world)) ?? '';
    const url = `${address.replace('[id]', own)}${(await query?.(world, asker)) ?? ''}`;
    const sent = await body?.(world, asker, own);
    const visitor = ENTERING.test(address)
      ? new Visitor()
      : ((await row.visitor?.(world, asker)) ?? world.people[asker].visitor);
    const answer = await visitor.call(method, url, sent);
    expect(answer.status, JSON.stringify(answer.body)).toBe(expected[asker]);
    if (answer.status >= 400) {
      expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
    }
  });
});

test('every method of every endpoint has a row', () => {
  const all = [...endpoints].flatMap(([address, module]) =>
    Object.keys(module)
      .filter((method) => method !== 'ALL')
      .map((method) => `${method} ${address}`),
  );
  expect(all.length).toBeGreaterThan(0);
  expect(new Set(rows.map(({ endpoint }) => endpoint))).toEqual(new Set(all));
});

test('an id that exists nowhere is answered like one that may not be seen', async () => {
  const { visitor } = world.people.stranger;
  for (const { endpoint, id, body } of rows.filter((row) => row.id)) {
    const [method, address] = endpoint.split(' ');
    const own = (await id?.(world)) ?? '';
    const sent = await body?.(world, 'stranger', own);
    const unseen = await visitor.call(method, address.replace('[id]', own), sent);
    const nowhere = await visitor.call(method, address.replace('[id]', 'nowhere'), sent);
    expect(unseen.body, endpoint).toEqual(nowhere.body);
  }
});

const names = async (asker: Asker, url: string, list: string, name: string): Promise<string[]> =>
  (await world.people[asker].visitor.get(url)).body[list].map(
    (item: Record<string, string>) => item[name],
  );

test('the list of projects holds those that the person sees', async () => {
  const ids = (asker: Asker) => names(asker, '/api/projects', 'projects', 'id');
  expect(await ids('owner')).toContain(world.project);
  const own = new Set([world.project, world.stepsProject]);
  expect(new Set(await ids('installer'))).toEqual(own);
  expect(new Set(await ids('client'))).toEqual(own);
  expect(await ids('installer elsewhere')).not.toContain(world.project);
  expect(await ids('stranger')).not.toContain(world.project);
});

test('the list of versions holds those that the person sees', async () => {
  const labels = (asker: Asker) =>
    names(asker, `/api/layouts/${world.layout}/versions`, 'versions', 'label');
  expect(new Set(await labels('designer'))).toEqual(new Set(['Saved', 'Shared', 'Issued']));
  expect(await labels('installer')).toEqual(['Issued']);
  expect(await labels('client')).toEqual(['Shared']);
});

test('a project shows installers and clients no draft and only what they may see', async () => {
  for (const [asker, label] of [
    ['installer', 'Issued'],
    ['client', 'Shared'],
  ] as const) {
    const project = (await world.people[asker].visitor.get(`/api/projects/${world.project}`)).body;
    expect(project.layouts).toHaveLength(1);
    expect(project.layouts[0]).toMatchObject({
      id: world.layout,
      draftedAt: null,
      draftRevision: null,
      versions: 1,
      latest: { label },
      document: court(),
    });
  }
});
