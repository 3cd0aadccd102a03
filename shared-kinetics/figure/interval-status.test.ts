import { describe, expect, it } from 'vitest'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { temperatureAt } from '../check-values/exact-simulation.ts'
import { methods } from '../isoconversional/registry.ts'
import type { IntervalStatus, MethodId } from '../isoconversional/result.ts'
import { randomStream } from '../numerics/random.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { intervalsByResampling, resamplingOf } from '../tasks/intervals-by-resampling.ts'
import { intervalRemarks, intervalStatusWords, studentStatus, studentWords } from './interval-status.ts'
import { profileResult } from '../tasks/profile-result.ts'
import type { IntervalResult } from '../tasks/study-result.ts'

const step = { Ea_J_per_mol: 60_000, A_per_s: 1e5, share: 1 }
const rates = [2, 5, 10, 20]
const levels = [0.2, 0.5, 0.8]

/** Runs whose thermometers err by `error_K` at each level: with tens of kelvin nothing is certain any more. */
function scattered(error_K: number, seed: number): SeriesAtLevels {
  const { normal } = randomStream(seed)
  return constantRateSeries(
    levels,
    rates,
    levels.map((level) => rates.map((rate) => temperatureAt([step], rate / 60, level) + error_K * normal())),
  )
}

function intervalsOf(method: MethodId, series: SeriesAtLevels) {
  const result = methods[method].run(series, quiet)
  const groups = series.runs.map((run) => run.programmeGroup)
  const profile = profileResult(methods[method].info, result, levels, [0.1, 0.9], groups)
  return {
    result,
    profile,
    intervals: [...profile.otherIntervals, ...intervalsByResampling(series, result, resamplingOf(series, 1), quiet)],
  }
}

/** What an interval's ends show at each level, whatever its status says. */
const shown = (Ea: readonly (number | null)[], { lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper }: IntervalResult): string[] =>
  levels.map((_, i) => {
    const [value, from, to] = [Ea[i] ?? null, lower[i] ?? null, upper[i] ?? null]
    if (value === null) return 'no Ea'
    if (from === null || to === null) return 'an end is missing'
    return from < 0 ? 'below 0' : 'complete'
  })

/** The same as a status tells it; a missing end has words. */
const told = ({ status }: IntervalResult): string[] =>
  status.map((one) => {
    if (one === 'no-energy') return 'no Ea'
    if (one === 'ok') return 'complete'
    if (one === 'reaches-below-zero') return 'below 0'
    return intervalStatusWords[one] === null ? 'nothing said' : 'an end is missing'
  })

describe('the status of an interval', () => {
  it('gives at every level the reason why an end is not there, however wild the data', () => {
    const seen = new Map<string, Set<IntervalStatus>>()
    for (let seed = 1; seed <= 25; seed++) {
      for (const method of ['starink', 'vyazovkin'] as const) {
        const { profile, intervals } = intervalsOf(method, scattered(25, seed))
        for (const interval of intervals) {
          expect(told(interval), `${method} ${interval.kind}`).toEqual(shown(profile.Ea_kJ_per_mol, interval))
          const key = `${method} ${interval.kind}`
          seen.set(key, new Set([...(seen.get(key) ?? []), ...interval.status]))
        }
        seen.set(method, new Set([...(seen.get(method) ?? []), ...studentStatus(profile)]))
      }
    }
    expect(seen.get('vyazovkin vyazovkin-wight-f')).toContain('end-outside')
    expect(seen.get('vyazovkin bootstrap')).toContain('resamples-without-energy')
    expect(seen.get('vyazovkin jackknife')).toContain('energy-needs-every-run')
    expect(seen.get('starink bootstrap')).toContain('reaches-below-zero')
    expect(seen.get('starink')).toContain('reaches-below-zero')
    expect(seen.get('vyazovkin')).toContain('no-energy')
  })

  it('has nothing to say of clean data', () => {
    for (const method of ['starink', 'vyazovkin'] as const) {
      const { profile, intervals } = intervalsOf(method, scattered(0.2, 1))
      for (const { status } of intervals) expect(status).toEqual(['ok', 'ok', 'ok'])
      expect(studentStatus(profile)).toEqual(['ok', 'ok', 'ok'])
    }
  })

  it('names the two programmes that leave no interval', () => {
    const two = constantRateSeries(
      levels,
      rates.slice(0, 2),
      levels.map((level) => rates.slice(0, 2).map((rate) => temperatureAt([step], rate / 60, level))),
    )
    expect(studentStatus(intervalsOf('starink', two).profile)).toEqual(levels.map(() => 'too-few-programmes'))
  })
})

const of = (Ea: number | null, lower: number | null, upper: number | null): string | null =>
  studentWords({ Ea_kJ_per_mol: Ea, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper })

describe('remarks on an interval', () => {
  it('name the levels that follow each other as one range', () => {
    const status: IntervalStatus[] = ['reaches-below-zero', 'reaches-below-zero', 'reaches-below-zero', 'ok', 'end-outside', 'no-energy']
    const remarks = intervalRemarks(status, [0.05, 0.1, 0.15, 0.2, 0.25, 0.3])
    expect(remarks.map(({ at, levels }) => [at, levels])).toEqual([
      [[0, 1, 2], '0.05 to 0.15'],
      [[4], '0.25'],
    ])
    expect(remarks.map(({ words }) => words)).toEqual([intervalStatusWords['reaches-below-zero'], intervalStatusWords['end-outside']])
  })

  it('of a single Ea say that its interval is missing or reaches below 0, and nothing without an Ea', () => {
    expect([of(100, 90, 110), of(null, null, null)]).toEqual([null, null])
    expect(of(100, null, null)).toBe('not to be had with fewer than three distinct programmes')
    expect(of(100, -5, 205)).toMatch(/^reaches below 0/)
  })
})
