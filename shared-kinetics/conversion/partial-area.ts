import { KineticsError } from '../errors.ts'
import { cumulativeIntegral } from '../signal/cumulative-integral.ts'
import type { Column } from '../units/quantity.ts'
import type { Converted } from './converted.ts'
import { rateAtEnds } from './cut-ends.ts'
import { curveFromRate, type DrawnBaseline } from './smooth-curve.ts'

/**
 * Conversion as the partial area between signal and baseline over the whole of it, over time; the direction of the peak cancels.
 *
 * @param baseline - null: the signal's own zero
 * @param drawn - what that baseline was drawn from, in units of the signal
 * @throws KineticsError `empty-window` where the area is 0
 */
export function fromPartialArea(
  time_s: Column<'s'>,
  temperature_K: Column<'K'>,
  signal: Float64Array,
  baseline: Float64Array | null,
  label: string,
  drawn: DrawnBaseline | null = null,
): Converted {
  const net = baseline === null ? signal : signal.map((value, i) => value - (baseline[i] ?? Number.NaN))
  const partial = cumulativeIntegral(time_s, net)
  const area = partial.at(-1) ?? Number.NaN
  if (!Number.isFinite(area) || area === 0) {
    throw new KineticsError(
      'empty-window',
      `${label}: the signal has no area inside the window. Move the window to where the reaction is.`,
      {
        run: label,
      },
    )
  }
  const curve = curveFromRate(
    time_s,
    temperature_K,
    net.map((value) => value / area),
    partial.map((value) => value / area),
    drawn === null ? null : overArea(drawn, area),
  )
  return { curve, baseline, area, rateAtEnds: rateAtEnds(curve), baselineKind: null }
}

const overArea = ({ passes, lines }: DrawnBaseline, area: number): DrawnBaseline => ({
  passes,
  lines: lines.map((line) => ({ ...line, value: line.value / area, slope: line.slope / area })),
})
