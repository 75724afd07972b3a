import { useState } from 'react';
import type { LiveState } from '@/api-types/live';
import type { VersionDetail } from '@/api-types/versions';
import { compareLink } from '../compare/compare-link';

/** Said when a newer version of the layout appears while this one is open. */
export function NewerVersion({
  version,
  live,
  client,
}: {
  version: VersionDetail;
  live: LiveState | null;
  client: boolean;
}) {
  const versions = live?.layouts.find(({ id }) => id === version.layoutId)?.versions ?? [];
  const [first, setFirst] = useState<number | null>(null);
  const newest = versions.reduce((most, { number }) => Math.max(most, number), 0);
  if (first === null && newest > 0) setFirst(newest);
  const fresh = versions.find(({ number }) => number === newest);
  if (first === null || newest <= first || !fresh || fresh.id === version.id) return null;
  return (
    <p role="status" className="border-l-2 border-line pl-3">
      Version {fresh.number} was just {client ? 'shared' : 'saved'}.{' '}
      <a className="link" href={`/versions/${fresh.id}`}>
        Open it
      </a>{' '}
      or{' '}
      <a className="link" href={compareLink(version.id, fresh.id)}>
        compare
      </a>
      .
    </p>
  );
}
