import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { runsAtOdds } from '../runs-at-odds.ts'
import { digits } from '../words.ts'

const leastChange = 0.05

/**
 * Fires, with five runs or more, for a run that lies off the lines through the others beyond chance, to one side at more than half of the levels, and without which Ea
 * is different by more than 5 %.
 */
export function outlierRun(input: ReviewInput, checkCancelled: () => void = () => undefined): Finding[] {
  return runsAtOdds(input, leastChange, checkCancelled).map(({ run, levels, judged, limit, example }): Finding => {
    const [without, whole] = [digits(example.EaWithout_kJ_per_mol), digits(example.EaWith_kJ_per_mol)]
    return {
      code: 'outlier-run',
      severity: 'caution',
      stage: 'activation',
      title: `${run.info.label} is at odds with the others: Ea ${whole} kJ/mol with it, ${without} without`,
      message:
        `At conversion ${digits(example.level)} it lies ${digits(Math.abs(example.studentised), 2)} standard errors off the line through the others (chance: up to ${digits(limit, 2)}), ` +
        `and to that side at ${levels} of ${judged} levels. Check its temperature calibration, mass, heating rate and window; leave it out if the cause is found.`,
      run: run.info.id,
      level: example.level,
      evidence: {
        studentisedResidual: Number.isFinite(example.studentised) ? example.studentised : null,
        limit,
        EaWith_kJ_per_mol: example.EaWith_kJ_per_mol,
        EaWithout_kJ_per_mol: example.EaWithout_kJ_per_mol,
        levels,
        judged,
      },
      basis:
        'Externally studentised residual beyond t(n - 3), 5 % shared among the runs (Bonferroni); a change of Ea of 5 % is common practice',
      sources: ['cook-weisberg-1982'],
    }
  })
}
