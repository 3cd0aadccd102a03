import type { Column } from '../units/quantity.ts'
import type { Converted } from './converted.ts'
import { curveFromExtent } from './smooth-curve.ts'

/** Conversion that was exported as such is taken as it stands: it is neither shifted nor stretched to run from 0 to 1 inside the window. */
export function fromColumn(time_s: Column<'s'>, temperature_K: Column<'K'>, conversion: Float64Array): Converted {
  return {
    curve: curveFromExtent(time_s, temperature_K, conversion),
    baseline: null,
    area: Number.NaN,
    rateAtEnds: null,
    baselineKind: null,
  }
}
