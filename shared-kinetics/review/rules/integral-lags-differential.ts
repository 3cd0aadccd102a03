import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.1
const rounding = 1e-9

/** Fires where Vyazovkin's Ea, integrated from zero, and Friedman's differ by more than 10 % of Friedman's at some level inside the range of the mean. */
export function integralLagsDifferential({ study, result }: ReviewInput): Finding[] {
  const integral = result.profiles.find((profile) => profile.method === 'vyazovkin')
  const differential = result.profiles.find((profile) => profile.method === 'friedman')
  if (integral === undefined || differential === undefined) return []
  const [from, to] = study.settings.meanRange
  const gaps = result.levels.flatMap((level, i) => {
    const a = integral.Ea_kJ_per_mol[i] ?? null
    const b = differential.Ea_kJ_per_mol[i] ?? null
    if (a === null || b === null || b <= 0 || level < from - rounding || level > to + rounding) return []
    return [{ level, integral: a, differential: b, gap: Math.abs(a - b) / b }]
  })
  if (gaps.length === 0) return []
  const worst = gaps.reduce((a, b) => (b.gap > a.gap ? b : a))
  if (worst.gap <= allowed) return []
  return [
    {
      code: 'integral-lags-differential',
      severity: 'note',
      stage: 'activation',
      title: `Integral and differential Ea differ by up to ${percent(worst.gap)}`,
      message:
        `At conversion ${digits(worst.level)} Vyazovkin gives ${digits(worst.integral)} and Friedman ${digits(worst.differential)} kJ/mol. An integral from zero averages Ea over all conversions ` +
        'below and lags where it changes; Friedman follows at once, but is more sensitive to noise and baseline. Where both are smooth, trust Friedman.',
      run: null,
      level: worst.level,
      evidence: {
        level: worst.level,
        integral_kJ_per_mol: worst.integral,
        differential_kJ_per_mol: worst.differential,
        difference_percent: 100 * worst.gap,
      },
      basis: 'Integrals from zero hold for an Ea that does not change; 10 % is common practice',
      sources: ['ictac-2011', 'vyazovkin-2001'],
    },
  ]
}
