import { describe, expect, it } from 'vitest'
import disturbed from '../check-values/computed/disturbed-line.json'
import otherForms from '../check-values/computed/systematic-error-other-forms.json'
import systematic from '../check-values/computed/systematic-error.json'
import twoSteps from '../check-values/computed/two-independent-steps.json'
import { temperatureAt, underConstantRate } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, constantRateSeries, hold, quiet, seriesOf } from '../check-values/series-of-values.ts'
import { Cancelled, KineticsError } from '../errors.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { friedman } from './friedman.ts'
import { isothermalIntegral } from './isothermal-integral.ts'
import { kissingerAkahiraSunose } from './kissinger-akahira-sunose.ts'
import { ozawaFlynnWall } from './ozawa-flynn-wall.ts'
import { ozawaFlynnWallCorrected } from './ozawa-flynn-wall-corrected.ts'
import { starink1996 } from './starink-1996.ts'
import { starink } from './starink.ts'
import { tang } from './tang.ts'

const R = gasConstant_J_per_mol_K
const heated = [ozawaFlynnWall, kissingerAkahiraSunose, starink, starink1996, tang]
const asPrinted = (value: number, printed: string): string => value.toFixed((printed.split('.')[1] ?? '').length)

describe('the disturbed line (first order, five rates, T moved by up to 0.5 K)', () => {
  const T = disturbed.exactTemperature_K.map((text, i) => Number(text) + (disturbed.disturbance_K[i] as number))
  const result = kissingerAkahiraSunose(constantRateSeries([0.5], disturbed.heatingRate_K_per_min, [T]), quiet)

  it('has the printed Ea, standard error and 95 % interval', () => {
    const { kas } = disturbed
    expect(asPrinted((result.Ea[0] as number) / 1000, kas.Ea_kJ_per_mol)).toBe(kas.Ea_kJ_per_mol)
    expect(asPrinted((result.standardError[0] as number) / 1000, kas.standardError_kJ_per_mol)).toBe(kas.standardError_kJ_per_mol)
    const halfWidth = ((result.upper95[0] as number) - (result.lower95[0] as number)) / 2000
    expect(asPrinted(halfWidth, kas.halfWidth95_kJ_per_mol)).toBe(kas.halfWidth95_kJ_per_mol)
    expect(result.interval).toEqual({ kind: 'student-t', level: 0.95, dof: 3, pointwise: true })
  })

  it('has the printed intercept once heating rates are in K/min', () => {
    const line = result.lines[0]
    expect(asPrinted((line?.intercept ?? 0) + Math.log(60), disturbed.kas.intercept_K_per_min)).toBe(disturbed.kas.intercept_K_per_min)
    expect(-(line?.slope_K ?? 0) * R).toBeCloseTo(result.Ea[0] as number, 6)
    expect(Array.from(line?.x_per_K ?? [])).toEqual(T.map((value) => 1 / value))
  })
})

