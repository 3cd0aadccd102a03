import { fQuantile } from '../numerics/f-distribution.ts'
import type { RunAtLevels } from '../series/series-at-levels.ts'
import { column } from '../units/quantity.ts'
import { energies, energyGrid, gridPointBelow, readBetween, type EnergyGrid } from './energy-grid.ts'
import { logIntegralTable } from './log-integral-table.ts'
import { phiAround, phiOverRange, type ReadIntegrals } from './phi-curve.ts'
import { PhiLater } from './phi-later.ts'
import { findPhiMinimum } from './phi-minimum.ts'
import { resultColumns } from './result-columns.ts'
import type { EnergyInterval, IntervalStatus, IsoconversionalMethod, LevelPhi, MethodInfo } from './result.ts'
import { checkSeries, countProgrammes } from './series-check.ts'
import { scanInOrder, scanOverGrid, type SlopeScan } from './slope-scan.ts'
import { interruptible, type TimeIntegral } from './time-integral.ts'
import { vyazovkinWight } from './vyazovkin-wight.ts'

/**
 * Makes a method that takes, at each level, the Ea at the minimum of Phi over the runs' integrals of exp(-Ea/(R T)) dt, which is what tells one such method from
 * another. Every used run must have its integral at the level (`level-not-reached`), and at least two programmes must be distinct (`too-few-programmes`). The
 * integrals are not approximated, so that the systematic error is 0. Besides the interval of the linearised regression it gives, with three or more distinct programmes,
 * that of Vyazovkin and Wight.
 *
 * @param integralOf - what is integrated of a run
 */
export function minimisingMethod(info: MethodInfo, integralOf: (run: RunAtLevels) => TimeIntegral): IsoconversionalMethod {
  return (series, context) => {
    checkSeries(info, series)
    const levels = series.levels.length
    const curves: LevelPhi[] = []
    const columns = resultColumns(info, series, [], curves)
    const integrals = series.runs.map((run) => {
      context.checkCancelled()
      return integralOf(run)
    })
    // Curves are read after this call, perhaps by another that its cancel is nothing to: not through these.
    const watched = integrals.map((integral, i) => interruptible(integral, series.runs[i] as RunAtLevels, context.checkCancelled))
    const programmes = countProgrammes(series)
    const enough = programmes >= 2
    const varianceRatio = programmes >= 3 ? varianceRatioIntervals(series.runs.length, levels) : null
    // Of J at every grid point only where the runs are no ramps in one order.
    let grid: EnergyGrid | null = null
    let near = energies.length >> 1
    const scanAt = (level: number): SlopeScan | null => {
      const scan = scanInOrder(integrals, level, near)
      if (scan !== null) return scan
      grid ??= energyGrid(integrals, levels, context)
      return scanOverGrid(grid, level, integrals.length)
    }
    const readAt = (level: number): ReadIntegrals => {
      const over = grid
      return over === null
        ? logIntegralTable(integrals, level)
        : (Ea, lnJ, inverseT) => {
            readBetween(over, Ea, level, lnJ, inverseT)
          }
    }
    for (let level = 0; level < levels; level++) {
      context.checkCancelled()
      if (!enough) curves.push(noCurve)
      else if (!integrals.every((integral) => integral.reaches(level))) {
        columns.setStatus(level, 'level-not-reached')
        curves.push(noCurve)
      } else {
        const scan = scanAt(level)
        const minimum = findPhiMinimum(watched, scan, level, columns.t)
        if (typeof minimum === 'string') {
          columns.setStatus(level, minimum)
          curves.push(new PhiLater(() => phiOverRange(readAt(level), integrals.length)))
        } else {
          columns.setEnergy(level, minimum.Ea, minimum.standardError, minimum.r2)
          columns.setPoints(level, minimum.points)
          columns.result.systematicError[level] = 0
          near = gridPointBelow(minimum.Ea)
          varianceRatio?.set(level, minimum.Ea, watched, scan?.readBetween)
          curves.push(new PhiLater(() => phiAround(readAt(level), integrals.length, minimum, columns.t * minimum.standardError)))
        }
      }
      context.progress(level + 1, levels)
    }
    return varianceRatio === null ? columns.result : { ...columns.result, otherIntervals: [varianceRatio.interval] }
  }
}

/** The interval of Vyazovkin and Wight, level by level. */
function varianceRatioIntervals(
  runs: number,
  levels: number,
): {
  readonly interval: EnergyInterval
  readonly set: (level: number, Ea: number, integrals: readonly TimeIntegral[], nearly: ReadIntegrals | undefined) => void
} {
  const lower95 = column(new Float64Array(levels).fill(Number.NaN), 'J/mol')
  const upper95 = column(new Float64Array(levels).fill(Number.NaN), 'J/mol')
  const status = Array.from<IntervalStatus>({ length: levels }).fill('no-energy')
  const quantile = fQuantile(0.95, runs - 1, runs - 1)
  return {
    interval: { kind: 'vyazovkin-wight-f', lower95, upper95, status },
    set(level, Ea, integrals, nearly) {
      const read = (energy: number, lnJ: Float64Array, inverseT: Float64Array): void => {
        integrals.forEach((integral, i) => {
          const value = integral.atLevel(energy, level)
          lnJ[i] = value.lnJ
          inverseT[i] = value.inverseT
        })
      }
      const ends = vyazovkinWight(runs, Ea, quantile, read, nearly)
      lower95[level] = ends.lower95
      upper95[level] = ends.upper95
      status[level] = ends.status
    },
  }
}

const noCurve: LevelPhi = {
  Ea_J_per_mol: column(new Float64Array(0), 'J/mol'),
  phi: new Float64Array(0),
  phiMinimum: Number.NaN,
  phiThreshold: Number.NaN,
}
