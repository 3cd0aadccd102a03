import { describe, expect, it } from 'vitest'
import { underConstantRate, temperatureAt } from '../check-values/exact-simulation.ts'
import {
  autocatalytic,
  durationOf,
  evenTimes,
  firstOrder,
  holdAt,
  normalNumbers,
  ramp,
  reducedTime,
  temperatureOf,
  type Pieces,
} from '../check-values/simulated-run.ts'
import { bracketedRoot } from '../numerics/root.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, type Column } from '../units/quantity.ts'
import { rateAtEnds } from './cut-ends.ts'
import { fromColumn } from './from-column.ts'
import { fromHeatFlow } from './from-heat-flow.ts'
import { fromHeatRelease } from './from-heat-release.ts'
import { fromMass } from './from-mass.ts'
import { readAtLevels } from './levels.ts'
import { peakTemperature } from './peak-temperature.ts'
import { curveFromExtent } from './smooth-curve.ts'
import { findWindow, rowsInWindow } from './window.ts'

const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)

interface Sampled {
  readonly time: Column<'s'>
  readonly T: Column<'K'>
  readonly alpha: Float64Array
  /** dα/dt. */
  readonly rate: Float64Array
}

/** First order under any programme: exact. */
function sampled(programme: Pieces, samples = 3000): Sampled {
  const time = evenTimes(durationOf(programme), samples)
  const T = time.map((t) => temperatureOf(programme, t))
  const theta = reducedTime(step, programme, time)
  const alpha = theta.map(firstOrder)
  const k = T.map((value) => step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * value)))
  return { time: column(time, 's'), T: column(T, 'K'), alpha, rate: alpha.map((a, i) => (1 - a) * (k[i] as number)) }
}

const heated = sampled(ramp(380, 10, 850))
/** The temperatures at the levels, from another route: the temperature integral in closed form. It starts at 0 K and not at 380 K, by when α is below 1e-6. */
const exactT = levels.map((level) => temperatureAt([{ ...step, share: 1 }], 10 / 60, level))

/** Noise of α over the slope of α(T) is noise of T; some 20 samples are averaged at the least, and four standard deviations are never passed. */
const allowed = (noise: number, T: number): number =>
  (4 * (noise / Math.sqrt(20))) / (underConstantRate([{ ...step, share: 1 }], 10 / 60, T).rate_per_s * 6)

describe('reading a conversion curve at levels', () => {
  it('of clean data gives the exact temperatures and rates', () => {
    const read = readAtLevels(curveFromExtent(heated.time, heated.T, heated.alpha), levels)
    levels.forEach((_, i) => {
      const T = exactT[i] as number
      expect(read.temperature_K[i]).toBeCloseTo(T, 3)
      expect(read.time_s[i]).toBeCloseTo((T - 380) * 6, 2)
      const { rate_per_s } = underConstantRate([{ ...step, share: 1 }], 10 / 60, T)
      expect((read.reactionRate_per_s[i] as number) / rate_per_s).toBeCloseTo(1, 4)
    })
  })

  it('loses nothing that matters with 3 K between samples', () => {
    const coarse = sampled(ramp(380, 10, 850), 158)
    const read = readAtLevels(curveFromExtent(coarse.time, coarse.T, coarse.alpha), levels)
    levels.forEach((_, i) => expect(Math.abs((read.temperature_K[i] as number) - (exactT[i] as number))).toBeLessThan(0.05))
  })

  it('of noisy data gives temperatures as good as the noise allows, also where the curve crosses a level several times', () => {
    const normal = normalNumbers(4)
    const noise = 0.01
    const noisy = heated.alpha.map((a) => a + noise * normal())
    const read = readAtLevels(curveFromExtent(heated.time, heated.T, noisy), levels)
    levels.forEach((_, i) => {
      const T = exactT[i] as number
      const { rate_per_s } = underConstantRate([{ ...step, share: 1 }], 10 / 60, T)
      expect(Math.abs((read.temperature_K[i] as number) - T)).toBeLessThan(allowed(noise, T))
      expect(Math.abs((read.reactionRate_per_s[i] as number) / rate_per_s - 1)).toBeLessThan(0.15)
    })
    expect([...read.temperature_K]).toEqual([...read.temperature_K].sort((a, b) => a - b))
  })

  it('leaves levels empty that are not passed', () => {
    const inside = heated.T.map((T, i) => (T > 520 && T < 600 ? i : -1)).filter((i) => i >= 0)
    const [a, b] = [inside[0] as number, inside.at(-1) as number]
    const curve = curveFromExtent(column(heated.time.slice(a, b), 's'), column(heated.T.slice(a, b), 'K'), heated.alpha.slice(a, b))
    const read = readAtLevels(curve, [1e-4, 0.5, 0.99999])
    expect(Array.from(read.temperature_K, Number.isNaN)).toEqual([
      (heated.alpha[a] as number) > 1e-4,
      false,
      (heated.alpha[b - 1] as number) < 0.99999,
    ])
    expect(read.time_s[1]).toBeGreaterThan(0)
  })

  it('averages noise of the temperature', () => {
    const normal = normalNumbers(6)
    const T = column(
      heated.T.map((value) => value + 0.2 * normal()),
      'K',
    ) // noise 0.2 K
    const read = readAtLevels(curveFromExtent(heated.time, T, heated.alpha), levels)
    const off = levels.map((_, i) => (read.temperature_K[i] as number) - (exactT[i] as number))
    expect(Math.sqrt(off.reduce((sum, value) => sum + value * value, 0) / off.length)).toBeLessThan(0.06)
  })
})

