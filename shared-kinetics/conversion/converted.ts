import type { RateAtEnds } from './cut-ends.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** A run's conversion with what else its signal tells. */
export interface Converted {
  readonly curve: ConversionCurve
  /** Baseline under a heat-flow signal, one value a row of the window; null for other signals. */
  readonly baseline: Float64Array | null
  /** Area of the peak over time, in the signal's unit times s; NaN where the signal has no area. */
  readonly area: number
  /** null where the ends of the window say nothing about the conversion there (a conversion column). */
  readonly rateAtEnds: RateAtEnds | null
  /** The baseline that was drawn under a heat flow; null for other signals. */
  readonly baselineKind: HeatFlowBaseline | null
}

export type HeatFlowBaseline = 'area-proportional' | 'straight' | 'level-at-end'
