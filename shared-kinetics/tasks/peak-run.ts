import type { ShapedRatePeak } from '../peak-methods/astm-e2890.ts'
import type { RatePeakFromStart } from '../peak-methods/augis-bennett.ts'
import type { RunPoints } from '../peak-methods/borchardt-daniels.ts'
import type { RatePeakAtConversion } from '../peak-methods/kissinger-for-model.ts'
import type { Programme } from '../series/programme.ts'
import type { Quantity } from '../units/quantity.ts'
import type { HalfHeights } from './half-heights.ts'

/** A run as the peak and single-run methods look at it. */
export interface PeakRun {
  readonly runId: string
  readonly label: string
  readonly programme: Programme
  readonly programmeGroup: number
  /** NaN where the reaction rate has no maximum. */
  readonly peak_K: number
  readonly conversionAtPeak: number
  readonly halfHeights: HalfHeights
  /** Where the heating began. */
  readonly start: Quantity<'K'>
  /** Of a heat-flow signal whose file says which way an exothermic event points; null for the rest. */
  readonly heat: 'exothermic' | 'endothermic' | null
  /** Points for a single-run method; only those that the run reaches. */
  readonly points: RunPoints
}

/** Everything a peak method takes, of one run. */
export type FullRatePeak = ShapedRatePeak & RatePeakFromStart & RatePeakAtConversion
