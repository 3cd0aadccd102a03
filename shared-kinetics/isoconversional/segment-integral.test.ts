import { describe, expect, it } from 'vitest'
import exact from '../check-values/computed/segment-integrals.json'
import { constantHeatingRate, seriesOf, type RunValues } from '../check-values/series-of-values.ts'
import { gaussLegendre } from '../numerics/quadrature.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { segmentIntegral } from './segment-integral.ts'
import { timeIntegral } from './time-integral.ts'

const R = gasConstant_J_per_mol_K
const largestEa = 1e6
const runAt = (run: RunValues) =>
  seriesOf(
    run.temperature_K.map(() => 0.5),
    [run],
  ).runs[0]!

/** T of the programme of the check values at a time, rows added between the corners every `every` s. */
function measured(every: number): RunValues {
  const { cornerTime_s: t, cornerTemperature_K: T, time_s } = exact
  const at = (time: number): number => {
    const next = Math.max(
      1,
      t.findIndex((corner) => corner >= time),
    )
    return T[next - 1]! + ((T[next]! - T[next - 1]!) * (time - t[next - 1]!)) / (t[next]! - t[next - 1]!)
  }
  const rows = [...new Set([...t, ...Array.from({ length: Math.floor(t.at(-1)! / every) }, (_, i) => i * every)])].sort((a, b) => a - b)
  return {
    programme: { kind: 'general' },
    programmeGroup: 0,
    temperature_K: time_s.map(at),
    time_s,
    history: { time_s: rows, temperature_K: rows.map(at) },
  }
}

describe.each([1e4, 7, 0.5])('a programme of ramps, holds, cooling and a jump, rows every %d s', (every) => {
  const run = runAt(measured(every))
  const fromStart = timeIntegral(run, largestEa)
  const segments = segmentIntegral(run, largestEa)

  it.each(exact.rows)('has the integrals of 60-digit arithmetic at Ea $Ea_J_per_mol J/mol', (row) => {
    exact.time_s.forEach((time, level) => {
      expect([fromStart.reaches(level), segments.reaches(level)]).toEqual([true, true])
      // 1e-9 for the rules at the largest Ea and for nodes that were joined 2e-7·(Ea/1e6)⁴; nothing is lost however short a segment is (1e-4 s here).
      const tolerance = 2e-9 + 2e-7 * (row.Ea_J_per_mol / 1e6) ** 4
      expect(
        Math.abs(fromStart.atLevel(row.Ea_J_per_mol, level).lnJ - Number(row.lnJFromStart[level])),
        `from 0 to ${time} s`,
      ).toBeLessThan(tolerance)
      expect(Math.abs(segments.atLevel(row.Ea_J_per_mol, level).lnJ - Number(row.lnJOfSegment[level])), `to ${time} s`).toBeLessThan(
        tolerance,
      )
    })
  })
})

/** A ramp of 6 K/min read at these temperatures. */
const rampOf = (temperature_K: number[], withTime = true): RunValues => ({
  programme: constantHeatingRate(6),
  programmeGroup: 0,
  temperature_K,
  ...(withTime ? { time_s: temperature_K.map((T) => (T - 300) * 10) } : {}),
})

describe('a segment of a ramp', () => {
  const fine = gaussLegendre(64)

  it.each([1e-6, 0.3, 0.999_999, 1, 1.000_001, 5, 40])('of %d K keeps its digits by either way of summing', (width) => {
    for (const T of [350, 600, 1200]) {
      for (const Ea of [2e3, 5e4, 2e5, 9e5]) {
        const [from, to] = [T, T + width]
        // The same by 64 points, relative to the hot end; 40 K at 900 kJ/mol and 350 K is the steepest.
        let sum = 0
        for (let i = 0; i < 64; i++)
          sum += 0.5 * fine.weights[i]! * Math.exp((-Ea / R) * (1 / (from + 0.5 * (1 + fine.nodes[i]!) * (to - from)) - 1 / to))
        for (const withTime of [true, false]) {
          const { lnJ, inverseT } = segmentIntegral(runAt(rampOf([from, to], withTime)), largestEa).atLevel(Ea, 1)
          const expected = Math.log(sum) - Ea / (R * to) + Math.log(10 * (to - from))
          // Times and temperatures of 1e-13 of their size leave a width of 1e-6 K open by 1e-6 of it.
          expect(Math.abs(lnJ - expected), `${T} K, ${Ea} J/mol`).toBeLessThan(2e-12 + 3e-12 / width)
          expect(inverseT).toBeGreaterThan((1 / to) * (1 - 1e-12))
          expect(inverseT).toBeLessThan((1 / from) * (1 + 1e-12))
        }
      }
    }
  })

  it('has the slope -(effective 1/T)/R', () => {
    const integral = segmentIntegral(runAt(rampOf([500, 500.4, 512])), largestEa)
    for (const level of [0, 1, 2]) {
      for (const Ea of [2e4, 1.2e5, 5e5]) {
        const d = Ea * 1e-5
        const slope = (integral.atLevel(Ea + d, level).lnJ - integral.atLevel(Ea - d, level).lnJ) / (2 * d)
        expect((-R * slope) / integral.atLevel(Ea, level).inverseT).toBeCloseTo(1, 7)
      }
    }
  })

  it('takes the measured time, so that noise of the temperature moves it little', () => {
    // 0.05 K more at the end of a segment of 0.5 K: a tenth of ΔT, a thousandth of the rate constant.
    const time_s = [2000, 2005]
    const integral = (end: number) =>
      segmentIntegral(
        runAt({ programme: constantHeatingRate(6), programmeGroup: 0, temperature_K: [500, end], time_s }),
        largestEa,
      ).atLevel(1e5, 1).lnJ
    expect(Math.abs(integral(500.55) - integral(500.5))).toBeLessThan(1.3e-3)
    // Even where the sample cools for a moment.
    expect(Math.abs(integral(499.98) - integral(500.02))).toBeLessThan(1.1e-3)
  })

  it('is there only where both its levels are, one after the other', () => {
    const run = rampOf([500, Number.NaN, 510, 520])
    const integral = segmentIntegral(runAt(run), largestEa)
    expect([0, 1, 2, 3].map(integral.reaches)).toEqual([true, false, false, true])
    const back = segmentIntegral(runAt({ ...rampOf([500, 510, 505], false) }), largestEa)
    expect([0, 1, 2].map(back.reaches)).toEqual([true, true, false])
    const held: RunValues = {
      programme: { kind: 'general' },
      programmeGroup: 0,
      temperature_K: [450, 450, 450, 450],
      time_s: [10, 10, 20, 200],
      history: { time_s: [5, 105], temperature_K: [450, 450] },
    }
    // At one time with the level before; beyond the end of the history.
    expect([0, 1, 2, 3].map(segmentIntegral(runAt(held), largestEa).reaches)).toEqual([true, false, true, false])
  })
})
