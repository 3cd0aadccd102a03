import { describe, expect, it } from 'vitest'
import { quantityOfName } from './column-quantity.ts'
import { parseHeading } from './parse-heading.ts'

const told = (text: string): string => {
  const heading = parseHeading(text)
  const name = quantityOfName(heading.name, heading.unit)
  return `${name.quantity} ${heading.unit?.word ?? (heading.unitText === null ? 'no unit' : 'unknown unit')}`
}

const rank = (name: string) => quantityOfName(name, null)

describe('a heading', () => {
  it.each([
    ['Time (s)', 'time s'],
    ['time ', 'time no unit'],
    ['t/s', 'time s'],
    ['t / min', 'time min'],
    ['t', 'time no unit'],
    ['T', 'temperature no unit'],
    ['T/degC', 'temperature °C'],
    ['t (°C)', 'temperature °C'],
    ['T (min)', 'time min'],
    ['Ts [K]', 'temperature K'],
    ['Temp./°C', 'temperature °C'],
    ['Temperature, K', 'temperature K'],
    ['Temp. in °C', 'temperature °C'],
    ['temperature_C', 'temperature °C'],
    ['Sample Temperature (K)', 'temperature K'],
    ['Temp 4 K/min (°C)', 'temperature °C'],
    ['Temp1 (°C)', 'temperature °C'],
    ['time_min', 'time min'],
    ['mass_percent', 'mass %'],
    ['Mass%', 'mass %'],
    ['Mass (mg)', 'mass mg'],
    ['Weight (%)', 'mass %'],
    ['Sample mass %', 'mass %'],
    ['TG /(%)', 'mass %'],
    ['Mass 8 K/min (%)', 'mass %'],
    ['Unsubtracted Weight (mg)', 'mass mg'],
    ['Mass change/%', 'mass %'],
    ['Heat flow/mW/mg', 'heat-flow W/g'],
    ['DSC /(mW/mg)', 'heat-flow W/g'],
    ['DSC (µV)', 'heat-flow unknown unit'],
    ['DSC/µV', 'heat-flow unknown unit'],
    ['Heat Flow (exo up) (mW)', 'heat-flow mW'],
    ['HF (mW) exo up', 'heat-flow mW'],
    ['DSC/(mW/mg), exo ↓', 'heat-flow W/g'],
    ['heat_flow_W_per_g', 'heat-flow W/g'],
    ['Reversing Heat Flow (Normalized) W/g', 'heat-flow W/g'],
    ['Heat Flow (Normalized) (W/g)', 'heat-flow W/g'],
    ['Heat Flow W / g', 'heat-flow W/g'],
    ['HRR (W/g)', 'heat-release W/g'],
    ['Heat release rate [W/g]', 'heat-release W/g'],
    ['Conversion', 'conversion no unit'],
    ['Conversion (-)', 'conversion 1'],
    ['alpha', 'conversion no unit'],
    ['α (%)', 'conversion %'],
    ['Extent of reaction (1)', 'conversion 1'],
    ['DTG (%/min)', 'derivative unknown unit'],
    ['dm/dt (mg/min)', 'derivative unknown unit'],
    ['d(Mass)/dT', 'derivative no unit'],
    ['dα/dt (1/s)', 'derivative unknown unit'],
    ['Deriv. Weight (%/°C)', 'derivative unknown unit'],
    ['Mass loss rate (mg/s)', 'derivative unknown unit'],
    ['Conversion rate (1/s)', 'derivative unknown unit'],
    ['Heating rate (K/min)', 'derivative unknown unit'],
    ['N2 Flow (cc/min)', 'other unknown unit'],
    ['Purge gas flow (mL/min)', 'other unknown unit'],
    ['Mass flow (mL/min)', 'other unknown unit'],
    ['Oxygen (%)', 'other %'],
    ['Heat capacity (J/g/K)', 'other unknown unit'],
    ['Total heat release (kJ/g)', 'other unknown unit'],
    ['Modulated Heat Flow (W/g)', 'other W/g'],
    ['Fit 1 (W/g)', 'other W/g'],
    ['m/z 18', 'other no unit'],
    ['Sample C', 'other no unit'],
  ])('%s is %s', (text, expected) => {
    expect(told(text)).toBe(expected)
  })

  it('tells the temperature of the sample from others, and what is left from what is gone', () => {
    expect(rank('Sample temperature')).toMatchObject({ rank: 0 })
    expect(rank('Temperature')).toMatchObject({ rank: 1 })
    expect(rank('Furnace temperature')).toMatchObject({ rank: 2 })
    expect(rank('Mass loss')).toMatchObject({ quantity: 'mass', as: 'loss' })
    expect(rank('Mass change')).toMatchObject({ quantity: 'mass', as: 'change' })
  })

  it('keeps the heating rate and its words', () => {
    expect(parseHeading('Temp 4 K/min (°C)').heatingRate).toEqual({ heatingRate_K_per_s: 4 / 60, text: '4 K/min' })
    expect(parseHeading('Mass (%) @ 2,5 °C/min')).toMatchObject({ name: 'Mass', heatingRate: { heatingRate_K_per_s: 2.5 / 60 } })
    expect(parseHeading('Temperature (°C)').heatingRate).toBeNull()
  })
})
