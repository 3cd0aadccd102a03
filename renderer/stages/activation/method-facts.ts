import type { Maybe, ProfileResult } from '../../../shared-kinetics/contract/study-result.ts'
import { decimals, formatSigned } from '../../sheet/format.ts'
import { intervalKinds, intervalOfKind, intervalWordsAt, shortKinds, type ShownOfMethod } from './shown-interval.ts'

/** What else is to be known of a method's Ea at a level, in sentences: its own error, lack of fit against replicates, and its pre-exponential. */
export function methodFacts(profile: ProfileResult, levelIndex: number): readonly string[] {
  return [systematic(profile, levelIndex), lackOfFit(profile, levelIndex), preExponential(profile, levelIndex)].filter(
    (fact) => fact !== null,
  )
}

/** What is to be said at a level of the kinds of interval that the method has, once for all of which it holds: `Student-t, combined interval: …`. */
export function intervalFacts({ profile, apart }: Pick<ShownOfMethod, 'profile' | 'apart'>, levelIndex: number): readonly string[] {
  const namesByWords = new Map<string, string[]>()
  for (const kind of intervalKinds) {
    const words = intervalWordsAt(intervalOfKind(profile, apart, kind), levelIndex)
    if (words !== null) namesByWords.set(words, [...(namesByWords.get(words) ?? []), shortKinds[kind]])
  }
  return [...namesByWords].map(([words, names]) => {
    const kinds = names.join(', ')
    return `${kinds.charAt(0).toUpperCase()}${kinds.slice(1)} interval: ${words}.`
  })
}

function systematic({ systematicError_percent: errors }: ProfileResult, levelIndex: number): string | null {
  const percent = errors[levelIndex] ?? null
  if (percent === null) return null
  if (errors.every((one) => one === null || one === 0)) return 'Systematic error of the method: none.'
  return `Systematic error from its temperature integral: ${formatSigned(percent, 2)} %; not part of the interval.`
}

function lackOfFit({ lackOfFit: test, interval }: ProfileResult, levelIndex: number): string | null {
  if (test === null) return interval.dof > 0 ? 'Lack of fit: cannot be tested, no programme was measured twice.' : null
  const [F, p] = [test.F[levelIndex] ?? null, test.p[levelIndex] ?? null]
  if (F === null || p === null) return 'Lack of fit: not to be had at this level.'
  const over = test.overMeanRange
  const range = over.p === null ? '' : ` Over the range of the mean ${pText(over.p)}.`
  return `Lack of fit against replicates: F(${test.dofLackOfFit}, ${test.dofPureError}) = ${decimals(F, 2)}, ${pText(p)}.${range}`
}

const pText = (p: number): string => (p < 0.001 ? 'p < 0.001' : `p = ${decimals(p, 3)}`)

function preExponential(profile: ProfileResult, levelIndex: number): string | null {
  const at = (values: readonly Maybe[]): Maybe => values[levelIndex] ?? null
  const [lnAf, error, covariance] = [at(profile.lnAf_per_s), at(profile.lnAfStandardError), at(profile.covarianceEaLnAf_kJ_per_mol)]
  if (lnAf !== null) {
    const uncertain = error === null ? '' : ` ± ${decimals(error, 2)} (standard error)`
    return `ln[A f(α)] ${decimals(lnAf, 2)}${uncertain}, A in 1/s${covariance === null ? '' : `; covariance with Ea ${decimals(covariance, 3)} kJ/mol`}.`
  }
  const lnA = at(profile.lnA_per_s)
  return lnA === null ? null : `ln A ${decimals(lnA, 2)}, A in 1/s, by the model that the method assumes.`
}
