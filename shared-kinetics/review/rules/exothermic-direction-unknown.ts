import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, list } from '../words.ts'

/** Fires once where runs have an enthalpy whose sign cannot be told, since nothing says which way an exothermic event points. */
export function exothermicDirectionUnknown({ runs }: ReviewInput): Finding[] {
  const unknown = runs.filter(({ result }) => result.enthalpyMagnitude_J_per_g !== null && result.enthalpy_J_per_g === null)
  if (unknown.length === 0) return []
  const magnitudes = unknown.flatMap(({ result }) => result.enthalpyMagnitude_J_per_g ?? [])
  const [least, most] = [Math.min(...magnitudes), Math.max(...magnitudes)]
  const many = unknown.length > 3
  const named = many ? `${unknown.length} runs` : list(unknown.map(({ info }) => info.label))
  return [
    {
      code: 'exothermic-direction-unknown',
      severity: 'note',
      stage: 'runs',
      title: `Enthalpy of ${digits(most)} J/g without a sign`,
      message:
        `Of ${named} nothing says which way an exothermic event points. The enthalpy (${least === most ? digits(most) : `${digits(least)} to ${digits(most)}`} J/g) is given as a ` +
        'magnitude; Ea does not depend on the sign. Say which way exothermic points to get it.',
      run: null,
      level: null,
      evidence: { runs: unknown.length, least_J_per_g: least, most_J_per_g: most },
      basis: 'Exothermic is negative, endothermic positive; no sign is guessed',
      sources: [],
    },
  ]
}
