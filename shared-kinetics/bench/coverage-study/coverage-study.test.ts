import { beforeAll, describe, expect, it } from 'vitest'
import { gates, studiedMethods, type ErrorKind } from './design.ts'
import { boundsFor, coverageOf, errorOfShare, isGated, outsideGate } from './gate.ts'
import { regressionIntervals, sourceIntervals, type Ends, type IntervalMaker } from './intervals-of.ts'
import { runShare } from './run-share.ts'
import { reportOf, sharesOf } from './study.ts'
import { merged, type Cell } from './tally.ts'
import { cellName } from './words.ts'

/** All but resampling, which takes the time. */
const gatedOf: IntervalMaker = (analysis) => {
  const drawn = sourceIntervals(analysis)
  return regressionIntervals(analysis).map((ofMethod, m) => ({ ...ofMethod, ...drawn[m] }))
}

const half: IntervalMaker = (analysis) =>
  gatedOf(analysis).map((ofMethod) => Object.fromEntries(Object.entries(ofMethod).map(([kind, ends]) => [kind, halved(ends)])))

const quarterIn = (from: ArrayLike<number>, to: ArrayLike<number>): number[] =>
  Array.from(from, (value, k) => value + 0.25 * ((to[k] ?? Number.NaN) - value))
const halved = ({ lower, upper }: Ends): Ends => ({ lower: quarterIn(lower, upper), upper: quarterIn(upper, lower) })

const endless: IntervalMaker = ({ results }) =>
  results.map(() => ({ 'student-t': { lower: new Float64Array(5).fill(Number.NaN), upper: new Float64Array(5).fill(1e9) } }))

const share = (error: ErrorKind, reaction: number, replicates: number, maker = gatedOf): readonly Cell[] =>
  runShare({ seed: 5, error, reaction, from: 0, to: replicates }, maker).cells

const replicates = 160
let honest: readonly Cell[] = []
let tooNarrow: readonly Cell[] = []
beforeAll(() => {
  honest = [share('temperature-offset', 0, replicates), share('heating-rate', 1, replicates), share('all-sources', 2, replicates)].flat()
  tooNarrow = share('temperature-offset', 0, 100, half).filter(isGated)
}, 120_000)

describe('intervals over simulated measurements', () => {
  it('hold the own value of each method in 95 of 100 cases: (a) with independent errors, (d) with those it is told of', () => {
    const gated = honest.filter(isGated)
    // Three errors of one reaction each, four methods, four numbers of runs, five levels; (a) under two of them.
    expect(gated.length).toBe((2 + 3) * studiedMethods.length * 4 * 5)
    for (const cell of gated) {
      expect(cell.replicates).toBe(replicates)
      expect(cell.withoutInterval).toBe(0)
      expect(Math.abs(coverageOf(cell) - 0.95), `in ${cellName(cell)}`).toBeLessThan(4 * errorOfShare(replicates))
    }
    expect(outsideGate(honest)).toEqual([])
  })

  it('are found too narrow where they are half as wide', () => {
    const outside = outsideGate(tooNarrow)
    expect(outside.length).toBeGreaterThan(0.75 * tooNarrow.length)
    // Half of t(0.975; 4) and of z(0.975): P(|t| < 1.388; 4) = 0.763, P(|z| < 0.980) = 0.673.
    for (const cell of tooNarrow.filter(({ runs }) => runs === 6)) {
      expect(outside).toContain(cell)
      expect(Math.abs(coverageOf(cell) - (cell.interval === 'student-t' ? 0.763 : 0.673))).toBeLessThan((4 * 0.5) / Math.sqrt(100))
    }
  })

  it('count as not holding where there are none', () => {
    const { cells } = runShare({ seed: 5, error: 'heating-rate', reaction: 0, from: 0, to: 3 }, endless)
    expect(new Set(cells.map(({ covered, withoutInterval }) => `${covered} ${withoutInterval}`))).toEqual(new Set(['0 3']))
  })

  it('are the same numbers however the replicates are shared out', () => {
    const whole = runShare({ seed: 2, error: 'all-sources', reaction: 1, from: 0, to: 6 }).cells
    const parts = [
      runShare({ seed: 2, error: 'all-sources', reaction: 1, from: 0, to: 2 }).cells,
      runShare({ seed: 2, error: 'all-sources', reaction: 1, from: 2, to: 6 }).cells,
    ]
    const [one, other] = [merged([whole]), merged(parts)]
    expect(other.map(({ covered, replicates }) => [covered, replicates])).toEqual(
      one.map(({ covered, replicates }) => [covered, replicates]),
    )
    other.forEach((cell, k) => expect(cell.halfWidths_J_per_mol).toBeCloseTo(one[k]?.halfWidths_J_per_mol ?? Number.NaN, 3))
  })

  it('go through the conversion of whole noisy mass runs as well, with the finding that tells of unequal variance', () => {
    const { cells, findings } = runShare({ seed: 1, error: 'signal-noise', reaction: 2, from: 0, to: 21 }, gatedOf)
    for (const cell of cells.filter(({ interval }) => interval === 'student-t')) {
      expect(Math.abs(cell.own_J_per_mol / 220e3 - 1)).toBeLessThan(0.001)
      // 21 of 95 %: the chance of fewer than 15 is 1e-4.
      expect(cell.covered, `in ${cellName(cell)}`).toBeGreaterThanOrEqual(14)
    }
    expect(findings.map(({ looks }) => looks)).toEqual([3, 3, 3, 3])
    expect(findings.at(-1)?.fired).toBeGreaterThan(0)
  })
})

describe('the study', () => {
  it('has every replicate of every error and reaction once', () => {
    const shares = sharesOf(120, 1)
    const seen = shares.flatMap(({ error, reaction, from, to }) =>
      Array.from({ length: to - from }, (_, k) => `${error} ${reaction} ${from + k}`),
    )
    expect(seen.length).toBe(4 * 3 * 120)
    expect(new Set(seen).size).toBe(seen.length)
  })

  it('widens the gate for fewer replicates, and names what lies outside', () => {
    expect(boundsFor(2000)).toEqual({ least: 0.93, most: 0.97 })
    expect(boundsFor(200).least).toBeLessThan(0.91)
    expect(boundsFor(200).most).toBeGreaterThan(0.99)
    expect(gates['student-t']).not.toContain('signal-noise')
    const cell = honest.find(isGated)
    if (cell === undefined) throw new Error('no gated cell')
    const short = [{ ...cell, covered: Math.round(0.8 * replicates) }]
    const { failures, gatedCells, page } = reportOf([{ cells: short, findings: [] }], replicates, 5)
    expect(gatedCells).toBe(1)
    expect(failures).toHaveLength(1)
    expect(failures[0]).toContain('80.0 %')
    expect(page).toContain(`Outside: ${failures[0]}`)
  })
})
