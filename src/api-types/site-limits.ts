/** Entries sent at a time. */
export const ENTRIES_AT_ONCE = 50;

/** No photo may be larger as it is sent, bytes. */
export const PHOTO_LIMIT = 12 * 1024 * 1024;

/** Issued versions in the list of what may be kept on a phone. */
export const PACKS_LISTED = 60;
