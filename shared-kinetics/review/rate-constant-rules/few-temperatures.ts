import { studentTQuantile } from '../../numerics/student-t.ts'
import type { Finding } from '../finding.ts'
import { digits, percent } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

/** Half an interval of more than this share of Ea is called wide. */
const wide = 0.1

/** Fewer than two distinct temperatures give no Ea (stop), two give one without an interval (caution); with few points the interval may be wide for want of them (note). */
export function fewTemperatures({ result: { line } }: RateConstantReview): Finding[] {
  const { distinctTemperatures: temperatures, points } = line
  const counted = `${temperatures === 0 ? 'No' : temperatures} distinct temperature${temperatures === 1 ? '' : 's'}`
  if (temperatures < 2) {
    return [
      aboutTable({
        code: 'few-temperatures',
        severity: 'stop',
        title: `${counted}; Ea needs at least 2, an interval 3`,
        message: `${counted} among ${points} rows used. Ea is the slope of ln k over temperatures: add rate constants at two or more other temperatures.`,
        evidence: { temperatures, points },
        basis: 'A line needs two points, an interval three',
        sources: ['draper-smith-1998'],
      }),
    ]
  }
  if (temperatures === 2) {
    return [
      aboutTable({
        code: 'few-temperatures',
        severity: 'caution',
        title: 'No interval: two distinct temperatures',
        message: `${counted}. Through two any line fits, so that Ea has no interval and nothing shows whether ln k is straight. Add a rate constant at a third temperature.`,
        evidence: { temperatures, points },
        basis: 'A line needs two points, an interval three',
        sources: ['draper-smith-1998'],
      }),
    ]
  }
  const { Ea_kJ_per_mol: Ea, standardError_kJ_per_mol: error } = line
  if (Ea === null || error === null || !(Ea > 0)) return []
  const t = studentTQuantile(0.975, line.interval.dof)
  const half = (t * error) / Ea
  if (half <= wide) return []
  const isForWantOfPoints = (1.96 * error) / Ea <= wide
  return [
    aboutTable({
      code: 'few-temperatures',
      severity: isForWantOfPoints ? 'note' : 'caution',
      title: `95 % interval of ±${percent(half)} of Ea`,
      message:
        `Half the interval of Ea is ${percent(half)} of Ea: with ${points} points a standard error of ${digits(error)} kJ/mol is multiplied by ${digits(t)} (with many by 1.96). ` +
        (isForWantOfPoints
          ? 'The width is for want of points: add temperatures or replicates.'
          : 'More points alone would not make it narrow: the rate constants scatter too much, or lie too close in temperature.'),
      evidence: { points, halfInterval_percent: 100 * half, t },
      basis: "Student's t; 10 % is common practice",
      sources: ['abramowitz-stegun-1964'],
    }),
  ]
}
