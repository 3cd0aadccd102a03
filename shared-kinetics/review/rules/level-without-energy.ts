import type { LevelStatus } from '../../isoconversional/result.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { levelsInWords } from '../words.ts'

/** What each status of a level means and what to do; null where another rule speaks of it. */
const explanations: Readonly<Record<LevelStatus, string | null>> = {
  ok: null,
  'level-not-reached': null,
  'too-few-programmes': null,
  'rate-not-positive':
    'The reaction rate of some run is not above 0 there, so that it has no logarithm. Look at noise, baseline and window of the runs, or ask for levels farther from 0 and 1.',
  'line-not-determined':
    'The runs have no points that determine a line there: their temperatures are the same. Look at windows and programmes; add a run at another heating rate or hold temperature.',
  'minimum-at-bound':
    'Φ(Ea) has no minimum between 1 and 1000 kJ/mol: faster runs do not reach the level at higher temperatures, or hardly differ. Look at windows and baselines; leave out the wrong run.',
  'minimum-flat':
    'The runs have one effective temperature there, so that Φ does not depend on Ea. Add a run at another heating rate or hold temperature.',
  'several-minima':
    'Φ(Ea) has minima that its threshold does not tell apart: several Ea suit the runs alike. See the curve of Φ at the left; add a run whose programme differs more, or use Friedman.',
}

/** Fires once for each method and reason why levels were given no Ea, save those that other rules speak of. */
export function levelWithoutEnergy({ result }: ReviewInput): Finding[] {
  return result.profiles.flatMap((profile) =>
    [...new Set(profile.status)].flatMap((status): Finding[] => {
      const explanation = explanations[status]
      if (explanation === null) return []
      const without = result.levels.filter((_, i) => profile.status[i] === status)
      return [
        {
          code: 'level-without-energy',
          severity: 'caution',
          stage: 'activation',
          title: `${profile.label} gives no Ea at conversion ${levelsInWords(without)}`,
          message: `${explanation} No number is made up; the mean leaves ${without.length === 1 ? 'this level' : `these ${without.length} levels`} out.`,
          run: null,
          level: without[0] ?? null,
          evidence: { method: profile.method, status, missing: without.length, levels: result.levels.length },
          basis: 'A level has a number only where the method determines it',
          sources: ['ictac-2011'],
        },
      ]
    }),
  )
}
