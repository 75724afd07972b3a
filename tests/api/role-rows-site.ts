import { useFiles } from '@/server/files/the-files';
import { court } from './firm';
import { phonePhoto, sendPhoto } from './photos';
import { statuses, type Asker, type Row, type World } from './role-rows';

const SITE = 'check measurements, course progress';
const PACK = 'set-out pack';
const DRAFTS = 'projects, drafts, saving and sharing versions';

/** A store for these rows alone: what is asked here is who is answered, not how files are kept. */
const kept = new Map<string, Uint8Array>();
useFiles({
  put: async (name, bytes) => void kept.set(name, bytes),
  get: async (name) => kept.get(name) ?? null,
});

let made = 0;
const newId = () => `entry-${(made += 1)}-of-the-role-rows`;
const madeAt = '2026-05-04T07:30:00.000Z';

const personId = async ({ people }: World, asker: Asker): Promise<string> =>
  (await people[asker].visitor.get('/api/account')).body.id ?? 'nobody';

/** An entry of the owner's on the version that everybody sees. */
const sentByOwner = async (world: World, content: unknown): Promise<string> => {
  const id = newId();
  const answer = await world.people.owner.visitor.post(
    `/api/versions/${world.seenByAll}/site-entries`,
    {
      device: 'phone-of-the-owner',
      by: await personId(world, 'owner'),
      entries: [{ id, place: made, madeAt, content }],
    },
  );
  if (answer.status !== 200 || answer.body.kept.length !== 1) {
    throw new Error(JSON.stringify(answer.body));
  }
  return id;
};

const photoQuery = async (world: World, asker: Asker, id: string) =>
  `?${new URLSearchParams({
    id,
    place: String(made),
    device: 'phone-of-the-owner',
    by: await personId(world, asker),
    madeAt,
  })}`;

const photoOfOwner = async (world: World): Promise<string> => {
  const id = newId();
  const answer = await sendPhoto(
    world.people.owner.visitor,
    `/api/versions/${world.seenByAll}/site-photos${await photoQuery(world, 'owner', id)}`,
    await phonePhoto(),
  );
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return id;
};

const revision = async ({ people, stepsLayout }: World): Promise<number> =>
  (await people.owner.visitor.get(`/api/layouts/${stepsLayout}/draft`)).body.revision;

let latestRevision = 1;

/** On site: packs, entries, photos and proposals. */
export const siteRows: readonly Row[] = [
  {
    row: `${PACK}: those to build from`,
    endpoint: 'GET /api/site',
    // Of one's own firm, of projects that one is on: to be on none is no refusal.
    expected: statuses([200, 200, 200, 403, 200, 403, 200, 401]),
  },
  {
    row: `${PACK}: of an issued version that everybody sees`,
    endpoint: 'GET /api/versions/[id]/site-pack',
    id: ({ seenByAll }) => seenByAll,
    expected: statuses([200, 200, 200, 403, 404, 404, 404, 401]),
  },
  {
    row: `${PACK}: of one that was never issued`,
    endpoint: 'GET /api/versions/[id]/site-pack',
    id: ({ shared }) => shared,
    expected: statuses([404, 404, 404, 403, 404, 404, 404, 401]),
  },
  {
    row: `${SITE}: see`,
    endpoint: 'GET /api/versions/[id]/site-entries',
    id: ({ seenByAll }) => seenByAll,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${SITE}: enter`,
    endpoint: 'POST /api/versions/[id]/site-entries',
    id: ({ seenByAll }) => seenByAll,
    body: async (world, asker) => ({
      device: 'phone-of-the-role-rows',
      by: await personId(world, asker),
      entries: [
        { id: newId(), place: made, madeAt, content: { kind: 'course', course: 1, laid: true } },
      ],
    }),
    expected: statuses([200, 200, 200, 403, 404, 404, 404, 401]),
  },
  {
    row: `${SITE}: send a photo (this one is none, which only those who may are told)`,
    endpoint: 'POST /api/versions/[id]/site-photos',
    id: ({ seenByAll }) => seenByAll,
    query: (world, asker) => photoQuery(world, asker, newId()),
    body: () => 'no photo',
    expected: statuses([422, 422, 422, 403, 404, 404, 404, 401]),
  },
  {
    row: `${SITE}: see a photo; clients are not shown the crew’s`,
    endpoint: 'GET /api/site-photos/[id]',
    id: photoOfOwner,
    expected: statuses([200, 200, 200, 404, 404, 404, 404, 401]),
  },
  {
    row: `${DRAFTS}: take what the crew proposes as the draft`,
    endpoint: 'POST /api/site-proposals/[id]/draft',
    id: async (world) => {
      latestRevision = await revision(world);
      return sentByOwner(world, { kind: 'proposal', text: 'So', document: court() });
    },
    body: () => ({ baseRevision: latestRevision }),
    expected: statuses([200, 200, 403, 403, 404, 404, 404, 401]),
  },
];
