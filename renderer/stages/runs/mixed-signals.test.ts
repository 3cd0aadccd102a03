import { describe, expect, it } from 'vitest'
import { runInfoOf } from '../../../shared-kinetics/check-values/run-info-of.ts'
import { applyChange } from '../../../shared-kinetics/contract/study-change.ts'
import { emptyStudy, type StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, SignalQuantity } from '../../../shared-kinetics/contract/study-result.ts'
import { keepOnly, mixedSignals } from './mixed-signals.ts'

const runWith = (id: string, ...quantities: SignalQuantity[]): RunInfo =>
  runInfoOf(id, { signals: quantities.map((quantity) => ({ quantity, unit: '1', label: quantity, fileUnit: '' })) })
const study = (...runs: RunInfo[]): StudyDocument => ({ ...emptyStudy('a study'), runs })

describe('runs without a signal in common', () => {
  const mixed = study(runWith('a', 'mass'), runWith('b', 'conversion'), runWith('c', 'mass'))

  it('are told apart by the signal they hold', () => {
    const held = mixedSignals(mixed).map(({ signal, having, lacking }) => [signal, having.map(({ id }) => id), lacking.map(({ id }) => id)])
    expect(held).toEqual([
      ['mass', ['a', 'c'], ['b']],
      ['conversion', ['b'], ['a', 'c']],
    ])
  })

  it.each(['mass', 'conversion'] as const)('have %s in common once the others are left out', (signal) => {
    const holder = mixedSignals(mixed).find((one) => one.signal === signal)
    const after = holder === undefined ? mixed : keepOnly(holder, null).reduce(applyChange, mixed)
    expect(mixedSignals(after)).toEqual([])
    expect(after.runs.filter((run) => run.use).every((run) => run.signals.some(({ quantity }) => quantity === signal))).toBe(true)
  })

  it('are no matter where one signal is in all runs in use', () => {
    expect(mixedSignals(study(runWith('a', 'mass', 'heat-flow'), runWith('b', 'heat-flow')))).toEqual([])
    expect(mixedSignals(study(runWith('a', 'mass'), { ...runWith('b', 'conversion'), use: false }))).toEqual([])
    expect(mixedSignals(study())).toEqual([])
  })

  it('take back a signal that was asked for before', () => {
    const holder = mixedSignals(mixed).find((one) => one.signal === 'mass')
    expect(holder === undefined ? [] : keepOnly(holder, 'conversion')).toContainEqual({ kind: 'set-signal', signal: 'mass' })
  })
})
