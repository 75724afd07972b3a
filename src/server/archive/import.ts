import { createHash, randomBytes } from 'node:crypto';
import { sql } from 'drizzle-orm';
import type { PgTable } from 'drizzle-orm/pg-core';
import { firms } from '@/db/schema';
import { layoutDocumentSchema } from '@/paving/layout-document';
import type { Db } from '../database';
import type { FileStore } from '../files/file-store';
import { theFiles } from '../files/the-files';
import { fingerprintOf } from '../fingerprint';
import { invalid, done, type Outcome } from '../outcomes';
import { passwordHash } from '../passwords';
import { PHOTO_TYPE, photoFile } from '../site/photo-files';
import { ARCHIVE_SCHEMA, PHOTO_FOLDER } from './export';
import { ARCHIVED_TABLES, archivedColumns, isMoment, type ArchivedTable } from './tables';
import { BrokenZip, unzipped, zipEntries, type Bytes, type ZipEntry } from './zip-file';

type Row = Readonly<Record<string, unknown>>;

/** Rows put in at a time: PostgreSQL takes at most 65,535 values a statement. */
const ROWS_AT_ONCE = 500;

/** Documents read at a time. */
const FILES_AT_ONCE = 200;

/** What takes the place of a secret: nobody has it, so people choose a new password and are invited anew. */
const replaced: Readonly<Record<string, () => Promise<Row>>> = {
  people: async () => ({ passwordHash: await passwordHash(randomBytes(32).toString('base64url')) }),
  invitations: async () => ({
    tokenHash: createHash('sha256').update(randomBytes(32)).digest('hex'),
  }),
};

class NotAnArchive extends Error {}

/**
 * The largest file of an archive, unpacked, that is taken in, bytes. Files are read one at a time, and each is a table or a
 * document; a larger one would not fit into one string.
 */
const LARGEST_FILE = 400_000_000;

/** An archive, read file by file: never more of it is in memory than one file and the rows that are put in at a time. */
interface Archive {
  readonly zip: Bytes;
  readonly files: ReadonlyMap<string, ZipEntry>;
}

const read = async ({ zip, files }: Archive, name: string): Promise<Uint8Array> => {
  const entry = files.get(name);
  if (!entry) throw new NotAnArchive(`${name} is missing`);
  if (entry.size > LARGEST_FILE) {
    const megabytes = Math.ceil(entry.size / 1e6);
    throw new NotAnArchive(
      `${name} is ${megabytes} MB unpacked, and no file of more than ${LARGEST_FILE / 1e6} MB can be read in`,
    );
  }
  return unzipped(zip, entry);
};

const json = async (archive: Archive, name: string): Promise<unknown> => {
  const bytes = await read(archive, name);
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch {
    throw new NotAnArchive(`${name} is not JSON`);
  }
};

const isRow = (value: unknown): value is Row =>
  value !== null && typeof value === 'object' && !Array.isArray(value);

/** Names of the files that hold a table's rows. */
const filesOf = ({ files }: Archive, { name, fileBy }: ArchivedTable): string[] =>
  fileBy === undefined
    ? [`${name}.json`]
    : [...files.keys()].filter((file) => file.startsWith(`${name}/`));

const checked = ({ name, ...archived }: ArchivedTable, rows: unknown): Row[] => {
  if (!Array.isArray(rows) || !rows.every(isRow)) {
    throw new NotAnArchive(`${name} holds something other than rows`);
  }
  for (const row of rows) {
    for (const [column] of archivedColumns({ name, ...archived })) {
      if (!(column in row)) throw new NotAnArchive(`a row of ${name} has no ${column}`);
    }
    if ('document' in row && !layoutDocumentSchema.safeParse(row.document).success) {
      throw new NotAnArchive(`the document of ${name} ${String(row.id ?? row.layoutId)} is none`);
    }
    if (name === 'versions' && fingerprintOf(row.document) !== row.fingerprint) {
      throw new NotAnArchive(`version ${String(row.id)} is not the one its fingerprint is of`);
    }
  }
  // The first comment of a thread goes in before its answers, which refer to it.
  return name === 'comments'
    ? [...rows].sort((a, b) => Number(b.id === b.threadId) - Number(a.id === a.threadId))
    : rows;
};

/** The rows of a table, checked, some at a time. */
async function* rowsIn(archive: Archive, archived: ArchivedTable): AsyncGenerator<Row[]> {
  const names = filesOf(archive, archived);
  if (archived.fileBy === undefined) {
    yield checked(archived, await json(archive, names[0]));
    return;
  }
  for (let from = 0; from < names.length; from += FILES_AT_ONCE) {
    const rows: unknown[] = [];
    for (const name of names.slice(from, from + FILES_AT_ONCE))
      rows.push(await json(archive, name));
    yield checked(archived, rows);
  }
}

