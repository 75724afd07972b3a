/** The migrated, empty database that each test file's own is copied from. */
export const TEMPLATE = 'template_evenlay';