describe('temperature of the rate peak', () => {
  it('is Kissinger’s condition for first order, between samples', () => {
    // β Ea/(R T²) = A exp(-Ea/(R T)), exact for first order.
    const R = gasConstant_J_per_mol_K
    const condition = (T: number): number =>
      Math.log((10 / 60) * step.Ea_J_per_mol) - Math.log(R * T * T * step.A_per_s) + step.Ea_J_per_mol / (R * T)
    const exact = bracketedRoot(condition, 400, 900).x
    expect(peakTemperature(curveFromExtent(heated.time, heated.T, heated.alpha))).toBeCloseTo(exact, 2)
    const normal = normalNumbers(9)
    const noisy = heated.alpha.map((a) => a + 0.001 * normal())
    expect(Math.abs(peakTemperature(curveFromExtent(heated.time, heated.T, noisy)) - exact)).toBeLessThan(0.6)
  })

  it('is found in dense and noisy data, whatever the noise', () => {
    const dense = sampled(ramp(380, 10, 850), 10_000)
    for (let seed = 1; seed <= 12; seed++) {
      const normal = normalNumbers(seed)
      const peak = peakTemperature(
        curveFromExtent(
          dense.time,
          dense.T,
          dense.alpha.map((a) => a + 0.01 * normal()),
        ),
      )
      // Noise of 1 % leaves about 1 K in a maximum that is flat over several kelvin.
      expect(Math.abs(peak - 558.97)).toBeLessThan(5)
    }
  })

  it('is not to be had where the rate only falls', () => {
    const held = sampled(holdAt(580, 2000))
    expect(peakTemperature(curveFromExtent(held.time, held.T, held.alpha))).toBeNaN()
  })
})

const massOf = (alpha: Float64Array, noise = 0): Float64Array => {
  const normal = normalNumbers(12)
  return alpha.map((a) => 5e-6 * (1 - 0.6 * a) + noise * normal())
}

describe('conversion from mass', () => {
  it('is that of the simulation, for loss and gain', () => {
    for (const sign of [1, -1]) {
      const mass = massOf(heated.alpha).map((value) => (sign > 0 ? value : 8e-6 - value))
      const { curve } = fromMass(heated.time, heated.T, mass, 'Run')
      heated.alpha.forEach((a, i) => expect(curve.conversion[i]).toBeCloseTo(a, 5))
    }
  })

  it('averages the plateaus of noisy data', () => {
    const read = readAtLevels(fromMass(heated.time, heated.T, massOf(heated.alpha, 2e-8), 'Run').curve, levels)
    levels.forEach((_, i) => {
      const T = exactT[i] as number
      expect(Math.abs((read.temperature_K[i] as number) - T)).toBeLessThan(allowed(2e-8 / 3e-6, T))
    })
  })

  it('takes the local line where the window ends inside the reaction, and tells how fast it still runs there', () => {
    const last = heated.T.findIndex((T) => T > (exactT[15] as number))
    const cut = fromMass(
      column(heated.time.slice(0, last), 's'),
      column(heated.T.slice(0, last), 'K'),
      massOf(heated.alpha).slice(0, last),
      'Run',
    )
    expect(cut.curve.conversion.at(-1)).toBeCloseTo(1, 3)
    const { start, end } = rateAtEnds(cut.curve)
    const top = Math.max(...heated.rate)
    // Mean over the outermost fifth of the duration, hence a little more than at the very end.
    expect(start).toBeLessThan(0.001)
    expect(end).toBeGreaterThan((heated.rate[last] as number) / top)
    expect(end).toBeLessThan(1)
    const whole = rateAtEnds(fromMass(heated.time, heated.T, massOf(heated.alpha), 'Run').curve)
    expect(whole.end).toBeLessThan(0.001)
  })

  it('refuses a mass that does not change', () => {
    const normal = normalNumbers(13)
    expect(() =>
      fromMass(
        heated.time,
        heated.T,
        heated.T.map(() => 5e-6 + 1e-9 * normal()),
        'Run 7',
      ),
    ).toThrow(/Run 7: the mass does not change/)
  })
})

