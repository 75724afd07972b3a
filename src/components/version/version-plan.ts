import type { VersionDetail } from '@/api-types/versions';
import { layFloor } from '@/paving/laying';
import type { PaperName } from '@/sheets/paper';
import type { PlanInput, SheetStamp } from '@/sheets/plan-input';

/** What the plan sheet of a version is drawn from. */
export function versionPlanInput(
  { version, stamp }: { readonly version: VersionDetail; readonly stamp: SheetStamp },
  paper: PaperName | 'auto',
): PlanInput {
  return {
    laying: layFloor(version.document),
    report: version.report,
    firm: version.firmName,
    project: version.projectName,
    layout: version.layoutName,
    version: version.number,
    label: version.label,
    creator: version.createdBy.name,
    documentNumber: documentNumber(version),
    date: version.createdAt,
    fingerprint: version.fingerprint,
    state: version.state,
    stamp,
    paper,
  };
}

/** The last six letters and digits of the layout's id: short, and its own. */
export const layoutShortNumber = (layoutId: string): string =>
  layoutId
    .replace(/[^0-9a-z]/gi, '')
    .slice(-6)
    .toUpperCase();

/** The layout's own short number and the version's: the same on every sheet of that version. */
export const documentNumber = (version: Pick<VersionDetail, 'layoutId' | 'number'>): string =>
  `${layoutShortNumber(version.layoutId)}-${version.number}`;
