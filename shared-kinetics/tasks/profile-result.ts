import type { IntervalKind, IsoconversionalResult, MethodInfo } from '../isoconversional/result.ts'
import { fQuantile } from '../numerics/f-distribution.ts'
import { sources } from '../sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { intervalResult } from './interval-result.ts'
import { lackOfFitResult } from './lack-of-fit-result.ts'
import { maybe, maybes } from './maybe.ts'
import { meanResult } from './mean-result.ts'
import type { ProfileResult } from './study-result.ts'

function kilojoules(values: Float64Array): number[] {
  const found: number[] = []
  for (let i = 0; i < values.length; i++) found.push(joulesToKilojoules(values[i] as number))
  return found
}

/**
 * A method's result in the terms of `StudyResult`: kJ/mol, null for what is not to be had, and the mean over a range of conversion.
 *
 * @param programmeGroup - one a run; replicates share a number
 * @throws Cancelled, by `checkCancelled`
 */
export function profileResult(
  info: MethodInfo,
  result: IsoconversionalResult,
  levels: readonly number[],
  meanRange: readonly [number, number],
  programmeGroup: readonly number[],
  withPhi = true,
  checkCancelled: () => void = () => undefined,
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
    otherIntervals: result.otherIntervals.map(({ kind, lower95, upper95, status }) => {
      const columns = { standardUncertainty: result.Ea.map(() => Number.NaN), lower95, upper95 }
      return intervalResult(kind, columns, noteOn(kind, programmeGroup.length), result.Ea, (level) => status[level] ?? 'no-energy')
    }),
    systematicError_percent: maybes(result.systematicError.map((share) => 100 * share)),
    lackOfFit: lackOfFitResult(result, levels, meanRange, programmeGroup),
    r2: maybes(result.r2),
    status: result.status,
    lines: result.lines.map((line) => ({
      x_per_K: maybes(line.x_per_K),
      y: maybes(line.y),
      slope_K: maybe(line.slope_K),
      intercept: maybe(line.intercept),
    })),
    // Each curve is worked out when it is first read.
    phi: (withPhi ? result.phi : []).map((phi) => {
      checkCancelled()
      return {
        Ea_kJ_per_mol: kilojoules(phi.Ea_J_per_mol),
        phi: Array.from(phi.phi),
        phiMinimum: maybe(phi.phiMinimum),
        phiThreshold: maybe(phi.phiThreshold),
      }
    }),
    mean: meanResult(result, levels, meanRange),
  }
}

/** How an interval that comes with a method was made. */
function noteOn(kind: IntervalKind, runs: number): string {
  if (kind !== 'vyazovkin-wight-f') return ''
  return (
    `Every Ea with S²(Ea)/S²min below F(0.95; ${runs - 1}, ${runs - 1}) = ${fQuantile(0.95, runs - 1, runs - 1).toPrecision(5)}, ${runs} runs. Pointwise and approximate: with ` +
    'independent errors it holds the true value in about 86 % of cases for 3 runs, 94 % for 4, 97 % for 5, 98 % for 6. Without an end where that lies beyond 1 or 1000 kJ/mol.'
  )
}
