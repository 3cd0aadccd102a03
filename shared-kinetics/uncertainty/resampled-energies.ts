import { constantRateIntegral } from '../isoconversional/constant-rate-integral.ts'
import { largestEa, smallestEa } from '../isoconversional/energy-grid.ts'
import { heatingRateOf } from '../isoconversional/line-method.ts'
import { logIntegralTable } from '../isoconversional/log-integral-table.ts'
import { methods } from '../isoconversional/registry.ts'
import type { IsoconversionalResult, LevelPoints, MethodId, TaskContext } from '../isoconversional/result.ts'
import { segmentIntegral } from '../isoconversional/segment-integral.ts'
import { interruptible, timeIntegral, type TimeIntegral } from '../isoconversional/time-integral.ts'
import { guardedNewton } from '../numerics/guarded-newton.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'

/** Ea in J/mol at every level from the runs taken so many times each (0: left out); NaN where they do not determine it, or the method gives none with all runs. */
export type ResampledEnergies = (times: ArrayLike<number>) => Float64Array

/** Ea follows from the slope in a way of its own (a table): run anew on every resample. */
const runAnew: ReadonlySet<MethodId> = new Set(['astm-e1641'])

/**
 * What a method makes of resampled runs: a weighted line through the points, the minimum of a weighted Phi, or the method itself on the series with runs left out and
 * repeated, which all come to the same.
 *
 * @param result - of the method on all runs of the series
 */
export function resampledEnergies(series: SeriesAtLevels, result: IsoconversionalResult, context: TaskContext): ResampledEnergies {
  const { method } = result
  if (runAnew.has(method)) {
    const silent = { checkCancelled: context.checkCancelled, progress: () => undefined }
    return (times) => {
      const runs = series.runs.flatMap((run, i) => Array.from({ length: times[i] ?? 0 }, () => run))
      return methods[method].run({ ...series, runs }, silent).Ea
    }
  }
  const energies = energiesAtLevels(series, result, context.checkCancelled)
  return (times) => {
    const Ea = new Float64Array(energies.length)
    energies.forEach((energyAt, level) => {
      context.checkCancelled()
      Ea[level] = energyAt(times)
    })
    return Ea
  }
}

type EnergyAtLevel = (times: ArrayLike<number>) => number

const searched = { lower: smallestEa, upper: largestEa, relativeTolerance: 1e-9 }

const none: EnergyAtLevel = () => Number.NaN

function energiesAtLevels(
  series: SeriesAtLevels,
  { method, Ea, points, status }: IsoconversionalResult,
  checkCancelled: () => void,
): EnergyAtLevel[] {
  const where = (make: (Ea: number, points: LevelPoints, level: number) => EnergyAtLevel): EnergyAtLevel[] =>
    points.map((atLevel, level) => (status[level] === 'ok' ? make(Ea[level] ?? Number.NaN, atLevel, level) : none))
  if (method === 'vyazovkin' || method === 'vyazovkin-incremental') {
    const integralOf = method === 'vyazovkin' ? timeIntegral : segmentIntegral
    const integrals = series.runs.map((run) => {
      checkCancelled()
      return interruptible(integralOf(run, largestEa), run, checkCancelled)
    })
    return where((value, _, level) => weightedMinimum(value, integrals, level))
  }
  if (method === 'ofw-corrected') {
    const integrals = series.runs.map((run) => constantRateIntegral(quantity(heatingRateOf(run), 'K/s'), run.temperature_K))
    return where((value, { x_per_K }, level) => levelledIntegral(value, x_per_K, integrals, level))
  }
  return where(weightedLine)
}

/**
 * The slope through the points by weighted least squares, from the residuals of the line through all: Ea + (dEa/dslope) Σw(x - x̄_w)(r - r̄_w)/Σw(x - x̄_w)².
 */
function weightedLine(Ea: number, { x_per_K: x, residual: r, energyPerSlope }: LevelPoints): EnergyAtLevel {
  return (times) => {
    let sum = 0
    let xMean = 0
    let rMean = 0
    for (let i = 0; i < x.length; i++) {
      const w = times[i] ?? 0
      sum += w
      xMean += w * (x[i] as number)
      rMean += w * (r[i] as number)
    }
    xMean /= sum
    rMean /= sum
    let xx = 0
    let xr = 0
    for (let i = 0; i < x.length; i++) {
      const w = times[i] ?? 0
      const dx = (x[i] as number) - xMean
      xx += w * dx * dx
      xr += w * dx * ((r[i] as number) - rMean)
    }
    // Runs at one temperature, but for rounding, have no slope.
    return xx > 1e-18 * sum * xMean * xMean ? Ea + (energyPerSlope * xr) / xx : Number.NaN
  }
}

/**
 * The Ea at which ln J of the runs, ln p(Ea/RT) - ln beta but for what is common to all, has no slope against 1/T by weighted least squares: where the correction of
 * OFW comes to rest.
 */
function levelledIntegral(Ea: number, x: Float64Array, integrals: readonly TimeIntegral[], level: number): EnergyAtLevel {
  const read = logIntegralTable(integrals, level)
  const lnJ = new Float64Array(x.length)
  const u = new Float64Array(x.length)
  return (times) => {
    let sum = 0
    let xMean = 0
    for (let i = 0; i < x.length; i++) {
      sum += times[i] ?? 0
      xMean += (times[i] ?? 0) * (x[i] as number)
    }
    xMean /= sum
    return guardedNewton(
      (energy) => {
        read(energy, lnJ, u)
        let value = 0
        let slope = 0
        for (let i = 0; i < x.length; i++) {
          const weight = (times[i] ?? 0) * (xMean - (x[i] as number))
          value += weight * (lnJ[i] as number)
          slope -= (weight * (u[i] as number)) / gasConstant_J_per_mol_K
        }
        return { value, slope }
      },
      Ea,
      searched,
    ).x
  }
}

/** The root of dPhi/dEa next to the Ea of all runs, Phi = Σᵢ Σⱼ wᵢ wⱼ Jᵢ/Jⱼ with each run taken wᵢ times; NaN where it leaves 1 to 1000 kJ/mol. */
function weightedMinimum(Ea: number, integrals: readonly TimeIntegral[], level: number): EnergyAtLevel {
  const read = logIntegralTable(integrals, level)
  const lnJ = new Float64Array(integrals.length)
  const u = new Float64Array(integrals.length)
  return (times) =>
    guardedNewton(
      (energy) => {
        read(energy, lnJ, u)
        let value = 0
        let slope = 0
        for (let i = 1; i < lnJ.length; i++) {
          const wi = times[i] ?? 0
          if (wi === 0) continue
          for (let j = 0; j < i; j++) {
            const w = wi * (times[j] ?? 0)
            if (w === 0) continue
            const ratio = Math.exp((lnJ[i] as number) - (lnJ[j] as number))
            const change = ((u[j] as number) - (u[i] as number)) / gasConstant_J_per_mol_K
            value += w * change * (ratio - 1 / ratio)
            slope += w * change * change * (ratio + 1 / ratio)
          }
        }
        return { value, slope }
      },
      Ea,
      searched,
    ).x
}
