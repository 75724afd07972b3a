import { gapProfile, type EdgeProfile } from '@/paving/gap-profile';
import { leastGapAt, type LeastGap } from '@/paving/least-gap';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument, type DocumentProblem } from '@/paving/layout-validation';
import { layFloor, type Laying } from '@/paving/laying';
import { wholeReport, type Report } from '@/paving/report';
import { setOut, type SetOut } from '@/paving/set-out/set-out';

/** All that the table shows of a document, worked out once for each and only as far as it is asked for. */
export interface Floor {
  readonly document: LayoutDocument;
  readonly problems: readonly DocumentProblem[];
  /** Null when the document cannot be laid; `problems` says why. */
  readonly laying: Laying | null;
  /** Of the whole units: what cutting comes to takes longer and is asked for beside the page. */
  readonly report: Report | null;
  readonly profile: readonly EdgeProfile[];
  readonly leastGap: LeastGap | null;
  readonly setOut: SetOut | null;
}

const floors = new WeakMap<LayoutDocument, Floor>();

function once<T>(make: () => T): () => T {
  let made: { value: T } | null = null;
  return () => (made ??= { value: make() }).value;
}

/** What the laying depends on; a change of anything else leaves every unit where it is. */
const LAID_BY = [
  'ground',
  'units',
  'bond',
  'placement',
  'clearance',
  'lifted',
  'cutting',
  'tones',
] as const satisfies readonly (keyof LayoutDocument)[];

let lastLaid: { readonly document: LayoutDocument; readonly laying: Laying } | null = null;

/** The laying of `parsed`, which `document` passed as: that laid last, where only levels or notes differ. */
function layingOf(document: LayoutDocument, parsed: LayoutDocument): Laying {
  const last = lastLaid;
  const laying =
    last && LAID_BY.every((key) => last.document[key] === document[key])
      ? { ...last.laying, document: parsed }
      : layFloor(parsed);
  lastLaid = { document, laying };
  return laying;
}

export function floorOf(document: LayoutDocument): Floor {
  const known = floors.get(document);
  if (known) return known;
  const parsed = parseLayoutDocument(document);
  const laying = once(() => (parsed.ok ? layingOf(document, parsed.document) : null));
  const from = <T>(make: (laying: Laying) => T, without: T) =>
    once(() => {
      const laid = laying();
      return laid ? make(laid) : without;
    });
  const report = from<Report | null>(wholeReport, null);
  const profile = from<readonly EdgeProfile[]>(gapProfile, []);
  const leastGap = from<LeastGap | null>(leastGapAt, null);
  const settingOut = from<SetOut | null>((laid) => setOut(laid, report() ?? undefined), null);
  const floor: Floor = {
    document,
    problems: parsed.ok ? [] : parsed.problems,
    get laying() {
      return laying();
    },
    get report() {
      return report();
    },
    get profile() {
      return profile();
    },
    get leastGap() {
      return leastGap();
    },
    get setOut() {
      return settingOut();
    },
  };
  floors.set(document, floor);
  return floor;
}
