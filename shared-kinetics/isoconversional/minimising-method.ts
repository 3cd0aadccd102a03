import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { column } from '../units/quantity.ts'
import { energyGrid } from './energy-grid.ts'
import { phiAround, phiOverRange } from './phi-curve.ts'
import { findPhiMinimum } from './phi-minimum.ts'
import { resultColumns } from './result-columns.ts'
import type { IsoconversionalMethod, LevelPhi, MethodInfo } from './result.ts'
import { checkSeries, countProgrammes } from './series-check.ts'
import type { TimeIntegral } from './time-integral.ts'

/**
 * Makes a method that takes, at each level, the Ea at the minimum of Phi over the runs' integrals of exp(-Ea/(R T)) dt, which is what tells one such method from
 * another. Every used run must have its integral at the level (`level-not-reached`), and at least two programmes must be distinct (`too-few-programmes`). The
 * integrals are not approximated, so that the systematic error is 0.
 *
 * @param integralsOf - one integral a run, in the order of the runs
 */
export function minimisingMethod(
  info: MethodInfo,
  integralsOf: (series: SeriesAtLevels) => readonly TimeIntegral[],
): IsoconversionalMethod {
  return (series, context) => {
    checkSeries(info, series)
    const levels = series.levels.length
    const curves: LevelPhi[] = []
    const columns = resultColumns(info, series, [], curves)
    const integrals = integralsOf(series)
    const enough = countProgrammes(series) >= 2
    const grid = enough ? energyGrid(integrals, levels, context) : null
    for (let level = 0; level < levels; level++) {
      context.checkCancelled()
      if (grid === null) curves.push(noCurve)
      else if (!integrals.every((integral) => integral.reaches(level))) {
        columns.setStatus(level, 'level-not-reached')
        curves.push(noCurve)
      } else {
        const minimum = findPhiMinimum(integrals, grid, level, columns.t)
        if (typeof minimum === 'string') {
          columns.setStatus(level, minimum)
          curves.push(phiOverRange(grid, level, integrals.length))
        } else {
          columns.setEnergy(level, minimum.Ea, minimum.standardError, minimum.r2)
          columns.setPoints(level, minimum.points)
          columns.result.systematicError[level] = 0
          curves.push(phiAround(grid, level, integrals.length, minimum, columns.t * minimum.standardError))
        }
      }
      context.progress(level + 1, levels)
    }
    return columns.result
  }
}

const noCurve: LevelPhi = {
  Ea_J_per_mol: column(new Float64Array(0), 'J/mol'),
  phi: new Float64Array(0),
  phiMinimum: Number.NaN,
  phiThreshold: Number.NaN,
}
