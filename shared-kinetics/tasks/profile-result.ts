import type { IsoconversionalResult, MethodInfo } from '../isoconversional/result.ts'
import { sources } from '../sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { maybe, maybes } from './maybe.ts'
import type { MeanEnergy, ProfileResult } from './study-result.ts'

const kilojoules = (values: Float64Array): Float64Array => values.map(joulesToKilojoules)

/** A method's result in the terms of `StudyResult`: kJ/mol, null for what is not to be had, and the mean over a range of conversion. */
export function profileResult(
  info: MethodInfo,
  result: IsoconversionalResult,
  levels: readonly number[],
  meanRange: readonly [number, number],
): ProfileResult {
  const Ea_kJ_per_mol = maybes(kilojoules(result.Ea))
  return {
    method: result.method,
    label: info.label,
    sources: info.sources.map((key) => sources[key]),
    evidence: info.evidence,
    interval: result.interval,
    Ea_kJ_per_mol,
    standardError_kJ_per_mol: maybes(kilojoules(result.standardError)),
    lower95_kJ_per_mol: maybes(kilojoules(result.lower95)),
    upper95_kJ_per_mol: maybes(kilojoules(result.upper95)),
    lnAf_per_s: maybes(result.lnAf),
    lnAfStandardError: maybes(result.lnAfStandardError),
    covarianceEaLnAf_kJ_per_mol: maybes(kilojoules(result.covarianceEaLnAf)),
    lnA_per_s: maybes(result.lnA),
    otherIntervals: [],
    systematicError_percent: maybes(result.systematicError.map((share) => 100 * share)),
    lackOfFit: null,
    r2: maybes(result.r2),
    status: result.status,
    lines: result.lines.map((line) => ({
      x_per_K: maybes(line.x_per_K),
      y: maybes(line.y),
      slope_K: maybe(line.slope_K),
      intercept: maybe(line.intercept),
    })),
    phi: result.phi.map((phi) => ({
      Ea_kJ_per_mol: [...kilojoules(phi.Ea_J_per_mol)],
      phi: [...phi.phi],
      phiMinimum: maybe(phi.phiMinimum),
      phiThreshold: maybe(phi.phiThreshold),
    })),
    mean: meanOf(Ea_kJ_per_mol, levels, meanRange),
  }
}

/** Levels are compared with the ends of a range within rounding, so that 0.1 belongs to 0.1 … 0.9 however it was made. */
const rounding = 1e-9

function meanOf(Ea: readonly (number | null)[], levels: readonly number[], [from, to]: readonly [number, number]): MeanEnergy {
  const inRange = levels.flatMap((level, i) => (level >= from - rounding && level <= to + rounding ? [{ level, Ea: Ea[i] ?? null }] : []))
  // An Ea at or below 0 means nothing, and neither would a mean that it entered.
  const used = inRange.flatMap(({ level, Ea: value }) => (value !== null && value > 0 ? [{ level, value }] : []))
  const values = used.map(({ value }) => value)
  const some = used.length > 0
  return {
    from,
    to,
    Ea_kJ_per_mol: some ? values.reduce((sum, value) => sum + value, 0) / values.length : null,
    spread_kJ_per_mol: some ? Math.max(...values) - Math.min(...values) : null,
    standardError_kJ_per_mol: null,
    lower95_kJ_per_mol: null,
    upper95_kJ_per_mol: null,
    levelsUsed: used.length,
    levelsInRange: inRange.length,
    firstLevel: used[0]?.level ?? null,
    lastLevel: used.at(-1)?.level ?? null,
  }
}
