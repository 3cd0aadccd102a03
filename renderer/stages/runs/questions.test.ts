import { describe, expect, it } from 'vitest'
import { runInfoOf } from '../../../shared-kinetics/check-values/run-info-of.ts'
import { emptyStudy, type StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import { directionSaid, runsWithoutDirection } from './questions.ts'

const heatFlow = (...ways: readonly ('up' | 'down' | null)[]): StudyDocument => {
  const study = emptyStudy('study')
  return {
    ...study,
    settings: { ...study.settings, signal: 'heat-flow' },
    runs: ways.map((exothermic, i) => ({ ...runInfoOf(`run-${i}`), exothermic })),
  }
}

describe('which way exothermic points', () => {
  it('is asked of the runs that do not say it', () => {
    expect(runsWithoutDirection(heatFlow('up', null, 'up'), null).map((run) => run.id)).toEqual(['run-1'])
    expect(runsWithoutDirection(heatFlow('down'), null)).toEqual([])
  })

  it('stays known once it is answered', () => {
    expect(directionSaid(heatFlow('down', 'down'), null)).toBe('down')
    expect(directionSaid(heatFlow('up', 'down'), null)).toBe('mixed')
    expect(directionSaid(heatFlow(null, null), null)).toBeNull()
  })

  it('does not matter where no heat flow is analysed, nor in a run that is not used', () => {
    const study = heatFlow('up', 'down')
    expect(directionSaid({ ...study, settings: { ...study.settings, signal: 'mass' } }, null)).toBeNull()
    const [first, second] = study.runs
    if (first === undefined || second === undefined) throw new Error('two runs')
    expect(directionSaid({ ...study, runs: [first, { ...second, use: false }] }, null)).toBe('up')
  })
})
