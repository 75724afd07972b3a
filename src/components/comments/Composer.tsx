import { useId, useRef, useState } from 'react';
import type { Mentionable } from '@/api-types/comments';
import { ROLE_WORDS } from '../ui/role-words';
import { mentionMatches, mentionPut, mentionQuery } from './mention-text';

interface Props {
  readonly label: string;
  readonly send: string;
  readonly people: readonly Mentionable[];
  readonly busy: boolean;
  readonly error?: Error | null;
  readonly onSend: (body: string) => Promise<unknown>;
  readonly onCancel?: () => void;
  readonly autoFocus?: boolean;
  readonly rows?: number;
}

/** Where a comment is written: @ offers the people who see this version, by name. */
export function Composer(props: Props) {
  const { label, send, people, busy, error, onSend, onCancel, autoFocus, rows = 2 } = props;
  const id = useId();
  const area = useRef<HTMLTextAreaElement>(null);
  const [text, setText] = useState('');
  const [caret, setCaret] = useState(0);
  const [picked, setPicked] = useState(0);
  const [closed, setClosed] = useState(false);
  const query = closed ? null : mentionQuery(text, caret);
  const matches = query ? mentionMatches(people, query.typed).slice(0, 6) : [];
  const at = Math.min(picked, matches.length - 1);

  const put = (person: Mentionable) => {
    if (!query) return;
    const next = mentionPut(text, query, person.name);
    setText(next.text);
    setCaret(next.caret);
    setPicked(0);
    requestAnimationFrame(() => {
      area.current?.focus();
      area.current?.setSelectionRange(next.caret, next.caret);
    });
  };
  const submit = async () => {
    if (text.trim() === '' || busy) return;
    try {
      await onSend(text.trim());
      setText('');
      setCaret(0);
    } catch {
      // What was typed stays; the error is shown below.
    }
  };
  const onKeyDown = (event: React.KeyboardEvent) => {
    if (matches.length > 0) {
      const moves: Record<string, () => void> = {
        ArrowDown: () => setPicked((at + 1) % matches.length),
        ArrowUp: () => setPicked((at + matches.length - 1) % matches.length),
        Enter: () => put(matches[at]),
        Tab: () => put(matches[at]),
        Escape: () => setClosed(true),
      };
      if (moves[event.key]) {
        event.preventDefault();
        event.stopPropagation();
        moves[event.key]();
        return;
      }
    }
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      void submit();
    }
    if (event.key === 'Escape') onCancel?.();
  };

  return (
    <form
      className="relative"
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <label htmlFor={id} className="sr-only">
        {label}
      </label>
      <textarea
        id={id}
        ref={area}
        className="field"
        rows={rows}
        maxLength={4000}
        placeholder={`${label}. @ mentions somebody.`}
        // The person asked for this field by a press.
        autoFocus={autoFocus}
        value={text}
        role="combobox"
        aria-autocomplete="list"
        aria-expanded={matches.length > 0}
        aria-controls={`${id}-people`}
        aria-activedescendant={matches.length > 0 ? `${id}-${at}` : undefined}
        onChange={(event) => {
          setText(event.target.value);
          setCaret(event.target.selectionStart);
          setClosed(false);
          setPicked(0);
        }}
        onSelect={(event) => setCaret(event.currentTarget.selectionStart)}
        onKeyDown={onKeyDown}
      />
      <ul
        id={`${id}-people`}
        role="listbox"
        aria-label="People to mention"
        hidden={matches.length === 0}
        className="absolute z-20 w-full border border-graphite bg-stone-50 not-[[hidden]]:block"
      >
        {matches.map((person, n) => (
          <li
            key={person.id}
            id={`${id}-${n}`}
            role="option"
            aria-selected={n === at}
            className={`flex min-h-9 cursor-pointer items-center justify-between gap-3 px-3 pointer-coarse:min-h-11 ${n === at ? 'bg-line-wash' : ''}`}
            onPointerDown={(event) => {
              event.preventDefault();
              put(person);
            }}
          >
            <span className="font-semibold">{person.name}</span>
            <span className="text-sm text-slate">{ROLE_WORDS[person.role]}</span>
          </li>
        ))}
      </ul>
      {error && (
        <p role="alert" className="mt-1 text-brick">
          {error.message} What you wrote is still here.
        </p>
      )}
      <div className="mt-2 flex gap-2">
        <button className="button button-primary" disabled={busy || text.trim() === ''}>
          {busy ? 'Sending …' : send}
        </button>
        {onCancel && (
          <button type="button" className="button button-quiet" onClick={onCancel}>
            Leave it
          </button>
        )}
      </div>
    </form>
  );
}
