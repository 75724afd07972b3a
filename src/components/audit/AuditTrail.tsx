import { useInfiniteQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { AuditPage } from '@/api-types/audit';
import type { PersonName } from '@/api-types/people';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { Moment } from '../ui/Moment';
import { SelectField } from '../ui/SelectField';
import { Wrong } from '../ui/Wrong';
import { AUDIT_SUBJECTS, deedText, detailText, subjectLink } from './audit-words';

interface Props {
  readonly first: AuditPage;
  readonly people: readonly PersonName[];
}

/** Who did what in the firm, newest first. */
export default function AuditTrail(props: Props) {
  return (
    <Queries>
      <Trail {...props} />
    </Queries>
  );
}

function Trail({ first, people }: Props) {
  const [what, setWhat] = useState('');
  const [person, setPerson] = useState('');
  const trail = useInfiniteQuery({
    queryKey: ['audit', what, person],
    queryFn: ({ pageParam }) =>
      api<AuditPage>(
        'GET',
        `/api/audit?${new URLSearchParams({
          ...(what ? { what } : {}),
          ...(person ? { person } : {}),
          ...(pageParam ? { after: pageParam } : {}),
        })}`,
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.next,
    initialData: what || person ? undefined : { pages: [first], pageParams: [''] },
    placeholderData: (before) => before,
  });
  const entries = trail.data?.pages.flatMap((page) => page.entries) ?? [];
  return (
    <>
      <div className="mt-5 grid grid-cols-2 gap-3 sm:flex">
        <SelectField
          label="About"
          value={what}
          onValue={setWhat}
          options={[['', 'Everything'], ...AUDIT_SUBJECTS]}
          className="sm:w-48"
        />
        <SelectField
          label="By"
          value={person}
          onValue={setPerson}
          options={[['', 'Everybody'], ...people.map(({ id, name }) => [id, name] as const)]}
          className="sm:w-56"
        />
      </div>
      <Wrong error={trail.error} again={() => void trail.refetch()} className="mt-4" />
      {trail.data && entries.length === 0 && (
        <p className="mt-6 text-slate">
          {what || person
            ? 'Nothing of this kind is recorded.'
            : 'Nothing is recorded yet. Whatever is saved, shared, accepted or changed in the firm is noted here.'}
        </p>
      )}
      {entries.length > 0 && (
        <table className={`mt-5 w-full ${trail.isPlaceholderData ? 'opacity-60' : ''}`}>
          <caption className="sr-only">Who did what, newest first</caption>
          <thead className="max-sm:sr-only">
            <tr className="border-b border-graphite text-left text-sm text-slate">
              <th scope="col" className="py-1 pr-4 font-normal">
                When
              </th>
              <th scope="col" className="py-1 pr-4 font-normal">
                Who
              </th>
              <th scope="col" className="py-1 pr-4 font-normal">
                What
              </th>
              <th scope="col" className="py-1 font-normal">
                More
              </th>
            </tr>
          </thead>
          <tbody className="hairlines border-b border-stone-300">
            {entries.map((entry) => {
              const link = subjectLink(entry);
              return (
                <tr key={entry.id} className="max-sm:grid max-sm:py-2 sm:[&>td]:py-2">
                  <td className="pr-4 whitespace-nowrap text-slate max-sm:text-sm">
                    <Moment iso={entry.at} />
                  </td>
                  <td className="pr-4 font-semibold sm:whitespace-nowrap">
                    {entry.person?.name ?? 'Evenlay itself'}
                  </td>
                  <td className="pr-4 sm:whitespace-nowrap">
                    {link ? (
                      <a className="link" href={link}>
                        {deedText(entry.what)}
                      </a>
                    ) : (
                      deedText(entry.what)
                    )}
                  </td>
                  <td className="min-w-0 w-1/2 text-sm break-words text-slate">
                    {detailText(entry.detail)}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      )}
      {trail.hasNextPage && (
        <button
          type="button"
          className="button mt-5"
          disabled={trail.isFetchingNextPage}
          onClick={() => void trail.fetchNextPage()}
        >
          {trail.isFetchingNextPage ? 'Reading …' : 'Show what was before'}
        </button>
      )}
    </>
  );
}
