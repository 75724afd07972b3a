import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';

declare module 'vitest' {
  interface ProvidedContext {
    /** Address of the built server that the browser tests drive. */
    base: string;
  }
}

/** How long the server may take to build, make its database and listen, ms. */
const PATIENCE_MS = 300_000;

const listening = (server: ChildProcess) =>
  new Promise<string>((resolve, reject) => {
    let printed = '';
    const timer = setTimeout(
      () => reject(new Error(`the server did not start:\n${printed}`)),
      PATIENCE_MS,
    );
    const read = (chunk: Buffer) => {
      printed += chunk.toString();
      const address = /Evenlay is at (http:\S+)/.exec(printed)?.[1];
      if (address) {
        clearTimeout(timer);
        resolve(address);
      }
    };
    server.stdout!.on('data', read);
    server.stderr!.on('data', read);
    server.once('exit', (code) => reject(new Error(`the server ended with ${code}:\n${printed}`)));
  });

/** Starts the built server as a person would, on a database of its own with the demo firm in it. */
export default async function setup(project: TestProject) {
  const data = mkdtempSync(path.join(tmpdir(), 'evenlay-e2e-'));
  const server = spawn(process.execPath, ['--import', 'tsx', 'scripts/start.ts'], {
    env: { ...process.env, NODE_ENV: 'production', PORT: '0', DATA_DIR: data },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  project.provide('base', await listening(server));
  return async () => {
    const ended = new Promise((resolve) => server.once('exit', resolve));
    server.kill('SIGTERM');
    await ended;
    rmSync(data, { recursive: true, force: true });
  };
}
