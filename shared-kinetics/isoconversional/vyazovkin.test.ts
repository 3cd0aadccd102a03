import { describe, expect, it } from 'vitest'
import disturbed from '../check-values/computed/disturbed-line.json'
import twoSteps from '../check-values/computed/two-independent-steps.json'
import programmes from '../check-values/computed/ramp-hold-ramp.json'
import { temperatureAt, underConstantRate } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, constantRateSeries, hold, quiet, seriesOf, type RunValues } from '../check-values/series-of-values.ts'
import { Cancelled } from '../errors.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { friedman } from './friedman.ts'
import { vyazovkin } from './vyazovkin.ts'

const R = gasConstant_J_per_mol_K
const general = { kind: 'general' } as const

/** Ramp-hold-ramp runs of the check values, history sampled every `every` s. */
function rampHoldRamp(every: number, origin_s = 0): RunValues[] {
  return programmes.runs.map((run, i) => {
    const [holdStarts, holdEnds, ends] = [Number(run.holdStarts_s), Number(run.holdEnds_s), Number(run.ends_s)]
    const time = Array.from({ length: Math.floor(ends / every) + 1 }, (_, k) => k * every)
    return {
      programme: general,
      programmeGroup: i,
      temperature_K: run.at.map((row) => Number(row.temperature_K)),
      time_s: run.at.map((row) => Number(row.time_s)),
      reactionRate_per_s: run.at.map((row) => Number(row.reactionRate_per_s)),
      history: {
        time_s: time.map((t) => origin_s + t),
        temperature_K: time.map((t) =>
          t <= holdStarts
            ? run.start_K + (run.rate1_K_per_min * t) / 60
            : t <= holdEnds
              ? run.hold_K
              : run.hold_K + (run.rate2_K_per_min * (t - holdEnds)) / 60,
        ),
      },
    }
  })
}
const levelsOfProgrammes = programmes.runs[0]!.at.map((row) => row.level)

