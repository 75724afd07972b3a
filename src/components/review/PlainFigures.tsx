import type { VersionDetail } from '@/api-types/versions';
import { clientCautions, plainFigures } from './plain-figures';

export function PlainFigures({ version }: { version: VersionDetail }) {
  return (
    <section aria-label="What it is">
      <h2 className="border-b border-graphite pb-1 text-base">What you get</h2>
      <dl className="hairlines border-b border-stone-300">
        {plainFigures(version).map(({ name, value, meaning }) => (
          <div key={name} className="py-2">
            <div className="flex items-baseline justify-between gap-4">
              <dt className="font-semibold">{name}</dt>
              <dd className="font-bold whitespace-nowrap">{value}</dd>
            </div>
            <dd className="text-sm text-slate">{meaning}</dd>
          </div>
        ))}
      </dl>
      <ul className="mt-2 list-['–_'] space-y-1 pl-3 text-sm text-slate">
        {clientCautions(version).map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </section>
  );
}