const putIn = async (tx: Db, archived: ArchivedTable, rows: readonly Row[]): Promise<void> => {
  const columns = archivedColumns(archived);
  for (let from = 0; from < rows.length; from += ROWS_AT_ONCE) {
    const values = await Promise.all(
      rows.slice(from, from + ROWS_AT_ONCE).map(async (row) => ({
        ...Object.fromEntries(
          columns.map(([name, column]) => {
            const value = row[name];
            const moment = isMoment(column) && value !== null;
            return [name, moment ? sql`${value}::timestamptz` : value];
          }),
        ),
        ...(await replaced[archived.name]?.()),
      })),
    );
    await tx.insert(archived.table as PgTable).values(values as never);
  }
};

const PHOTO = new RegExp(`^${PHOTO_FOLDER}/([0-9a-f]{64})\\.jpg$`);

/** The hashes that name an archive's photos, each found to be of its photo. */
const photosIn = async (archive: Archive): Promise<string[]> => {
  const hashes = [...archive.files.keys()].flatMap((name) => PHOTO.exec(name)?.[1] ?? []);
  for (const hash of hashes) {
    const bytes = await read(archive, `${PHOTO_FOLDER}/${hash}.jpg`);
    if (createHash('sha256').update(bytes).digest('hex') !== hash) {
      throw new NotAnArchive(`photo ${hash} is not the one its name says`);
    }
  }
  return hashes;
};

/** Whether an archive was made before there was a table: then it has no rows of it, and does not count them either. */
const isOlder = ({ files }: Archive, { name }: ArchivedTable, counts: Row): boolean =>
  !(name in counts) && !files.has(`${name}.json`);

/** What the archive says that it is; that nothing of it is missing is looked up in its list of files. */
const aboutOf = async (archive: Archive): Promise<{ firmId: string; counts: Row }> => {
  const about = await json(archive, 'archive.json');
  if (!isRow(about) || about.schema !== ARCHIVE_SCHEMA || typeof about.firmId !== 'string') {
    throw new NotAnArchive(`it is not of the kind ${ARCHIVE_SCHEMA}`);
  }
  const counts = isRow(about.counts) ? about.counts : {};
  for (const archived of ARCHIVED_TABLES) {
    const names = filesOf(archive, archived);
    if (isOlder(archive, archived, counts)) continue;
    if (archived.fileBy === undefined && !archive.files.has(names[0])) {
      throw new NotAnArchive(`${names[0]} is missing`);
    }
    if (archived.fileBy !== undefined) complete(archived.name, counts, names.length);
  }
  return { firmId: about.firmId, counts };
};

const complete = (name: string, counts: Row, found: number): void => {
  if (name in counts && counts[name] !== found) {
    throw new NotAnArchive(`some of its ${name} are missing`);
  }
};

/**
 * Puts a firm's archive into a database that holds no firm. All of it or nothing: 422 `invalid` when it is no archive, or
 * when a version is not what its fingerprint says. Passwords are not in an archive: everybody chooses a new one.
 */
export const importFirm = async (
  db: Db,
  bytes: Bytes,
  store?: FileStore,
): Promise<Outcome<{ firmId: string; counts: Readonly<Record<string, number>> }>> => {
  try {
    const archive: Archive = { zip: bytes, files: await zipEntries(bytes) };
    const about = await aboutOf(archive);
    const counts = await db.transaction(async (tx) => {
      const [any] = await tx.select({ id: firms.id }).from(firms).limit(1);
      if (any) throw new NotAnArchive('this database holds a firm already, and takes in only one');
      const found: Record<string, number> = {};
      for (const archived of ARCHIVED_TABLES) {
        found[archived.name] = 0;
        if (isOlder(archive, archived, about.counts)) continue;
        for await (const rows of rowsIn(archive, archived)) {
          found[archived.name] += rows.length;
          await putIn(tx, archived, rows);
        }
        complete(archived.name, about.counts, found[archived.name]);
        // Triggers look up what is in already: planned for the tables as they are now, not as when they were empty.
        await tx.execute(sql`analyze ${archived.table}`);
      }
      for (const hash of await photosIn(archive)) {
        const photo = await read(archive, `${PHOTO_FOLDER}/${hash}.jpg`);
        await (store ?? (await theFiles())).put(photoFile(about.firmId, hash), photo, PHOTO_TYPE);
      }
      return found;
    });
    return done({ firmId: about.firmId, counts });
  } catch (error) {
    if (!(error instanceof NotAnArchive) && !(error instanceof BrokenZip)) throw error;
    const why = error.message;
    return invalid(`This archive cannot be read in: ${why}.`, [{ path: [], message: why }]);
  }
};
