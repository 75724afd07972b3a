import type { CutReport } from '@/paving/cutting/cut-report';
import type { Laying } from '@/paving/laying';
import type { Report } from '@/paving/report';
import { moneyTimes } from './money';
import type { PriceList } from './price-list';
import { takeOff } from './take-off';
import { bondUnits, unitMass } from './unit-lines';

/**
 * What the saw's time is reckoned with. All of it is common practice, to be typed over by whoever knows
 * their saw: nobody publishes a pace for every stone.
 */
export interface SawTerms {
  /** Along the cut, m/min. */
  readonly pace: number;
  /** Measuring, marking, carrying and trying, for each cut, min. */
  readonly minutesACut: number;
  /** Of the saw in the hand, m/s²; 0 for a saw on a bench. */
  readonly vibration: number;
  /** Labour by the hour, minor units of the firm's currency; null where nobody has said: then the firm's own hour counts. */
  readonly hourMinor: number | null;
}

/** Common practice, no source: wet cutting of 50 mm concrete at a walking crew's pace. */
export const USUAL_SAW: SawTerms = { pace: 0.5, minutesACut: 2, vibration: 5, hourMinor: null };

/** Greatest values that can be typed, and no less than which. */
export const SAW_RANGES = {
  pace: [0.01, 20],
  minutesACut: [0, 60],
  vibration: [0, 50],
} as const;

/** Daily exposure to hand-arm vibration, m/s² A(8), from which an employer must act: Directive 2002/44/EC, article 3. */
export const VIBRATION_ACTION = 2.5;
/** Daily exposure that must not be passed: the same article. */
export const VIBRATION_LIMIT = 5;

/** Hours in the hand after which a day's exposure reaches `exposure`: A(8) = a √(T / 8 h). */
export const vibrationHours = (vibration: number, exposure: number): number =>
  vibration > 0 ? 8 * (exposure / vibration) ** 2 : Infinity;

/** One of the two floors. Areas in m², lengths in m, times in min; money in minor units, null without a price. */
export interface FloorCost {
  /** Whole units to buy, spares not counted: laid ones and those that pieces are sawn from. */
  readonly units: number;
  /** Of those, to be sawn. */
  readonly sawnUnits: number;
  readonly pieces: number;
  /** What aggregate takes. */
  readonly aggregate: number;
  /** Of units bought, what is thrown away. */
  readonly waste: number;
  readonly wasteKg: number;
  readonly sawLength: number;
  readonly cuts: number;
  readonly sawMinutes: number;
  /** All that is ordered, with spares and whole packs, as the take-off has it; null when any of it has no price. */
  readonly materialsMinor: number | null;
  /** Names of what has no price yet; empty also where there is no list. */
  readonly unpriced: readonly string[];
  readonly labourMinor: number | null;
}

/** The same floor whole and cut, side by side. */
export interface CuttingComparison {
  readonly whole: FloorCost;
  readonly cut: FloorCost;
  /** ISO 4217; null without a price list. */
  readonly currency: string | null;
}

const MM_PER_M = 1000;
const MINUTES_PER_HOUR = 60;

/** Minutes at the saw. */
export const sawMinutes = (
  { sawLength, cuts }: Pick<CutReport, 'sawLength' | 'cuts'>,
  { pace, minutesACut }: Pick<SawTerms, 'pace' | 'minutesACut'>,
): number => sawLength / MM_PER_M / pace + cuts * minutesACut;

function materials(laying: Laying, report: Report, prices: PriceList | null) {
  if (!prices) return { materialsMinor: null, unpriced: [] };
  const { costMinor, orders, unpriced } = takeOff(laying, report, prices);
  return {
    materialsMinor: unpriced.length === 0 ? costMinor : null,
    unpriced: orders.filter(({ id }) => unpriced.includes(id)).map(({ name }) => name),
  };
}

/** Mass of what is thrown away, kg: each kind of unit by its own. */
function wasteKg(laying: Laying, cut: CutReport, prices: PriceList | null): number {
  return bondUnits(laying).reduce((sum, unit) => {
    const sawn = cut.byUnit[unit.id] ?? 0;
    if (sawn === 0) return sum;
    const unitArea = (unit.length * unit.width) / 1e6;
    const kept = cut.pieces.reduce(
      (area, piece) => (laying.motif[piece.unit[2]].unit.id === unit.id ? area + piece.area : area),
      0,
    );
    return sum + (sawn - kept / unitArea) * unitMass(laying, unit, prices).kg;
  }, 0);
}

/**
 * The same floor, from the same start, laid of whole units alone and with its edge cut: units, waste,
 * time at the saw and money side by side. Whatever the document says of cutting, both are worked out.
 *
 * @param whole the report of the whole units
 * @param cut what cutting at the edge comes to
 */
export function cuttingComparison(
  laying: Laying,
  whole: Omit<Report, 'cut'>,
  cut: CutReport,
  prices: PriceList | null,
  terms: SawTerms = USUAL_SAW,
): CuttingComparison {
  const minutes = sawMinutes(cut, terms);
  return {
    currency: prices?.currency ?? null,
    whole: {
      units: whole.wholeUnits,
      sawnUnits: 0,
      pieces: 0,
      aggregate: whole.fillArea,
      waste: 0,
      wasteKg: 0,
      sawLength: 0,
      cuts: 0,
      sawMinutes: 0,
      ...materials(laying, whole, prices),
      labourMinor: 0,
    },
    cut: {
      units: whole.wholeUnits + cut.wholeUnits,
      sawnUnits: cut.wholeUnits,
      pieces: cut.count,
      aggregate: cut.fillArea,
      waste: cut.waste,
      wasteKg: wasteKg(laying, cut, prices),
      sawLength: cut.sawLength / MM_PER_M,
      cuts: cut.cuts,
      sawMinutes: minutes,
      ...materials(laying, { ...whole, cut }, prices),
      labourMinor:
        terms.hourMinor === null
          ? null
          : moneyTimes(minutes / MINUTES_PER_HOUR, terms.hourMinor, 'halfUp'),
    },
  };
}
