import type { LetteringGap } from '@/sheets/lettering-gaps';

const MOST_SHOWN = 12;

/** Says which texts of the plan print with a question mark for letters that its typeface lacks. */
export function LetteringNote({ gaps }: { gaps: readonly LetteringGap[] }) {
  if (gaps.length === 0) return null;
  const names = gaps.map(({ of }) => of);
  const last = names[names.length - 1];
  const list = names.length === 1 ? last : `${names.slice(0, -1).join(', ')} and ${last}`;
  const letters = [...new Set(gaps.flatMap(({ characters }) => characters))];
  const shown = letters.slice(0, MOST_SHOWN).join(' ');
  return (
    <p role="note" className="w-full bg-amber-wash px-3 py-2 wrap-break-word">
      Some letters of {list} are not in the drawing’s typeface and print as “?”: {shown}
      {letters.length > MOST_SHOWN && ' …'}
    </p>
  );
}
