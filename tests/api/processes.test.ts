import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { asc } from 'drizzle-orm';
import { afterEach, expect, test } from 'vitest';
import { openDatabase } from '@/db/client';
import { holdFolder } from '@/db/folder-lock';
import { versionEvents, versions } from '@/db/schema';
import { fingerprintOf } from '@/server/fingerprint';

/** Processes of the real services on a PGlite folder, without the web layer: what is tested here is below it. */
const folders: string[] = [];
const children: ChildProcess[] = [];

const newFolder = (): string => {
  const folder = mkdtempSync(path.join(tmpdir(), 'evenlay-processes-'));
  folders.push(folder);
  return folder;
};

afterEach(async () => {
  for (const child of children.splice(0)) {
    if (child.exitCode === null && child.signalCode === null) {
      const ended = new Promise((resolve) => child.once('exit', resolve));
      child.kill('SIGKILL');
      await ended;
    }
  }
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true });
});

interface Run {
  readonly child: ChildProcess;
  readonly lines: string[];
  readonly errors: () => string;
  readonly firstLine: Promise<void>;
  readonly ended: Promise<{ code: number | null; signal: NodeJS.Signals | null }>;
}

const run = (script: string, dataDir: string): Run => {
  const child = spawn(process.execPath, ['--import', 'tsx', `tests/api/processes/${script}.ts`], {
    env: { PATH: process.env.PATH, DATA_DIR: dataDir },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  children.push(child);
  const lines: string[] = [];
  let rest = '';
  let errors = '';
  child.stderr.on('data', (chunk) => (errors += chunk));
  const ended = new Promise<{ code: number | null; signal: NodeJS.Signals | null }>((resolve) => {
    // `close` comes after the last output was read.
    child.once('close', (code, signal) => resolve({ code, signal }));
  });
  const firstLine = new Promise<void>((resolve, reject) => {
    child.stdout.on('data', (chunk) => {
      const parts = `${rest}${chunk}`.split('\n');
      rest = parts.pop() ?? '';
      lines.push(...parts);
      if (lines.length > 0) resolve();
    });
    void ended.then(() => reject(new Error(`It ended without a line: ${errors}`)));
  });
  firstLine.catch(() => {});
  return { child, lines, errors: () => errors, firstLine, ended };
};

test('a second process is refused the folder with a clear error, and may have it when the first is gone', async () => {
  const dataDir = newFolder();
  const first = run('hold', dataDir);
  await first.firstLine;
  const second = run('hold', dataDir);
  expect((await second.ended).code).toBe(1);
  expect(second.errors()).toContain(`in use by another process (${first.child.pid})`);
  expect(second.errors()).toContain('DATA_DIR');
  first.child.kill('SIGKILL');
  await first.ended;
  const third = run('hold', dataDir);
  await third.firstLine;
});

test('a database told to stop closes, lets go of its folder and ends well', async () => {
  const dataDir = newFolder();
  const lock = path.join(dataDir, 'pglite.lock');
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    const holder = run('hold', dataDir);
    await holder.firstLine;
    expect(existsSync(lock)).toBe(true);
    holder.child.kill(signal);
    expect(await holder.ended).toEqual({ code: 0, signal: null });
    expect(existsSync(lock)).toBe(false);
  }
});

test.each(['socket', 'file'] as const)('the lock by %s holds once and lets go', async (means) => {
  const folder = path.join(newFolder(), 'pglite');
  const letGo = await holdFolder(folder, means);
  await expect(holdFolder(folder, means)).rejects.toThrow(/in use by another process/);
  await letGo();
  await (
    await holdFolder(folder, means)
  )();
});

test('a lock file left by a process that is dead is taken over', async () => {
  const dataDir = newFolder();
  const dead = spawn(process.execPath, ['-e', '']);
  await new Promise((resolve) => dead.once('exit', resolve));
  writeFileSync(path.join(dataDir, 'pglite.lock'), `${dead.pid}\n`);
  await (
    await holdFolder(path.join(dataDir, 'pglite'), 'file')
  )();
});

const KILLS = 20;

test(
  `a server killed ${KILLS} times while it saves keeps every version that it had answered for`,
  { timeout: 180_000 },
  async () => {
    const dataDir = newFolder();
    const answered: { number: number; id: string; fingerprint: string }[] = [];
    for (let kill = 0; kill < KILLS; kill += 1) {
      const server = run('save', dataDir);
      await server.firstLine;
      // Spread over several saves, so that kills fall at every stage of one.
      await new Promise((resolve) => setTimeout(resolve, 7 * kill));
      server.child.kill('SIGKILL');
      expect((await server.ended).signal).toBe('SIGKILL');
      for (const line of server.lines) {
        const [number, id, fingerprint] = line.split(' ');
        answered.push({ number: Number(number), id, fingerprint });
      }
    }
    const { db, close } = await openDatabase({ dataDir });
    const kept = await db.select().from(versions).orderBy(asc(versions.number));
    const events = await db.select().from(versionEvents);
    await close();

    expect(answered.length).toBeGreaterThanOrEqual(KILLS);
    const byId = new Map(kept.map((version) => [version.id, version]));
    for (const { id, number, fingerprint } of answered) {
      const version = byId.get(id);
      expect(version, `version ${number} is gone`).toBeDefined();
      expect(version).toMatchObject({ number, fingerprint });
      expect(fingerprintOf(version?.document)).toBe(fingerprint);
    }
    expect(kept.map(({ number }) => number)).toEqual(kept.map((_, n) => n + 1));
    expect(new Set(events.map(({ versionId }) => versionId))).toEqual(new Set(byId.keys()));
    // At most the one save that each kill cut off between its commit and its answer is not known to us.
    expect(kept.length - answered.length).toBeLessThanOrEqual(KILLS);
  },
);
