import type { SheetPack } from '@/api-types/sheet-pack';
import { letteringGaps } from '@/sheets/lettering-gaps';
import { setOutMark } from '@/sheets/plan-input';
import { useMemo } from 'react';
import { LetteringNote } from '../version/LetteringNote';
import { versionPlanInput } from '../version/version-plan';
import { Moment } from '../ui/Moment';

/** Hosts that only the machine itself, or its own network, can reach. */
const isNear = (host: string): boolean =>
  host === 'localhost' || host === '127.0.0.1' || host === '[::1]' || host.endsWith('.localhost');

/** What to know about the pack before printing it. */
export function PackNotes({ pack }: { readonly pack: SheetPack }) {
  const { version, stamp } = pack;
  const gaps = useMemo(() => letteringGaps(versionPlanInput(pack, 'auto')), [pack]);
  const mark = setOutMark(version.state);
  return (
    <div className="space-y-2 text-slate">
      {version.state === 'issued' ? (
        <p>
          Issued <Moment iso={stamp.issuedAt!} />. Sheets give the time in UTC.
        </p>
      ) : (
        <p className="bg-amber-wash px-3 py-2 text-graphite">
          Every sheet says <strong>{mark}</strong>
          {version.state === 'superseded'
            ? `: version ${stamp.supersededBy?.number ?? ''} was issued in its place.`
            : ', until the client has accepted this version and it is issued.'}
        </p>
      )}
      <p>Print at 100&nbsp;%, not fitted to the page, or the scale is lost.</p>
      {pack.sheets === 'all' && isNear(new URL(stamp.currentUrl).hostname) && (
        <p>
          The QR code leads to this machine alone ({new URL(stamp.currentUrl).host}): phones on site
          can’t open it until whoever runs this site sets its public address.
        </p>
      )}
      <LetteringNote gaps={gaps} />
    </div>
  );
}
