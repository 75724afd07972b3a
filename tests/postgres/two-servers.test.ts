import { spawn, type ChildProcess } from 'node:child_process';
import { asc } from 'drizzle-orm';
import { afterEach, expect, inject, test } from 'vitest';
import { openDatabase } from '@/db/client';
import {
  drafts,
  layouts,
  outbox,
  projectPeople,
  setAsideDrafts,
  versionEvents,
  versions,
} from '@/db/schema';
import { useDatabase } from '@/server/database';
import { newFirm, newMember, newProject } from '../api/firm';
import { mailServer } from '../api/mail-servers';
import { newPostgresDatabase } from '../api/site';

/** Two processes of the real services on one PostgreSQL, without the web layer: what is tested here is below it. */
const children: ChildProcess[] = [];

afterEach(() => {
  for (const child of children.splice(0)) child.kill('SIGKILL');
});

type Line = {
  kind: string;
  origin?: [number, number];
  subject?: string;
  number?: number;
  version?: string;
};

const startServer = (databaseUrl: string, ...args: string[]) => {
  const child = spawn(
    process.execPath,
    ['--import', 'tsx', 'tests/api/processes/storm.ts', ...args],
    {
      env: { PATH: process.env.PATH, DATABASE_URL: databaseUrl },
      stdio: ['pipe', 'pipe', 'pipe'],
    },
  );
  children.push(child);
  let printed = '';
  let errors = '';
  child.stderr.on('data', (chunk) => (errors += chunk));
  const ready = new Promise<void>((resolve, reject) => {
    child.stdout.on('data', (chunk) => {
      printed += chunk;
      if (printed.startsWith('ready\n')) resolve();
    });
    child.once('close', () => reject(new Error(`It ended before it was ready: ${errors}`)));
  });
  const ended = new Promise<Line[]>((resolve, reject) => {
    child.once('close', (code) =>
      code === 0
        ? resolve(
            printed
              .trim()
              .split('\n')
              .slice(1)
              .map((line) => JSON.parse(line) as Line),
          )
        : reject(new Error(`It ended with ${code}: ${errors}`)),
    );
  });
  ended.catch(() => {});
  return { ready, begin: () => child.stdin.write('go\n'), ended };
};

const SAVES = 40;

test(
  'two servers on one database lose no save, give no number twice, accept once and send no letter twice',
  { timeout: 120_000 },
  async () => {
    expect(inject('postgres')).not.toBeNull();
    const databaseUrl = await newPostgresDatabase();
    const opened = await openDatabase({ databaseUrl, dataDir: '' });
    useDatabase(opened);
    const owner = await newFirm();
    const designer = await newMember(owner.actor.firmId, 'designer');
    const client = await newMember(owner.actor.firmId, 'client');
    const { layoutId, projectId } = await newProject(owner.visitor);
    await opened.db
      .insert(projectPeople)
      .values({ firmId: owner.actor.firmId, projectId, personId: client.actor.personId });
    const server = await mailServer();
    const pair = [owner, designer].map(({ actor }, n) =>
      startServer(
        databaseUrl,
        layoutId,
        JSON.stringify(actor),
        JSON.stringify(client.actor),
        String(n + 1),
        String(SAVES),
        server.url,
      ),
    );
    await Promise.all(pair.map(({ ready }) => ready));
    for (const { begin } of pair) begin();
    const lines = (await Promise.all(pair.map(({ ended }) => ended))).flat();
    const of = (kind: string) => lines.filter((line) => line.kind === kind);
    const origins = (kind: string) => of(kind).map(({ origin }) => String(origin));

    // They did come in each other's way.
    expect(of('changed').length).toBeGreaterThan(0);
    // Each save is one revision: none was stored over another unseen.
    const [draft] = await opened.db.select().from(drafts);
    expect(of('saved').length + of('changed').length).toBe(2 * SAVES);
    expect(draft.revision).toBe(1 + of('saved').length);
    // A save that was refused is kept beside.
    const aside = await opened.db.select().from(setAsideDrafts);
    expect(new Set(aside.map(({ document }) => String(document.placement.origin)))).toEqual(
      new Set(origins('changed')),
    );
    // Each version that was answered for is there, once, with the document that was answered for.
    const kept = await opened.db.select().from(versions).orderBy(asc(versions.number));
    expect(kept.map(({ number }) => number)).toEqual(kept.map((_, n) => n + 1));
    expect(kept.map(({ document }) => String(document.placement.origin)).sort()).toEqual(
      origins('version').sort(),
    );
    // Every shared version was accepted once, though both servers were at it.
    const events = await opened.db.select().from(versionEvents);
    const acceptedIds = events.filter(({ kind }) => kind === 'accepted').map((e) => e.versionId);
    expect(new Set(acceptedIds).size).toBe(acceptedIds.length);
    expect([...acceptedIds].sort()).toEqual(
      of('accepted')
        .map(({ version }) => version)
        .sort(),
    );
    expect(acceptedIds).toHaveLength(kept.length);
    expect(of('accept refused').length).toBeGreaterThan(0);
    // Each letter came once, though both servers were sending.
    const posted = of('posted').map(({ subject }) => subject);
    expect(posted).toHaveLength(2 * SAVES);
    const ofTest = server.taken
      .map(({ subject }) => subject)
      .filter((s) => s?.startsWith('Letter '));
    expect(ofTest.sort()).toEqual(posted.sort());
    const ids = server.taken.map(({ messageId }) => messageId);
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids).toHaveLength((await opened.db.select().from(outbox)).length);
    expect((await opened.db.select().from(outbox)).every(({ sentAt }) => sentAt !== null)).toBe(
      true,
    );
    expect(await opened.db.select().from(layouts)).toHaveLength(1);
    await opened.close();
  },
);
