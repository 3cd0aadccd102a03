import type { IsoconversionalResult } from '../isoconversional/result.ts'
import { lackOfFit, meanResiduals } from '../uncertainty/lack-of-fit.ts'
import { maybe } from './maybe.ts'
import { levelsInMean } from './mean-result.ts'
import type { LackOfFitResult } from './study-result.ts'

/** Lack of fit at each level, and of the residuals averaged over the range of the mean; null without replicates or with fewer than three distinct programmes. */
export function lackOfFitResult(
  { Ea, points, status }: IsoconversionalResult,
  levels: readonly number[],
  meanRange: readonly [number, number],
  programmeGroup: readonly number[],
): LackOfFitResult | null {
  const tests = points.map((atLevel, i) => lackOfFit(atLevel.residual, status[i] === 'ok' ? programmeGroup : []))
  const whole = lackOfFit(meanResiduals(levelsInMean(Ea, levels, meanRange).flatMap((i) => points[i] ?? [])), programmeGroup)
  const first = whole ?? tests.find((test) => test !== null)
  if (first === undefined || first === null) return null
  return {
    dofLackOfFit: first.dofLackOfFit,
    dofPureError: first.dofPureError,
    F: tests.map((test) => maybe(test?.F ?? Number.NaN)),
    p: tests.map((test) => maybe(test?.p ?? Number.NaN)),
    overMeanRange: { F: maybe(whole?.F ?? Number.NaN), p: maybe(whole?.p ?? Number.NaN) },
  }
}
