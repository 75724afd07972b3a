import { execFileSync, spawn } from 'node:child_process';
import { chownSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import postgres from 'postgres';
import { postgresPrograms } from './binaries';

const USER = 'evenlay';

/** How long the server may take to answer, ms. */
const PATIENCE_MS = 30_000;

/** PostgreSQL does not run as root: then it runs as Debian's own user for it, or as nobody. */
const lesserUser = (): { uid: number; gid: number } | undefined => {
  if (process.getuid?.() !== 0) return undefined;
  const users = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .map((line) => line.split(':'));
  const user = ['postgres', 'nobody']
    .map((name) => users.find((fields) => fields[0] === name))
    .find((fields) => fields !== undefined);
  if (!user) throw new Error('There is neither a user "postgres" nor a user "nobody".');
  return { uid: Number(user[2]), gid: Number(user[3]) };
};

const freePort = () =>
  new Promise<number>((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address() as AddressInfo;
      server.close(() => resolve(port));
    });
  });

export interface PostgresServer {
  /** Address of a database of the server by its name. */
  readonly urlOf: (database: string) => string;
  readonly stop: () => Promise<void>;
}

const answers = async (url: string, printed: () => string): Promise<void> => {
  const until = Date.now() + PATIENCE_MS;
  for (;;) {
    const client = postgres(url, { max: 1, connect_timeout: 2, onnotice: () => {} });
    try {
      await client`select 1`;
      return;
    } catch (error) {
      if (Date.now() > until) {
        throw new Error(`PostgreSQL did not start:\n${printed()}`, { cause: error });
      }
      await new Promise((resolve) => setTimeout(resolve, 100));
    } finally {
      await client.end({ timeout: 1 });
    }
  }
};

/** Starts a PostgreSQL server of one's own: a new folder under the system's temporary one, a free port. */
export const startPostgres = async (): Promise<PostgresServer> => {
  const programs = postgresPrograms();
  const user = lesserUser();
  const folder = mkdtempSync(path.join(tmpdir(), 'evenlay-postgres-'));
  if (user) chownSync(folder, user.uid, user.gid);
  const as = { ...user, cwd: folder, env: { PATH: process.env.PATH, LC_ALL: 'C.UTF-8' } };
  const data = path.join(folder, 'data');
  const init = ['-D', data, '-U', USER, '-A', 'trust', '-E', 'UTF8', '--no-sync'];
  execFileSync(path.join(programs, 'initdb'), init, { ...as, stdio: 'pipe' });
  const port = await freePort();
  const settings = {
    listen_addresses: '127.0.0.1',
    unix_socket_directories: folder,
    max_connections: '200',
    // The folder is thrown away: nothing needs to outlive a power cut.
    fsync: 'off',
    synchronous_commit: 'off',
    full_page_writes: 'off',
  };
  const server = spawn(
    path.join(programs, 'postgres'),
    [
      '-D',
      data,
      '-p',
      String(port),
      ...Object.entries(settings).flatMap(([name, value]) => ['-c', `${name}=${value}`]),
    ],
    { ...as, stdio: ['ignore', 'pipe', 'pipe'] },
  );
  let printed = '';
  server.stdout.on('data', (chunk) => (printed += chunk));
  server.stderr.on('data', (chunk) => (printed = `${printed}${chunk}`.slice(-4000)));
  const ended = new Promise<void>((resolve) => server.once('exit', () => resolve()));
  const urlOf = (database: string) => `postgres://${USER}@127.0.0.1:${port}/${database}`;
  await answers(urlOf('postgres'), () => printed);
  return {
    urlOf,
    stop: async () => {
      // SIGINT: its fast shutdown, which does not wait for clients.
      server.kill('SIGINT');
      await ended;
      rmSync(folder, { recursive: true, force: true });
    },
  };
};