describe('Vyazovkin', () => {
  it('matches the disturbed line: printed Ea and minimum of Phi', () => {
    const T = disturbed.exactTemperature_K.map((text, i) => Number(text) + disturbed.disturbance_K[i]!)
    const result = vyazovkin(constantRateSeries([0.5], disturbed.heatingRate_K_per_min, [T]), quiet)
    expect((result.Ea[0]! / 1000).toFixed(4)).toBe(disturbed.vyazovkin.Ea_kJ_per_mol)
    expect(result.phi[0]!.phiMinimum.toFixed(7)).toBe(disturbed.vyazovkin.phiMinimum)
    // The same disturbance by the straight line KAS has a standard error of 3.3204: the same to a fraction of a per cent, as theory wants.
    expect(Math.abs(result.standardError[0]! / 1000 / Number(disturbed.kas.standardError_kJ_per_mol) - 1)).toBeLessThan(3e-3)
    expect(result.upper95[0]! - result.Ea[0]!).toBeCloseTo(studentTQuantile(0.975, 3) * result.standardError[0]!, 6)
    expect(result.r2[0]).toBeGreaterThan(0.998)
    expect(result.r2[0]).toBeLessThan(0.9995)
  })

  it('recovers Ea from exact programmes of ramp, hold and ramp, sampled coarsely or finely', () => {
    for (const every of [1, 15]) {
      const result = vyazovkin(seriesOf(levelsOfProgrammes, rampHoldRamp(every)), quiet)
      expect(result.status).toEqual(levelsOfProgrammes.map(() => 'ok'))
      for (const Ea of result.Ea) expect(Math.abs(Ea / programmes.Ea_J_per_mol - 1)).toBeLessThan(1e-8)
    }
    const rates = friedman(seriesOf(levelsOfProgrammes, rampHoldRamp(60)), quiet)
    for (const Ea of rates.Ea) expect(Math.abs(Ea / programmes.Ea_J_per_mol - 1)).toBeLessThan(1e-8)
  })

  it('recovers Ea from exact holds', () => {
    const [Ea, A] = [95_000, 3e8]
    const levels = [0.05, 0.5, 0.95]
    const result = vyazovkin(
      seriesOf(
        levels,
        [420, 430, 440].map((T, i) => {
          const time_s = levels.map((alpha) => -Math.log(1 - alpha) / (A * Math.exp(-Ea / (R * T))))
          return {
            programme: hold(T),
            programmeGroup: i,
            temperature_K: levels.map(() => T),
            time_s,
            history: { time_s: [0, 1e6], temperature_K: [T, T] },
          }
        }),
      ),
      quiet,
    )
    for (const value of result.Ea) expect(Math.abs(value / Ea - 1)).toBeLessThan(1e-8)
  })

  it('recovers Ea from ramps, holds and other programmes together', () => {
    const step = { Ea_J_per_mol: programmes.Ea_J_per_mol, A_per_s: programmes.A_per_s, share: 1 }
    const levels = levelsOfProgrammes
    const ramps = [2, 20].map(
      (beta, i): RunValues => ({
        programme: constantHeatingRate(beta),
        programmeGroup: 10 + i,
        temperature_K: levels.map((level) => temperatureAt([step], beta / 60, level)),
      }),
    )
    const holds = [430, 445].map(
      (T, i): RunValues => ({
        programme: hold(T),
        programmeGroup: 20 + i,
        temperature_K: levels.map(() => T),
        time_s: levels.map((alpha) => -Math.log(1 - alpha) / (step.A_per_s * Math.exp(-step.Ea_J_per_mol / (R * T)))),
        history: { time_s: [0, 1e5], temperature_K: [T, T] },
      }),
    )
    const result = vyazovkin(seriesOf(levels, [...ramps, ...holds, ...rampHoldRamp(15)]), quiet)
    expect(result.status).toEqual(levels.map(() => 'ok'))
    expect(result.interval.dof).toBe(6)
    for (const value of result.Ea) expect(Math.abs(value / step.Ea_J_per_mol - 1)).toBeLessThan(1e-8)
  })

  it('does not depend on where time starts', () => {
    const plain = vyazovkin(seriesOf(levelsOfProgrammes, rampHoldRamp(15)), quiet)
    const later = vyazovkin(seriesOf(levelsOfProgrammes, rampHoldRamp(15, 86_400)), quiet)
    for (let k = 0; k < levelsOfProgrammes.length; k++) expect(Math.abs(later.Ea[k]! / plain.Ea[k]! - 1)).toBeLessThan(1e-10)
  })

  it('lags behind the differential Ea of two overlapping steps, as the straight lines from zero do', () => {
    const levels = twoSteps.levels.map((row) => row.level)
    const result = vyazovkin(
      constantRateSeries(
        levels,
        twoSteps.heatingRate_K_per_min,
        twoSteps.levels.map((row) => row.temperature_K),
      ),
      quiet,
    )
    twoSteps.levels.forEach((row, k) => {
      // The 1.92 form differs from the exact integral by less than 0.1 % at Ea/(RT) of 27 to 37.
      expect(Math.abs(result.Ea[k]! / 1000 / Number(row.starink) - 1)).toBeLessThan(1e-3)
    })
  })

  it('has the coverage its interval claims, on lines disturbed at random', () => {
    const step = { Ea_J_per_mol: 150_000, A_per_s: 1e12, share: 1 }
    const rates = [1, 2, 5, 10, 20]
    const exact = rates.map((beta) => temperatureAt([step], beta / 60, 0.5))
    let seed = 4711
    const uniform = (): number => {
      seed = (seed * 16807) % 2147483647
      return seed / 2147483647
    }
    const normal = (): number => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
    const levels = Array.from({ length: 2000 }, (_, k) => (k + 1) / 2001)
    const result = vyazovkin(
      constantRateSeries(
        levels,
        rates,
        levels.map(() => exact.map((T) => T + 0.4 * normal())),
      ),
      quiet,
    )
    const covered = levels.filter((_, k) => result.lower95[k]! < step.Ea_J_per_mol && step.Ea_J_per_mol < result.upper95[k]!).length
    // 95 % of 2000 with a standard deviation of 0.49 %.
    expect(covered / levels.length).toBeGreaterThan(0.935)
    expect(covered / levels.length).toBeLessThan(0.965)
  })
})

