import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits } from '../words.ts'

const allowed = 0.1

/** Fires where Kissinger was given, and the conversion at the rate peak differs by more than 0.1 between runs. */
export function peaksAtDifferentConversion({ result }: ReviewInput): Finding[] {
  const { kissinger } = result
  if (kissinger === null) return []
  const known = kissinger.conversionAtPeak.filter((conversion) => conversion !== null)
  const [lowest, highest] = [Math.min(...known), Math.max(...known)]
  if (!(highest - lowest > allowed)) return []
  const at = (conversion: number): string => result.runs[kissinger.conversionAtPeak.indexOf(conversion)]?.label ?? ''
  return [
    {
      code: 'peaks-at-different-conversion',
      severity: 'caution',
      stage: 'activation',
      title: `Kissinger compares peaks at conversion ${digits(lowest, 2)} to ${digits(highest, 2)}`,
      message:
        `The rate peaks at conversion ${digits(lowest, 2)} in ${at(lowest)} and ${digits(highest, 2)} in ${at(highest)}. Kissinger takes it to be the same; peaks of different steps ` +
        `may be mixed, and ${digits(kissinger.Ea_kJ_per_mol)} kJ/mol may belong to none. Use Ea level by level.`,
      run: null,
      level: null,
      evidence: { lowest, highest, difference: highest - lowest, Ea_kJ_per_mol: kissinger.Ea_kJ_per_mol },
      basis: 'Kissinger holds where the conversion at the peak does not change with the heating rate; 0.1 is common practice',
      sources: ['kissinger-1957', 'ictac-2011'],
    },
  ]
}
