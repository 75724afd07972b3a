import type { VersionState } from '@/api-types/versions';
import { Peg, statePeg } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { STATE_WORDS } from '../ui/version-words';

/** A version on the string: what a peg shows. */
export interface PegVersion {
  readonly id: string;
  readonly number: number;
  readonly label: string;
  readonly state: VersionState;
  readonly createdAt: string;
}

export interface PegLayout {
  readonly id: string;
  readonly name: string;
  /** Oldest first. */
  readonly versions: readonly PegVersion[];
}

interface Props {
  readonly layouts: readonly PegLayout[];
  readonly from: string;
  readonly to: string;
  readonly onPick: (side: 'from' | 'to', id: string) => void;
}

/** The versions of each layout as pegs on a string; any two are picked, the string between them is live. */
export function VersionString({ layouts, from, to, onPick }: Props) {
  return (
    <div className="space-y-6">
      {layouts.map((layout) => (
        <section key={layout.id} aria-label={`Versions of ${layout.name}`}>
          {layouts.length > 1 && <h3 className="mb-2 text-sm text-slate">{layout.name}</h3>}
          <OneString layout={layout} from={from} to={to} onPick={onPick} />
        </section>
      ))}
    </div>
  );
}

function OneString({ layout, from, to, onPick }: Omit<Props, 'layouts'> & { layout: PegLayout }) {
  const { versions } = layout;
  const places = [from, to].map((id) => versions.findIndex((version) => version.id === id));
  const [least, greatest] = [Math.min(...places), Math.max(...places)];
  const live = (n: number) => least >= 0 && n >= least && n < greatest;
  return (
    <ol className="flex overflow-x-auto pb-1">
      {versions.map((version, n) => {
        const picked = version.id === from || version.id === to;
        return (
          <li key={version.id} className="relative w-44 flex-[1_0_11rem] pr-4">
            <span
              aria-hidden="true"
              className={`absolute top-[8px] right-0 left-[7px] border-t-2 ${live(n) ? 'border-line' : 'border-stone-300'} ${n === versions.length - 1 ? 'opacity-40' : ''}`}
            />
            <Peg look={picked ? 'live' : statePeg(version.state)} className="relative" />
            <p className={`mt-2 font-bold ${picked ? 'text-line' : ''}`}>
              <a href={`/versions/${version.id}`} className="hover:underline">
                Version {version.number}
              </a>
            </p>
            <p className="leading-snug">{version.label}</p>
            <p className="text-sm text-slate">
              <Moment iso={version.createdAt} day />, {STATE_WORDS[version.state].toLowerCase()}
            </p>
            <div className="mt-2 flex">
              <Side side="from" version={version} picked={from} onPick={onPick} />
              <Side side="to" version={version} picked={to} onPick={onPick} />
            </div>
          </li>
        );
      })}
    </ol>
  );
}

function Side({
  side,
  version,
  picked,
  onPick,
}: {
  side: 'from' | 'to';
  version: PegVersion;
  picked: string;
  onPick: Props['onPick'];
}) {
  return (
    <label className="-ml-px inline-flex min-h-8 cursor-pointer items-center border border-slate px-3 text-sm first:ml-0 has-checked:z-10 has-checked:border-line has-checked:font-semibold has-checked:text-line has-focus-visible:outline-2 has-focus-visible:outline-offset-2 has-focus-visible:outline-line pointer-coarse:min-h-11">
      <input
        type="radio"
        name={side}
        className="sr-only"
        checked={picked === version.id}
        onChange={() => onPick(side, version.id)}
        aria-label={`${side === 'from' ? 'From' : 'To'} version ${version.number}, ${version.label}`}
      />
      {side === 'from' ? 'From' : 'To'}
    </label>
  );
}
