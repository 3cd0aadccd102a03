import type { Finding } from '../finding.ts'
import { leadingProfile } from '../leading-profile.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, list, percent } from '../words.ts'

const allowed = 0.2

/** Fires where Ea of a single run (Borchardt–Daniels) is off the mean Ea of the runs together by more than 20 %; one finding for all such runs. */
export function singleRunEnergyDiffers({ result }: ReviewInput): Finding[] {
  const leading = leadingProfile(result.profiles)
  const together = leading?.mean.Ea_kJ_per_mol ?? null
  if (leading === undefined || together === null) return []
  const off = (Ea: number): number => Math.abs(Ea / together - 1)
  const single = result.peakMethods.flatMap(({ runLabel, applies, Ea_kJ_per_mol: Ea }) =>
    runLabel !== null && applies && Ea !== null && off(Ea) > allowed ? [{ label: runLabel, Ea }] : [],
  )
  const [worst] = [...single].sort((a, b) => off(b.Ea) - off(a.Ea))
  if (worst === undefined) return []
  const runs = single.length > 3 ? `${single.length} runs` : list(single.map(({ label }) => label))
  return [
    {
      code: 'single-run-energy-differs',
      severity: 'note',
      stage: 'activation',
      title: `Borchardt–Daniels gives ${digits(worst.Ea)} kJ/mol from one run, ${leading.label} ${digits(together)} from all`,
      message:
        `From ${runs} alone Ea is off the mean of ${leading.label} by more than ${percent(allowed)}, most for ${worst.label}. A single run fits an nth-order reaction well even where the ` +
        'reaction is none, with a narrow interval. Use Ea from all runs.',
      run: null,
      level: null,
      evidence: {
        runs: single.length,
        run: worst.label,
        singleRun_kJ_per_mol: worst.Ea,
        together_kJ_per_mol: together,
        method: leading.method,
      },
      basis: 'One heating rate is never enough; 20 % is common practice',
      sources: ['ictac-2011', 'borchardt-daniels-1957'],
    },
  ]
}
