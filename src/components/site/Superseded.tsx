import { TriangleAlert } from 'lucide-react';
import type { SitePack } from '@/api-types/site';
import { dayOf } from '../ui/times';

/** Loud, and at the head of every part: a crew must never build a superseded plan. */
export function Superseded({ pack }: { pack: SitePack }) {
  if (pack.state === 'issued') return null;
  const by = pack.supersededBy;
  return (
    <div role="alert" className="contents text-brick">
      {/* Stays in sight: it may come while somebody is far down the courses. */}
      <p className="sticky top-0 z-20 flex items-center gap-2 bg-brick-wash px-4 py-3 text-[1.25rem] leading-tight font-bold">
        <TriangleAlert size={24} aria-hidden className="shrink-0" />
        Superseded. Do not build from this plan.
      </p>
      <div className="border-b-2 border-brick bg-brick-wash px-4 pb-3">
        <p>
          {by
            ? `Version ${by.number} was issued in its place on ${dayOf(by.at)}. `
            : 'Another version was issued in its place. '}
          What you enter here is still kept and sent.
        </p>
        {by && (
          <a className="button mt-2 border-brick text-brick" href={`/site/${by.id}`}>
            Open version {by.number}
          </a>
        )}
      </div>
    </div>
  );
}
