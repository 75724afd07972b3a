import type { Display } from '@/paving/length';
import { Length } from '../ui/Length';

/** A change of length, with its sign. */
export function Signed({ mm, display }: { mm: number; display: Display }) {
  return (
    <span className="whitespace-nowrap">
      {mm > 0 && '+'}
      <Length mm={mm} display={display} decimals={1} />
    </span>
  );
}
