import type { Agreement } from '@/api-types/agreement';
import type { VersionState } from '@/api-types/versions';

/** Where a version stands, as a client is told. */
export const CLIENT_STATES: Record<VersionState, string> = {
  saved: 'Not shared yet.',
  shared: 'Waiting for your answer.',
  accepted: 'You have agreed to this floor. It can now be issued to the crew.',
  change_asked: 'A change was asked for. Your designer will come back with another version.',
  issued: 'Agreed and issued to the crew: this is the floor that is built.',
  superseded: 'Another version has taken its place. This one is not built.',
};

/** And as the firm is told. */
export const FIRM_STATES: Record<VersionState, string> = {
  saved: 'Only the firm sees it until you share it.',
  shared: 'The client can accept it or ask for a change.',
  accepted: 'It can be issued for set-out.',
  change_asked: 'The client asked for a change. Draft another version, or share this one again.',
  issued: 'The crew sees it and builds from it.',
  superseded: 'Another version of this layout was issued after it.',
};

/** What tells a reader that another version is the one to build from, if so. */
export function currentPlanNote(agreement: Agreement): string | null {
  const { issued, versionId } = agreement;
  return issued && issued.id !== versionId
    ? `Version ${issued.number} is the one issued for set-out.`
    : null;
}