describe('conversion from a column', () => {
  it('is taken as it stands, neither shifted nor stretched', () => {
    const half = heated.alpha.map((a) => 0.1 + 0.8 * a)
    const { curve } = fromColumn(heated.time, heated.T, half)
    expect(curve.conversion[0]).toBeCloseTo(0.1, 5)
    expect(curve.conversion.at(-1)).toBeCloseTo(0.9, 5)
  })
})

describe('conversion from heat release', () => {
  it('is integrated over time, not temperature: exact where the heating rate changes by half', () => {
    const uneven = sampled({
      start_K: 450,
      pieces: [
        { rate_K_per_s: 0.2, duration_s: 800 },
        { rate_K_per_s: 0.1, duration_s: 2000 },
      ],
    })
    const { curve, area } = fromHeatRelease(
      uneven.time,
      uneven.T,
      uneven.rate.map((rate) => 2e6 * rate),
      'Run',
    )
    expect(area / 2e6).toBeCloseTo(1, 5)
    uneven.alpha.forEach((a, i) => expect(curve.conversion[i]).toBeCloseTo(a, 4))
  })

  it('takes no baseline away', () => {
    const { curve, baseline } = fromHeatRelease(
      heated.time,
      heated.T,
      heated.rate.map((rate) => 2e6 * rate + 100),
      'Run',
    )
    // 100 W/kg over 2820 s, beside 2 MJ/kg: a share of 0.124 spread evenly over time.
    const middle = 1000
    expect(curve.conversion[middle]).toBeCloseTo(
      ((heated.alpha[middle] as number) * 2e6 + 100 * (heated.time[middle] as number)) / (2e6 + 100 * 2820),
      3,
    )
    expect(baseline).toBeNull()
  })
})

// Heat capacity of the reactant and of the product, both rising with temperature, times the heating rate; and an enthalpy of either sign.
const baselineOf = (a: number, T: number): number => -(1 - a) * (200 + 0.3 * (T - 450)) - a * (260 + 0.2 * (T - 450))
const signal = (heat: number, noise = 0): Float64Array => {
  const normal = normalNumbers(25)
  return heated.alpha.map((a, i) => baselineOf(a, heated.T[i] as number) + heat * (heated.rate[i] as number) + noise * normal())
}

describe('conversion from heat flow', () => {
  it.each([3e5, -3e5])('area-proportional finds α and the enthalpy behind a rising heat capacity (%d J/kg)', (heat) => {
    const { curve, area, baseline } = fromHeatFlow(heated.time, heated.T, signal(heat), 'area-proportional', 'Run')
    expect(area / heat).toBeCloseTo(1, 2)
    heated.alpha.forEach((a, i) => expect(Math.abs((curve.conversion[i] as number) - a)).toBeLessThan(0.003))
    expect(baseline).toHaveLength(heated.time.length)
  })

  it('with noise of 1 % of the peak keeps the levels from 0.2 to 0.95 within 1.5 K (1 % of α in the steep part is 0.5 K)', () => {
    const top = 3e5 * Math.max(...heated.rate)
    const { curve } = fromHeatFlow(heated.time, heated.T, signal(3e5, 0.01 * top), 'area-proportional', 'Run')
    const read = readAtLevels(curve, levels)
    const off = levels.map((_, i) => Math.abs((read.temperature_K[i] as number) - (exactT[i] as number)))
    expect(Math.max(...off.slice(3))).toBeLessThan(1.5)
  })

  it('straight is exact where the heat capacity does not change', () => {
    const flat = heated.rate.map((rate, i) => 3e5 * rate - 200 - 0.3 * ((heated.T[i] as number) - 450))
    const { curve, area } = fromHeatFlow(heated.time, heated.T, flat, 'straight', 'Run')
    expect(area / 3e5).toBeCloseTo(1, 3)
    heated.alpha.forEach((a, i) => expect(Math.abs((curve.conversion[i] as number) - a)).toBeLessThan(0.001))
  })

  it('a hold, whose reaction runs from the first moment on, is levelled at its end', () => {
    const held = sampled(holdAt(550, 3000))
    expect(held.alpha.at(-1)).toBeGreaterThan(0.999999)
    const { curve, area } = fromHeatFlow(
      held.time,
      held.T,
      held.rate.map((rate) => 4 - 3e5 * rate),
      'level-at-end',
      'Run',
    )
    expect(-area / 3e5).toBeCloseTo(1, 3)
    held.alpha.forEach((a, i) => expect(Math.abs((curve.conversion[i] as number) - a)).toBeLessThan(0.001))
  })

  it('refuses a window without a peak', () => {
    const normal = normalNumbers(22)
    expect(() =>
      fromHeatFlow(
        heated.time,
        heated.T,
        heated.T.map((T) => 0.01 * T + normal()),
        'area-proportional',
        'Run 3',
      ),
    ).toThrow(/Run 3: there is no peak in the heat flow/)
  })
})

