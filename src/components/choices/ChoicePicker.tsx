import { ArrowDown, ArrowUp } from 'lucide-react';
import type { LayoutDocument } from '@/paving/layout-document';
import { FloorDrawing } from '../ui/FloorDrawing';

/** A version to pick, as the list names it. */
export interface Pickable {
  readonly id: string;
  readonly name: string;
  /** Where it stands, and of which layout it is. */
  readonly about: string;
  readonly document: LayoutDocument;
}

interface Props {
  readonly versions: readonly Pickable[];
  /** Ids of those that are picked, first to last. */
  readonly picked: readonly string[];
  readonly onPick: (picked: readonly string[]) => void;
  /** One that is put before the client in any case. */
  readonly fixed?: string;
}

const swapped = (ids: readonly string[], at: number, by: 1 | -1): readonly string[] => {
  const next = [...ids];
  [next[at], next[at + by]] = [next[at + by], next[at]];
  return next;
};

/** Versions with a tick for each that is put before the client, those first and in their order. */
export function ChoicePicker({ versions, picked, onPick, fixed }: Props) {
  const byId = new Map(versions.map((version) => [version.id, version]));
  const first = picked.flatMap((id) => byId.get(id) ?? []);
  const rest = versions.filter(({ id }) => !picked.includes(id));
  return (
    <ol className="hairlines border-y border-stone-300">
      {[...first, ...rest].map((version) => {
        const place = picked.indexOf(version.id);
        const moves = [
          ['Earlier', ArrowUp, -1, place > 0],
          ['Later', ArrowDown, 1, place >= 0 && place < picked.length - 1],
        ] as const;
        return (
          <li key={version.id} className="flex items-center gap-3 py-1.5" data-testid="choice">
            <label className="flex min-h-11 min-w-0 flex-1 items-center gap-3">
              <input
                type="checkbox"
                className="size-5 shrink-0 accent-line"
                checked={place >= 0}
                disabled={version.id === fixed}
                onChange={(event) =>
                  onPick(
                    event.target.checked
                      ? [...picked, version.id]
                      : picked.filter((id) => id !== version.id),
                  )
                }
              />
              <span className={`block w-14 shrink-0 ${place < 0 ? 'opacity-50' : ''}`}>
                <FloorDrawing document={version.document} width={96} height={72} />
              </span>
              <span className="min-w-0">
                <span className="block font-semibold">{version.name}</span>
                <span className="block text-sm text-slate">{version.about}</span>
              </span>
            </label>
            {place >= 0 && picked.length > 1 && (
              <span className="flex shrink-0">
                {moves.map(([name, Icon, by, may]) => (
                  <button
                    key={name}
                    type="button"
                    className="flex size-9 items-center justify-center hover:bg-stone-100 disabled:text-stone-300 max-md:size-11 pointer-coarse:size-11"
                    aria-label={`${name}: ${version.name}`}
                    disabled={!may}
                    onClick={() => onPick(swapped(picked, place, by))}
                  >
                    <Icon size={17} aria-hidden />
                  </button>
                ))}
              </span>
            )}
          </li>
        );
      })}
    </ol>
  );
}
