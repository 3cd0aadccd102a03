import { describe, expect, it } from 'vitest'
import { defaultUncertainty } from '../contract/study-document.ts'
import { assumedUncertainties } from '../uncertainty/assumed-uncertainties.ts'
import type { Budget } from '../uncertainty/budget.ts'
import { uncertaintySources, type MeasuredSources } from '../uncertainty/measured-sources.ts'
import { column } from '../units/quantity.ts'
import { budgetEntries, noteOnCombined } from './budget-entries.ts'

const zero = (): Float64Array => new Float64Array(1)
const budget: Budget = {
  'temperature-common': column(zero(), 'J/mol'),
  'temperature-run': column(zero(), 'J/mol'),
  'temperature-lag': column(zero(), 'J/mol'),
  'heating-rate': column(zero(), 'J/mol'),
  'signal-noise': column(zero(), 'J/mol'),
  baseline: column(Float64Array.of(Number.NaN), 'J/mol'),
}
const sources = (change: Partial<MeasuredSources>): MeasuredSources => ({
  stated: assumedUncertainties,
  heatingRate_share: Float64Array.of(2.5e-16),
  noise: { time_s: column(zero(), 's'), lnReactionRate: zero(), lnReactionRateSlope_per_s: zero(), correlationWithBefore: zero() },
  baseline: null,
  ...change,
})
const entryOf = (source: string, of: MeasuredSources) => budgetEntries(budget, of).find((entry) => entry.source === source)

describe('entries of a budget', () => {
  it('take for granted what a new study holds', () => {
    expect(defaultUncertainty).toMatchObject(assumedUncertainties)
  })

  it('call stated what somebody has stated to be just what is assumed otherwise', () => {
    const of = sources({ stated: { ...assumedUncertainties, stated: ['lag_s'] } })
    expect(entryOf('temperature-lag', of)).toMatchObject({ assumed: false, magnitude: '1 s times the heating rate, as stated' })
    expect(entryOf('temperature-run', of)).toMatchObject({ assumed: true })
  })

  it('call assumed what nobody has stated, and stated what somebody has', () => {
    const of = sources({ stated: { ...assumedUncertainties, temperatureCommon_K: 0.2 } })
    expect(entryOf('temperature-common', of)).toMatchObject({ assumed: false, magnitude: '0.2 K, as stated' })
    expect(entryOf('temperature-lag', of)).toMatchObject({
      assumed: true,
      magnitude: '1 s times the heating rate, assumed, nothing stated',
    })
    expect(entryOf('temperature-run', of)).toMatchObject({ assumed: true })
    expect(entryOf('signal-noise', of)).toMatchObject({ assumed: false })
    const note = noteOnCombined(budgetEntries(budget, of))
    expect(note).toContain('temperature, common to all runs (0.2 K, as stated)')
    expect(note).toContain('thermal lag (1 s times the heating rate, assumed, nothing stated)')
  })

  it('assume a heating rate only where one was not measured', () => {
    expect(entryOf('heating-rate', sources({}))).toMatchObject({ assumed: false, magnitude: 'none' })
    expect(entryOf('heating-rate', sources({ heatingRate_share: Float64Array.of(0.003, 0.02) }))).toMatchObject({
      assumed: true,
      magnitude: 'up to 2.0 % of each, assumed where it was not measured',
    })
    expect(entryOf('heating-rate', sources({ heatingRate_share: Float64Array.of(0.003) }))).toMatchObject({
      assumed: false,
      magnitude: 'up to 0.30 % of each',
    })
  })

  it('are as many as there are sources, and give the reason where one cannot be told', () => {
    const reason = 'No other baseline under run 3.'
    const baseline = { time_s: column(zero(), 's'), lnReactionRate: zero(), reason }
    const entries = budgetEntries(budget, sources({ baseline }))
    expect(entries.map((entry) => entry.source)).toEqual([...uncertaintySources])
    expect(entries.at(-1)).toMatchObject({ reason, standardUncertainty_kJ_per_mol: [null] })
    expect(noteOnCombined(entries)).toContain(reason)
    expect(entries.slice(0, -1).every((entry) => entry.reason === null)).toBe(true)
  })
})
