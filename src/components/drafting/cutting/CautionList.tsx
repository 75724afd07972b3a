import { TriangleAlert } from 'lucide-react';
import type { CuttingCaution } from '@/takeoff/cutting-cautions';

const WEIGHTS: Readonly<Record<CuttingCaution['weight'], string>> = {
  wrong: 'Do not lay it so',
  look: 'Look at this',
  caution: 'Take care',
};

/** What pieces and saw call for, the gravest first, each with who says so. */
export function CautionList({ cautions }: { cautions: readonly CuttingCaution[] }) {
  const order = Object.keys(WEIGHTS);
  const sorted = [...cautions].sort((a, b) => order.indexOf(a.weight) - order.indexOf(b.weight));
  return (
    <ul className="space-y-2 text-sm" aria-label="Cautions">
      {sorted.map(({ id, weight, words, source }) => (
        <li
          key={id}
          className={`px-3 py-2 ${weight === 'wrong' ? 'bg-brick-wash' : 'bg-amber-wash'}`}
        >
          <p
            className={`flex items-center gap-1.5 font-bold ${weight === 'wrong' ? 'text-brick' : 'text-amber'}`}
          >
            <TriangleAlert size={15} aria-hidden /> {WEIGHTS[weight]}
          </p>
          <p>{words}</p>
          <p className="mt-0.5 text-slate">Source: {source}.</p>
        </li>
      ))}
    </ul>
  );
}
