import { studentTQuantile } from '../../numerics/student-t.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'
import { leadingProfile } from './energy-varies.ts'

const fewDegrees = 2
const wide = 0.1

/** Fires where at most two degrees of freedom (three or four runs) go with a median half interval of more than 10 % of Ea. */
export function intervalWideBecauseFewRuns({ result }: ReviewInput): Finding[] {
  const profile = leadingProfile(result.profiles)
  if (profile === undefined) return []
  const { dof } = profile.interval
  if (dof < 1 || dof > fewDegrees) return []
  const shares = profile.Ea_kJ_per_mol.flatMap((Ea, i) => {
    const upper = profile.upper95_kJ_per_mol[i] ?? null
    return Ea === null || upper === null || Ea <= 0 ? [] : [(upper - Ea) / Ea]
  }).sort((a, b) => a - b)
  const middle = shares[shares.length >> 1]
  if (middle === undefined || middle <= wide) return []
  const now = studentTQuantile(0.975, dof)
  const next = studentTQuantile(0.975, dof + 1)
  return [
    {
      code: 'interval-wide-because-few-runs',
      severity: 'note',
      stage: 'activation',
      title: `95 % interval of ±${percent(middle)} rests on ${dof + 2} runs`,
      message:
        `Half the 95 % interval of Ea (${profile.label}) is ${percent(middle)} of Ea at the middle level. With ${dof + 2} runs a standard error is multiplied by ${digits(now)}; ` +
        `with one run more it would be ${digits(next)}. Most of the width is for want of runs, not for bad ones: add a heating rate or a replicate.`,
      run: null,
      level: null,
      evidence: { runs: dof + 2, halfInterval_percent: 100 * middle, t: now, tWithOneMore: next },
      basis: "Student's t; 10 % is common practice",
      sources: ['abramowitz-stegun-1964', 'ictac-2011'],
    },
  ]
}
