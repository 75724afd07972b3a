import { execFileSync } from 'node:child_process';
import { accessSync, constants, existsSync, readdirSync } from 'node:fs';
import path from 'node:path';

const PROGRAMS = ['initdb', 'postgres'];

const holdsPrograms = (folder: string): boolean => {
  try {
    for (const program of PROGRAMS) accessSync(path.join(folder, program), constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

/** Debian keeps each version's server programs in a folder of its own, off the PATH. */
const DEBIAN = '/usr/lib/postgresql';

const versions = (): string[] =>
  existsSync(DEBIAN)
    ? readdirSync(DEBIAN)
        .filter((name) => /^\d+$/.test(name))
        .sort((a, b) => Number(b) - Number(a))
    : [];

/** The folder of PostgreSQL's server programs, if this machine has them. */
export const findPostgres = (): string | undefined =>
  [
    ...(process.env.PATH ?? '').split(path.delimiter),
    ...versions().map((version) => path.join(DEBIAN, version, 'bin')),
  ].find((folder) => folder !== '' && holdsPrograms(folder));

export const mayInstallPostgres = (): boolean =>
  existsSync('/etc/debian_version') && existsSync('/usr/bin/apt-get') && process.getuid?.() === 0;

/** The same, installed with apt on a Debian machine where we are root and it is missing. */
export const postgresPrograms = (): string => {
  const found = findPostgres();
  if (found) return found;
  if (mayInstallPostgres()) {
    console.log('PostgreSQL is missing; installing it with apt-get.');
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    execFileSync('apt-get', ['update'], { stdio: 'inherit', env });
    const install = ['install', '-y', '--no-install-recommends', 'postgresql'];
    execFileSync('apt-get', install, { stdio: 'inherit', env });
    const installed = findPostgres();
    if (installed) return installed;
  }
  throw new Error(
    'The API tests on PostgreSQL need its server programs, and none were found. Install them ' +
      '(on Debian and Ubuntu: sudo apt-get install postgresql), or put their folder on the PATH.',
  );
};
