import { figuredText } from '@/paving/figured-words';
import { formatLength, type Display } from '@/paving/length';
import type { Check } from '@/paving/set-out/set-out';
import type { SiteEntryContent } from '@/paving/site/site-entry';

/** What was written down, in a line; readings with what was to be measured. */
export const entryWords = (
  content: SiteEntryContent,
  checks: readonly Pick<Check, 'id' | 'what'>[],
  display: Display,
): string => {
  switch (content.kind) {
    case 'course':
      return content.laid
        ? `Course ${content.course} is laid.`
        : `Course ${content.course} is not laid after all.`;
    case 'check': {
      const what = figuredText(
        checks.find(({ id }) => id === content.check)?.what ?? content.check,
        display,
      );
      return content.measured === null
        ? `${what}: reading taken back.`
        : `${what}: ${formatLength(content.measured, display, { decimals: 1 })}.`;
    }
    case 'note':
      return content.text;
    case 'photo':
      return content.caption || 'Photo';
    case 'proposal':
      return `Proposed to the designer: ${content.text}`;
  }
};
