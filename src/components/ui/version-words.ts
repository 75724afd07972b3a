import type { VersionState } from '@/api-types/versions';

/** Where a version stands, in words. */
export const STATE_WORDS: Record<VersionState | 'draft', string> = {
  draft: 'Draft',
  saved: 'Saved',
  shared: 'Shared',
  accepted: 'Accepted',
  change_asked: 'Change asked',
  issued: 'Issued for set-out',
  superseded: 'Superseded',
};
