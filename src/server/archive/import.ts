import { createHash, randomBytes } from 'node:crypto';
import { sql } from 'drizzle-orm';
import type { PgTable } from 'drizzle-orm/pg-core';
import { unzipSync } from 'fflate';
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

type Row = Readonly<Record<string, unknown>>;

/** Rows put in at a time: PostgreSQL takes at most 65,535 values a statement. */
const ROWS_AT_ONCE = 500;

/** What takes the place of a secret: nobody has it, so people choose a new password and are invited anew. */
const replaced: Readonly<Record<string, () => Promise<Row>>> = {
  people: async () => ({ passwordHash: await passwordHash(randomBytes(32).toString('base64url')) }),
  invitations: async () => ({
    tokenHash: createHash('sha256').update(randomBytes(32)).digest('hex'),
  }),
};

class NotAnArchive extends Error {}

const json = (files: Readonly<Record<string, Uint8Array>>, name: string): unknown => {
  if (!(name in files)) throw new NotAnArchive(`${name} is missing`);
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(files[name]));
  } catch {
    throw new NotAnArchive(`${name} is not JSON`);
  }
};

const isRow = (value: unknown): value is Row =>
  value !== null && typeof value === 'object' && !Array.isArray(value);

const rowsIn = (files: Readonly<Record<string, Uint8Array>>, archived: ArchivedTable): Row[] => {
  const { name, fileBy } = archived;
  const read =
    fileBy === undefined
      ? json(files, `${name}.json`)
      : Object.keys(files)
          .filter((file) => file.startsWith(`${name}/`))
          .map((file) => json(files, file));
  if (!Array.isArray(read) || !read.every(isRow)) {
    throw new NotAnArchive(`${name} holds something other than rows`);
  }
  for (const row of read) {
    for (const [column] of archivedColumns(archived)) {
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
    ? [...read].sort((a, b) => Number(b.id === b.threadId) - Number(a.id === a.threadId))
    : read;
};

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

/** The photos of an archive by the hash that names them. */
const photosIn = (files: Readonly<Record<string, Uint8Array>>): Map<string, Uint8Array> =>
  new Map(
    Object.entries(files).flatMap(([name, bytes]) => {
      const hash = new RegExp(`^${PHOTO_FOLDER}/([0-9a-f]{64})\\.jpg$`).exec(name)?.[1];
      if (!hash) return [];
      if (createHash('sha256').update(bytes).digest('hex') !== hash) {
        throw new NotAnArchive(`photo ${hash} is not the one its name says`);
      }
      return [[hash, bytes] as const];
    }),
  );

/**
 * Puts a firm's archive into a database that holds no firm. All of it or nothing: 422 `invalid` when it is no archive, or
 * when a version is not what its fingerprint says. Passwords are not in an archive: everybody chooses a new one.
 */
export const importFirm = async (
  db: Db,
  archive: Uint8Array,
  store?: FileStore,
): Promise<Outcome<{ firmId: string; counts: Readonly<Record<string, number>> }>> => {
  const refuse = (why: string) =>
    invalid(`This archive cannot be read in: ${why}.`, [{ path: [], message: why }]);
  let tables: { archived: ArchivedTable; rows: Row[] }[];
  let photos: Map<string, Uint8Array>;
  let firmId: string;
  try {
    const files = unzipSync(archive);
    const about = json(files, 'archive.json');
    if (!isRow(about) || about.schema !== ARCHIVE_SCHEMA || typeof about.firmId !== 'string') {
      return refuse(`it is not of the kind ${ARCHIVE_SCHEMA}`);
    }
    firmId = about.firmId;
    photos = photosIn(files);
    tables = ARCHIVED_TABLES.map((archived) => ({ archived, rows: rowsIn(files, archived) }));
    for (const { archived, rows } of tables) {
      if (isRow(about.counts) && about.counts[archived.name] !== rows.length) {
        return refuse(`some of its ${archived.name} are missing`);
      }
    }
  } catch (error) {
    return refuse(error instanceof NotAnArchive ? error.message : 'it is no ZIP file, or broken');
  }
  return db.transaction(async (tx) => {
    const [any] = await tx.select({ id: firms.id }).from(firms).limit(1);
    if (any) return refuse('this database holds a firm already, and takes in only one');
    for (const { archived, rows } of tables) {
      await putIn(tx, archived, rows);
      // Triggers look up what is in already: planned for the tables as they are now, not as when they were empty.
      await tx.execute(sql`analyze ${archived.table}`);
    }
    for (const [hash, bytes] of photos) {
      await (store ?? (await theFiles())).put(photoFile(firmId, hash), bytes, PHOTO_TYPE);
    }
    const counts = Object.fromEntries(
      tables.map(({ archived, rows }) => [archived.name, rows.length]),
    );
    return done({ firmId, counts });
  });
};
