/**
 * Every row of a firm carries `firm_id`, and references between rows of a firm are composite, so that
 * the database itself refuses a layout whose project belongs to another firm. SQL is kept to
 * what PostgreSQL 15 has, since the same migrations run on PGlite and on a PostgreSQL server.
 */
export * from './schema/agreement';
export * from './schema/audit';
export * from './schema/catalogue';
export * from './schema/comments';
export * from './schema/drafts';
export * from './schema/entering';
export * from './schema/firm-pricing';
export * from './schema/firms';
export * from './schema/layout-prices';
export * from './schema/layouts';
export * from './schema/outbox';
export * from './schema/projects';
export * from './schema/purchase-orders';
export * from './schema/quotes';
export * from './schema/sessions';
export * from './schema/site';
export * from './schema/versions';
