import type { Finding } from '../finding.ts'
import { digits } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

const least_kJ_per_mol = 20
const most_kJ_per_mol = 450

/** Fires where Ea is not above 0, or so small or large that a slip of unit or heading is likelier. */
export function energyImplausible({ result: { line } }: RateConstantReview): Finding[] {
  const Ea = line.Ea_kJ_per_mol
  if (Ea === null || (Ea >= least_kJ_per_mol && Ea <= most_kJ_per_mol)) return []
  const [title, message] = reading(Ea)
  return [
    aboutTable({
      code: Ea > 0 ? 'energy-implausible' : 'energy-not-positive',
      severity: 'caution',
      title,
      message,
      evidence: { Ea_kJ_per_mol: Ea },
      basis: `Ea of reactions of solids and liquids mostly lies between ${least_kJ_per_mol} and ${most_kJ_per_mol} kJ/mol; common practice`,
      sources: [],
    }),
  ]
}

function reading(Ea: number): readonly [string, string] {
  const value = `${digits(Ea)} kJ/mol`
  if (Ea <= 0) {
    return [
      `Ea is not above 0 (${value})`,
      `Ea is ${value}: the rate constants do not rise with temperature. Look at the order of the rows, at the unit of temperature, and at whether the column holds k and not a time.`,
    ]
  }
  if (Ea < least_kJ_per_mol) {
    return [
      `Ea of ${value} is very small`,
      `Ea is ${value}, as of transport (diffusion, evaporation, heat) rather than of a reaction. Look at the unit of temperature (K or °C) and at what limits the rate.`,
    ]
  }
  return [
    `Ea of ${value} is very large`,
    `Ea is ${value}. Denaturation of proteins and processes near equilibrium reach this, few reactions do. Look at the units of temperature and k, and at whether the temperatures span enough.`,
  ]
}
