import type { MethodId } from '../../isoconversional/result.ts'
import type { ProfileResult } from '../../tasks/study-result.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const noticeable = 0.1
const large = 0.2

/** The method the rule looks at: the first of these that was run. */
const preferred: readonly MethodId[] = ['vyazovkin', 'friedman', 'starink', 'kas', 'ofw', 'isothermal-integral']

export const leadingProfile = (profiles: readonly ProfileResult[]): ProfileResult | undefined =>
  preferred.map((method) => profiles.find((profile) => profile.method === method)).find((profile) => profile !== undefined)

/** Fires where Ea spreads (largest less smallest, over the range of the mean) by more than 10 % of its mean: a note, beyond 20 % a caution. */
export function energyVaries({ result }: ReviewInput): Finding[] {
  const profile = leadingProfile(result.profiles)
  if (profile === undefined) return []
  const { from, to, Ea_kJ_per_mol: meanEa, spread_kJ_per_mol: spread } = profile.mean
  if (meanEa === null || spread === null || meanEa <= 0) return []
  const share = spread / meanEa
  if (share <= noticeable) return []
  return [
    {
      code: 'energy-varies',
      severity: share > large ? 'caution' : 'note',
      stage: 'activation',
      title: `Ea varies by ${percent(share)} of its mean`,
      message:
        `Between conversion ${digits(from)} and ${digits(to)} Ea (${profile.label}) spreads over ${digits(spread)} kJ/mol around a mean of ${digits(meanEa)} kJ/mol. ` +
        `${share > large ? 'The reaction has more than one step' : 'The reaction may have more than one step'}: one Ea with one kinetic model ${share > large ? 'does' : 'may'} not describe it. ` +
        'Use Ea level by level, and do not quote its mean alone.',
      run: null,
      level: null,
      evidence: { method: profile.method, mean_kJ_per_mol: meanEa, spread_kJ_per_mol: spread, spread_percent: 100 * share },
      basis: 'A spread of more than 10 to 20 % of the mean Ea tells of several steps',
      sources: ['ictac-2011'],
    },
  ]
}
