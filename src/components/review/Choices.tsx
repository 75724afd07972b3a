import { useQuery } from '@tanstack/react-query';
import type { Agreement } from '@/api-types/agreement';
import type { VersionDetail, VersionWithDrawing } from '@/api-types/versions';
import { formatLength } from '@/paving/length';
import { formatCount } from '@/paving/count';
import { useChoices } from '../choices/use-choices';
import { compareLink } from '../compare/compare-link';
import { api } from '../ui/api';
import { FloorDrawing } from '../ui/FloorDrawing';
import { STATE_WORDS } from '../ui/version-words';

/** The other floors that this person may choose from, with the way to compare each with this one. */
export function Choices({
  version,
  client,
  agreement,
}: {
  version: VersionDetail;
  client: boolean;
  agreement: Agreement | undefined;
}) {
  const offered = useChoices(version.projectId);
  const { data: ofLayout = [] } = useQuery({
    queryKey: ['versions', version.layoutId],
    queryFn: () =>
      api<{ versions: VersionWithDrawing[] }>(
        'GET',
        `/api/layouts/${version.layoutId}/versions`,
      ).then((answer) => answer.versions),
    enabled: !client,
  });
  // The firm sees what else there is of this layout; a client what is put before them, in that order.
  const all = client
    ? (offered.data?.versions ?? [])
    : ofLayout.map((other) => ({ ...other, layoutName: version.layoutName }));
  const shown = all.filter(({ id }) => id !== version.id);
  if (shown.length === 0) return null;
  return (
    <section aria-label={client ? 'Your choices' : 'Other versions'}>
      <h2 className="border-b border-graphite pb-1 text-base">
        {client ? 'Your other choices' : 'Other versions'}
      </h2>
      <ul className="hairlines border-b border-stone-300">
        {shown.map((other) => (
          <li key={other.id} className="flex gap-3 py-3">
            <span className="block w-24 shrink-0">
              <FloorDrawing document={other.document} width={96} height={72} />
            </span>
            <div className="min-w-0">
              <a href={`/versions/${other.id}`} className="font-semibold hover:text-line">
                {other.number}. {other.label}
              </a>
              {other.layoutId !== version.layoutId && (
                <p className="text-sm text-slate">{other.layoutName}</p>
              )}
              <p className="text-sm">
                {formatCount(other.figures.wholeUnits)} {client ? 'pieces' : 'whole units'}
                {other.figures.leastGap !== null &&
                  `, ${formatLength(other.figures.leastGap, other.document.display)} ${client ? 'from the edge' : 'least gap'}`}
                <span className="text-slate">
                  {' · '}
                  {STATE_WORDS[other.state]}
                  {agreement?.issued?.id === other.id && ', the one that is built'}
                </span>
              </p>
              <a
                className="link text-sm"
                href={
                  other.layoutId !== version.layoutId || other.number < version.number
                    ? compareLink(other.id, version.id)
                    : compareLink(version.id, other.id)
                }
              >
                Compare with this
              </a>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}
