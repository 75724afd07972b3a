import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { eq } from 'drizzle-orm';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { PHOTO_LIMIT } from '@/api-types/site-limits';
import { siteEntries } from '@/db/schema';
import { layFloor } from '@/paving/laying';
import { setOut } from '@/paving/set-out/set-out';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import { exportFirm } from '@/server/archive/export';
import { importFirm } from '@/server/archive/import';
import { bytesInMemory } from '@/server/archive/zip-file';
import { useDatabase } from '@/server/database';
import { startLocalS3, type LocalS3 } from '@/server/files/local-s3';
import { s3Store } from '@/server/files/s3-store';
import { useFiles } from '@/server/files/the-files';
import { startSession } from '@/server/sessions';
import { court, moved, newProject, type Signed } from './firm';
import { letters, newOffice, versionThatIs, type Office } from './office';
import { sendPhoto, phonePhoto } from './photos';
import { db, openEmpty, serve, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

let folder: string;
let local: LocalS3;
let office: Office;
let issued: string;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'evenlay-site-'));
  local = await startLocalS3(folder);
  useFiles(s3Store(local.settings));
  office = await newOffice();
  issued = await versionThatIs(office, 'issued');
});
afterAll(async () => {
  await local.close();
  rmSync(folder, { recursive: true, force: true });
});

const DEVICE = 'phone-of-the-installer';
let made = 0;

/** An entry as a phone makes it. */
const entry = (
  place: number,
  content: SiteEntryContent,
  id = `entry-${(made += 1)}-of-these-tests`,
) => ({
  id,
  place,
  madeAt: new Date(Date.UTC(2026, 4, 4, 7, place)).toISOString(),
  content,
});
const laid = (course: number, is = true): SiteEntryContent => ({
  kind: 'course',
  course,
  laid: is,
});
const note = (text: string): SiteEntryContent => ({ kind: 'note', text });

const send = (
  { visitor, actor }: Signed,
  versionId: string,
  entries: readonly ReturnType<typeof entry>[],
  { device = DEVICE, by = actor.personId } = {},
) => visitor.post(`/api/versions/${versionId}/site-entries`, { device, by, entries });

const standing = async ({ visitor }: Signed, versionId: string) =>
  (await visitor.get(`/api/versions/${versionId}/site-entries`)).body;

describe('what may be built from', () => {
  test('an installer is given the issued versions of their projects, and nothing else', async () => {
    const saved = await versionThatIs(office, 'saved');
    const elsewhere = await newProject(office.owner.visitor);
    await versionThatIs(office, 'saved', elsewhere.layoutId);
    const { body } = await office.installer.visitor.get('/api/site');
    expect(body.account.id).toBe(office.installer.actor.personId);
    expect(body.keep).toBe('all');
    expect(body.packs.map(({ versionId }: { versionId: string }) => versionId)).toEqual([issued]);
    expect((await office.installer.visitor.get(`/api/versions/${saved}/site-pack`)).status).toBe(
      404,
    );
    const drawn = await office.designer.visitor.get(`/api/versions/${saved}/site-pack`);
    expect(drawn.status).toBe(404);
    expect((await office.designer.visitor.get('/api/site')).body.keep).toBe('opened');
  });

  test('the pack holds the document that was issued, who issued it and when', async () => {
    const { body } = await office.installer.visitor.get(`/api/versions/${issued}/site-pack`);
    expect(body).toMatchObject({
      versionId: issued,
      state: 'issued',
      supersededBy: null,
      issuedBy: { id: office.owner.actor.personId },
      document: court(),
      standing: { entries: [] },
    });
    const version = (await office.owner.visitor.get(`/api/versions/${issued}`)).body;
    expect(body.shortFingerprint).toBe(version.shortFingerprint);
    const [event] = version.events.filter(({ kind }: { kind: string }) => kind === 'issued');
    expect(body.issuedAt).toBe(event.at);
  });

  test('a client is told that this is not theirs, a stranger that there is no such version', async () => {
    const { client, clientElsewhere, stranger } = office;
    expect((await client.visitor.get('/api/site')).status).toBe(403);
    expect((await client.visitor.get(`/api/versions/${issued}/site-pack`)).status).toBe(403);
    expect((await clientElsewhere.visitor.get(`/api/versions/${issued}/site-pack`)).status).toBe(
      404,
    );
    expect((await stranger.visitor.get(`/api/versions/${issued}/site-pack`)).status).toBe(404);
  });

  test('a person has one key for what waits on their phone, and no other person has it', async () => {
    const key = async ({ visitor }: Signed) => (await visitor.get('/api/site')).body.key as string;
    const first = await key(office.installer);
    expect(Buffer.from(first, 'base64')).toHaveLength(32);
    expect(await key(office.installer)).toBe(first);
    expect(await key(office.designer)).not.toBe(first);
  });
});

