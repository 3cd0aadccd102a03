import { levelText } from '../../shared-kinetics/figure/nice-axis.ts'
import { middleHeatingRate } from '../../shared-kinetics/isoconversional/middle-heating-rate.ts'
import type { ProfileResult, StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { doyleTableSlope } from '../../shared-kinetics/temperature-integral/doyle-table.ts'
import { gasConstant_J_per_mol_K } from '../../shared-kinetics/units/constants.ts'

/** A as ASTM E1641 has it, by first order; every array as long as the levels. */
export interface PreExponential {
  readonly model: string
  /** beta', and the run it is of. */
  readonly heatingRate_K_per_min: number
  readonly run: string
  readonly A_per_s: readonly (number | null)[]
  readonly A_per_min: readonly (number | null)[]
  /** From the standard error of Ea alone. */
  readonly lnAStandardError: readonly (number | null)[]
}

/**
 * A of a profile by ASTM E1641 with the heating rate it was computed with; null for other methods, which give none.
 *
 * Standard error of ln A: ln A = const - ln Ea + ln 10·a(x), x = Ea/(R Tc), da/dx = b, so that d(ln A)/dEa = -1/Ea + ln 10·b/(R Tc).
 *
 * @source astm-e1641
 */
export function preExponentialOf(profile: ProfileResult, { runs }: Pick<StudyResult, 'runs'>): PreExponential | null {
  if (profile.method !== 'astm-e1641') return null
  const ramps = runs.filter((run) => run.heatingRate_K_per_min !== null)
  const middle = ramps[middleHeatingRate(ramps.map((run) => run.heatingRate_K_per_min ?? Number.NaN))]
  if (middle === undefined || middle.heatingRate_K_per_min === null) return null
  const lnAs = profile.lnA_per_s
  return {
    model: 'first order, 1 - α',
    heatingRate_K_per_min: middle.heatingRate_K_per_min,
    run: middle.label,
    A_per_s: lnAs.map((lnA) => finite(lnA === null ? null : Math.exp(lnA))),
    A_per_min: lnAs.map((lnA) => finite(lnA === null ? null : 60 * Math.exp(lnA))),
    lnAStandardError: lnAs.map((lnA, i) => {
      const [Ea, error, T] = [profile.Ea_kJ_per_mol[i], profile.standardError_kJ_per_mol[i], middle.temperatureAtLevel_K[i]]
      if (lnA === null || isMissing(Ea) || isMissing(error) || isMissing(T)) return null
      const J = 1000 * Ea
      const thermal = gasConstant_J_per_mol_K * T
      return finite(Math.abs(-1 / J + (Math.LN10 * doyleTableSlope(J / thermal)) / thermal) * 1000 * error)
    }),
  }
}

/** What a report by a standard says of A: at every level for ASTM E1641, that there is none for ISO 11358-2; nothing of other methods. */
export function preExponentialLines(profile: ProfileResult, result: StudyResult): string[] {
  if (profile.method === 'iso-11358-2') return ['ISO 11358-2 gives no A']
  const found = preExponentialOf(profile, result)
  if (found === null) return []
  const { heatingRate_K_per_min: rate, run, model, A_per_s, A_per_min, lnAStandardError } = found
  return [
    `${profile.label}: A by ${model}, with β′ = ${rate.toFixed(3)} K/min (${run}, the heating rate nearest the middle); standard errors of ln A are from that of Ea alone`,
    ...result.levels.flatMap((level, i) => {
      const [perSecond, perMinute, error] = [A_per_s[i], A_per_min[i], lnAStandardError[i]]
      if (isMissing(perSecond) || isMissing(perMinute)) return []
      const ofLnA = isMissing(error) ? 'no standard error' : `standard error of ln A ${error.toFixed(2)}`
      return [`  conversion ${levelText(level)}: A = ${perSecond.toExponential(3)} 1/s = ${perMinute.toExponential(3)} 1/min, ${ofLnA}`]
    }),
  ]
}

const isMissing = (value: number | null | undefined): value is null | undefined => value === null || value === undefined
const finite = (value: number | null): number | null => (value === null || !Number.isFinite(value) ? null : value)
