import type { Disturbance, Room } from './disturbance.ts'
import { energyOnHistories, energyOnRamps } from './disturbed-integral.ts'
import type { EnergyModel, LineForm } from './energy-model.ts'

export { roomFor, type Disturbance, type Room } from './disturbance.ts'

/**
 * Ea at one level, in J/mol, as it would have come out of disturbed measurements. Line methods: the regression again; minimising methods: the root of dPhi/dEa again.
 * A shift δ of all temperatures of a run changes ln J by (Ea/R)·mean(1/T²)·δ·(1 - δ/T). Held to the methods themselves on disturbed runs (tests): within 3 % of the change on
 * straight ramps, for changes up to half of Ea; within 6 % of it and 0.25 kJ/mol on other programmes, where the lowest minimum is found anew when it moves far. Where several
 * minima might be meant the method has no answer, and a draw still takes the lowest. NaN where the level has no Ea, or the disturbed runs have no minimum.
 */
export function disturbedEnergy(model: EnergyModel, level: number, disturbance: Disturbance, room: Room): number {
  const Ea = model.Ea[level] ?? Number.NaN
  if (Number.isNaN(Ea)) return Number.NaN
  const { form } = model
  if (form.kind === 'line') return ofLine(model, form, level, disturbance, room)
  return form.table === null
    ? energyOnRamps(model, form, level, disturbance, room)
    : energyOnHistories(model, form, form.table, level, disturbance, room)
}

function ofLine(model: EnergyModel, form: LineForm, level: number, disturbance: Disturbance, { a: x, b: y }: Room): number {
  const { runs } = model
  let meanX = 0
  let meanY = 0
  for (let i = 0; i < runs; i++) {
    const k = level * runs + i
    const T = form.temperature_K[k] as number
    const heatingRate = model.heatingRate_K_per_s[k] as number
    const exponent = form.temperatureExponent[k] as number
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