const startUp = (t: number): number => Math.exp(-t / 30)

describe('windows', () => {
  it('in temperature hold the rows of the main heating part inside them', () => {
    const { first, last } = rowsInWindow(heated.time, heated.T, { kind: 'temperature', start_K: 500, end_K: 700 }, 'Run')
    expect(heated.T[first - 1]).toBeLessThan(500)
    expect(heated.T[first]).toBeGreaterThanOrEqual(500)
    expect(heated.T[last]).toBeLessThanOrEqual(700)
    expect(heated.T[last + 1]).toBeGreaterThan(700)
  })

  it('in temperature do not reach into a cooling part', () => {
    const programme = {
      start_K: 450,
      pieces: [
        { rate_K_per_s: 0.2, duration_s: 1000 },
        { rate_K_per_s: -0.2, duration_s: 1000 },
      ],
    }
    const time = evenTimes(2000, 2001)
    const T = time.map((t) => temperatureOf(programme, t))
    const { first, last } = rowsInWindow(time, T, { kind: 'temperature', start_K: 500, end_K: 600 }, 'Run')
    expect([time[first], time[last]]).toEqual([250, 750])
  })

  it('in time count from the first row, ends included', () => {
    const time = evenTimes(1000, 1001)
    const T = time.map(() => 400)
    expect(rowsInWindow(time, T, { kind: 'time', start_s: 100, end_s: 300 }, 'Run')).toEqual({ first: 100, last: 300 })
  })

  it('with fewer than 20 rows inside are refused, saying where the run lies', () => {
    expect(() => rowsInWindow(heated.time, heated.T, { kind: 'temperature', start_K: 900, end_K: 950 }, 'Run 5')).toThrow(
      /Run 5: 0 rows lie inside the window 900 K .* 20 are needed.*380 K.*850 K/,
    )
  })

  it('are all of the heating part where none is set, for mass, conversion and heat release', () => {
    expect(findWindow(heated.time, heated.T, heated.alpha, 'whole')).toEqual({ first: 0, last: 2999 })
  })

  it('reach for heat flow from the straight part before the peak to that after it, without the start-up of the furnace', () => {
    // The heating rate comes up over the first 30 K, and the heat flow swings in with it.
    const T = column(
      heated.time.map((t) => 380 + t / 6 - 5 * (1 - startUp(t))),
      'K',
    )
    const y = heated.rate.map((rate, i) => 3e5 * rate - 500 * startUp(heated.time[i] as number))
    for (const kind of ['peak-with-tangents', 'peak-alone'] as const) {
      const { first, last } = findWindow(heated.time, T, y, kind)
      expect(heated.time[first]).toBeGreaterThan(60)
      // Less than half a percent of the reaction lies outside.
      expect(heated.alpha[first]).toBeLessThan(0.005)
      expect(heated.alpha[last]).toBeGreaterThan(0.995)
    }
  })
})

describe('smoothing', () => {
  it('rounds no corner of a clean curve: rates beside the end of a ramp are exact', () => {
    const programme = {
      start_K: 500,
      pieces: [
        { rate_K_per_s: 0.1, duration_s: 800 },
        { rate_K_per_s: 0, duration_s: 3000 },
      ],
    }
    const bent = sampled(programme, 4000)
    const read = readAtLevels(curveFromExtent(bent.time, bent.T, bent.alpha), levels)
    levels.forEach((level, i) => {
      const k = step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * (read.temperature_K[i] as number)))
      expect((read.reactionRate_per_s[i] as number) / (k * (1 - level))).toBeCloseTo(1, 2)
    })
  })

  it('is exact for an autocatalytic reaction, whose curve is S-shaped in a hold', () => {
    const programme = holdAt(560, 6000)
    const time = column(evenTimes(6000, 2000), 's')
    const theta = reducedTime(step, programme, time)
    const alpha = theta.map(autocatalytic(0.02))
    const read = readAtLevels(
      curveFromExtent(
        time,
        column(
          time.map(() => 560),
          'K',
        ),
        alpha,
      ),
      levels,
    )
    const k = (theta[1999] as number) / 6000
    levels.forEach((level, i) => {
      // α = (grown - s)/(1 - s), so that θ at a level follows from the logistic curve.
      const grown = level * 0.98 + 0.02
      const exact = (Math.log(grown / (1 - grown)) - Math.log(0.02 / 0.98)) / k
      expect(Math.abs((read.time_s[i] as number) - exact) < 0.01 || Number.isNaN(read.time_s[i])).toBe(true)
      expect(Number.isNaN(read.time_s[i])).toBe(exact > 6000)
    })
    expect(read.time_s.filter(Number.isFinite).length).toBeGreaterThan(15)
  })
})
