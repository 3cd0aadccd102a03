import { largestEa, smallestEa } from '../isoconversional/energy-grid.ts'
import { phi, phiSlope } from '../isoconversional/phi.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Disturbance, Room } from './disturbance.ts'
import type { EnergyModel } from './energy-model.ts'
import { lnStep, tableEnergies, type IntegralForm, type IntegralTable } from './integral-form.ts'

/** Steps of the search for the root; from the linearised answer two or three are enough. */
const mostSteps = 12
const tolerance = 1e-8

/** The cubic in e is held to the method itself up to this share of Ea (tests); beyond, a straight ramp has no answer. */
const cubicUpTo = 0.5

/** On straight ramps: the root of dPhi/dEa, ln J to third order around the undisturbed Ea. NaN where it moves by more than half of Ea. */
export function energyOnRamps(
  model: EnergyModel,
  form: IntegralForm,
  level: number,
  disturbance: Disturbance,
  { a: lnJ, b: u, c: shift, d: ofTime, e: ofTimeBefore }: Room,
): number {
  const { runs } = model
  const R = gasConstant_J_per_mol_K
  const Ea = model.Ea[level] as number
  for (let i = 0; i < runs; i++) {
    const k = level * runs + i
    shift[i] = (disturbance.temperature_K[i] as number) + (model.heatingRate_K_per_s[k] as number) * disturbance.lag_s
    ofTime[i] = (form.perSecond[k] as number) * (disturbance.time_s[k] as number)
    ofTimeBefore[i] = form.perSecondBefore[k] === 0 ? 0 : (form.perSecondBefore[k] as number) * (disturbance.time_s[k - runs] as number)
  }
  /** ln J and effective 1/T of all runs at Ea + R e. */
  const integrate = (e: number): void => {
    for (let i = 0; i < runs; i++) {
      const k = level * runs + i
      const inverseT = form.inverseT[k] as number
      const variance = form.variance[k] as number
      const third = form.third[k] as number
      const delta = shift[i] as number
      // Mean of 1/T - 1/(T + δ), to second order in δ.
      const fallOfInverseT = (inverseT * inverseT + variance) * delta * (1 - inverseT * delta)
      const [fall, fallBefore] = [form.perSecondFall[k] as number, form.perSecondBeforeFall[k] as number]
      const [time, before] = [ofTime[i] as number, ofTimeBefore[i] as number]
      lnJ[i] =
        (form.lnJ[k] as number) -
        e * (inverseT - e * (0.5 * variance - (e * third) / 6)) +
        (Ea / R + e) * fallOfInverseT +
        time * (1 - e * fall) -
        before * (1 - e * fallBefore) -
        (form.holdsHeatingRate[k] === 1 ? (disturbance.lnHeatingRate[i] as number) : 0)
      u[i] = inverseT - e * (variance - 0.5 * e * third) - fallOfInverseT + time * fall - before * fallBefore
    }
  }
  const e = rootOf(integrate, lnJ, u, Ea)
  return Math.abs(e) * R <= cubicUpTo * Ea ? Ea + R * e : Number.NaN
}

/** A minimum that moves by more than this share of Ea might not be the lowest one. */
const looksAgain = 0.1

/**
 * Where a run leaves the straight ramp: the root of dPhi/dEa with ln J from the table. Where it moves far, or is not found, every minimum over the range of Ea is looked at,
 * and the lowest taken, as the method does; NaN where a bound lies lower than it.
 */
export function energyOnHistories(
  model: EnergyModel,
  form: IntegralForm,
  table: IntegralTable,
  level: number,
  disturbance: Disturbance,
  { a: lnJ, b: u }: Room,
): number {
  const R = gasConstant_J_per_mol_K
  const Ea = model.Ea[level] as number
  const integrate = (e: number): void => {
    integrateByTable(model, form, table, level, disturbance, Ea + R * e, lnJ, u)
  }
  integrate(0)
  // An error that cannot be told leaves no answer, wherever it is looked for.
  if (lnJ.some(Number.isNaN)) return Number.NaN
  const near = R * rootOf(integrate, lnJ, u, Ea)
  return Math.abs(near) <= looksAgain * Ea ? Ea + near : lowestMinimum(integrate, lnJ, u, Ea)
}

