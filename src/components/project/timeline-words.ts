import type { TimelineEntry } from '@/api-types/timeline';

const DEEDS: Record<TimelineEntry['kind'], string> = {
  saved: 'saved',
  shared: 'shared',
  accepted: 'accepted',
  change_asked: 'asked for a change to',
  issued: 'issued',
  superseded: 'superseded',
  commented: 'commented on',
  replied: 'replied on',
};

/** What somebody did, between their name and the version's. */
export const deedWords = (entry: TimelineEntry): string => DEEDS[entry.kind];

/** Where an entry leads: to the version, and to the thread if it is a comment. */
export const entryLink = (entry: TimelineEntry): string =>
  'threadId' in entry
    ? `/versions/${entry.version.id}?thread=${entry.threadId}`
    : `/versions/${entry.version.id}`;

export const entryText = (entry: TimelineEntry): string =>
  'body' in entry ? entry.body : entry.note;
