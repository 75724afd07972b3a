/** GET /api/versions/{id}/cost: what a version comes to, as far as whoever asks may know. */
export interface VersionCost {
  readonly versionId: string;
  /** ISO 4217. */
  readonly currency: string;
  /** What its materials cost the firm, minor units; null for those who do not see costs, or when it is not known. */
  readonly materialsMinor: number | null;
  /** Whether every material has a price. */
  readonly complete: boolean;
  /** Of the quote sent last, with tax; null when none was sent, or for those who see none. */
  readonly quotedMinor: number | null;
}
