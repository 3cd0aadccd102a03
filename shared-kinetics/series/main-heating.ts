import { isHold } from './hold.ts'

/** Rows of a run, both ends included. */
export interface RowRange {
  readonly first: number
  readonly last: number
}

/** A fall of the temperature of less than this, or of 2 % of the run's whole span where that is more, is no reversal but noise or a self-cooling sample. */
const smallestReversal_K = 3

/**
 * The main heating part of a run: the stretch without a reversal of the temperature that spans the most kelvin (of several within 5 % of it the first). Holds
 * before, between and after ramps belong to it. A run that only holds is its own main part.
 *
 * @param temperature_K - in order of time
 */
export function mainHeating(temperature_K: Float64Array): RowRange {
  const n = temperature_K.length
  if (isHold(temperature_K, { first: 0, last: n - 1 })) return { first: 0, last: n - 1 }
  const reversal = Math.max(smallestReversal_K, 0.02 * spanOf(temperature_K))
  const stretches = heatingStretches(temperature_K, reversal)
  const most = Math.max(...stretches.map((stretch) => stretch.span))
  const main = stretches.find((stretch) => stretch.span >= 0.95 * most) ?? { first: 0, last: n - 1 }
  return { first: main.first, last: main.last }
}

function spanOf(values: Float64Array): number {
  let lowest = Infinity
  let highest = -Infinity
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number
    if (value < lowest) lowest = value
    if (value > highest) highest = value
  }
  return highest - lowest
}

/** All stretches between reversals in which the temperature rises; each begins with the hold before it and ends with the hold after it. */
function heatingStretches(temperature: Float64Array, reversal: number): (RowRange & { readonly span: number })[] {
  const stretches: (RowRange & { readonly span: number })[] = []
  const n = temperature.length
  const at = (i: number): number => temperature[i] ?? Number.NaN
  let rising = true
  let lowest = 0
  let highest = 0
  const close = (): void => {
    const bottom = at(lowest) + 0.25 * reversal
    const top = at(highest) - 0.25 * reversal
    let first = lowest
    while (first > 0 && at(first - 1) <= bottom) first--
    let last = highest
    while (last < n - 1 && at(last + 1) >= top) last++
    if (at(highest) - at(lowest) >= reversal) stretches.push({ first, last, span: at(highest) - at(lowest) })
  }
  let low = at(0)
  let high = low
  for (let i = 1; i < n; i++) {
    const here = temperature[i] as number
    if (rising) {
      if (here > high) {
        highest = i
        high = here
      } else if (highest === lowest && here < low) {
        lowest = highest = i
        low = high = here
      } else if (here < high - reversal) {
        close()
        rising = false
        lowest = i
        low = here
      }
    } else {
      if (here < low) {
        lowest = i
        low = here
      } else if (here > low + reversal) {
        rising = true
        highest = i
        high = here
      }
    }
  }
  if (rising) close()
  return stretches
}
