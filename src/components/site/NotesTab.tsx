import { Camera } from 'lucide-react';
import { useId, useRef, useState } from 'react';
import { entriesInOrder } from '@/paving/site/site-record';
import { entryWords } from './entry-words';
import { EntryItem } from './EntryItem';
import type { TabProps } from './PackView';
import { photoShrunk } from './photo-shrink';
import { enter } from './site-state';

/** Entries listed before the rest is asked for. */
const FIRST = 20;

/** Notes and photos for whoever comes after, and all that was written down, newest first. */
export function NotesTab({ kept, floor, entries, display }: TabProps) {
  const id = useId();
  const [text, setText] = useState('');
  const [said, setSaid] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const file = useRef<HTMLInputElement>(null);
  const words = text.trim();

  const keepNote = async () => {
    if (words === '') return setSaid('Write something first.');
    if (await enter(kept.versionId, [{ content: { kind: 'note', text: words } }])) {
      setText('');
      setSaid('Kept.');
    }
  };
  const keepPhoto = async (taken: File) => {
    setBusy(true);
    setSaid('Making the photo smaller …');
    const shrunk = await photoShrunk(taken);
    if (!shrunk.ok) setSaid(shrunk.why);
    else {
      const { full, small } = shrunk;
      const content = { kind: 'photo', caption: words.slice(0, 300) } as const;
      if (await enter(kept.versionId, [{ content, picture: { full, small } }])) {
        setText('');
        setSaid('The photo is kept.');
      }
    }
    setBusy(false);
  };
  const all = [...entriesInOrder(entries)].reverse();
  const item = (entry: (typeof all)[number]) => (
    <EntryItem key={entry.id} entry={entry} words={entryWords(entry.content, floor, display)} />
  );
  return (
    <section aria-label="Notes and photos">
      <h2>Notes and photos</h2>
      <label htmlFor={id} className="field-label mt-3">
        What is worth knowing, or what the photo shows
      </label>
      <textarea
        id={id}
        className="field min-h-24"
        maxLength={2000}
        value={text}
        onChange={(event) => {
          setText(event.target.value);
          setSaid(null);
        }}
      />
      <div className="mt-3 flex flex-wrap gap-3">
        <button
          type="button"
          className="button button-primary min-h-12 flex-1"
          disabled={busy}
          onClick={() => file.current?.click()}
        >
          <Camera size={20} aria-hidden />
          Take a photo
        </button>
        <button
          type="button"
          className="button min-h-12 flex-1"
          disabled={busy}
          onClick={() => void keepNote()}
        >
          Keep the note
        </button>
        <input
          ref={file}
          type="file"
          accept="image/*"
          capture="environment"
          aria-label="A photo from the camera"
          className="sr-only"
          tabIndex={-1}
          onChange={(event) => {
            const [taken] = event.target.files ?? [];
            // The same photo may be chosen again.
            event.target.value = '';
            if (taken) void keepPhoto(taken);
          }}
        />
      </div>
      <p role="status" className="mt-2 min-h-6">
        {said}
      </p>
      <p className="text-sm text-slate">
        The firm sees these; the client does not. Where a photo was taken is not sent with it.
      </p>
      <h3 className="mt-6 border-b border-graphite pb-1">Written down for this plan</h3>
      {all.length === 0 && (
        <p className="mt-3 text-slate">
          Nothing yet. Ticks, readings, notes and photos are listed here, newest first.
        </p>
      )}
      <ol className="hairlines">{all.slice(0, FIRST).map(item)}</ol>
      {all.length > FIRST && (
        <details>
          <summary className="flex min-h-11 items-center font-semibold">
            {all.length - FIRST} earlier
          </summary>
          <ol className="hairlines">{all.slice(FIRST).map(item)}</ol>
        </details>
      )}
    </section>
  );
}