describe('what is written down on site', () => {
  test('comes in once and in order, however often and in whatever pieces it is sent', async () => {
    const version = await versionThatIs(office, 'issued');
    const all = [1, 2, 3, 4, 5, 6].map((n) => entry(n, n === 4 ? note('Rain') : laid(n)));
    const first = await send(office.installer, version, all.slice(0, 3));
    expect(first.body).toEqual({ kept: all.slice(0, 3).map(({ id }) => id), refused: [] });
    // The answer was lost: the phone sends them again, with more.
    const again = await send(office.installer, version, all);
    expect(again.body.kept).toEqual(all.map(({ id }) => id));
    await send(office.installer, version, [...all].reverse());
    const { entries } = await standing(office.designer, version);
    expect(entries.map(({ id }: { id: string }) => id)).toEqual(all.map(({ id }) => id));
    expect(entries[0]).toMatchObject({
      device: DEVICE,
      place: 1,
      madeAt: all[0].madeAt,
      by: { id: office.installer.actor.personId },
      content: laid(1),
    });
    expect(Date.parse(entries[0].receivedAt)).toBeGreaterThan(Date.now() - 60_000);
  });

  test('sent at once from two tabs, it is kept once', async () => {
    const version = await versionThatIs(office, 'issued');
    const all = Array.from({ length: 20 }, (_, n) => entry(n + 1, laid(1 + (n % 10))));
    const answers = await Promise.all([1, 2, 3].map(() => send(office.installer, version, all)));
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
    expect((await standing(office.installer, version)).entries).toHaveLength(20);
  });

  test('what cannot be is refused with its reason and holds up nothing after it', async () => {
    const version = await versionThatIs(office, 'issued');
    const { courses, checks } = setOut(layFloor(court()));
    const entries = [
      entry(1, laid(courses.length + 1)),
      entry(2, { kind: 'check', check: 'edge-XY', measured: 10 }),
      entry(3, { kind: 'photo', caption: '' }),
      entry(4, { kind: 'check', check: checks[0].id, measured: checks[0].expected }),
      entry(5, laid(courses.length)),
    ];
    const { body } = await send(office.installer, version, entries);
    expect(body.kept).toEqual([entries[3].id, entries[4].id]);
    expect(body.refused.map(({ id }: { id: string }) => id)).toEqual(
      entries.slice(0, 3).map(({ id }) => id),
    );
    expect(body.refused[0].reason).toContain(`it has ${courses.length}`);
  });

  test('is written down under the name of whoever made it, or not at all', async () => {
    const version = await versionThatIs(office, 'issued');
    const one = entry(1, laid(1));
    const other = await send(office.designer, version, [one], {
      by: office.installer.actor.personId,
    });
    expect(other.status).toBe(403);
    expect((await standing(office.designer, version)).entries).toEqual([]);
    // An id that somebody else used is not taken over.
    await send(office.designer, version, [one]);
    const taken = await send(office.installer, version, [one]);
    expect(taken.body).toMatchObject({ kept: [], refused: [{ id: one.id }] });
  });

  test('owner, designer and installer enter; a client sees courses and readings, and no more', async () => {
    const version = await versionThatIs(office, 'issued');
    const [check] = setOut(layFloor(court())).checks;
    await send(office.installer, version, [
      entry(1, laid(1)),
      entry(2, { kind: 'check', check: check.id, measured: check.expected }),
      entry(3, note('The client’s dog got in')),
    ]);
    await send(office.owner, version, [entry(1, laid(2))], { device: 'phone-of-the-owner' });
    await send(office.designer, version, [entry(1, laid(3))], { device: 'phone-of-the-designer' });
    const refused = await send(office.client, version, [entry(1, laid(4))]);
    expect(refused.status).toBe(403);
    const kinds = async (who: Signed) =>
      (await standing(who, version)).entries
        .map(({ content }: { content: SiteEntryContent }) => content.kind)
        .sort();
    expect(await kinds(office.client)).toEqual(['check', 'course', 'course', 'course']);
    expect(await kinds(office.installer)).toEqual(['check', 'course', 'course', 'course', 'note']);
    for (const who of [office.stranger, office.clientElsewhere]) {
      expect((await send(who, version, [entry(1, laid(1))])).status).toBe(404);
      expect((await standing(who, version)).status).toBe(404);
    }
  });

  test('is never altered or taken away, whoever asks the database', async () => {
    const version = await versionThatIs(office, 'issued');
    const one = entry(1, laid(1));
    await send(office.installer, version, [one]);
    const database = await db();
    await expect(
      database.update(siteEntries).set({ kind: 'note' }).where(eq(siteEntries.id, one.id)),
    ).rejects.toThrow();
    await expect(database.delete(siteEntries).where(eq(siteEntries.id, one.id))).rejects.toThrow();
  });

  test('is taken for a superseded version too, which is told by which one', async () => {
    const first = await versionThatIs(office, 'issued');
    const second = await versionThatIs(office, 'issued');
    const { number } = (await office.owner.visitor.get(`/api/versions/${second}`)).body;
    const sent = await send(office.installer, first, [entry(1, laid(1))]);
    expect(sent.body.kept).toHaveLength(1);
    const told = await standing(office.installer, first);
    expect(told).toMatchObject({ state: 'superseded', supersededBy: { id: second, number } });
    expect(told.entries).toHaveLength(1);
    const { packs } = (await office.installer.visitor.get('/api/site')).body;
    const by = Object.fromEntries(
      packs.map((pack: { versionId: string; supersededBy: { id: string } | null }) => [
        pack.versionId,
        pack.supersededBy?.id ?? null,
      ]),
    );
    expect(by[first]).toBe(second);
    expect(by[second]).toBeNull();
  });

  test('moves the live state of the project, but not a client’s for what they are not shown', async () => {
    const version = await versionThatIs(office, 'issued');
    const counts = async ({ visitor }: Signed) => {
      const { body } = await visitor.get(`/api/projects/${office.projectId}/live`);
      return body.layouts[0].versions.find(({ id }: { id: string }) => id === version).siteEntries;
    };
    expect(await counts(office.designer)).toBe(0);
    await send(office.installer, version, [entry(1, laid(1)), entry(2, note('Dry'))]);
    expect(await counts(office.designer)).toBe(2);
    expect(await counts(office.client)).toBe(1);
  });
});

