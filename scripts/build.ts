import { spawn } from 'node:child_process';
import { existsSync, readdirSync, statSync, utimesSync, writeFileSync } from 'node:fs';
import path from 'node:path';

const ROOT = path.resolve(import.meta.dirname, '..');
/** Written when a build has ended well, so that one that was broken off counts as missing. */
const STAMP = path.join(ROOT, 'dist', 'built.txt');
const SOURCES = [
  'src',
  'public',
  'astro.config.mjs',
  'pwa.config.ts',
  'package.json',
  'tsconfig.json',
];

const newest = (file: string): number => {
  if (!existsSync(file)) return 0;
  const stat = statSync(file);
  if (!stat.isDirectory()) return stat.mtimeMs;
  return Math.max(stat.mtimeMs, ...readdirSync(file).map((name) => newest(path.join(file, name))));
};

/** Whether `dist/` is missing or older than what it is built from. */
const buildIsStale = (): boolean =>
  !existsSync(STAMP) ||
  statSync(STAMP).mtimeMs < Math.max(...SOURCES.map((name) => newest(path.join(ROOT, name))));

/** Runs Astro's command line in this project and waits for it; throws when it fails. */
const runAstro = (...args: string[]): Promise<void> =>
  new Promise((resolve, reject) => {
    const astro = path.join(ROOT, 'node_modules', 'astro', 'astro.js');
    const child = spawn(process.execPath, [astro, ...args], {
      cwd: ROOT,
      stdio: 'inherit',
    });
    child.once('error', reject);
    child.once('exit', (code) =>
      code === 0 ? resolve() : reject(new Error(`astro ${args[0]} ended with ${code}`)),
    );
  });

/** Builds the server if what is in `dist/` is not what the sources say. */
export const buildIfStale = async (): Promise<void> => {
  if (!buildIsStale()) return;
  const started = new Date();
  await runAstro('build');
  // As old as the build's start: what changed while it ran makes it stale.
  writeFileSync(STAMP, `${started.toISOString()}\n`);
  utimesSync(STAMP, started, started);
};
