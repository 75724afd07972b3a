/** More courses than this are drawn as one length of string. */
const MOST_PEGS = 60;
const WIDTH = 600;
const HEIGHT = 30;

/** The courses as pegs on the string: what is laid is filled, and the string is tied up to it. */
export function ProgressString({
  courses,
}: {
  courses: readonly { readonly number: number; readonly laid: boolean }[];
}) {
  const n = courses.length;
  const laid = courses.filter((course) => course.laid).length;
  const at = (index: number) => 8 + ((WIDTH - 16) * (index + 0.5)) / n;
  const half = Math.min(6, ((WIDTH - 16) / n) * 0.36);
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="w-full"
      role="img"
      aria-label={`${laid} of ${n} courses laid.`}
    >
      <path d={`M0 9H${WIDTH}`} stroke="var(--slate)" strokeWidth="1.5" />
      {n > MOST_PEGS ? (
        <path d={`M8 9H${8 + ((WIDTH - 16) * laid) / n}`} stroke="var(--vial)" strokeWidth="9" />
      ) : (
        courses.map((course, index) => (
          <path
            key={course.number}
            d={`M${at(index) - half} 3h${2 * half}l${-half * 0.4} 22h${-half * 1.2}z`}
            fill={course.laid ? 'var(--vial)' : 'var(--peg-empty)'}
            stroke="var(--graphite)"
          />
        ))
      )}
    </svg>
  );
}