describe('a proposal from site', () => {
  const proposal = (document = moved(court(), 7)): SiteEntryContent => ({
    kind: 'proposal',
    text: 'Joints of 4 mm from course 3',
    document,
  });

  test('reaches those who draw once, and becomes their draft when they take it', async () => {
    const version = await versionThatIs(office, 'issued');
    const one = entry(1, proposal());
    await send(office.installer, version, [one]);
    await send(office.installer, version, [one]);
    const written = await letters(office.owner.actor.firmId, 'site-proposal');
    expect(written.map(({ to }) => to).sort()).toEqual(
      [office.designer.email, office.owner.email].sort(),
    );
    expect(written[0].text).toContain('Joints of 4 mm from course 3');
    const draft = `/api/layouts/${office.layoutId}/draft`;
    const { revision } = (await office.designer.visitor.get(draft)).body;
    const take = (who: Signed, baseRevision: number) =>
      who.visitor.post(`/api/site-proposals/${one.id}/draft`, { baseRevision });
    expect((await take(office.designer, revision + 1)).status).toBe(409);
    expect((await take(office.installer, revision)).status).toBe(403);
    expect((await take(office.stranger, revision)).status).toBe(404);
    const taken = await take(office.designer, revision);
    expect(taken.body).toMatchObject({
      revision: revision + 1,
      document: moved(court(), 7),
      basedOn: { id: version },
    });
  });

  test('of a floor that cannot be laid is refused', async () => {
    const version = await versionThatIs(office, 'issued');
    const bad = { ...court(), bond: { kind: 'stack', unit: 'none', joint: 3 } } as const;
    const { body } = await send(office.installer, version, [entry(1, proposal(bad))]);
    expect(body.kept).toEqual([]);
    expect(body.refused[0].reason).toMatch(/cannot be laid/);
  });
});

