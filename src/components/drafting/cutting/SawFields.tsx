import type { Display } from '@/paving/length';
import { SAW_RANGES, USUAL_SAW, type SawTerms } from '@/takeoff/cutting-cost';
import { M_PER_FOOT } from '@/takeoff/measures';
import { formatMoney, parseMoney } from '@/takeoff/money';
import { NumberField } from '../../ui/NumberField';
import { TypedField } from '../../ui/TypedField';

interface Props {
  readonly terms: SawTerms;
  readonly display: Display;
  readonly currency: string | null;
  /** What an hour costs the firm, minor units; null where it has not said. */
  readonly firmHour: number | null;
  readonly onTerms: (terms: SawTerms) => void;
}

/** What the saw's time and cost are reckoned with: assumptions, to be typed over. */
export function SawFields({ terms, display, currency, firmHour, onTerms }: Props) {
  const hour = terms.hourMinor ?? firmHour;
  const metres = display === 'metric';
  const pacePer = metres ? 1 : M_PER_FOOT;
  const between =
    (range: readonly [number, number], per: number, unit: string) => (value: number) => {
      const [least, most] = range.map((end) => Number((end / per).toPrecision(3)));
      return value < least || value > most ? `Between ${least} and ${most} ${unit}.` : null;
    };
  return (
    <details className="border-t border-stone-300 pt-2">
      <summary className="flex min-h-9 cursor-pointer items-center font-semibold pointer-coarse:min-h-11">
        What the saw’s time is reckoned with
      </summary>
      <p className="mt-1 text-sm text-slate">
        Assumptions, not measured: common practice for a wet saw in 50 mm concrete. Type your own;
        they are kept on this device.
      </p>
      <div className="mt-2 grid grid-cols-2 items-end gap-2">
        <NumberField
          label="Pace along the cut"
          value={terms.pace / pacePer}
          suffix={metres ? ' m/min' : ' ft/min'}
          refuse={between(SAW_RANGES.pace, pacePer, metres ? 'm/min' : 'ft/min')}
          onNumber={(value) => onTerms({ ...terms, pace: value * pacePer })}
        />
        <NumberField
          label="Marking, a cut"
          value={terms.minutesACut}
          suffix=" min"
          refuse={between(SAW_RANGES.minutesACut, 1, 'min')}
          onNumber={(minutesACut) => onTerms({ ...terms, minutesACut })}
        />
        <NumberField
          label="The saw’s vibration"
          value={terms.vibration}
          suffix=" m/s²"
          refuse={between(SAW_RANGES.vibration, 1, 'm/s²')}
          onNumber={(vibration) => onTerms({ ...terms, vibration })}
        />
        {currency && (
          <TypedField
            label="Labour, an hour"
            shown={hour === null ? '' : formatMoney(hour, currency)}
            inputMode="decimal"
            read={(text) => {
              const parsed = parseMoney(text, currency);
              return parsed.ok ? { ok: true, value: parsed.minor } : parsed;
            }}
            refuse={(minor) => (minor < 0 ? 'An hour cannot cost less than 0.' : null)}
            onValue={(hourMinor) => onTerms({ ...terms, hourMinor })}
          />
        )}
      </div>
      {currency && firmHour !== null && (
        <p className="mt-1 text-sm text-slate">
          {terms.hourMinor === null
            ? 'The hour is your firm’s, from its '
            : `Your firm’s hour is ${formatMoney(firmHour, currency)}, from its `}
          <a className="link" href="/catalogue/prices">
            prices and papers
          </a>
          .
        </p>
      )}
      {JSON.stringify(terms) !== JSON.stringify(USUAL_SAW) && (
        <button type="button" className="button mt-2 w-full" onClick={() => onTerms(USUAL_SAW)}>
          Back to the usual figures
        </button>
      )}
    </details>
  );
}
