import { describe, expect, it } from 'vitest'
import { profileOf, reviewedRun, reviewInput } from '../check-values/review-input-of.ts'
import type { PeakMethodResult } from '../tasks/study-result.ts'
import { peakLineCurved } from './rules/peak-line-curved.ts'
import { singleRunEnergyDiffers } from './rules/single-run-energy-differs.ts'

const nothing: PeakMethodResult = {
  method: 'borchardt-daniels',
  label: 'Borchardt–Daniels',
  sources: [],
  runId: null,
  runLabel: null,
  applies: true,
  reason: null,
  Ea_kJ_per_mol: null,
  standardError_kJ_per_mol: null,
  lower95_kJ_per_mol: null,
  upper95_kJ_per_mol: null,
  dof: 0,
  lnA_per_s: null,
  lnAStandardError: null,
  covarianceEaLnA_kJ_per_mol: null,
  covarianceWithOrder: null,
  r2: null,
  numbers: [],
  remarks: [],
  line: null,
}

const singleRuns = (...Ea: (number | null)[]) =>
  singleRunEnergyDiffers(
    reviewInput({
      result: {
        profiles: [profileOf('vyazovkin', [100, 100, 100])],
        peakMethods: Ea.map((value, i) => ({ ...nothing, runLabel: `Run ${i}`, applies: value !== null, Ea_kJ_per_mol: value })),
      },
    }),
  )

describe('single-run-energy-differs', () => {
  it('fires beyond 20 % either way, and names the worst', () => {
    expect(singleRuns(81, 100, 119)).toEqual([])
    expect(singleRuns(null, 100)).toEqual([])
    expect(singleRuns(79, 100, 150, null)[0]).toMatchObject({
      severity: 'note',
      evidence: { runs: 2, run: 'Run 2', singleRun_kJ_per_mol: 150, together_kJ_per_mol: 100 },
    })
    expect(singleRuns(79, 100, 150)[0]?.message).toContain('From Run 0 and Run 2 alone')
    expect(singleRuns(50, 50, 50, 50)[0]?.message).toContain('From 4 runs alone')
  })

  it('is silent without Ea of the runs together, and about methods that compare peaks', () => {
    expect(
      singleRunEnergyDiffers(reviewInput({ result: { profiles: [], peakMethods: [{ ...nothing, runLabel: 'Run', Ea_kJ_per_mol: 500 }] } })),
    ).toEqual([])
    expect(singleRunEnergyDiffers(reviewInput({ result: { peakMethods: [{ ...nothing, Ea_kJ_per_mol: 500 }] } }))).toEqual([])
  })
})

describe('peak-line-curved', () => {
  const R = 8.31446261815324
  /** Peaks at even steps of 1/T on a line of 100 kJ/mol, its slope changing by `change` of itself from end to end, each off it by what is added. */
  const findings = (change: number, off: readonly number[] = [], programmes = 5) => {
    const x = Array.from({ length: programmes }, (_, i) => 0.002 - 0.00003 * i)
    const span = (x[0] ?? 0) - (x.at(-1) ?? 0)
    const middle = x.reduce((sum, value) => sum + value, 0) / x.length
    const slope = -100e3 / R
    const y = x.map((value, i) => slope * (value - middle) + ((slope * change) / (2 * span)) * (value - middle) ** 2 + (off[i] ?? 0))
    const runs = x.map((_, i) => reviewedRun(String(i), 2 ** i, i))
    const line = { ordinate: 'ln(β/Tp²)', x_per_K: x, y, slope_K: slope, intercept: 0 }
    return peakLineCurved(reviewInput({ runs, result: { peakMethods: [{ ...nothing, method: 'kissinger', line }] } }))
  }

  it('fires where Ea changes by more than 20 % along the line, and says from what to what', () => {
    expect(findings(0.19)).toEqual([])
    const [finding] = findings(0.3)
    expect(finding).toMatchObject({
      severity: 'caution',
      evidence: {
        slow_kJ_per_mol: expect.closeTo(115, 6) as unknown,
        fast_kJ_per_mol: expect.closeTo(85, 6) as unknown,
        change: expect.closeTo(0.3, 8) as unknown,
      },
    })
  })

  it('is silent where scatter explains the bend, and with fewer than four programmes', () => {
    expect(findings(0.3, [0.1, -0.15, 0.1, -0.1, 0.12])).toEqual([])
    expect(findings(2, [], 3)).toEqual([])
    expect(peakLineCurved(reviewInput())).toEqual([])
  })
})
