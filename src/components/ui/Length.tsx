import { lengthParts, type Display } from '@/paving/length';

/** A length as it is read: thin-spaced units, fractions of an inch set as fractions. */
export function Length({
  mm,
  display,
  decimals = 0,
  unit = true,
}: {
  mm: number;
  display: Display;
  decimals?: number;
  unit?: boolean;
}) {
  const parts = lengthParts(mm, display, decimals);
  return (
    <span className="whitespace-nowrap">
      {parts.negative && '−'}
      {parts.figures}
      {parts.fraction && (
        <>
          {parts.figures && '\u202f'}
          <span className="fraction">
            {parts.fraction[0]}/{parts.fraction[1]}
          </span>
        </>
      )}
      {parts.unit === 'mm' ? unit && '\u202fmm' : parts.unit}
    </span>
  );
}
