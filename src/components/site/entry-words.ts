import { figuredText } from '@/paving/figured-words';
import { formatLength, type Display } from '@/paving/length';
import { checkById } from '@/paving/set-out/checks';
import { courseOfRow } from '@/paving/set-out/course-numbers';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import type { PackFloor } from './pack-floor';

/** What was written down, in a line; courses by the sheets' numbers, readings with what was to be measured. */
export const entryWords = (
  content: SiteEntryContent,
  { laying, setOut }: PackFloor,
  display: Display,
): string => {
  switch (content.kind) {
    case 'course': {
      const number = courseOfRow(setOut.courses, content.course)?.number ?? content.course;
      return content.laid ? `Course ${number} is laid.` : `Course ${number} is not laid after all.`;
    }
    case 'check': {
      const what = figuredText(
        checkById(laying, setOut, content.check)?.what ?? content.check,
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
