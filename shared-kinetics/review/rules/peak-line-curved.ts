import { linearLeastSquares } from '../../numerics/linear-least-squares.ts'
import { studentTQuantile } from '../../numerics/student-t.ts'
import { gasConstant_J_per_mol_K } from '../../units/constants.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, mean, percent, programmesOf } from '../words.ts'

const fewestProgrammes = 4
const allowed = 0.2

/**
 * Fires, with four programmes or more, where Kissinger's line through the peaks is curved beyond chance (a squared term differs from 0 at 5 %) and so much that its
 * slope, and Ea with it, changes by more than 20 % of itself from the slowest to the fastest run.
 */
export function peakLineCurved({ result, runs }: ReviewInput): Finding[] {
  const line = result.peakMethods.find((method) => method.method === 'kissinger' && method.applies)?.line ?? null
  if (line === null || programmesOf(runs).length < fewestProgrammes) return []
  const x = line.x_per_K.filter((value) => value !== null)
  const y = line.y.filter((value) => value !== null)
  if (x.length !== y.length || x.length < fewestProgrammes) return []
  const middle = mean(x)
  const from = x.map((value) => value - middle)
  const fit = linearLeastSquares([from.map(() => 1), from, from.map((value) => value * value)], y)
  const [, slope = Number.NaN, bend = Number.NaN] = fit.coefficients
  if (fit.status !== 'ok' || fit.dof < 1) return []
  const t = Math.abs(bend) / (fit.standardErrors[2] ?? Number.NaN)
  const EaAt = (at: number): number => (-gasConstant_J_per_mol_K * (slope + 2 * bend * at)) / 1000
  const [slow, fast] = [EaAt(Math.max(...from)), EaAt(Math.min(...from))]
  const change = Math.abs(slow - fast) / EaAt(0)
  const limit = studentTQuantile(0.975, fit.dof)
  if (!(t > limit && change > allowed)) return []
  return [
    {
      code: 'peak-line-curved',
      severity: 'caution',
      stage: 'activation',
      title: `The line through the peaks is curved: Ea ${digits(slow)} kJ/mol among slow runs, ${digits(fast)} among fast ones`,
      message:
        `The squared term of Kissinger's line is ${digits(t, 2)} standard errors from 0 (chance: up to ${digits(limit, 2)}), and its slope changes by ${percent(change)}. ` +
        'One Ea does not describe these peaks: Kissinger, ASTM E698 and ASTM E2890 do not apply. Look for a fast run that lags behind its furnace, or use Ea level by level.',
      run: null,
      level: null,
      evidence: { slow_kJ_per_mol: slow, fast_kJ_per_mol: fast, change, t, limit },
      basis: 'A plot of the peaks that is not straight marks a case where the method does not apply; 20 % is common practice',
      sources: ['astm-e698', 'draper-smith-1998'],
    },
  ]
}
