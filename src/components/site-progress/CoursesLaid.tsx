import type { LayoutDocument } from '@/paving/layout-document';
import { ProgressString } from './ProgressString';
import { progressOf, useSiteStanding } from './standing';

/** How far an issued version is built, in a line of a list. Says nothing until something is written down. */
export function CoursesLaid({
  versionId,
  document,
}: {
  versionId: string;
  document: LayoutDocument;
}) {
  const standing = useSiteStanding(versionId);
  if (!standing.data || standing.data.entries.length === 0) return null;
  const progress = progressOf(document, standing.data.entries);
  return (
    <a className="mt-1 block no-underline hover:text-line" href={`/versions/${versionId}#on-site`}>
      <span className="text-sm">
        {progress.laid} of {progress.courses.length} courses laid
        {progress.wrong.length > 0 && (
          <span className="font-semibold text-brick">
            {' '}
            · {progress.wrong.length} {progress.wrong.length === 1 ? 'reading' : 'readings'} not
            within
          </span>
        )}
      </span>
      <span className="mt-1 block max-w-md">
        <ProgressString courses={progress.courses} />
      </span>
    </a>
  );
}
