import type { SourceKey } from '../sources.ts'

/** Ids of the methods that work on rate peaks or on a single run, in the order in which they are listed everywhere. */
export const peakMethodIds = [
  'kissinger',
  'astm-e698',
  'astm-e2890',
  'ozawa-peak',
  'ozawa-peak-corrected',
  'augis-bennett',
  'augis-bennett-without-start',
  'borchardt-daniels',
] as const
export type PeakMethodId = (typeof peakMethodIds)[number]

export interface PeakMethodInfo {
  readonly id: PeakMethodId
  readonly label: string
  /** What its line has as ordinate, heating rates in K/s; null for a method without a line. */
  readonly ordinate: string | null
  readonly sources: readonly SourceKey[]
}