describe('the curve of Phi', () => {
  const T = disturbed.exactTemperature_K.map((text, i) => Number(text) + 0.2 * disturbed.disturbance_K[i]!)
  const series = constantRateSeries([0.5], disturbed.heatingRate_K_per_min, [T])
  const result = vyazovkin(series, quiet)
  const { Ea_J_per_mol, phi, phiMinimum, phiThreshold } = result.phi[0]!

  it('spans two and a half half-widths on each side of its minimum', () => {
    expect(Ea_J_per_mol).toHaveLength(81)
    const halfWidth = result.upper95[0]! - result.Ea[0]!
    expect(Ea_J_per_mol[0]).toBeCloseTo(result.Ea[0]! - 2.5 * halfWidth, 5)
    expect(Ea_J_per_mol[80]).toBeCloseTo(result.Ea[0]! + 2.5 * halfWidth, 5)
    expect(Ea_J_per_mol[40]).toBe(result.Ea[0])
    expect(phi[40]).toBe(phiMinimum)
    expect(phi.every((value) => value >= phiMinimum)).toBe(true)
  })

  it('is Σ Σ Jᵢ/Jⱼ, by the definition', () => {
    // J of each run from the closed form of an exact simulation: -ln(1 - alpha) = A J with A = 1.
    Ea_J_per_mol.forEach((Ea, k) => {
      const J = T.map(
        (value, i) =>
          underConstantRate([{ Ea_J_per_mol: Ea, A_per_s: 1, share: 1 }], disturbed.heatingRate_K_per_min[i]! / 60, value).conversion,
      )
      let sum = 0
      for (const a of J) for (const b of J) sum += a === b ? 0 : a / b
      expect(Math.abs(phi[k]! - sum)).toBeLessThan(1e-6)
    })
  })

  it('meets its threshold at the ends of the interval', () => {
    // Phi near its minimum is a parabola to about the share that the half-width has in Ea.
    for (const [from, to] of [
      [0, 40],
      [80, 40],
    ] as const) {
      const end = from + (to - from) * (1 - 1 / 2.5)
      const [near, far] = [end - Math.sign(to - from), end + Math.sign(to - from)]
      expect(phi[near]).toBeGreaterThan(phiThreshold)
      expect(phi[far]).toBeLessThan(phiThreshold)
    }
  })

  it('spans ±20 % where two programmes give no interval', () => {
    const two = vyazovkin(constantRateSeries([0.5], [1, 10], [[T[0]!, T[3]!]]), quiet)
    expect(two.status).toEqual(['ok'])
    for (const column of [two.standardError, two.lower95, two.upper95, two.r2]) expect(column[0]).toBeNaN()
    const curve = two.phi[0]!
    expect(curve.phiMinimum).toBeCloseTo(2, 12)
    expect(curve.phiThreshold).toBeNaN()
    expect(curve.Ea_J_per_mol[0]).toBeCloseTo(0.8 * two.Ea[0]!, 6)
    expect(curve.Ea_J_per_mol[80]).toBeCloseTo(1.2 * two.Ea[0]!, 6)
  })
})

const held = (T: number, group: number, time: number): RunValues => ({
  programme: general,
  programmeGroup: group,
  temperature_K: [T],
  time_s: [time],
  history: { time_s: [0, 1e6], temperature_K: [T, T] },
})
/** Holds one after the other, the level at the end. */
const stairs = (group: number, ...steps: readonly (readonly [minutes: number, T: number])[]): RunValues => {
  const time: number[] = []
  const temperature: number[] = []
  let now = 0
  for (const [minutes, T] of steps) {
    time.push(now, now + 60 * minutes)
    temperature.push(T, T)
    now += 60 * minutes
  }
  return {
    programme: general,
    programmeGroup: group,
    temperature_K: [steps[steps.length - 1]![1]],
    time_s: [now],
    history: { time_s: time, temperature_K: temperature },
  }
}
const answer = (runs: readonly RunValues[]) => {
  const result = vyazovkin(seriesOf([0.5], runs), quiet)
  expect(result.phi).toHaveLength(1)
  if (result.status[0] !== 'ok') expect([result.Ea[0], result.standardError[0]]).toEqual([Number.NaN, Number.NaN])
  return result
}

