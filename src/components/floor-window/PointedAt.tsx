import type { Point } from '@/geometry/point';

/** A cross where the hand points in the window beside this one. */
export function PointedAt({ at }: { at: Point | null }) {
  if (!at) return null;
  return (
    <svg
      aria-hidden="true"
      width="22"
      height="22"
      viewBox="-11 -11 22 22"
      className="pointer-events-none absolute top-0 left-0"
      style={{ transform: `translate(${at[0] - 11}px, ${at[1] - 11}px)` }}
    >
      <path d="M-11 0H-3M3 0H11M0-11V-3M0 3V11" stroke="var(--line)" strokeWidth="1.6" />
    </svg>
  );
}
