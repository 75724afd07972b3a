import type { VersionDetail } from '@/api-types/versions';
import { layFloor } from '@/paving/laying';
import type { PaperName } from '@/sheets/paper';
import type { PlanInput } from '@/sheets/plan-input';

/** What the plan sheet of a version is drawn from. */
export function versionPlanInput(version: VersionDetail, paper: PaperName | 'auto'): PlanInput {
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
    paper,
  };
}

/** The layout's own short number and the version's: the same on every sheet of that version. */
export function documentNumber(version: Pick<VersionDetail, 'layoutId' | 'number'>): string {
  const short = version.layoutId
    .replace(/[^0-9a-z]/gi, '')
    .slice(-6)
    .toUpperCase();
  return `${short}-${version.number}`;
}

/** A name for a downloaded file: `back-court-diamond-chequer-v3`. */
export function planFileName(version: VersionDetail): string {
  const words = `${version.projectName} ${version.layoutName}`
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);
  return `${words || 'plan'}-v${version.number}`;
}
