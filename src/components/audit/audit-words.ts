import type { AuditEntry } from '@/api-types/audit';

/** What is recorded, by its first part, in the words of the filter. */
export const AUDIT_SUBJECTS: readonly (readonly [what: string, name: string])[] = [
  ['version', 'Versions'],
  ['layout', 'Layouts'],
  ['project', 'Projects'],
  ['thread', 'Comments'],
  ['person', 'People'],
  ['invitation', 'Invitations'],
  ['quote', 'Quotes'],
  ['order', 'Orders'],
  ['item', 'The catalogue'],
  ['catalogue', 'Files read into the catalogue'],
  ['supplier', 'Suppliers'],
  ['firm', 'The firm'],
];

/** `version.change-asked` as `Version: change asked`. */
export function deedText(what: string): string {
  const [subject, deed = ''] = what.split('.');
  const first = subject.charAt(0).toUpperCase() + subject.slice(1);
  return `${first}${deed ? `: ${deed.replaceAll('-', ' ')}` : ''}`;
}

/** The page of what an entry is about, where it has one. */
export function subjectLink({ subject }: AuditEntry): string | null {
  const pages: Readonly<Record<string, string>> = {
    version: '/versions/',
    layout: '/layouts/',
    project: '/projects/',
  };
  return pages[subject.type] ? pages[subject.type] + subject.id : null;
}

/** Ids as the server makes them. */
const ID = /^[a-z0-9]{24}$/;

/** Details as they can be read; ids are left out. */
export function detailText(detail: AuditEntry['detail']): string {
  return Object.entries(detail)
    .filter(
      ([, value]) =>
        !ID.test(String(value)) && value !== '' && value !== null && typeof value !== 'object',
    )
    .map(([name, value]) => `${name.replace(/([A-Z])/g, ' $1').toLowerCase()} ${String(value)}`)
    .join(', ');
}
