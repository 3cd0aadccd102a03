import { KineticsError } from '../errors.ts'
import { noiseOf } from '../signal/noise.ts'
import type { Column } from '../units/quantity.ts'
import type { Converted } from './converted.ts'
import { rateAtEnds } from './cut-ends.ts'
import { plateauAtEnd } from './plateau.ts'
import { curveFromExtent } from './smooth-curve.ts'

/** A change of mass below so many standard deviations of the noise is none. */
const smallestChange = 10

/**
 * Conversion from mass: α = (m start - m) / (m start - m end), with the masses of the plateaus at the ends of the window (or, where there is no plateau, of the
 * line through the outermost rows). A gain of mass works alike.
 *
 * @param mass - in kg or as a fraction
 * @throws KineticsError `empty-window` where the mass does not change inside the window
 * @source ictac-2011 (definition of α)
 */
export function fromMass(time_s: Column<'s'>, temperature_K: Column<'K'>, mass: Float64Array, label: string): Converted {
  const noise = noiseOf(time_s, mass, 0, mass.length - 1)
  const { value: start, standardError: startError } = plateauAtEnd(time_s, mass, 'start', noise)
  const { value: end, standardError: endError } = plateauAtEnd(time_s, mass, 'end', noise)
  const change = start - end
  if (!(Math.abs(change) > smallestChange * noise) || Math.abs(change) < 1e-6 * Math.abs(start)) {
    throw new KineticsError(
      'empty-window',
      `${label}: the mass does not change inside the window. Move the window to where the reaction is, or choose another signal.`,
      { run: label, massAtStart: start, massAtEnd: end },
    )
  }
  const size = Math.abs(change)
  const curve = curveFromExtent(time_s, temperature_K, shareOf(mass, start, change), { start: startError / size, end: endError / size })
  return { curve, baseline: null, area: Number.NaN, rateAtEnds: rateAtEnds(curve), baselineKind: null }
}

function shareOf(mass: Float64Array, start: number, change: number): Float64Array {
  const share = new Float64Array(mass.length)
  for (let i = 0; i < share.length; i++) share[i] = (start - (mass[i] as number)) / change
  return share
}
