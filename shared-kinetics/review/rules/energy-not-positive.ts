import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, levelsInWords, list } from '../words.ts'

/** Fires once where methods give an Ea at or below 0. */
export function energyNotPositive({ result }: ReviewInput): Finding[] {
  const below = result.profiles.flatMap((profile) =>
    result.levels.flatMap((level, i) => {
      const Ea = profile.Ea_kJ_per_mol[i] ?? null
      return Ea !== null && Ea <= 0 ? [{ method: profile.label, level, Ea }] : []
    }),
  )
  if (below.length === 0) return []
  const levels = [...new Set(below.map(({ level }) => level))].sort((a, b) => a - b)
  const methods = [...new Set(below.map(({ method }) => method))]
  const worst = below.reduce((a, b) => (b.Ea < a.Ea ? b : a))
  return [
    {
      code: 'energy-not-positive',
      severity: 'caution',
      stage: 'activation',
      title: `Ea is not above 0 at conversion ${levelsInWords(levels)}`,
      message:
        `${list(methods)} give${methods.length === 1 ? 's' : ''} down to ${digits(worst.Ea)} kJ/mol: faster runs do not reach the level at higher temperatures. Such an Ea means ` +
        'nothing and is left out of the mean. Look at window, baseline and calibration of the runs; leave out the wrong one.',
      run: null,
      level: worst.level,
      evidence: { methods: methods.join(', '), lowest_kJ_per_mol: worst.Ea, levels: levels.length },
      basis: 'Isoconversional methods take the same reaction to run faster the hotter it is',
      sources: ['ictac-2011'],
    },
  ]
}
