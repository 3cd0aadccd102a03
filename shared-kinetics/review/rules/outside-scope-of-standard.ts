import type { MethodId } from '../../isoconversional/result.ts'
import type { ProfileResult, RunResult } from '../../tasks/study-result.ts'
import { gasConstant_J_per_mol_K } from '../../units/constants.ts'
import type { Finding } from '../finding.ts'
import { countRateMaxima } from '../rate-maxima.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, list, programmesOf } from '../words.ts'

type Standard = Extract<MethodId, 'astm-e1641' | 'iso-11358-2'>

interface Scope {
  readonly words: string
  readonly temperature_K: readonly [number, number] | null
  readonly fewestProgrammes: number
  /** Ea/(RT) for which the standard's constants are made. */
  readonly x: readonly [number, number]
}

const scopes: Readonly<Record<Standard, Scope>> = {
  'astm-e1641': {
    words:
      'thermogravimetry between 400 and 1300 K of a smooth mass loss with a single maximum of its rate, first order, customarily at four heating rates or more',
    temperature_K: [400, 1300],
    fewestProgrammes: 4,
    x: [8, 60],
  },
  'iso-11358-2': {
    words: 'thermogravimetry of polymers that decompose by a single mechanism or in single steps that are clearly apart',
    temperature_K: null,
    fewestProgrammes: 3,
    x: [20, 60],
  },
}

/** A second maximum counts where the rate falls and rises again by more than this share of its highest value: clear of noise. */
const standsOut = 0.2

/** Fires where a standard was asked for, and the runs lie outside of what it is made for. Ea is given nevertheless. */
export function outsideScopeOfStandard({ result, runs }: ReviewInput): Finding[] {
  return result.profiles.flatMap((profile): Finding[] => {
    const method = profile.method
    if (method !== 'astm-e1641' && method !== 'iso-11358-2') return []
    const scope = scopes[method]
    const temperatures = runs.flatMap((run) => run.result.temperatureAtLevel_K.filter((T) => T !== null))
    const x = energyRatios(profile, runs)
    const reasons = [
      ...notMass(result.signal),
      ...severalMaxima(runs),
      ...outside(temperatures, scope.temperature_K, (from, to) => `the levels are reached at ${digits(from)} to ${digits(to)} K`),
      ...tooFew(programmesOf(runs).length, scope.fewestProgrammes),
      ...outside(
        x,
        scope.x,
        (from, to) => `Ea/(RT) is ${digits(from, 2)} to ${digits(to, 2)}, and its constants are made for ${scope.x[0]} to ${scope.x[1]}`,
      ),
    ]
    if (reasons.length === 0) return []
    return [
      {
        code: 'outside-scope-of-standard',
        severity: 'caution',
        stage: 'activation',
        title: `Outside the scope of ${profile.label}`,
        message:
          `${profile.label} is made for ${scope.words}. Here ${reasons.join('; ')}. Its Ea is worked out nevertheless, but a report should not call it a result by that ` +
          'standard. Use Starink or Vyazovkin, which are not bound to it.',
        run: null,
        level: null,
        evidence: {
          method,
          reasons: reasons.length,
          programmes: programmesOf(runs).length,
          lowestEaPerRT: least(x),
          highestEaPerRT: most(x),
        },
        basis: `Scope of ${profile.label} (heating rates and the range of its constants remembered, not re-read)`,
        sources: [method],
      },
    ]
  })
}

const notMass = (signal: ReviewInput['result']['signal']): string[] =>
  signal === 'heat-flow' || signal === 'heat-release'
    ? [`the signal is ${signal === 'heat-flow' ? 'a heat flow' : 'a heat-release rate'}`]
    : []

function severalMaxima(runs: ReviewInput['runs']): string[] {
  const several = runs.filter((run) => countRateMaxima(rateWithin(run.result), standsOut) > 1)
  return several.length === 0 ? [] : [`the rate has more than one maximum in ${list(several.map((run) => run.info.label))}`]
}

/** The rate without the first and last twentieth of the reaction, where a step of the balance would look like a maximum. */
const rateWithin = ({ curve }: RunResult): Float64Array =>
  curve.reactionRate_per_s.filter((_, i) => (curve.conversion[i] ?? 0) >= 0.05 && (curve.conversion[i] ?? 0) <= 0.95)

const tooFew = (programmes: number, fewest: number): string[] =>
  programmes < fewest ? [`there are ${programmes} distinct heating rates, fewer than ${fewest}`] : []

function outside(values: readonly number[], range: readonly [number, number] | null, say: (from: number, to: number) => string): string[] {
  const [lowest, highest] = [least(values), most(values)]
  if (range === null || lowest === null || highest === null) return []
  return lowest < range[0] || highest > range[1] ? [say(lowest, highest)] : []
}

/** Ea/(RT) of every level with an Ea, T over the runs. */
function energyRatios(profile: ProfileResult, runs: ReviewInput['runs']): number[] {
  return profile.Ea_kJ_per_mol.flatMap((Ea, level) =>
    Ea === null
      ? []
      : runs.flatMap((run) => {
          const T = run.result.temperatureAtLevel_K[level] ?? null
          return T === null ? [] : [(1000 * Ea) / (gasConstant_J_per_mol_K * T)]
        }),
  )
}

const least = (values: readonly number[]): number | null => (values.length === 0 ? null : values.reduce((a, b) => Math.min(a, b)))
const most = (values: readonly number[]): number | null => (values.length === 0 ? null : values.reduce((a, b) => Math.max(a, b)))
