import { and, asc, eq, gt, sql, type SQL } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';
import { Zip, ZipDeflate, ZipPassThrough } from 'fflate';
import { firms, people } from '@/db/schema';
import type { Db } from '../database';
import type { FileStore } from '../files/file-store';
import { theFiles } from '../files/the-files';
import { photoFile, photoHashes } from '../site/photo-files';
import {
  ARCHIVED_TABLES,
  archivedColumns,
  columnWritten,
  keyColumns,
  personColumns,
  type ArchivedTable,
} from './tables';

/** What an archive says that it is. */
export const ARCHIVE_SCHEMA = 'evenlay/firm@1';

/** Where photos lie in an archive, each named by the SHA-256 of its bytes. */
export const PHOTO_FOLDER = 'photo-files';

/** Documents read at a time: what is held in memory while an archive is written. */
const ROWS_AT_ONCE = 200;

/** Every file of an archive bears this date, so that the same firm gives the same bytes. */
const FILE_DATE = new Date(1980, 0, 1);

type Row = Readonly<Record<string, unknown>>;

const firmColumn = ({ table }: ArchivedTable): PgColumn =>
  (table as unknown as Record<string, PgColumn>).firmId;

/** People of the firm, and whoever is named in what it keeps: who has left still saved their versions. */
const peopleOf = (firmId: string): SQL => {
  const named = ARCHIVED_TABLES.filter(({ table }) => table !== people && table !== firms).flatMap(
    (archived) =>
      personColumns(archived.table).map(
        (column) =>
          sql`select ${column} from ${archived.table} where ${firmColumn(archived)} = ${firmId}`,
      ),
  );
  return sql`${people.id} in (${sql.join(named, sql` union `)})`;
};

const ofFirm = (archived: ArchivedTable, firmId: string): SQL => {
  if (archived.table === firms) return eq(firms.id, firmId);
  return archived.table === people ? peopleOf(firmId) : eq(firmColumn(archived), firmId);
};

/** The rows of a table in the order of their keys, some at a time. */
async function* rowsOf(tx: Db, archived: ArchivedTable, firmId: string): AsyncGenerator<Row[]> {
  const fields = Object.fromEntries(
    archivedColumns(archived).map(([name, column]) => [name, columnWritten(column)]),
  );
  const keys = keyColumns(archived.table);
  const { fileBy } = archived;
  if (fileBy === undefined) {
    const rows = await tx
      .select(fields)
      .from(archived.table)
      .where(ofFirm(archived, firmId))
      .orderBy(...keys.map((key) => asc(key)));
    yield rows as Row[];
    return;
  }
  const key = (archived.table as unknown as Record<string, PgColumn>)[fileBy];
  for (let last: string | undefined; ;) {
    const rows = (await tx
      .select(fields)
      .from(archived.table)
      .where(and(ofFirm(archived, firmId), last === undefined ? undefined : gt(key, last)))
      .orderBy(asc(key))
      .limit(ROWS_AT_ONCE)) as Row[];
    yield rows;
    if (rows.length < ROWS_AT_ONCE) return;
    last = String(rows[rows.length - 1][fileBy]);
  }
}

/**
 * Writes everything that a firm has as one ZIP archive: its rows as JSON files, but for secrets, as they stood at one moment,
 * and its photos as they are kept. A photo's file never changes, so files are read once the rows are; one that is lost is
 * named in `archive.json`. `write` takes the archive's bytes in order. Whatever reads it again is `importFirm`.
 */
export const exportFirm = async (
  db: Db,
  firmId: string,
  write: (bytes: Uint8Array) => void,
  files?: FileStore,
): Promise<void> => {
  const zip = new Zip((error, bytes) => {
    if (error) throw error;
    write(bytes);
  });
  const encoder = new TextEncoder();
  const add = (bytes: Uint8Array, file: ZipDeflate | ZipPassThrough) => {
    file.mtime = FILE_DATE;
    zip.add(file);
    file.push(bytes, true);
  };
  const addJson = (name: string, value: unknown) =>
    add(encoder.encode(`${JSON.stringify(value, null, 2)}\n`), new ZipDeflate(name, { level: 6 }));
  const counts: Record<string, number> = {};
  const photos = await db.transaction(
    async (tx) => {
      for (const archived of ARCHIVED_TABLES) {
        const { name, fileBy } = archived;
        counts[name] = 0;
        for await (const rows of rowsOf(tx, archived, firmId)) {
          counts[name] += rows.length;
          if (fileBy === undefined) addJson(`${name}.json`, rows);
          else for (const row of rows) addJson(`${name}/${String(row[fileBy])}.json`, row);
        }
      }
      return photoHashes(tx, firmId);
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
  const lost: string[] = [];
  for (const hash of photos) {
    const bytes = await (files ?? (await theFiles())).get(photoFile(firmId, hash));
    const name = `${PHOTO_FOLDER}/${hash}.jpg`;
    // Photos are packed already.
    if (bytes) add(bytes, new ZipPassThrough(name));
    else lost.push(hash);
  }
  addJson('archive.json', { schema: ARCHIVE_SCHEMA, firmId, counts, lost });
  zip.end();
};
