import type { Role } from '@/api-types/people';
import type { VersionDetail } from '@/api-types/versions';
import { Moment } from '../ui/Moment';
import type { StandingEntry } from './standing';
import { TakeProposal } from './TakeProposal';

/** A note, photo or proposal of the crew's. */
export function SiteNote({
  entry,
  version,
  role,
}: {
  entry: StandingEntry;
  version: VersionDetail;
  role: Role;
}) {
  const { content, by, madeAt, id } = entry;
  return (
    <li className="py-2" data-testid="site-note">
      {content.kind === 'photo' && (
        <a href={`/api/site-photos/${id}`} target="_blank" rel="noreferrer">
          <img
            src={`/api/site-photos/${id}?size=phone`}
            alt={content.caption || `Photo by ${by.name}`}
            loading="lazy"
            className="max-h-52 max-w-full border border-stone-300"
          />
        </a>
      )}
      {content.kind === 'photo' && content.caption && <p className="mt-1">{content.caption}</p>}
      {content.kind === 'note' && <p className="break-words whitespace-pre-line">{content.text}</p>}
      {content.kind === 'proposal' && (
        <>
          <p className="font-semibold">The crew proposes another floor for the rest</p>
          <p className="mt-1 break-words">{content.text}</p>
          {(role === 'owner' || role === 'designer') && (
            <TakeProposal entryId={id} layoutId={version.layoutId} />
          )}
        </>
      )}
      <p className="text-sm text-slate">
        {by.name}, <Moment iso={madeAt} />
      </p>
    </li>
  );
}