describe('photos', () => {
  const query = (id: string, { actor }: Signed, place = 1) =>
    new URLSearchParams({
      id,
      place: String(place),
      device: DEVICE,
      by: actor.personId,
      madeAt: '2026-05-04T07:30:00.000Z',
      caption: 'The corner at the gate',
    });
  const put = (who: Signed, id: string, bytes: Uint8Array, version = issued) =>
    sendPhoto(who.visitor, `/api/versions/${version}/site-photos?${query(id, who)}`, bytes);
  const seen = async ({ visitor }: Signed, id: string, size = 'full') => {
    const response = await serve(visitor.request('GET', `/api/site-photos/${id}?size=${size}`));
    return { response, bytes: Buffer.from(await response.arrayBuffer()) };
  };

  test('are kept without where, when and by whom they were taken', async () => {
    const taken = await phonePhoto();
    // The photo that goes in does say so: GPS directory (tag 0x8825, here little-endian) and names.
    const before = (await sharp(taken).metadata()).exif!;
    expect(before.includes(Buffer.from([0x25, 0x88]))).toBe(true);
    expect(before.includes('J. Winterpell')).toBe(true);
    const answer = await put(office.installer, 'photo-with-a-place-in-it', taken);
    expect(answer).toMatchObject({ status: 201, body: { width: 64, height: 32 } });
    for (const size of ['full', 'phone']) {
      const { response, bytes } = await seen(office.designer, 'photo-with-a-place-in-it', size);
      expect(response.status).toBe(200);
      expect(response.headers.get('content-type')).toBe('image/jpeg');
      expect(response.headers.get('x-content-type-options')).toBe('nosniff');
      expect(response.headers.get('cache-control')).toContain('no-store');
      const { format, exif, xmp, iptc, icc, orientation } = await sharp(bytes).metadata();
      expect({ format, exif, xmp, iptc, icc, orientation }).toEqual({ format: 'jpeg' });
      for (const word of ['Winterpell', 'Pocketcam', 'GPS', 'Exif']) {
        expect(bytes.includes(word)).toBe(false);
      }
    }
    const { entries } = await standing(office.installer, issued);
    expect(entries.map(({ content }: { content: SiteEntryContent }) => content)).toContainEqual({
      kind: 'photo',
      caption: 'The corner at the gate',
    });
  });

  // EXIF 2.32, tag 274: 6 is to be turned a quarter clockwise to be seen, 3 by half, 8 a quarter anticlockwise.
  test.each([
    [1, 64, 32, 'left'],
    [3, 64, 32, 'right'],
    [6, 32, 64, 'top'],
    [8, 32, 64, 'bottom'],
  ] as const)(
    'held as orientation %i says, the red half is upright',
    async (turn, width, height, red) => {
      const id = `photo-held-in-way-${turn}`;
      const answer = await put(office.installer, id, await phonePhoto({}, turn));
      expect(answer.body).toMatchObject({ width, height });
      const { bytes } = await seen(office.installer, id);
      const { data, info } = await sharp(bytes).raw().toBuffer({ resolveWithObject: true });
      const at = (x: number, y: number) => data[(y * info.width + x) * info.channels];
      const spots = {
        left: at(4, height / 2),
        right: at(width - 5, height / 2),
        top: at(width / 2, 4),
        bottom: at(width / 2, height - 5),
      };
      const opposite = { left: 'right', right: 'left', top: 'bottom', bottom: 'top' } as const;
      expect(spots[red]).toBeGreaterThan(150);
      expect(spots[opposite[red]]).toBeLessThan(80);
    },
  );

  test('are made smaller, the larger side to 2,560 and 640 points', async () => {
    await put(
      office.installer,
      'photo-of-many-points',
      await phonePhoto({ width: 5200, height: 1300 }),
    );
    const size = async (name: string) => {
      const { width, height } = await sharp(
        (await seen(office.installer, 'photo-of-many-points', name)).bytes,
      ).metadata();
      return [width, height];
    };
    expect(await size('full')).toEqual([2560, 640]);
    expect(await size('phone')).toEqual([640, 160]);
  });

  test('are kept once, however often they are sent', async () => {
    const bytes = await phonePhoto();
    const answers = [];
    for (let n = 0; n < 2; n++)
      answers.push(await put(office.installer, 'photo-sent-more-than-once', bytes));
    expect(answers[1].body).toEqual(answers[0].body);
    const { entries } = await standing(office.installer, issued);
    const same = entries.filter(({ id }: { id: string }) => id === 'photo-sent-more-than-once');
    expect(same).toHaveLength(1);
    const other = await put(office.designer, 'photo-sent-more-than-once', bytes);
    expect(other.status).toBe(422);
  });

  test('a byte over 12 MB is refused, and told so; 12 MB of no image is no image', async () => {
    const over = await put(
      office.installer,
      'photo-that-is-too-large',
      new Uint8Array(PHOTO_LIMIT + 1),
    );
    expect(over.status).toBe(413);
    expect(over.body.detail).toContain('12 MB');
    const full = await put(
      office.installer,
      'photo-of-just-the-limit',
      new Uint8Array(PHOTO_LIMIT),
    );
    expect(full.status).toBe(422);
  });

  test.each([
    ['text', Buffer.from('This is a photo, honestly')],
    ['nothing', Buffer.alloc(0)],
    [
      'a drawing that could run or reach for other files',
      Buffer.from(
        '<svg xmlns="http://www.w3.org/2000/svg" width="10" height="10"><rect width="9" height="9"/></svg>',
      ),
    ],
    ['a page', Buffer.from('<html><script>alert(1)</script></html>')],
    ['half a JPEG', null],
  ])('%s is refused as no image', async (_what, bytes) => {
    const sent = bytes ?? (await phonePhoto({ width: 400, height: 300 })).subarray(0, 700);
    const answer = await put(office.installer, 'photo-that-is-no-photo-at-all', sent);
    expect(answer.status).toBe(422);
    expect(answer.body.detail).toContain('JPEG');
    const { entries } = await standing(office.installer, issued);
    expect(entries.map(({ id }: { id: string }) => id)).not.toContain(
      'photo-that-is-no-photo-at-all',
    );
  });

  test('a few bytes that unpack to over a hundred million points are refused unopened', async () => {
    const bomb = await sharp({
      create: { width: 11_000, height: 11_000, channels: 3, background: '#000000' },
      limitInputPixels: false,
    })
      .png({ compressionLevel: 9 })
      .toBuffer();
    expect(bomb.byteLength).toBeLessThan(PHOTO_LIMIT / 10);
    const answer = await put(office.installer, 'photo-that-would-unpack', bomb);
    expect(answer.status).toBe(422);
    expect(answer.body.detail).toContain('121 million points');
  });

  test('are shown to those who may enter on the version, and to nobody else', async () => {
    await put(office.installer, 'photo-for-the-firm-alone', await phonePhoto());
    const status = async (who: Signed) =>
      (await seen(who, 'photo-for-the-firm-alone')).response.status;
    expect(await status(office.owner)).toBe(200);
    expect(await status(office.installer)).toBe(200);
    expect(await status(office.client)).toBe(404);
    expect(await status(office.stranger)).toBe(404);
    const none = await office.stranger.visitor.get('/api/site-photos/nowhere-to-be-found');
    const other = await office.stranger.visitor.get('/api/site-photos/photo-for-the-firm-alone');
    expect(other.body).toEqual(none.body);
    const sent = await put(office.stranger, 'photo-of-another-firm', await phonePhoto());
    expect(sent.status).toBe(404);
  });

  test('go into the archive with what was written down, and come out of it the same', async () => {
    const other = await newOffice();
    const version = await versionThatIs(other, 'issued');
    await put(other.installer, 'photo-for-the-archive', await phonePhoto(), version);
    await send(other.installer, version, [entry(2, note('Kept for ever'))]);
    const { firmId } = other.owner.actor;
    const files = s3Store(local.settings);
    const archive = async (database: Awaited<ReturnType<typeof db>>, store = files) => {
      const parts: Uint8Array[] = [];
      await exportFirm(database, firmId, (bytes) => parts.push(bytes), store);
      return new Uint8Array(Buffer.concat(parts));
    };
    const before = await db();
    const first = await archive(before);
    const photo = (await seen(other.installer, 'photo-for-the-archive')).bytes;
    const empty = await openEmpty();
    const elsewhere = mkdtempSync(path.join(tmpdir(), 'evenlay-site-'));
    const second = await startLocalS3(elsewhere);
    try {
      const store = s3Store(second.settings);
      expect(await importFirm(empty.db, bytesInMemory(first), store)).toMatchObject({ ok: true });
      expect(Buffer.compare(await archive(empty.db, store), first)).toBe(0);
      useDatabase(empty);
      useFiles(store);
      const { personId } = other.installer.actor;
      const visitor = new Visitor();
      const { session } = await startSession(empty.db, personId, firmId, {
        before: undefined,
        userAgent: '',
      });
      visitor.setCookie(session.id);
      const { bytes } = await seen({ ...other.installer, visitor }, 'photo-for-the-archive');
      expect(Buffer.compare(bytes, photo)).toBe(0);
    } finally {
      useDatabase({ db: before, kind: 'pglite', settled: async () => {}, close: async () => {} });
      useFiles(files);
      await empty.close();
      await second.close();
      rmSync(elsewhere, { recursive: true, force: true });
    }
  });
});
