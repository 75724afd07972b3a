/** Evenlay's mark: two pegs, the string between them, and a unit under the string. */
export function Mark({ size = 26 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 28 28" aria-hidden="true" className="shrink-0">
      <path d="M2 4h6l-1.2 20H3.4z M20 4h6l-1.4 20h-3.4z" fill="var(--graphite)" />
      <path d="M7.6 8.5h12.6" stroke="var(--line)" strokeWidth="1.8" />
      <path d="M14 12.2l4.6 4.6-4.6 4.6-4.6-4.6z" fill="var(--graphite)" />
    </svg>
  );
}
