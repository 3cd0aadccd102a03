import { KineticsError } from '../errors.ts'
import { lnPOfX, scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Quantity } from '../units/quantity.ts'

/** The decomposition that ends the life of a material: its Ea, and where a run at a constant heating rate reaches the conversion taken as failure. */
export interface FailureDecomposition {
  readonly Ea: Quantity<'J/mol'>
  /** One standard error of Ea; NaN where it is not known. */
  readonly standardError: Quantity<'J/mol'>
  /** T_c, of the run named by its heating rate (for ASTM E1641 the one nearest the middle). */
  readonly temperatureAtFailure: Quantity<'K'>
  readonly heatingRate: Quantity<'K/s'>
}

/** A time and how far its logarithm is open. */
export interface FailureTime {
  readonly time: Quantity<'s'>
  readonly lnTime: number
  /** One standard error of ln t_f that follows from Ea's: |1/(R T_f) + 1/Ea - h/(R T_c)| se(Ea), T_c taken as exact. */
  readonly lnStandardError: number
}

/** A temperature and one standard error of it that follows from Ea's, the time being given. */
export interface ThermalIndex {
  readonly temperature: Quantity<'K'>
  readonly standardError: Quantity<'K'>
}

/** Failure time for which a thermal index is given unless another is asked for, in s: 60,000 h. */
export const customaryFailureTime_s = 60_000 * 3600

/**
 * Thermal endurance after ASTM E1877: the time t_f at a constant temperature T_f to the conversion taken as failure, from Ea and one run at heating rate beta that
 * reaches this conversion at T_c:
 *
 *   log t_f = Ea/(ln 10·R T_f) + log[Ea/(R beta)] - a,   a = -log p(Ea/(R T_c))
 *
 * a is computed, not read from the table of ASTM E1641. No order of reaction enters: the same conversion takes the same ∫ exp(-Ea/RT) dt under both programmes.
 *
 * A calculated value is an estimate for planning: it extrapolates over decades of time, holds for one reaction with one Ea in the same atmosphere and not across a
 * melting point or glass transition, and is no claim of a product's life. It does not replace tests on the real amount, package and plant; local codes and the judgement
 * of licensed or otherwise competent people come first.
 *
 * @throws KineticsError `bad-option` where Ea, T_c, beta or T_f is not a positive finite number
 * @source astm-e1877
 */
export function failureTime(decomposition: FailureDecomposition, temperature: Quantity<'K'>): FailureTime {
  const { Ea, standardError } = decomposition
  checkPositive('temperature of use in K', temperature)
  const R = gasConstant_J_per_mol_K
  const lnTime = Ea / (R * temperature) + lnScale(decomposition)
  return {
    time: quantity(Math.exp(lnTime), 's'),
    lnTime,
    lnStandardError: Math.abs(1 / (R * temperature) + slopeOfScale(decomposition)) * standardError,
  }
}

/**
 * Thermal index after ASTM E1877: the temperature at which the time to the conversion taken as failure is t_f,
 *
 *   TI = (Ea/(ln 10·R))/(log t_f - log[Ea/(R beta)] + a)
 *
 * For what it is worth, see `failureTime`: an estimate for planning.
 *
 * @param time_s - t_f; by custom 60,000 h
 * @returns NaN where the material fails sooner at every temperature, the denominator not being positive
 * @throws KineticsError `bad-option` where Ea, T_c, beta or the time is not a positive finite number
 * @source astm-e1877
 */
export function thermalIndex(decomposition: FailureDecomposition, time_s: number = customaryFailureTime_s): ThermalIndex {
  checkPositive('failure time in s', time_s)
  const { Ea, standardError } = decomposition
  const R = gasConstant_J_per_mol_K
  const u = Math.log(time_s) - lnScale(decomposition)
  if (!(u > 0)) return { temperature: quantity(Number.NaN, 'K'), standardError: quantity(Number.NaN, 'K') }
  const T = Ea / (R * u)
  // T = Ea/(R u), du/dEa = -d lnScale/dEa.
  const slope = T / Ea + (T / u) * slopeOfScale(decomposition)
  return { temperature: quantity(T, 'K'), standardError: quantity(Math.abs(slope) * standardError, 'K') }
}

/** ln[Ea/(R beta)] + ln p(Ea/(R T_c)): ln of the time that a run would need at infinite temperature. */
function lnScale({ Ea, temperatureAtFailure, heatingRate }: FailureDecomposition): number {
  checkPositive('Ea in J/mol', Ea)
  checkPositive('temperature at failure in K', temperatureAtFailure)
  checkPositive('heating rate in K/s', heatingRate)
  const R = gasConstant_J_per_mol_K
  return Math.log(Ea / (R * heatingRate)) + lnPOfX(Ea / (R * temperatureAtFailure))
}

/** Its derivative with respect to Ea: 1/Ea - h(x)/(R T_c), h = -d ln p/dx = 1/π. */
function slopeOfScale({ Ea, temperatureAtFailure }: FailureDecomposition): number {
  const RT = gasConstant_J_per_mol_K * temperatureAtFailure
  return 1 / Ea - 1 / (scaledPOfX(Ea / RT) * RT)
}

function checkPositive(what: string, value: number): void {
  if (value > 0 && Number.isFinite(value)) return
  throw new KineticsError('bad-option', `Thermal endurance needs a positive ${what}, not ${value}.`, { value })
}
