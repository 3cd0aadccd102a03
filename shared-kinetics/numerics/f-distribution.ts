import { KineticsError } from '../errors.ts'
import { lnIncompleteBeta } from './incomplete-beta.ts'
import { lnBeta } from './ln-beta.ts'

/**
 * Probability that a variable of the F distribution with `dof1` and `dof2` degrees of freedom is at most `f`: I_x(dof1/2, dof2/2), x = dof1·f/(dof1·f + dof2).
 *
 * @param dof1 - degrees of freedom of the numerator, above 0, need not be whole
 * @param dof2 - of the denominator
 * @returns 0 for f <= 0, NaN for NaN
 * @throws KineticsError `bad-option` for degrees of freedom that are none
 * @source abramowitz-stegun-1964 26.6.2
 */
export function fProbability(f: number, dof1: number, dof2: number): number {
  assertDegrees(dof1, dof2)
  if (Number.isNaN(f)) return Number.NaN
  if (f <= 0) return 0
  return Math.exp(lnShareBelow(f, dof1, dof2))
}

/**
 * Probability that a variable of the F distribution exceeds `f`: the p-value of an F test. Formed directly, so that far tails keep their digits.
 *
 * @throws KineticsError `bad-option` for degrees of freedom that are none
 * @source abramowitz-stegun-1964 26.6.2
 */
export function fUpperTail(f: number, dof1: number, dof2: number): number {
  // A variable exceeds f where its reciprocal, which has the degrees exchanged, stays below 1/f.
  return f <= 0 ? 1 - fProbability(f, dof2, dof1) : fProbability(1 / f, dof2, dof1)
}

/**
 * Quantile of the F distribution: the f below which a share `probability` of it lies.
 *
 * Newton's method on ln P against ln f for the tail that holds less than half. The density of ln F is log-concave, hence ln P is concave in ln f, and from a start
 * below the root (the power law that the tail tends to, an upper bound of P) every step stays below it: it closes in from one side, whatever the arguments.
 *
 * @param probability - inside (0, 1)
 * @throws KineticsError `bad-option` outside these
 * @source abramowitz-stegun-1964 26.6
 */
export function fQuantile(probability: number, dof1: number, dof2: number): number {
  assertDegrees(dof1, dof2)
  if (!(probability > 0 && probability < 1)) {
    throw new KineticsError('bad-option', `A quantile needs a probability between 0 and 1, not ${probability}.`, { probability })
  }
  return probability <= 0.5 ? lowerQuantile(probability, dof1, dof2) : 1 / lowerQuantile(1 - probability, dof2, dof1)
}

function lowerQuantile(probability: number, dof1: number, dof2: number): number {
  const a = dof1 / 2
  const lnB = lnBeta(a, dof2 / 2)
  const lnTarget = Math.log(probability)
  const lnRatio = Math.log(dof1 / dof2)
  let lnF = (lnTarget + Math.log(a) + lnB) / a - lnRatio
  for (let k = 0; k < 200; k++) {
    const lnShare = lnShareBelow(Math.exp(lnF), dof1, dof2)
    const lnU = lnRatio + lnF
    const lnDensity = a * lnU - (a + dof2 / 2) * Math.log1p(Math.exp(lnU)) - lnB
    const step = (lnTarget - lnShare) / Math.exp(lnDensity - lnShare)
    lnF += step
    if (Math.abs(step) < 4 * Number.EPSILON * Math.max(1, Math.abs(lnF))) break
  }
  return Math.exp(lnF)
}

/** ln of the probability below f > 0. */
function lnShareBelow(f: number, dof1: number, dof2: number): number {
  const u = (dof1 * f) / dof2
  // 1/(1 + 1/u) keeps its meaning where u overflows.
  return lnIncompleteBeta(dof1 / 2, dof2 / 2, 1 / (1 + 1 / u), 1 / (1 + u), lnBeta(dof1 / 2, dof2 / 2))
}

function assertDegrees(dof1: number, dof2: number): void {
  if (!(dof1 > 0 && dof2 > 0 && Number.isFinite(dof1) && Number.isFinite(dof2))) {
    throw new KineticsError('bad-option', `The F distribution needs two positive degrees of freedom, not ${dof1} and ${dof2}.`, {
      dof1,
      dof2,
    })
  }
}
