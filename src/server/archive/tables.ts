import { getTableColumns, is, sql, type SQL } from 'drizzle-orm';
import { getTableConfig, PgTimestamp, type PgColumn, type PgTable } from 'drizzle-orm/pg-core';
import * as schema from '@/db/schema';

/** A table of a firm's archive. */
export interface ArchivedTable {
  /** Names its file `name.json`, or its folder when each row is a file of its own. */
  readonly name: string;
  readonly table: PgTable;
  /** The column whose value names each row's file, for rows that hold a document. */
  readonly fileBy?: string;
  /** Left out: secrets, and what the database works out by itself. */
  readonly without?: readonly string[];
}

/** What an archive holds, in the order in which it can be put back: nothing refers to what comes after it. */
export const ARCHIVED_TABLES: readonly ArchivedTable[] = [
  { name: 'firm', table: schema.firms },
  { name: 'people', table: schema.people, without: ['passwordHash'] },
  { name: 'memberships', table: schema.memberships },
  { name: 'projects', table: schema.projects, without: ['stage', 'words'] },
  { name: 'project-people', table: schema.projectPeople },
  { name: 'firm-pricing', table: schema.firmPricing },
  { name: 'number-sequences', table: schema.numberSequences },
  { name: 'suppliers', table: schema.suppliers },
  { name: 'catalogue-items', table: schema.catalogueItems, without: ['words'] },
  { name: 'catalogue-prices', table: schema.cataloguePrices },
  { name: 'invitations', table: schema.invitations, without: ['tokenHash'] },
  { name: 'layouts', table: schema.layouts },
  { name: 'layout-prices', table: schema.layoutPrices },
  { name: 'versions', table: schema.versions, fileBy: 'id' },
  { name: 'version-events', table: schema.versionEvents },
  { name: 'version-pricings', table: schema.versionPricings, fileBy: 'versionId' },
  { name: 'quotes', table: schema.quotes, fileBy: 'id' },
  { name: 'purchase-orders', table: schema.purchaseOrders, fileBy: 'id' },
  { name: 'drafts', table: schema.drafts, fileBy: 'layoutId' },
  { name: 'set-aside-drafts', table: schema.setAsideDrafts, fileBy: 'id' },
  { name: 'acceptances', table: schema.acceptances },
  { name: 'choices', table: schema.choices },
  { name: 'choice-versions', table: schema.choiceVersions },
  { name: 'comments', table: schema.comments },
  { name: 'mentions', table: schema.mentions },
  { name: 'comment-reads', table: schema.commentReads },
  { name: 'site-entries', table: schema.siteEntries, fileBy: 'id' },
  { name: 'site-photos', table: schema.sitePhotos },
  { name: 'audit-events', table: schema.auditEvents },
];

/** Not archived, and why. A test holds that every table is in one of these two lists. */
export const NOT_ARCHIVED: readonly { readonly table: PgTable; readonly why: string }[] = [
  { table: schema.sessions, why: 'lets people in' },
  { table: schema.passwordResets, why: 'lets people in' },
  { table: schema.signInAttempts, why: 'belongs to no firm' },
  { table: schema.outbox, why: 'letters hold links that let people in, and are not sent twice' },
  { table: schema.draftPresence, why: 'is over in a minute' },
  {
    table: schema.siteKeys,
    why: 'unlocks what waits on phones; each is made anew when it is missing',
  },
];

/** The archived columns of a table, by the names that the archive gives them. */
export const archivedColumns = ({ table, without = [] }: ArchivedTable): [string, PgColumn][] =>
  Object.entries(getTableColumns(table)).filter(([name]) => !without.includes(name));

const IN_MICROSECONDS = 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"';

/** A moment as the archive writes it: ISO 8601 in UTC, to the microsecond, as the database holds it. */
export const columnWritten = (column: PgColumn): PgColumn | SQL =>
  is(column, PgTimestamp)
    ? sql`to_char(${column} at time zone 'UTC', ${sql.raw(`'${IN_MICROSECONDS}'`)})`
    : column;

export const isMoment = (column: PgColumn): boolean => is(column, PgTimestamp);

/** The columns that a table's rows are told apart by. */
export const keyColumns = (table: PgTable): PgColumn[] => {
  const { columns, primaryKeys } = getTableConfig(table);
  return primaryKeys.at(0)?.columns ?? columns.filter(({ primary }) => primary);
};

/** The columns of a table that name a person. */
export const personColumns = (table: PgTable): PgColumn[] =>
  getTableConfig(table).foreignKeys.flatMap((key) => {
    const { columns, foreignTable } = key.reference();
    return foreignTable === schema.people ? (columns as PgColumn[]) : [];
  });
