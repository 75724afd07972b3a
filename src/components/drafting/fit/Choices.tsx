import { useMemo } from 'react';
import type { FitChoice } from '@/paving/fit/fit';
import { formatCount } from '@/paving/count';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { floorThumbnailSvg } from '@/sheets/floor-thumbnail';
import { choicesShown } from './choices-shown';

interface Props {
  readonly choices: readonly FitChoice[];
  readonly document: LayoutDocument;
  readonly chosen: FitChoice | null;
  readonly onChoice: (choice: FitChoice) => void;
}

/** As many as are taken in at a glance. */
const SHOWN = 6;

/** The trade-off between most units and most play, as a short list with small drawings. */
export function Choices({ choices, document, chosen, onChoice }: Props) {
  const { ground, units, bond, tones, aggregate, clearance, placement } = document;
  const shown = useMemo(
    () =>
      choicesShown(choices, SHOWN).map((choice) => ({
        choice,
        picture: floorThumbnailSvg(
          { ...document, placement: choice.placement, lifted: [], cutting: 'none' },
          56,
          44,
        ),
      })),
    // Where the pattern stands is the choice's own: dragging the floor draws none of them anew.
    [choices, ground, units, bond, tones, aggregate, clearance, placement.turn],
  );
  return (
    <ul className="hairlines border-y border-stone-300">
      {shown.map(({ choice, picture }) => (
        <li key={choice.wholeUnits}>
          <button
            type="button"
            aria-pressed={choice === chosen}
            onClick={() => onChoice(choice)}
            className={`flex min-h-14 w-full items-center gap-3 px-2 py-1 text-left hover:bg-stone-100 ${
              choice === chosen ? 'outline-2 -outline-offset-2 outline-line' : ''
            }`}
          >
            <span
              className="block w-14 shrink-0"
              aria-hidden="true"
              dangerouslySetInnerHTML={{ __html: picture }}
            />
            <span className="flex-1">
              <b>{formatCount(choice.wholeUnits)}</b> whole
            </span>
            <span className="text-slate">
              play ±
              {formatLength(choice.play, document.display, { decimals: choice.play < 10 ? 1 : 0 })}
            </span>
          </button>
        </li>
      ))}
    </ul>
  );
}
