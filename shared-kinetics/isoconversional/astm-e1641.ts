import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import { doyleA, doyleTableSlope } from '../temperature-integral/doyle-table.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { heatingRateOf, lineMethod, temperatureAtLevel, type LineAtLevel, type RefinedLine } from './line-method.ts'
import { middleHeatingRate } from './middle-heating-rate.ts'
import type { MethodInfo } from './result.ts'

export const astmE1641Info: MethodInfo = {
  id: 'astm-e1641',
  label: 'ASTM E1641',
  sources: ['astm-e1641', 'flynn-wall-1966', 'doyle-1962'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: false,
}

/** b of the first pass, in log10. */
const firstSlope = 0.457

/** The standard ends where Ea changes by less than 1 %; going on to where it no longer changes makes the number reproducible. */
const converged = 1e-12
const mostPasses = 60

/** Below, the table's difference ends. */
const leastX = 2

/**
 * Ea and A as ASTM E1641 has them, for reports made by that standard: at each level the line
 *
 *   log10 beta = const - b Ea/(R T),   Ea = -(R/b)·slope
 *
 * through the runs. b starts at 0.457 and is refined: from Ea follows x = Ea/(R Tc), Tc the temperature at the heating rate nearest the middle, from x the b of Doyle's
 * table, from b the next Ea. The standard asks for this until Ea changes by less than 1 %; it is done until Ea no longer changes, which moves the result by less than
 * 0.1 % once more. b is the table's, a backward difference of a = -log10 p(x) and not its derivative (see `doyleTableSlope`), computed from exact a. Then, by first order,
 *
 *   A = -(beta'/Ea)·R·ln(1 - alpha)·10ᵃ,   a at Ea/(R Tc), beta' the heating rate of that run; ln A is given with A in 1/s.
 *
 * The heating rate nearest the middle is that nearest to half the sum of the lowest and the highest, the slower of two that are equally near, the first of its replicates.
 *
 * Scope of the standard: thermogravimetry between 400 and 1300 K; a smooth mass loss with a single maximum of the rate; first order; at least four heating rates are
 * customary (1, 2, 5, 10 K/min). Ea is worked out outside of it too, and a finding says where. Not for the final number where the report need not follow the
 * standard: the table's b leaves a systematic error of Ea (-0.95 % at Ea/(RT) = 10, -0.24 % at 20, -0.11 % at 30, -0.03 % at 60), and A holds for first order alone.
 *
 * Standard error: |dEa/dslope|·(that of the slope). Since b follows Ea, Ea b(x) = -R·slope and dEa/dslope = -R/(d[x b(x)]/dx) = -R/(b + x b'(x)), which is more than R/b:
 * by some 20 % at x = 10, 10 % at 20, 7 % at 30, 3 % at 60. Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined` (also where x falls below 2,
 * where the table's difference ends).
 *
 * @source astm-e1641
 */
export const astmE1641 = lineMethod({
  info: astmE1641Info,
  temperature: temperatureAtLevel,
  ordinate: (run) => Math.log10(heatingRateOf(run)),
  withoutOrdinate: 'line-not-determined',
  slopeFactor: -firstSlope,
  interceptIsLnAf: false,
  integral: null,
  refine: refinedByTable,
})

function refinedByTable({ series, level, y, fit }: LineAtLevel): RefinedLine | null {
  const middle = middleRun(series)
  if (middle === undefined) return null
  const thermal = gasConstant_J_per_mol_K * temperatureAtLevel(middle, level)
  let b = firstSlope
  let Ea = -(gasConstant_J_per_mol_K / b) * fit.slope
  for (let pass = 0; pass < mostPasses; pass++) {
    if (!(Ea > 0)) return null
    b = doyleTableSlope(Ea / thermal)
    const next = -(gasConstant_J_per_mol_K / b) * fit.slope
    if (!Number.isFinite(next)) return null
    const settled = Math.abs(next - Ea) <= converged * Ea
    Ea = next
    if (settled) {
      const integral = { temperatureExponent: 0, divisor: b * Math.LN10 }
      return {
        Ea,
        y,
        fit,
        energyPerSlope: -gasConstant_J_per_mol_K / (b + (Ea / thermal) * slopeOfTableSlope(Ea / thermal)),
        lnA: lnAOf(Ea, thermal, heatingRateOf(middle), series, level),
        integral,
      }
    }
  }
  return null
}

/** db/dx. b is a straight line between whole x, so that a difference is exact there; at whole x it is the mean of both sides. */
function slopeOfTableSlope(x: number): number {
  const step = 1e-4 * x
  const from = Math.max(leastX, x - step)
  return (doyleTableSlope(x + step) - doyleTableSlope(from)) / (x + step - from)
}

/** ln A with A in 1/s, the heating rate in K/s. */
function lnAOf(Ea: number, thermal: number, heatingRate: number, series: SeriesAtLevels, level: number): number {
  const alpha = series.levels[level] ?? Number.NaN
  return Math.log((heatingRate * gasConstant_J_per_mol_K * -Math.log1p(-alpha)) / Ea) + Math.LN10 * doyleA(Ea / thermal)
}

const middleRun = ({ runs }: SeriesAtLevels): RunAtLevels | undefined => runs[middleHeatingRate(runs.map(heatingRateOf))]
