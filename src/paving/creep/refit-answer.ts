import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Address } from '../layout-document';
import { parseLayoutDocument } from '../layout-validation';
import { layFloor, type Laying } from '../laying';
import { stringStretches } from '../set-out/string-crossings';
import { unitFind } from '../unit-rows';
import type { ActualUnit, Refit } from './creep-types';
import { refitAdvice } from './refit-advice';
import { chosenDocument, type Choice, type RefitFloor } from './refit-floor';
import type { SearchResult } from './refit-search';
import { chordsNear, unitClearance } from './unit-clearance';
import { unitPlace, unitPlaces, unitTouch, type UnitAddress, type UnitPlaces } from './unit-places';

/** What the laying may differ by from the search, mm: units that fit by the tolerance alone are shrunk at their corners. */
const AGREEMENT_MM = LENGTH_TOLERANCE_MM / 2;

/** The answer, laid and measured by the ordinary laying. */
export function refitAnswer(
  laying: Laying,
  floor: RefitFloor,
  units: readonly ActualUnit[],
  choice: Choice,
  result: SearchResult | null,
): Refit {
  const { document, ground } = laying;
  const chosen = chosenDocument(laying, floor, units, choice);
  const parsed = parseLayoutDocument({ ...chosen, lifted: [] });
  if (!parsed.ok) {
    const { path, message } = parsed.problems[0];
    throw new Error(`the re-fit gives a document that is refused at ${path.join('.')}: ${message}`);
  }
  const laid = layFloor(parsed.document, ground);
  const places = unitPlaces(parsed.document, ground);
  const isLaid = (address: UnitAddress) => unitFind(laid.rows, laid.index.laid, address) >= 0;
  const dropped = floor.rest.filter((address) => !isLaid(address));
  const kept = floor.rest.filter(isLaid);
  // The search keeps a hair inside the tolerance: the laying may keep more, never fewer.
  if (result && kept.length < result.kept)
    throw new Error(
      `the re-fit found ${result.kept} units but the laying finds ${kept.length}, first unit at [${floor.at.join(', ')}], joints ${choice.joints.across} and ${choice.joints.along}`,
    );
  const leastGap = restGap(laying, places, kept);
  if (
    result &&
    kept.length === result.kept &&
    result.gap < Infinity &&
    leastGap !== null &&
    leastGap < result.gap - AGREEMENT_MM
  )
    throw new Error(
      `the re-fit found a least gap of ${result.gap} mm but ${leastGap} mm is measured, first unit at [${floor.at.join(', ')}]`,
    );
  const lifted = liftedFor(laying, laid, dropped);
  return {
    keepsAll: dropped.length === 0,
    toLay: floor.rest.length,
    dropped: dropped.map(([i, j, k]): Address => [i, j, k]),
    kept: kept.length,
    jointAcross: choice.joints.across,
    jointAlong: choice.joints.along,
    shift: choice.shift,
    leastGap,
    clearance: document.clearance,
    courses: restCourses(laying, floor, places, isLaid),
    document: { ...parsed.document, lifted },
    advice: refitAdvice(laying, floor, units, choice, dropped.length, leastGap, result),
  };
}

/** Least distance of those units to the edge, mm; null where there are none. */
function restGap(
  { ground }: Laying,
  places: UnitPlaces,
  kept: readonly UnitAddress[],
): number | null {
  if (kept.length === 0) return null;
  const placed = kept.map((address) => ({
    entry: places.motif[address[2]],
    at: unitPlace(places, address),
  }));
  const diagonal = Math.max(
    ...placed.map(({ entry }) => Math.hypot(entry.unit.length, entry.unit.width) / 2),
  );
  for (let band = 4 * diagonal; ; band *= 4) {
    let least = Infinity;
    for (const { entry, at } of placed) {
      const near = chordsNear(ground, ...at, diagonal, Math.min(band, least));
      if (near.length > 0) least = Math.min(least, unitClearance(ground, entry, at, near));
    }
    if (least <= band) return least;
  }
}

/** Units of the new pattern that are not to be laid: lifted before, dropped now, or whole only now. */
function liftedFor(laying: Laying, now: Laying, dropped: readonly UnitAddress[]): Address[] {
  const lifted = new Map<string, Address>();
  const add = (address: UnitAddress) =>
    lifted.set(address.join(), [address[0], address[1], address[2]]);
  laying.document.lifted.forEach(add);
  dropped.forEach(add);
  for (let n = 0; n < now.laid.count; n++) {
    const address: UnitAddress = [now.laid.i[n], now.laid.j[n], now.laid.k[n]];
    if (unitFind(laying.rows, laying.index.laid, address) < 0) add(address);
  }
  return [...lifted.values()];
}

/** The strings of the courses still to lay, as they come: each at the lowest of its units. */
function restCourses(
  { laid, ground }: Laying,
  floor: RefitFloor,
  places: UnitPlaces,
  isLaid: (address: UnitAddress) => boolean,
): Refit['courses'] {
  const { direction, normal } = places.strings;
  const strings = floor.left
    .flatMap(({ number, runs }) => {
      const touches = runs
        .flatMap((run) => run.laid)
        .map((unit): UnitAddress => [laid.i[unit], laid.j[unit], laid.k[unit]])
        .filter(isLaid)
        .map((address) => unitTouch(places, address, floor.at));
      if (touches.length === 0) return [];
      const v = Math.min(...touches.map((touch) => touch.v));
      const from = Math.min(...touches.map((touch) => touch.from));
      const to = Math.max(...touches.map((touch) => touch.to));
      return [{ number, v, from, to, units: touches.length }];
    })
    .sort((one, other) => one.v - other.v);
  const stretches = stringStretches(
    ground,
    floor.at,
    direction,
    strings.map(({ v }) => v),
  );
  const onGround = (u: number, v: number): Point => [
    floor.at[0] + u * direction[0] + v * normal[0],
    floor.at[1] + u * direction[1] + v * normal[1],
  ];
  return strings
    .map(({ number, v, from, to, units }, n) => {
      const start = Math.max(
        ...stretches[n]
          .map((part) => part.from)
          .filter((u) => u <= from + LENGTH_TOLERANCE_MM * 10),
      );
      const end = Math.min(
        ...stretches[n].map((part) => part.to).filter((u) => u >= to - LENGTH_TOLERANCE_MM * 10),
      );
      return {
        number,
        fromLaid: floor.side * v,
        from: onGround(start, v),
        to: onGround(end, v),
        units,
        startGap: Math.max(0, from - start),
        endGap: Math.max(0, end - to),
      };
    })
    .sort((one, other) => one.number - other.number);
}