describe('the systematic error at close heating rates', () => {
  const methods = { ofw: ozawaFlynnWall, kas: kissingerAkahiraSunose, starink, 'Starink 1996': starink1996, 'Tang 2003': tang }
  const rows = [...systematic.rows, ...otherForms.rows].filter(({ method }) => method in methods)
  it.each(rows)('of $method is the printed one, and stands beside Ea', ({ method, percent }) => {
    systematic.x.forEach((x, k) => {
      const Ea = x * R * 600
      // A constant g(alpha) asks for beta in proportion to p(Ea/RT).
      const T = [599.99, 600, 600.01]
      const beta = T.map((value) => 10 * Math.exp(lnPOfX(Ea / (R * value)) - lnPOfX(x)))
      const result = methods[method as keyof typeof methods](constantRateSeries([0.5], beta, [T]), quiet)
      const error = 100 * ((result.Ea[0] as number) / Ea - 1)
      const printed = percent[k] as string
      // One entry, -2.5949, stands printed as -2.60: a little more than half a unit.
      const allowed = 0.52 * 10 ** -(printed.split('.')[1] ?? '').length
      expect(Math.abs(error - Number(printed)), `Ea/RT ${x}`).toBeLessThan(allowed)
      // From the apparent Ea the true x is found again; 1e-5 % is what regression on temperatures 0.01 K apart leaves.
      expect(Math.abs(100 * (result.systematicError[0] as number) - error), `Ea/RT ${x}`).toBeLessThan(1e-5)
    })
  })

  it('is given where the runs are far apart too, close enough to correct Ea by', () => {
    // First order, 150 kJ/mol, 1 to 20 K/min.
    const step = { Ea_J_per_mol: 150_000, A_per_s: 1e12, share: 1 }
    const rates = [1, 2, 5, 10, 20]
    const T = rates.map((beta) => temperatureAt([step], beta / 60, 0.5))
    for (const method of Object.values(methods)) {
      const result = method(constantRateSeries([0.5], rates, [T]), quiet)
      const corrected = (result.Ea[0] as number) / (1 + (result.systematicError[0] as number))
      expect(Math.abs(corrected / step.Ea_J_per_mol - 1)).toBeLessThan(1e-4)
    }
  })

  it('is 0 for a method without a temperature integral, and not to be had without Ea', () => {
    const T = [500, 510, 520]
    const series = constantRateSeries([0.5], [1, 2, 5], [T], rate)
    expect(friedman(series, quiet).systematicError[0]).toBe(0)
    expect(friedman(constantRateSeries([0.5], [1, 2, 5], [T]), quiet).systematicError[0]).toBeNaN()
    expect(starink(constantRateSeries([0.5], [1, 2, 5], [[500, 500, 500]]), quiet).systematicError[0]).toBeNaN()
  })
})

describe('two independent first-order steps of equal weight', () => {
  const levels = twoSteps.levels.map((row) => row.level)
  const steps = twoSteps.steps.map(({ Ea_kJ_per_mol, A_per_min }) => ({
    Ea_J_per_mol: Ea_kJ_per_mol * 1000,
    A_per_s: A_per_min / 60,
    share: 0.5,
  }))
  const rates = twoSteps.heatingRate_K_per_min

  it('give the printed Ea within what their temperatures of five decimals allow', () => {
    const printedT = constantRateSeries(
      levels,
      rates,
      twoSteps.levels.map((row) => row.temperature_K),
    )
    const kas = kissingerAkahiraSunose(printedT, quiet)
    const star = starink(printedT, quiet)
    twoSteps.levels.forEach((row, k) => {
      // 5e-6 K at each run, 30 K apart in all, moves an Ea of 110 kJ/mol by up to 5e-5 kJ/mol; half a unit of the last printed digit is as much again.
      expect(Math.abs((kas.Ea[k] as number) / 1000 - Number(row.kas))).toBeLessThan(1e-4)
      expect(Math.abs((star.Ea[k] as number) / 1000 - Number(row.starink))).toBeLessThan(1e-4)
    })
  })

  it('simulated anew give every printed digit, by Friedman too', () => {
    const T = levels.map((level) => rates.map((beta) => temperatureAt(steps, beta / 60, level)))
    T.forEach((row, k) => expect(row.map((value) => value.toFixed(5))).toEqual(twoSteps.levels[k]?.temperature_K))
    const series = seriesOf(
      levels,
      rates.map((beta, i) => {
        const temperature_K = T.map((row) => row[i] as number)
        return {
          programme: constantHeatingRate(beta),
          programmeGroup: i,
          temperature_K,
          reactionRate_per_s: temperature_K.map((value) => underConstantRate(steps, beta / 60, value).rate_per_s),
        }
      }),
    )
    const results = { friedman: friedman(series, quiet), kas: kissingerAkahiraSunose(series, quiet), starink: starink(series, quiet) }
    twoSteps.levels.forEach((row, k) => {
      for (const id of ['friedman', 'kas', 'starink'] as const) {
        expect(asPrinted((results[id].Ea[k] as number) / 1000, row[id]), `${id}, ${row.level}`).toBe(row[id])
      }
    })
  })
})

