import { KineticsError } from '../errors.ts'
import { linearLeastSquares } from '../numerics/linear-least-squares.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity, type Column, type Quantity } from '../units/quantity.ts'
import type { PeakMethodInfo } from './peak-method-info.ts'

export const borchardtDanielsInfo: PeakMethodInfo = {
  id: 'borchardt-daniels',
  label: 'Borchardt–Daniels',
  ordinate: null,
  sources: ['borchardt-daniels-1957', 'astm-e2041', 'ictac-2011'],
}

/** Points of one run, columns of one length. */
export interface RunPoints {
  readonly temperature_K: Column<'K'>
  /** Inside (0, 1). */
  readonly conversion: Column<'1'>
  readonly reactionRate_per_s: Column<'1/s'>
}

/** Ea, Z and n from one run. Where status is not `ok` every number is NaN. */
export interface BorchardtDanielsEstimate {
  /**
   * `too-few-points`: fewer than four; `rate-not-positive`: a point without a positive reaction rate; `terms-not-independent`: temperature and conversion do not
   * tell Ea and n apart (a hold); `energy-not-positive`: the reaction rate does not rise with temperature.
   */
  readonly status: 'ok' | 'too-few-points' | 'rate-not-positive' | 'terms-not-independent' | 'energy-not-positive'
  readonly Ea: Quantity<'J/mol'>
  /** One standard error, n - 3 degrees of freedom, and Ea ± t(0.975; n - 3) of it. */
  readonly standardError: Quantity<'J/mol'>
  readonly lower95: Quantity<'J/mol'>
  readonly upper95: Quantity<'J/mol'>
  /** ln of Z in 1/s. */
  readonly lnZ: number
  readonly lnZStandardError: number
  readonly order: number
  readonly orderStandardError: number
  /** In J/mol. */
  readonly covarianceEaLnZ: number
  /** In J/mol. */
  readonly covarianceEaOrder: number
  readonly covarianceLnZOrder: number
  /** Share of the variance of ln(dalpha/dt) that the three terms explain. */
  readonly r2: number
  /** Number of points less 3. */
  readonly dof: number
}

/** Coefficients: ln Z, Ea, n. */
const terms = 3

/**
 * Borchardt and Daniels' method: Ea, Z and the reaction order n from a single run, by multilinear least squares over its points,
 *
 *   ln(dalpha/dt) = ln Z - Ea/(R T) + n ln(1 - alpha).
 *
 * Unweighted in ln(dalpha/dt): every point counts alike, as it should where the rate is known within a share of itself. Standard errors and covariances are those of
 * the regression with its points taken as independent; neighbours of a smoothed curve are not, so that points should be few and apart, and no such error tells
 * whether the nth-order model is right.
 *
 * Assumes f(alpha) = (1 - alpha)^n from beginning to end. Not for autocatalytic, accelerating, simultaneous or consecutive reactions, nor for holds. Even where it
 * fits, a single run's Ea is not to be relied on: another Ea with another f(alpha) fits one run as well, and one heating rate is never enough.
 *
 * @throws KineticsError `column-length` or `not-finite` where the columns do not match or a conversion is not inside (0, 1)
 * @source borchardt-daniels-1957; astm-e2041; ictac-2011 (one heating rate is never enough)
 */
export function borchardtDaniels({ temperature_K, conversion, reactionRate_per_s }: RunPoints): BorchardtDanielsEstimate {
  const points = temperature_K.length
  if (conversion.length !== points || reactionRate_per_s.length !== points) {
    throw new KineticsError('column-length', 'Borchardt–Daniels needs temperature, conversion and reaction rate at the same points.', {
      points,
    })
  }
  if (!temperature_K.every((T) => T > 0) || !conversion.every((alpha) => alpha > 0 && alpha < 1)) {
    throw new KineticsError('not-finite', 'Borchardt–Daniels needs temperatures in K and conversions between 0 and 1.', { points })
  }
  if (points <= terms) return none('too-few-points', points)
  if (!reactionRate_per_s.every((rate) => rate > 0)) return none('rate-not-positive', points)
  const R = gasConstant_J_per_mol_K
  // 1/T about its mean, so that ln Z and Ea are told apart as well as they can be.
  const inverse = temperature_K.map((T) => 1 / T)
  const middle = inverse.reduce((sum, x) => sum + x, 0) / points
  const y = reactionRate_per_s.map(Math.log)
  const fit = linearLeastSquares(
    [inverse.map(() => 1), inverse.map((x) => -(x - middle) / R), conversion.map((alpha) => Math.log1p(-alpha))],
    y,
  )
  if (fit.status !== 'ok') return none('terms-not-independent', points)
  const [lnRate = Number.NaN, Ea = Number.NaN, order = Number.NaN] = fit.coefficients
  if (!(Ea > 0)) return none('energy-not-positive', points)
  const covariance = (a: number, b: number): number => fit.covariance[a]?.[b] ?? Number.NaN
  // ln Z = ln of the rate constant at the middle + Ea/(R T) there.
  const c = middle / R
  const standardError = Math.sqrt(covariance(1, 1))
  const halfWidth = studentTQuantile(0.975, fit.dof) * standardError
  const mean = y.reduce((sum, value) => sum + value, 0) / points
  const total = y.reduce((sum, value) => sum + (value - mean) ** 2, 0)
  return {
    status: 'ok',
    Ea: quantity(Ea, 'J/mol'),
    standardError: quantity(standardError, 'J/mol'),
    lower95: quantity(Ea - halfWidth, 'J/mol'),
    upper95: quantity(Ea + halfWidth, 'J/mol'),
    lnZ: lnRate + c * Ea,
    lnZStandardError: Math.sqrt(covariance(0, 0) + 2 * c * covariance(0, 1) + c * c * covariance(1, 1)),
    order,
    orderStandardError: Math.sqrt(covariance(2, 2)),
    covarianceEaLnZ: covariance(0, 1) + c * covariance(1, 1),
    covarianceEaOrder: covariance(1, 2),
    covarianceLnZOrder: covariance(0, 2) + c * covariance(1, 2),
    r2: total > 0 ? 1 - fit.residualSumOfSquares / total : Number.NaN,
    dof: fit.dof,
  }
}

function none(status: BorchardtDanielsEstimate['status'], points: number): BorchardtDanielsEstimate {
  const nothing = Number.NaN
  const Ea = quantity(nothing, 'J/mol')
  return {
    status,
    Ea,
    standardError: Ea,
    lower95: Ea,
    upper95: Ea,
    lnZ: nothing,
    lnZStandardError: nothing,
    order: nothing,
    orderStandardError: nothing,
    covarianceEaLnZ: nothing,
    covarianceEaOrder: nothing,
    covarianceLnZOrder: nothing,
    r2: nothing,
    dof: Math.max(0, points - terms),
  }
}