describe('a level without a single minimum', () => {
  it('at the bound: the faster run is the colder', () => {
    const result = vyazovkin(constantRateSeries([0.5], [1, 2, 5], [[520, 510, 500]]), quiet)
    expect(result.status).toEqual(['minimum-at-bound'])
    // Still drawn, over the whole range that was searched.
    expect(result.phi[0]!.Ea_J_per_mol[0]).toBe(1000)
    expect(result.phi[0]!.phi.length).toBeGreaterThan(20)
    expect(result.phi[0]!.phiMinimum).toBeNaN()
  })

  it('flat: all runs at one temperature', () => {
    expect(answer([held(450, 0, 1000), held(450, 1, 2000), held(450, 2, 3000)]).status).toEqual(['minimum-flat'])
  })

  it('several: two energies make the integrals of two programmes equal', () => {
    // ln J differs by ln(90/101) at Ea = 0, by more than 0 at 50 and by less again above 112 kJ/mol.
    const runs = [stairs(0, [90, 500]), stairs(1, [100, 400], [1, 600])]
    expect(answer(runs).status).toEqual(['several-minima'])
    // A little longer, and the lower one is gone.
    const longer = answer([stairs(0, [110, 500]), stairs(1, [100, 400], [1, 600])])
    expect(longer.status).toEqual(['ok'])
    expect(longer.phi[0]!.phiMinimum).toBeCloseTo(2, 10)
    // ln 110 = (1/500 - 1/600) Ea/R where the cold part no longer counts.
    expect(longer.Ea[0]! / ((R * Math.log(110)) / (1 / 500 - 1 / 600))).toBeCloseTo(1, 2)
  })

  it('at the bound: the one minimum inside is higher', () => {
    const runs = [stairs(0, [110, 500], [0.0025, 900]), stairs(1, [100, 400], [1, 600])]
    expect(answer(runs).status).toEqual(['minimum-at-bound'])
  })

  it('not reached: one run ends before the level, or never comes to it', () => {
    expect(answer([held(450, 0, 1000), held(460, 1, 2e6)]).status).toEqual(['level-not-reached'])
    expect(answer([held(450, 0, 1000), held(460, 1, Number.NaN)]).status).toEqual(['level-not-reached'])
    const ramps = vyazovkin(
      constantRateSeries(
        [0.5, 0.6],
        [1, 2, 5],
        [
          [500, 510, 520],
          [505, Number.NaN, 525],
        ],
      ),
      quiet,
    )
    expect(ramps.status).toEqual(['ok', 'level-not-reached'])
    expect(ramps.phi[1]!.phi).toHaveLength(0)
  })

  it('too few programmes: replicates of one', () => {
    expect(answer([held(450, 3, 1000), held(450.1, 3, 1001)]).status).toEqual(['too-few-programmes'])
    expect(vyazovkin(seriesOf([0.5], []), quiet).status).toEqual(['too-few-programmes'])
  })

  it('is not made up where the integrals differ beyond the range of double precision', () => {
    // At 1000 kJ/mol the integrals of these holds differ by e^780.
    const [Ea, A] = [250_000, 1e30]
    const time = (T: number): number => 1 / (A * Math.exp(-Ea / (R * T)))
    const runs = [220, 260, 300].map((T, i) => ({ ...held(T, i, time(T)), history: { time_s: [0, 1e60], temperature_K: [T, T] } }))
    const result = answer(runs)
    expect(result.status).toEqual(['ok'])
    expect(Math.abs(result.Ea[0]! / Ea - 1)).toBeLessThan(1e-8)
  })
})

describe('long work', () => {
  it('stops when it is no longer wanted, and tells how far it is', () => {
    const series = seriesOf(levelsOfProgrammes, rampHoldRamp(15))
    let asked = 0
    const cancelSoon = (): void => {
      asked += 1
      if (asked > 20) throw new Cancelled()
    }
    expect(() => vyazovkin(series, { checkCancelled: cancelSoon, progress: () => {} })).toThrow(Cancelled)
    const told: number[] = []
    vyazovkin(series, { checkCancelled: () => {}, progress: (done, total) => told.push(done / total) })
    expect(told[told.length - 1]).toBe(1)
    expect(told).toEqual([...told].sort((a, b) => a - b))
  })

  it('on five noisy histories of 20,000 rows at 99 levels is found at every level', () => {
    const step = { Ea_J_per_mol: 200_000, A_per_s: 1.6e16, share: 1 }
    const levels = Array.from({ length: 99 }, (_, k) => (k + 1) / 100)
    let seed = 99
    const noise = (): number => {
      seed = (seed * 16807) % 2147483647
      return seed / 2147483647 - 0.5
    }
    const runs = [1, 2, 5, 10, 20].map((beta, i): RunValues => {
      const temperature_K = levels.map((level) => temperatureAt([step], beta / 60, level))
      const time = Array.from({ length: 20_000 }, (_, k) => (k * 0.02 * 60) / beta)
      return {
        programme: general,
        programmeGroup: i,
        temperature_K,
        time_s: temperature_K.map((T) => (60 * (T - 300)) / beta),
        history: { time_s: time, temperature_K: time.map((t) => 300 + (beta * t) / 60 + 0.1 * noise()) },
      }
    })
    const result = vyazovkin(seriesOf(levels, runs), quiet)
    expect(result.Ea).toHaveLength(99)
    for (const Ea of result.Ea) expect(Math.abs(Ea / step.Ea_J_per_mol - 1)).toBeLessThan(1e-4)
  })
})