describe('holds', () => {
  const [Ea, A] = [110_000, 2e9]
  const temperatures = [400, 410, 420, 430]
  const levels = [0.1, 0.5, 0.9]
  const k = (T: number): number => A * Math.exp(-Ea / (R * T))
  const series = seriesOf(
    levels,
    temperatures.map((T, i) => ({
      programme: hold(T),
      programmeGroup: i,
      temperature_K: levels.map(() => T),
      // Second order: g = alpha/(1 - alpha), f = (1 - alpha)².
      time_s: levels.map((alpha) => alpha / (1 - alpha) / k(T)),
      reactionRate_per_s: levels.map((alpha) => k(T) * (1 - alpha) ** 2),
    })),
  )

  it('give the true Ea by their times and by their rates', () => {
    for (const value of isothermalIntegral(series, quiet).Ea) expect(Math.abs(value / Ea - 1)).toBeLessThan(1e-12)
    const result = friedman(series, quiet)
    levels.forEach((alpha, i) => {
      expect(Math.abs((result.Ea[i] as number) / Ea - 1)).toBeLessThan(1e-12)
      expect(result.lnAf[i]).toBeCloseTo(Math.log(A * (1 - alpha) ** 2), 10)
    })
    expect(isothermalIntegral(series, quiet).lnAf.every(Number.isNaN)).toBe(true)
  })

  it('that reach a level at once have no line there', () => {
    const atOnce = seriesOf(
      [0.1],
      temperatures.map((T, i) => ({ programme: hold(T), programmeGroup: i, temperature_K: [T], time_s: [i === 2 ? 0 : 100 - i] })),
    )
    expect(isothermalIntegral(atOnce, quiet).status).toEqual(['line-not-determined'])
  })

  it('are refused by methods made for constant heating rates, and ramps by the one made for holds', () => {
    for (const method of heated) {
      expect(() => method(series, quiet)).toThrow(KineticsError)
      expect(() => method(series, quiet)).toThrow(/applies to a constant heating rate; run 1 followed a hold/)
    }
    const ramps = constantRateSeries([0.5], [1, 2, 5], [[500, 510, 520]])
    expect(() => isothermalIntegral(ramps, quiet)).toThrow(/applies to a hold/)
  })
})

const rate = (_: number, value: number): number => Math.exp(-12000 / value)

describe('the corrected OFW', () => {
  const T = disturbed.exactTemperature_K.map((text, i) => Number(text) + (disturbed.disturbance_K[i] as number))
  const series = constantRateSeries([0.5], disturbed.heatingRate_K_per_min, [T])
  const result = ozawaFlynnWallCorrected(series, quiet)

  it('is where ln beta - ln p(Ea/RT) has no slope against 1/T, and so does not depend on the line that was corrected', () => {
    const Ea = result.Ea[0] as number
    const slopeAt = (energy: number): number => {
      const y = T.map((value, i) => Math.log(disturbed.heatingRate_K_per_min[i] as number) - lnPOfX(energy / (R * value)))
      return lineFit(
        T.map((value) => 1 / value),
        y,
      ).slope
    }
    expect(Math.abs(slopeAt(Ea)) / (Ea / R)).toBeLessThan(1e-12)
    expect(slopeAt(Ea * 1.001) * slopeAt(Ea * 0.999)).toBeLessThan(0)
    // Its standard error is that slope's, over how fast the slope moves with Ea.
    const perSlope = (2e-6 * Ea) / (slopeAt(Ea * (1 + 1e-6)) - slopeAt(Ea * (1 - 1e-6)))
    expect((result.points[0]?.energyPerSlope as number) / -Math.abs(perSlope)).toBeCloseTo(1, 7)
    // KAS with its printed standard error of 3.3204 is a method of the same kind.
    expect(Math.abs((result.standardError[0] as number) / 1000 / Number(disturbed.kas.standardError_kJ_per_mol) - 1)).toBeLessThan(3e-3)
  })

  it('draws the corrected line: its slope is -1.052 Ea/R', () => {
    expect(((result.lines[0]?.slope_K ?? 0) * -R) / 1.052).toBeCloseTo(result.Ea[0] as number, 6)
  })

  it('has no Ea where the faster run is the colder: there is no temperature integral for it', () => {
    expect(ozawaFlynnWallCorrected(constantRateSeries([0.5], [1, 2, 5], [[520, 510, 500]]), quiet).status).toEqual(['line-not-determined'])
  })
})

