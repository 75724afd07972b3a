import type { VersionState } from '@/api-types/versions';

export type PegLook = 'plain' | 'holds' | 'empty' | 'live';

const FILLS: Record<PegLook, string> = {
  plain: 'var(--graphite)',
  holds: 'var(--vial)',
  empty: 'var(--peg-empty)',
  live: 'var(--line)',
};

export const statePeg = (state: VersionState | 'draft'): PegLook =>
  state === 'accepted' || state === 'issued'
    ? 'holds'
    : state === 'superseded' || state === 'draft'
      ? 'empty'
      : 'plain';

/** A peg, as things in order hang on. */
export function Peg({ look = 'plain', className = '' }: { look?: PegLook; className?: string }) {
  return (
    <svg
      width="14"
      height="18"
      viewBox="0 0 14 18"
      aria-hidden="true"
      className={`shrink-0 ${className}`}
    >
      <path
        d="M1 1h12l-2.4 16H3.4z"
        fill={FILLS[look]}
        stroke={look === 'live' ? 'var(--line)' : 'var(--graphite)'}
      />
    </svg>
  );
}
