import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Ground } from '../ground';
import type { LaidMotif, Laying } from '../laying';
import type { ActualUnit } from './creep-types';
import { chosenDocument, type RefitFloor } from './refit-floor';
import type { Search } from './refit-freedom';
import { bestValues, type SearchResult, type SearchUnit } from './refit-search';
import { chordDistance, chordsNear, inGround, nearestChord, unitClearance } from './unit-clearance';
import { unitPlace, unitPlaces } from './unit-places';

/** The laying counts a unit whole to within the tolerance; the search keeps this much inside it, mm. */
const SEARCH_MARGIN_MM = 1e-4;
/** Units left out of account at first, as if so many may have to be dropped. */
const LIKELY_DROPPED = 12;

/** The search over the units still to lay that any of its values brings near to an edge. */
export function restSearched(
  laying: Laying,
  floor: RefitFloor,
  units: readonly ActualUnit[],
  { freedoms, choice, start }: Search,
): SearchResult {
  const { ground, document } = laying;
  const clearance = Math.max(0, document.clearance - LENGTH_TOLERANCE_MM) + SEARCH_MARGIN_MM;
  // What of the tolerance the clearance cannot give is taken off the units, as the laying does.
  const shrink = Math.max(0, LENGTH_TOLERANCE_MM - document.clearance);
  const placesOf = (values: readonly number[]) =>
    unitPlaces(chosenDocument(laying, floor, units, choice(values)), ground);
  const middle = freedoms.map(({ from, to }) => (from + to) / 2);
  const half = freedoms.map(({ from, to }) => (to - from) / 2);
  // Everything moves in a straight line with each value: two places tell the way.
  const base = placesOf(middle);
  const steps = freedoms.map((_, m) => {
    const on = [...middle];
    on[m] += half[m] > 0 ? half[m] : 1;
    return { places: placesOf(on), by: on[m] - middle[m] };
  });
  const moved = floor.rest.map((address) => {
    const at = unitPlace(base, address);
    const ways = steps.map(({ places, by }): Point => {
      const [x, y] = unitPlace(places, address);
      return [(x - at[0]) / by, (y - at[1]) / by];
    });
    const entry = entryShrunk(base.motif[address[2]], shrink);
    const reach = ways.reduce((sum, way, m) => sum + Math.hypot(...way) * half[m], 0);
    return { entry, at, ways, reach };
  });

  const diagonal = ({ entry }: (typeof moved)[0]) =>
    Math.hypot(entry.unit.length, entry.unit.width) / 2;
  const band = clearance + Math.max(...moved.map(diagonal));
  const corners = half.reduce<readonly (readonly number[])[]>(
    (some, by, m) => some.flatMap((corner) => [-by, by].map((d) => corner.with(m, middle[m] + d))),
    [middle],
  );
  const weighed = moved.flatMap((unit) => {
    const near = chordsNear(ground, ...unit.at, diagonal(unit), unit.reach + band);
    if (near.length === 0) return [];
    const search = searchUnit(ground, unit, near, middle, band);
    return [{ search, most: search.most(middle, corners), least: search.gap(middle) - unit.reach }];
  });
  // Units that stay farther off than others can come, even with the worst of those left out, decide nothing.
  const decisiveFor = (leftOut: number) => {
    const reaches = weighed.map(({ most }) => most).sort((one, other) => one - other);
    const limit = Math.max(clearance, reaches[leftOut] ?? Infinity);
    return weighed.filter(({ least }) => least <= limit).map(({ search }) => search);
  };
  const attempt = (leftOut: number) => {
    const decisive = decisiveFor(leftOut);
    const found = bestValues(decisive, freedoms, clearance, start);
    return { found, dropped: decisive.length - found.kept };
  };
  let { found, dropped } = attempt(LIKELY_DROPPED);
  if (dropped > LIKELY_DROPPED) ({ found, dropped } = attempt(weighed.length));
  return { ...found, kept: floor.rest.length - dropped, gap: Math.max(0, found.gap - shrink) };
}

/** The unit smaller by so much on every side, mm. */
function entryShrunk(entry: LaidMotif, by: number): LaidMotif {
  if (by === 0) return entry;
  const { unit, halfLength, halfWidth } = entry;
  const length = unit.length - 2 * by;
  const width = unit.width - 2 * by;
  const scaled = ([x, y]: Point, share: number): Point => [x * share, y * share];
  return {
    ...entry,
    unit: { ...unit, length, width },
    halfLength: scaled(halfLength, length / unit.length),
    halfWidth: scaled(halfWidth, width / unit.width),
  };
}

interface MovedUnit {
  readonly entry: LaidMotif;
  readonly at: Point;
  readonly ways: readonly Point[];
  readonly reach: number;
}

/** A unit as the search sees it. Distances over `band` are as good as `band`. */
function searchUnit(
  ground: Ground,
  { entry, at, ways, reach }: MovedUnit,
  near: readonly number[],
  middle: readonly number[],
  band: number,
): SearchUnit {
  const place = (values: readonly number[]): Point => [
    ways.reduce((sum, way, m) => sum + way[0] * (values[m] - middle[m]), at[0]),
    ways.reduce((sum, way, m) => sum + way[1] * (values[m] - middle[m]), at[1]),
  ];
  const { length, width } = entry.unit;
  // One that lies whole in the ground, and moves less than its own width, cannot come to lie beyond the edge.
  const stays = reach < Math.min(length, width) && unitClearance(ground, entry, at, near) > 0;
  return {
    gap: (values) => {
      const to = place(values);
      const { distance } = nearestChord(ground, entry, to, near);
      if (distance === 0) return 0;
      return stays || inGround(ground, to) ? Math.min(band, distance) : 0;
    },
    most: (centre, corners) => {
      const { chord } = nearestChord(ground, entry, place(centre), near);
      if (chord < 0) return band;
      return Math.min(
        band,
        Math.max(...corners.map((corner) => chordDistance(ground, entry, place(corner), chord))),
      );
    },
  };
}
