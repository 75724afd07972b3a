import type { SiteEntryContent } from '@/paving/site/site-entry';

/** What was written down, in a line. Readings are given with their check elsewhere. */
export const entryWords = (content: SiteEntryContent): string => {
  switch (content.kind) {
    case 'course':
      return content.laid
        ? `Course ${content.course} is laid.`
        : `Course ${content.course} is not laid after all.`;
    case 'check':
      return content.measured === null
        ? `Reading of ${content.check} taken back.`
        : `Reading of ${content.check}.`;
    case 'note':
      return content.text;
    case 'photo':
      return content.caption || 'Photo';
    case 'proposal':
      return `Proposed to the designer: ${content.text}`;
  }
};
