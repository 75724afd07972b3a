import { formatCount } from '@/paving/count';
import { formatLength } from '@/paving/length';
import { compareLink } from '../compare/compare-link';
import { FloorDrawing } from '../ui/FloorDrawing';
import { STATE_WORDS } from '../ui/version-words';
import { Wrong } from '../ui/Wrong';
import { useChoices } from './use-choices';

/** A client's choices side by side, in the order in which they are put before them. */
export function YourChoices({ projectId }: { projectId: string }) {
  const choices = useChoices(projectId);
  if (choices.error && !choices.data)
    return <Wrong error={choices.error} again={() => void choices.refetch()} className="mb-8" />;
  const versions = choices.data?.versions ?? [];
  const picked = choices.data?.picked ?? null;
  // One version that nobody picked is no choice: it stands with its layout.
  if (versions.length < (picked ? 1 : 2)) return null;
  return (
    <section aria-label="Your choices" className="border-t-2 border-graphite pt-4">
      <h2>{versions.length === 1 ? 'The floor put before you' : 'Your choices'}</h2>
      {picked?.note && <p className="mt-1 max-w-2xl whitespace-pre-line">{picked.note}</p>}
      <ol className="mt-3 grid gap-x-6 gap-y-8 sm:grid-cols-2 lg:grid-cols-3">
        {versions.map((version, n) => (
          <li key={version.id} className="min-w-0" data-testid="your-choice">
            <a
              href={`/versions/${version.id}`}
              className="flex h-44 items-center justify-center border border-stone-300 p-4 hover:border-line"
              aria-label={`Look at ${version.label}`}
            >
              <FloorDrawing
                document={version.document}
                width={240}
                height={150}
                className="w-full max-w-60"
              />
            </a>
            <p className="mt-2">
              <a className="font-semibold hover:text-line" href={`/versions/${version.id}`}>
                {version.label}
              </a>
              <span className="block text-sm text-slate">
                Version {version.number} of {version.layoutName} · {STATE_WORDS[version.state]}
              </span>
              <span className="block text-sm">
                {formatCount(version.figures.wholeUnits)} pieces
                {version.figures.leastGap !== null &&
                  `, ${formatLength(version.figures.leastGap, version.document.display)} from the edge`}
              </span>
            </p>
            {n > 0 && (
              <a
                className="link inline-flex min-h-11 items-center text-sm"
                href={compareLink(versions[0].id, version.id)}
              >
                Compare with the first
              </a>
            )}
          </li>
        ))}
      </ol>
    </section>
  );
}
