import type { Role } from '@/api-types/people';
import type { VersionDetail } from '@/api-types/versions';
import { readingVerdict, verdictWords } from '@/paving/site/reading-verdict';
import { FiguredWords } from '../ui/FiguredWords';
import { Moment } from '../ui/Moment';
import { Wrong } from '../ui/Wrong';
import { ProgressString } from './ProgressString';
import { SiteNote } from './SiteNote';
import { progressOf, useSiteStanding } from './standing';

/** Notes shown before the rest is asked for. */
const FIRST = 4;

/** How far an issued version is built: courses, readings and, for the firm, what the crew wrote down. */
export function OnSite({ version, role }: { version: VersionDetail; role: Role }) {
  const issued = version.events.some(({ kind }) => kind === 'issued');
  return issued ? <Standing version={version} role={role} /> : null;
}

function Standing({ version, role }: { version: VersionDetail; role: Role }) {
  const standing = useSiteStanding(version.id);
  const client = role === 'client';
  const progress = standing.data && progressOf(version.document, standing.data.entries);
  return (
    <section aria-label="On site" id="on-site" className="border-t border-graphite pt-3">
      <h2 className="text-base">On site</h2>
      {standing.isPending && <p className="mt-2 text-slate">Asking how the work goes …</p>}
      <Wrong error={standing.error} again={() => void standing.refetch()} className="mt-2" />
      {progress && (
        <>
          <p className="mt-1">
            <strong data-testid="courses-laid">
              {progress.laid} of {progress.courses.length} courses laid
            </strong>
            {progress.lastAt && (
              <span className="text-slate">
                {' '}
                · last heard of <Moment iso={progress.lastAt} />
              </span>
            )}
          </p>
          {progress.courses.length > 0 && (
            <div className="mt-2">
              <ProgressString courses={progress.courses} />
            </div>
          )}
          <p className="mt-1" data-testid="checks-measured">
            {progress.measured} of {progress.checks} checks measured
            {progress.measured > 0 &&
              (progress.wrong.length === 0
                ? ', all within their limits.'
                : `, ${progress.wrong.length} not within ${progress.wrong.length === 1 ? 'its' : 'their'} limits:`)}
          </p>
          <ul className="mt-1 space-y-1">
            {progress.wrong.map(({ check, reading }) => (
              <li key={check.id} className="border-l-2 border-brick pl-3">
                <FiguredWords words={check.what} display={version.document.display} />.{' '}
                <span className="font-semibold text-brick">
                  {verdictWords(readingVerdict(check, reading.measured), version.document.display)}
                </span>{' '}
                <span className="text-sm text-slate">
                  {reading.by.name}, <Moment iso={reading.madeAt} />
                </span>
              </li>
            ))}
          </ul>
          {!client && (
            <>
              <ul className="hairlines mt-2">
                {progress.notes.slice(0, FIRST).map((entry) => (
                  <SiteNote key={entry.id} entry={entry} version={version} role={role} />
                ))}
              </ul>
              {progress.notes.length > FIRST && (
                <details>
                  <summary className="flex min-h-11 items-center font-semibold">
                    {progress.notes.length - FIRST} earlier
                  </summary>
                  <ul className="hairlines">
                    {progress.notes.slice(FIRST).map((entry) => (
                      <SiteNote key={entry.id} entry={entry} version={version} role={role} />
                    ))}
                  </ul>
                </details>
              )}
              <p className="mt-2">
                <a className="button" href={`/site/${version.id}`}>
                  Open as on the phone
                </a>
              </p>
            </>
          )}
        </>
      )}
    </section>
  );
}