/** ln J and effective 1/T of all runs, disturbed, at one Ea. */
function integrateByTable(
  { runs, heatingRate_K_per_s }: EnergyModel,
  form: IntegralForm,
  table: IntegralTable,
  level: number,
  disturbance: Disturbance,
  Ea: number,
  lnJ: Float64Array,
  u: Float64Array,
): void {
  const R = gasConstant_J_per_mol_K
  const places = tableEnergies.length
  const place = Math.min(places - 2, Math.max(0, Math.floor(Math.log(Ea / smallestEa) / lnStep)))
  const lower = tableEnergies[place] as number
  const width = (tableEnergies[place + 1] as number) - lower
  const s = (Ea - lower) / width
  const kappa = Ea / R
  const row = (level * places + place) * runs
  for (let i = 0; i < runs; i++) {
    const k = level * runs + i
    const y0 = table.lnJ[row + i] as number
    const rise = (table.lnJ[row + runs + i] as number) - y0
    const m0 = (-width / R) * (table.inverseT[row + i] as number)
    const m1 = (-width / R) * (table.inverseT[row + runs + i] as number)
    const c2 = 3 * rise - 2 * m0 - m1
    const c3 = m0 + m1 - 2 * rise
    const undisturbed = y0 + s * (m0 + s * (c2 + s * c3))
    const inverseT = (-R / width) * (m0 + s * (2 * c2 + 3 * s * c3))
    const variance = (R / width) ** 2 * Math.max(0, 2 * c2 + 6 * s * c3)
    const isHistory = table.isHistory[i] === 1
    // Over a history a lag is another time; on a straight ramp it is another temperature.
    const heatingRate = heatingRate_K_per_s[k] as number
    const delta = (disturbance.temperature_K[i] as number) + (isHistory ? 0 : heatingRate * disturbance.lag_s)
    const lag = isHistory ? disturbance.lag_s : 0
    const fall = (inverseT * inverseT + variance) * delta * (1 - inverseT * delta)
    const shifted = undisturbed + kappa * fall
    const end = shiftedInverse(table.endInverseT[k] as number, delta)
    const gained = part(kappa, end, heatingRate, shifted, lag + (disturbance.time_s[k] as number))
    const start = shiftedInverse(table.startInverseT[k] as number, delta)
    const moved = lag + (form.perSecondBefore[k] === 0 ? 0 : (disturbance.time_s[k - runs] as number))
    const lost = Number.isNaN(start) ? 0 : part(kappa, start, table.startHeatingRate[k] as number, shifted, moved)
    const grown = 1 + gained - lost
    lnJ[i] =
      shifted + (grown > 0 ? Math.log(grown) : Number.NaN) - (form.holdsHeatingRate[k] === 1 ? (disturbance.lnHeatingRate[i] as number) : 0)
    u[i] = inverseT - fall + (gained * (end - inverseT) - (lost === 0 ? 0 : lost * (start - inverseT))) / grown
  }
}

/** 1/(T + δ) from 1/T. */
const shiftedInverse = (inverseT: number, delta: number): number => inverseT / (1 + inverseT * delta)

/** What `time` seconds at 1/T and dT/dt add to J, as a share of it, to second order. */
const part = (kappa: number, inverseT: number, heatingRate: number, lnJ: number, time: number): number =>
  Math.exp(-kappa * inverseT - lnJ) * time * (1 + 0.5 * kappa * heatingRate * inverseT * inverseT * time)

/** The root next to e = 0 by secants from the linearised answer; NaN where they do not settle. */
function rootOf(integrate: (e: number) => void, lnJ: Float64Array, u: Float64Array, Ea: number): number {
  const R = gasConstant_J_per_mol_K
  const lowest = (smallestEa - Ea) / R
  const highest = (largestEa - Ea) / R
  integrate(0)
  let previous = 0
  let slopeBefore = phiSlope(lnJ, u)
  let e = linearisedRoot(lnJ, u)
  for (let n = 0; n < mostSteps && e > lowest && e < highest; n++) {
    integrate(e)
    const slope = phiSlope(lnJ, u)
    if (slope === slopeBefore) break
    const next = e - (slope * (e - previous)) / (slope - slopeBefore)
    previous = e
    slopeBefore = slope
    e = next
    if (Math.abs(e - previous) * R < tolerance * Ea) return e
  }
  return Math.abs(e - previous) * R < 1e3 * tolerance * Ea ? e : Number.NaN
}

/** Halvings of one step of the table: to 1e-9 of Ea. */
const halvings = 26

function lowestMinimum(integrate: (e: number) => void, lnJ: Float64Array, u: Float64Array, Ea: number): number {
  const R = gasConstant_J_per_mol_K
  const last = tableEnergies.length - 1
  const slopeAt = (energy: number): number => {
    integrate((energy - Ea) / R)
    return phiSlope(lnJ, u)
  }
  let lowest = Number.POSITIVE_INFINITY
  let found = Number.NaN
  const take = (value: number): void => {
    const at = phi(lnJ)
    if (!(at < lowest)) return
    lowest = at
    found = value
  }
  let before = slopeAt(tableEnergies[0] as number)
  if (before > 0) take(Number.NaN)
  for (let place = 1; place <= last; place++) {
    const slope = slopeAt(tableEnergies[place] as number)
    if (before < 0 && slope >= 0) {
      let [low, high] = [tableEnergies[place - 1] as number, tableEnergies[place] as number]
      for (let n = 0; n < halvings; n++) {
        const middle = 0.5 * (low + high)
        if (slopeAt(middle) < 0) low = middle
        else high = middle
      }
      const root = 0.5 * (low + high)
      slopeAt(root)
      take(root)
    } else if (place === last && slope < 0) take(Number.NaN)
    before = slope
  }
  return found
}

/** The e that makes ln J as equal as straight lines in e can. */
function linearisedRoot(lnJ: Float64Array, u: Float64Array): number {
  const n = lnJ.length
  let meanY = 0
  let meanU = 0
  for (let i = 0; i < n; i++) {
    meanY += (lnJ[i] as number) / n
    meanU += (u[i] as number) / n
  }
  let uu = 0
  let uy = 0
  for (let i = 0; i < n; i++) {
    const du = (u[i] as number) - meanU
    uu += du * du
    uy += du * ((lnJ[i] as number) - meanY)
  }
  return uy / uu
}
