import { createHash, randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { eq, isTable } from 'drizzle-orm';
import { strFromU8, strToU8, unzipSync, zipSync } from 'fflate';
import { describe, expect, test } from 'vitest';
import * as schema from '@/db/schema';
import { exportFirm } from '@/server/archive/export';
import { importFirm } from '@/server/archive/import';
import { ARCHIVED_TABLES, NOT_ARCHIVED } from '@/server/archive/tables';
import { bytesInMemory, withFile } from '@/server/archive/zip-file';
import { useDatabase } from '@/server/database';
import { startSession } from '@/server/sessions';
import { court, moved, newVersion } from './firm';
import { newOffice, versionThatIs, type Office } from './office';
import { db, openEmpty, serve, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

const archiveOf = async (firmId: string, database?: Awaited<ReturnType<typeof db>>) => {
  const parts: Uint8Array[] = [];
  await exportFirm(database ?? (await db()), firmId, (bytes) => parts.push(bytes));
  return new Uint8Array(Buffer.concat(parts));
};

/** A supplier, an item with two prices, settings, and a quote of a version that is sent. */
const pricedThings = async ({ owner }: Office, version: string) => {
  const { visitor } = owner;
  await visitor.patch('/api/firm/pricing', { revision: 0, currency: 'GBP', taxBasisPoints: 2000 });
  const supplier = (await visitor.post('/api/suppliers', { name: 'Yard' })).body;
  const item = (
    await visitor.post('/api/catalogue', {
      kind: 'sundry',
      name: 'Pegs',
      supplierId: supplier.id,
      packHolds: 0.1,
      price: { costMinor: 5, from: '2026-01-01' },
    })
  ).body;
  const price = { costMinor: 6, from: '2026-02-01' };
  await visitor.patch(`/api/catalogue/${item.id}`, { revision: 1, price });
  const quote = (await visitor.post(`/api/versions/${version}/quotes`)).body;
  const line = { id: 'own', group: 'labour', name: 'Work', amount: 1.5, measure: 'day', costMinor: 7 }; // prettier-ignore
  await visitor.patch(`/api/quotes/${quote.id}`, { revision: 1, lines: [line] });
  const sent = await visitor.post(`/api/quotes/${quote.id}/send`, { revision: 2 });
  expect(sent.status, JSON.stringify(sent.body)).toBe(200);
};

/** A firm with something in every table that an archive holds and that endpoints write. */
const busyOffice = async () => {
  const office = await newOffice();
  const { designer, owner, client, layoutId, projectId } = office;
  const first = await versionThatIs(office, 'issued');
  await versionThatIs(office, 'issued');
  const shared = await versionThatIs(office, 'shared');
  const thread = (
    await client.visitor.post(`/api/versions/${first}/comments`, {
      body: `“quoted”, \u{1F33F} and\nlines`,
      pin: [0.1 + 0.2, -3],
    })
  ).body;
  await designer.visitor.post(`/api/threads/${thread.id}/replies`, { body: 'Yes' });
  await owner.visitor.put(`/api/threads/${thread.id}/read`, { upTo: thread.id });
  await designer.visitor.patch(`/api/threads/${thread.id}`, { resolved: true });
  await client.visitor.post(`/api/versions/${shared}/ask-change`, { note: 'Turn it' });
  await pricedThings(office, first);
  const draft = `/api/layouts/${layoutId}/draft`;
  await designer.visitor.put(draft, { baseRevision: 1, document: moved(court(), 3) });
  await owner.visitor.put(draft, { baseRevision: 1, document: moved(court(), 4) });
  await newVersion(designer.visitor, layoutId);
  await owner.visitor.patch(`/api/projects/${projectId}`, { archived: true });
  return office;
};

test('read into an empty instance, an archive gives the very same archive again, byte for byte', async () => {
  const office = await busyOffice();
  const { firmId } = office.owner.actor;
  const archive = await archiveOf(firmId);
  const counts = JSON.parse(strFromU8(unzipSync(archive)['archive.json'])).counts;
  for (const name of [
    'versions',
    'drafts',
    'set-aside-drafts',
    'acceptances',
    'comments',
    'comment-reads',
    'audit-events',
    'firm-pricing',
    'number-sequences',
    'suppliers',
    'catalogue-items',
    'catalogue-prices',
    'version-pricings',
    'quotes',
  ]) {
    expect(counts[name], name).toBeGreaterThan(0);
  }
  const before = await db();
  const versions = (await office.owner.visitor.get(`/api/layouts/${office.layoutId}/versions`))
    .body;
  const projects = (await office.owner.visitor.get('/api/projects')).body;
  const other = await openEmpty();
  try {
    const imported = await importFirm(other.db, bytesInMemory(archive));
    expect(imported).toMatchObject({ ok: true, value: { firmId } });
    expect(Buffer.compare(await archiveOf(firmId, other.db), archive)).toBe(0);
    // It works as before, and nobody gets in with an old password.
    useDatabase(other);
    const visitor = new Visitor();
    const { email } = office.owner;
    const old = await visitor.post('/api/sign-in', { email, password: 'a long enough password' });
    expect(old.status).toBe(401);
    const { session } = await startSession(other.db, office.owner.actor.personId, firmId, {
      before: undefined,
      userAgent: '',
    });
    visitor.setCookie(session.id);
    expect((await visitor.get(`/api/layouts/${office.layoutId}/versions`)).body).toEqual(versions);
    expect((await visitor.get('/api/projects')).body).toEqual(projects);
    expect(await importFirm(other.db, bytesInMemory(archive))).toMatchObject({
      ok: false,
      kind: 'invalid',
    });
  } finally {
    useDatabase({ db: before, kind: 'pglite', settled: async () => {}, close: async () => {} });
    await other.close();
  }
});

test('it holds no secret, and nothing of another firm', async () => {
  const [office, stranger] = [await busyOffice(), await busyOffice()];
  const files = unzipSync(await archiveOf(office.owner.actor.firmId));
  const all = Object.values(files)
    .map((file) => strFromU8(file))
    .join('\n');
  expect(all).not.toMatch(/argon2|passwordHash|tokenHash/);
  expect(all).not.toContain(stranger.owner.actor.firmId);
  expect(all).not.toContain(stranger.owner.actor.personId);
  expect(all).toContain(office.client.email);
});

test('somebody who has left the firm is still named in what they did', async () => {
  const office = await busyOffice();
  const database = await db();
  await database
    .delete(schema.memberships)
    .where(eq(schema.memberships.personId, office.designer.actor.personId));
  const archive = await archiveOf(office.owner.actor.firmId);
  expect(strFromU8(unzipSync(archive)['people.json'])).toContain(office.designer.email);
});

test('every table is in an archive or is left out for a reason', () => {
  const archived = [...ARCHIVED_TABLES, ...NOT_ARCHIVED].map(({ table }) => table);
  const tables = Object.values(schema).filter((value) => isTable(value));
  expect(tables.length).toBeGreaterThan(15);
  expect(new Set(archived)).toEqual(new Set(tables));
  expect(archived).toHaveLength(tables.length);
});

describe('what is no archive is refused with a reason, and leaves the database empty', () => {
  const spoilt = async (spoil: (files: Record<string, Uint8Array>) => void) => {
    const office = await busyOffice();
    const files = { ...unzipSync(await archiveOf(office.owner.actor.firmId)) };
    spoil(files);
    return zipSync(files);
  };
  const firstVersion = (files: Record<string, Uint8Array>) =>
    Object.keys(files).find((name) => name.startsWith('versions/')) ?? '';

  test.each<[string, () => Promise<Uint8Array>, RegExp]>([
    ['no ZIP', async () => strToU8('not a zip'), /no ZIP/],
    ['another ZIP', async () => zipSync({ 'a.txt': strToU8('a') }), /archive\.json is missing/],
    [
      'one with a file missing',
      () => spoilt((files) => delete files['comments.json']),
      /comments\.json is missing/,
    ],
    [
      'one with a version missing',
      () => spoilt((files) => delete files[firstVersion(files)]),
      /some of its versions are missing/,
    ],
    [
      'one with a version altered',
      () =>
        spoilt((files) => {
          const name = firstVersion(files);
          files[name] = strToU8(strFromU8(files[name]).replace('"clearance": 6', '"clearance": 5'));
        }),
      /not the one its fingerprint is of/,
    ],
    [
      'one whose document is none',
      () =>
        spoilt((files) => {
          const name = firstVersion(files);
          files[name] = strToU8(
            strFromU8(files[name]).replace('evenlay/layout@1', 'evenlay/layout@9'),
          );
        }),
      /is none/,
    ],
  ])('%s', async (_name, make, why) => {
    const archive = await make();
    const other = await openEmpty();
    try {
      const outcome = await importFirm(other.db, bytesInMemory(archive));
      expect(outcome).toMatchObject({
        ok: false,
        kind: 'invalid',
        detail: expect.stringMatching(why),
      });
      expect(await other.db.select().from(schema.firms)).toEqual([]);
    } finally {
      await other.close();
    }
  });
});

test('an archive is read file by file, from a file too: never more at once than its largest file or its list', async () => {
  const office = await busyOffice();
  const files = { ...unzipSync(await archiveOf(office.owner.actor.firmId)) };
  // Photos enough to be most of the archive; the same firm may have hundreds of times as many.
  for (let n = 0; n < 30; n += 1) {
    const photo = randomBytes(200_000);
    files[`photo-files/${createHash('sha256').update(photo).digest('hex')}.jpg`] = photo;
  }
  const folder = mkdtempSync(path.join(tmpdir(), 'evenlay-import-'));
  const other = await openEmpty();
  try {
    const zip = path.join(folder, 'firm.zip');
    writeFileSync(zip, zipSync(files));
    let most = 0;
    const kept: string[] = [];
    const store = { put: async (name: string) => void kept.push(name), get: async () => null };
    const imported = await withFile(zip, (bytes) =>
      importFirm(
        other.db,
        {
          ...bytes,
          read: (at, length) => {
            most = Math.max(most, length);
            return bytes.read(at, length);
          },
        },
        store,
      ),
    );
    expect(imported).toMatchObject({ ok: true });
    expect(kept).toHaveLength(30);
    expect(most).toBeLessThan(300_000);
  } finally {
    rmSync(folder, { recursive: true });
    await other.close();
  }
});

test('an archive made before there was a table is read in without it', async () => {
  const office = await newOffice();
  const files = { ...unzipSync(await archiveOf(office.owner.actor.firmId)) };
  delete files['choices.json'];
  delete files['choice-versions.json'];
  const about = JSON.parse(strFromU8(files['archive.json']));
  delete about.counts.choices;
  delete about.counts['choice-versions'];
  files['archive.json'] = strToU8(JSON.stringify(about));
  const other = await openEmpty();
  try {
    const imported = await importFirm(other.db, bytesInMemory(zipSync(files)));
    expect(imported).toMatchObject({ ok: true, value: { counts: { choices: 0, layouts: 1 } } });
  } finally {
    await other.close();
  }
});

test('an owner gets the archive by the endpoint, as a file, and that is written down', async () => {
  const office = await newOffice();
  const response = await serve(office.owner.visitor.request('GET', '/api/firm/export'));
  expect(response.headers.get('content-type')).toBe('application/zip');
  expect(response.headers.get('content-disposition')).toContain('attachment');
  const files = unzipSync(new Uint8Array(await response.arrayBuffer()));
  expect(Object.keys(files)).toContain('archive.json');
  const [latest] = (await office.owner.visitor.get('/api/audit')).body.entries;
  expect(latest).toMatchObject({
    what: 'firm.exported',
    person: { id: office.owner.actor.personId },
  });
});

test('the audit tells who did what, filtered by person, subject and kind, page by page', async () => {
  const office = await busyOffice();
  const { visitor } = office.owner;
  const entries = async (query: string) =>
    (await visitor.get(`/api/audit?size=200&${query}`)).body.entries as {
      id: string;
      what: string;
      person: { id: string } | null;
    }[];
  const all = await entries('');
  const whats = new Set(all.map(({ what }) => what));
  for (const what of [
    'project.made',
    'project.archived',
    'layout.made',
    'version.saved',
    'version.shared',
    'version.accepted',
    'version.issued',
    'version.superseded',
    'version.change-asked',
    'thread.begun',
    'thread.answered',
    'thread.resolved',
  ]) {
    expect(whats, what).toContain(what);
  }
  const byClient = await entries(`person=${office.client.actor.personId}`);
  expect(new Set(byClient.map(({ what }) => what))).toEqual(
    new Set(['version.accepted', 'version.change-asked', 'thread.begun']),
  );
  expect(await entries('what=version')).toEqual(
    all.filter(({ what }) => what.startsWith('version.')),
  );
  expect(await entries('what=version.issued')).toHaveLength(2);
  const paged: unknown[] = [];
  for (let next: string | null = ''; next !== null;) {
    const { body }: { body: { entries: unknown[]; next: string | null } } = await visitor.get(
      `/api/audit?size=7&after=${next}`,
    );
    paged.push(...body.entries);
    next = body.next;
  }
  expect(paged).toEqual(all);
});