describe('what a level cannot answer', () => {
  const rates = [2, 5, 10, 20]
  const T = [
    [500, 510, 520, 530],
    [530, 541, Number.NaN, 561],
    [560, 560, 560, 560],
  ]
  const series = constantRateSeries([0.2, 0.5, 0.8], rates, T, (level) => (level === 0.2 ? 1e-3 : 0))

  it('is a status with NaN beside it, the other levels kept', () => {
    for (const method of heated) {
      const result = method(series, quiet)
      expect(result.status).toEqual(['ok', 'level-not-reached', 'line-not-determined'])
      expect(Array.from(result.Ea, Number.isFinite)).toEqual([true, false, false])
      expect(Array.from(result.upper95, Number.isFinite)).toEqual([true, false, false])
      expect(Array.from(result.r2, Number.isFinite)).toEqual([true, false, false])
      expect(result.lines).toHaveLength(3)
      expect(Array.from(result.lines[1]?.x_per_K ?? [], Number.isFinite)).toEqual([true, true, false, true])
      expect(result.lines[1]?.slope_K).toBeNaN()
    }
    expect(friedman(series, quiet).status).toEqual(['ok', 'level-not-reached', 'rate-not-positive'])
  })

  it('with two programmes is the standard error, with one the energy', () => {
    const two = constantRateSeries([0.2], [2, 5], [[500, 510]], rate)
    for (const method of [...heated, friedman]) {
      const result = method(two, quiet)
      expect(result.status).toEqual(['ok'])
      expect(result.Ea[0]).toBeGreaterThan(0)
      for (const column of [result.standardError, result.lower95, result.upper95, result.lnAfStandardError]) expect(column[0]).toBeNaN()
    }
    expect(friedman(two, quiet).lnAf[0]).toBeCloseTo(0, 9)
    // Three runs of two programmes: replicates do not make a third.
    const replicate = {
      ...two,
      runs: [...two.runs, ...constantRateSeries([0.2], [5.01], [[510.4]], rate).runs.map((run) => ({ ...run, programmeGroup: 1 }))],
    }
    const three = kissingerAkahiraSunose(replicate, quiet)
    expect([three.status[0], three.standardError[0], three.interval.dof]).toEqual(['ok', Number.NaN, 0])
    const alone = { ...two, runs: replicate.runs.slice(1) }
    for (const method of [...heated, friedman]) {
      const result = method(alone, quiet)
      expect(result.status).toEqual(['too-few-programmes'])
      expect(result.Ea[0]).toBeNaN()
      expect(result.lines[0]?.slope_K).toBeNaN()
    }
    expect(kissingerAkahiraSunose({ ...two, runs: [] }, quiet).status).toEqual(['too-few-programmes'])
  })

  it('counts replicates as points of the line', () => {
    const runs = constantRateSeries([0.5], [2, 5, 10, 2], [[500, 511, 519, 501]]).runs
    const withReplicate = kissingerAkahiraSunose(
      { levels: series.levels.subarray(0, 1) as typeof series.levels, runs: runs.map((run, i) => ({ ...run, programmeGroup: i % 3 })) },
      quiet,
    )
    expect(withReplicate.interval.dof).toBe(2)
    // t(0.975; 2) = 4.3027.
    const ratio = ((withReplicate.upper95[0] as number) - (withReplicate.Ea[0] as number)) / (withReplicate.standardError[0] as number)
    expect(ratio.toFixed(4)).toBe('4.3027')
  })
})

const cancel = (): never => {
  throw new Cancelled()
}

describe('calls that cannot be answered', () => {
  it('are refused with what is wrong and where', () => {
    const series = constantRateSeries([0.5], [1, 0, 5], [[500, 510, 520]])
    expect(() => starink(series, quiet)).toThrow(/positive heating rate; run 2/)
    const short = constantRateSeries([0.5], [1, 2, 5], [[500, 510, 520]])
    expect(() => starink({ ...short, levels: constantRateSeries([0.4, 0.5], [], []).levels }, quiet)).toThrow(/has 1 values for 2 levels/)
  })

  it('stop when the work is no longer wanted', () => {
    const series = constantRateSeries([0.5], [1, 2, 5], [[500, 510, 520]])
    expect(() => starink(series, { checkCancelled: cancel, progress: () => {} })).toThrow(Cancelled)
  })
})
