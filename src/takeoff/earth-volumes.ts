import type { LayoutDocument } from '@/paving/layout-document';

/** What there is to know before the volumes are believed. */
export interface LevelWarning {
  readonly kind:
    | 'noSpots'
    | 'fewSpots'
    | 'spotsInLine'
    | 'groundBeyondSpots'
    | 'spotsFarApart'
    | 'spotFarOutside'
    | 'overdigLeftOut';
  /** For the person, whole sentences. */
  readonly text: string;
}

/**
 * What is dug and filled under a floor. Volumes are in m³ **in place**: earth as it lies, base and
 * bedding compacted. Areas in m², levels in mm above the datum. `cut` less `fill` is the volume between
 * the existing ground and the formation, the bottom of the base.
 */
export interface EarthVolumes {
  /** The ground within the edge, keep-outs taken off. */
  readonly area: number;
  /** What is dug and based: the same and the overdig round it. */
  readonly dugArea: number;
  /** Earth above the formation. */
  readonly cut: number;
  /** Room between formation and ground where the ground is lower: filled with base. */
  readonly fill: number;
  /** Area where earth is cut, and where the ground is lower than the formation. */
  readonly cutArea: number;
  readonly fillArea: number;
  /** The same as `cut`: no other earth is moved. */
  readonly excavation: number;
  /** All that is dug leaves: fill is made with base, not with what was dug. */
  readonly spoil: number;
  /** Base altogether: its thickness over the dug area, and the fill. */
  readonly base: number;
  /** Its thickness times the dug area. */
  readonly baseLayer: number;
  /** Bedding altogether: its thickness over the ground, and more under thinner units. */
  readonly bedding: number;
  /** Its thickness times the area. */
  readonly beddingLayer: number;
  /** What units thinner than the thickest take more of it. */
  readonly beddingUnderThin: number;
  /** Greatest depths of cut and fill, mm; 0 where there is none. */
  readonly deepestCut: number;
  readonly deepestFill: number;
  /** From the existing ground's level: `spots`, or `assumed` level with the datum where none was taken. */
  readonly from: 'spots' | 'assumed';
  /** Part of `dugArea` outside the spots, where each place takes the level of the nearest place among them. */
  readonly beyondSpots: number;
  readonly warnings: readonly LevelWarning[];
}

export type Levelled = Pick<LayoutDocument, 'ground' | 'levels' | 'buildUp' | 'units' | 'bond'>;
