import { lineFit } from '../numerics/line-fit.ts'
import { quantity } from '../units/quantity.ts'
import { longestGapFreeStretch } from './gap-free-stretch.ts'
import { isHold } from './hold.ts'
import type { RowRange } from './main-heating.ts'
import type { Programme } from './programme.ts'
import type { NominalHeatingRate } from './run.ts'

export interface ToldProgramme {
  readonly programme: Programme
  /** Largest distance of the heating rate in an eighth of the reaction from that over all of it, as a share; NaN unless the heating rate is constant and measured. */
  readonly heatingRateSpread: number
  /** Mean temperature, and mean of dT/dt, over the reaction. */
  readonly meanTemperature_K: number
  readonly meanHeatingRate_K_per_s: number
}

const mostParts = 8
/** Fewer would not show a hold between two ramps. */
const fewestParts = 4
const fewestRowsPerPart = 4
/** A heating rate is constant while that in every eighth of the reaction lies within this share of the fitted one. */
const constantWithin = 0.15

/**
 * Tells from T(t), and from no label, what programme a run followed while it reacted.
 *
 * - `isothermal`: the temperature stays within 3 K (apart from the outermost 1 % of the samples on either side).
 * - `constant-heating-rate`: a line describes T(t): with the reaction's time cut into eighths, the slope in each lies within 15 % of the slope of all (or within
 *   four of its own standard errors); with few rows in fewer parts, or from row to row. Its slope and standard error are those of the line through the longest stretch without a gap or splice.
 * - `general`: anything else.
 *
 * With a time that was rebuilt from a stated rate there is nothing to measure: that rate is the programme.
 *
 * @param first, last - rows between which the reaction runs (conversion 0.02 to 0.98)
 */
export function tellProgramme(
  time_s: Float64Array,
  temperature_K: Float64Array,
  first: number,
  last: number,
  rebuiltFrom: NominalHeatingRate | null,
): ToldProgramme {
  const reaction = temperature_K.subarray(first, last + 1)
  const meanTemperature_K = reaction.reduce((sum, value) => sum + value, 0) / reaction.length
  if (rebuiltFrom !== null) {
    const heatingRate = rebuiltFrom.heatingRate_K_per_s
    return {
      programme: {
        kind: 'constant-heating-rate',
        heatingRate: quantity(heatingRate, 'K/s'),
        standardError: quantity(Number.NaN, 'K/s'),
        source: rebuiltFrom.source === 'option' ? 'option' : 'nominal',
      },
      heatingRateSpread: Number.NaN,
      meanTemperature_K,
      meanHeatingRate_K_per_s: heatingRate,
    }
  }
  const span = (time_s[last] ?? 0) - (time_s[first] ?? 0)
  const rest = {
    heatingRateSpread: Number.NaN,
    meanTemperature_K,
    meanHeatingRate_K_per_s: ((temperature_K[last] ?? 0) - (temperature_K[first] ?? 0)) / span,
  }
  if (isHold(temperature_K, { first, last })) {
    return { ...rest, programme: { kind: 'isothermal', temperature: quantity(meanTemperature_K, 'K') } }
  }
  const stretch = longestGapFreeStretch(time_s, temperature_K, first, last)
  const line = slopeBetween(time_s, temperature_K, stretch.first, stretch.last)
  if (!(line.slope > 0)) return { ...rest, programme: { kind: 'general' } }

  const parts = equalParts(time_s, stretch.first, stretch.last)
  const { spread, constant } =
    parts.length >= fewestParts
      ? spreadOverParts(time_s, temperature_K, parts, line)
      : spreadOverSteps(time_s, temperature_K, stretch, line)
  if (!constant) return { ...rest, programme: { kind: 'general' } }
  return {
    ...rest,
    programme: {
      kind: 'constant-heating-rate',
      heatingRate: quantity(line.slope, 'K/s'),
      standardError: quantity(line.standardError, 'K/s'),
      source: 'measured',
    },
    heatingRateSpread: spread,
    meanHeatingRate_K_per_s: line.slope,
  }
}

function slopeBetween(
  time: Float64Array,
  temperature: Float64Array,
  first: number,
  last: number,
): { slope: number; standardError: number } {
  const line = lineFit(time.subarray(first, last + 1), temperature.subarray(first, last + 1))
  return { slope: line.slope, standardError: line.slopeStandardError }
}

interface Spread {
  readonly spread: number
  readonly constant: boolean
}

function spreadOverParts(
  time: Float64Array,
  temperature: Float64Array,
  parts: readonly RowRange[],
  line: { readonly slope: number },
): Spread {
  let spread = 0
  let constant = true
  for (const part of parts) {
    const local = slopeBetween(time, temperature, part.first, part.last)
    const away = Math.abs(local.slope / line.slope - 1)
    spread = Math.max(spread, away)
    if (away > Math.max(constantWithin, (4 * local.standardError) / line.slope)) constant = false
  }
  return { spread, constant }
}

/** With too few rows for slopes of their own in four parts: whether the heating rate from row to row stays within the same share, whatever the noise. */
function spreadOverSteps(
  time: Float64Array,
  temperature: Float64Array,
  { first, last }: RowRange,
  line: { readonly slope: number },
): Spread {
  let spread = last - first >= 2 ? 0 : Number.NaN
  for (let i = first + 1; i <= last; i++) {
    const slope =
      ((temperature[i] ?? Number.NaN) - (temperature[i - 1] ?? Number.NaN)) / ((time[i] ?? Number.NaN) - (time[i - 1] ?? Number.NaN))
    spread = Math.max(spread, Math.abs(slope / line.slope - 1))
  }
  return { spread, constant: spread <= constantWithin }
}

/** The stretch in parts of equal time: eighths, or fewer and longer ones until each has four rows. */
function equalParts(time: Float64Array, first: number, last: number): RowRange[] {
  for (let parts = mostParts; parts >= fewestParts; parts--) {
    const start = time[first] ?? 0
    const step = ((time[last] ?? 0) - start) / parts
    const found: RowRange[] = []
    let from = first
    for (let part = 1; part <= parts; part++) {
      const until = part === parts ? Infinity : start + part * step
      let to = from
      while (to < last && (time[to + 1] ?? Number.NaN) <= until) to++
      found.push({ first: from, last: to })
      from = Math.min(last, to + 1)
    }
    if (found.every((part) => part.last - part.first + 1 >= fewestRowsPerPart)) return found
  }
  return []
}
