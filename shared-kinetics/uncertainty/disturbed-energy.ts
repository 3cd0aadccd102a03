import { phiSlope } from '../isoconversional/phi.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { EnergyModel, IntegralForm, LineForm } from './energy-model.ts'

/** Errors of one draw. The first two hold one entry a run, the others one a run at each level. */
export interface Disturbance {
  /** Added to every temperature of the run, besides what the lag adds. */
  readonly temperature_K: Float64Array
  readonly lnHeatingRate: Float64Array
  /** The same for all runs: added to T is this times dT/dt. */
  lag_s: number
  readonly time_s: Float64Array
  readonly lnReactionRate: Float64Array
}

/**
 * Ea at one level, in J/mol, as it would have come out of disturbed measurements. Line methods: the regression again; minimising methods: the root of dPhi/dEa again,
 * ln J taken to third order around the undisturbed Ea, within 1e-7 of itself. A shift δ of all temperatures of a run changes ln J by (Ea/R)·mean(1/T²)·δ·(1 - δ/T). NaN where
 * the level has no Ea.
 */
export function disturbedEnergy(model: EnergyModel, level: number, disturbance: Disturbance, room: Room): number {
  const Ea = model.Ea[level] ?? Number.NaN
  if (Number.isNaN(Ea)) return Number.NaN
  return model.form.kind === 'line'
    ? ofLine(model, model.form, level, disturbance, room)
    : ofIntegral(model, model.form, level, disturbance, room)
}

/** Memory for one level's points, so that thousands of draws do not each ask for it. */
export interface Room {
  readonly a: Float64Array
  readonly b: Float64Array
  readonly c: Float64Array
  readonly d: Float64Array
  readonly e: Float64Array
}

export const roomFor = (runs: number): Room => ({
  a: new Float64Array(runs),
  b: new Float64Array(runs),
  c: new Float64Array(runs),
  d: new Float64Array(runs),
  e: new Float64Array(runs),
})

function ofLine(model: EnergyModel, form: LineForm, level: number, disturbance: Disturbance, { a: x, b: y }: Room): number {
  const { runs } = model
  const exponent = form.temperatureExponent[level] as number
  let meanX = 0
  let meanY = 0
  for (let i = 0; i < runs; i++) {
    const k = level * runs + i
    const T = form.temperature_K[k] as number
    const heatingRate = model.heatingRate_K_per_s[k] as number
    const time = disturbance.time_s[k] as number
    const disturbed = T + (disturbance.temperature_K[i] as number) + heatingRate * (disturbance.lag_s + time)
    x[i] = 1 / disturbed
    y[i] =
      (form.y[k] as number) -
      (exponent === 0 ? 0 : exponent * Math.log(disturbed / T)) +
      (form.perSecond[k] as number) * time +
      (form.perLnHeatingRate + (model.timeIsRebuilt[i] === 1 ? form.perLnReactionRate : 0)) * (disturbance.lnHeatingRate[i] as number) +
      (form.perLnReactionRate === 0 ? 0 : form.perLnReactionRate * (disturbance.lnReactionRate[k] as number))
    meanX += (x[i] as number) / runs
    meanY += (y[i] as number) / runs
  }
  let xx = 0
  let xy = 0
  for (let i = 0; i < runs; i++) {
    const dx = (x[i] as number) - meanX
    xx += dx * dx
    xy += dx * ((y[i] as number) - meanY)
  }
  return (model.Ea[level] as number) + (form.energyPerSlope[level] as number) * (xy / xx - (form.slope_K[level] as number))
}

/** Steps of the search for the root; from the linearised answer two or three are enough. */
const mostSteps = 12
const tolerance = 1e-8

function ofIntegral(
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
  integrate(0)
  let previous = 0
  let slopeBefore = phiSlope(lnJ, u)
  let e = linearisedRoot(lnJ, u)
  for (let n = 0; n < mostSteps && Number.isFinite(e); n++) {
    integrate(e)
    const slope = phiSlope(lnJ, u)
    if (slope === slopeBefore) break
    const next = e - (slope * (e - previous)) / (slope - slopeBefore)
    previous = e
    slopeBefore = slope
    e = next
    if (Math.abs(e - previous) * R < tolerance * Ea) return Ea + R * e
  }
  return Math.abs(e - previous) * R < 1e3 * tolerance * Ea ? Ea + R * e : Number.NaN
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
