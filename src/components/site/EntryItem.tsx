import { useEffect, useState } from 'react';
import { Moment } from '../ui/Moment';
import type { PackEntry } from './pack-floor';
import { keptPicture } from './phone-store';
import { dropRefused, phoneStore } from './site-state';

/** One thing written down: what, by whom, when, and whether the server has it. */
export function EntryItem({ entry, words }: { entry: PackEntry; words: string }) {
  const { content, by, madeAt, standing, reason } = entry;
  return (
    <li className="py-3" data-testid="entry" data-standing={standing ?? 'sent'}>
      {content.kind === 'photo' && <Photo id={entry.id} caption={content.caption} />}
      <p className="break-words whitespace-pre-line">{words}</p>
      <p className="text-sm text-slate">
        {by.name}, <Moment iso={madeAt} />
        {standing === 'waiting' && (
          <span className="font-semibold text-amber"> · on this phone, not sent yet</span>
        )}
      </p>
      {standing === 'refused' && (
        <div className="mt-1 border-l-2 border-amber pl-3">
          <p className="text-amber">Not taken: {reason}</p>
          <button
            type="button"
            className="button button-quiet -ml-2"
            onClick={() => void dropRefused(entry.id)}
          >
            Throw it away
          </button>
        </div>
      )}
    </li>
  );
}

/** The small one that is kept here, or else the server's. */
function Photo({ id, caption }: { id: string; caption: string }) {
  const [src, setSrc] = useState<string | null>(null);
  const [gone, setGone] = useState(false);
  useEffect(() => {
    let made: string | null = null;
    let ended = false;
    const find = async () => {
      const store = phoneStore();
      const picture = store && (await keptPicture(store, id));
      if (ended) return;
      if (picture) made = URL.createObjectURL(new Blob([picture.small], { type: 'image/jpeg' }));
      setSrc(made ?? `/api/site-photos/${id}?size=phone`);
    };
    void find();
    return () => {
      ended = true;
      if (made) URL.revokeObjectURL(made);
    };
  }, [id]);
  if (gone) return <p className="text-slate">Photo: shown where there is signal.</p>;
  return src ? (
    <img
      src={src}
      alt={caption || 'Photo from site'}
      className="mb-1 max-h-64 max-w-full border border-stone-300"
      onError={() => setGone(true)}
    />
  ) : null;
}
