import { describe, expect, it } from 'vitest'
import {
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
import { isHold, startOfHold } from '../series/hold.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, type Column } from '../units/quantity.ts'
import { rateAtEnds } from './cut-ends.ts'
import { fromHeatFlow } from './from-heat-flow.ts'
import { longestHold } from './longest-hold.ts'
import { fromMass } from './from-mass.ts'
import { noiseOf } from '../signal/noise.ts'
import { valueAtEnd } from './plateau.ts'
import { findWindow } from './window.ts'

const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const kAt = (T: number): number => step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * T))

interface Sampled {
  readonly time: Column<'s'>
  readonly T: Column<'K'>
  readonly alpha: Float64Array
  readonly rate: Float64Array
}

/** First order, exact. */
function sampled(programme: Pieces, samples = 3000): Sampled {
  const time = evenTimes(durationOf(programme), samples)
  const T = time.map((t) => temperatureOf(programme, t))
  const alpha = reducedTime(step, programme, time).map(firstOrder)
  return { time: column(time, 's'), T: column(T, 'K'), alpha, rate: alpha.map((a, i) => (1 - a) * kAt(T[i] as number)) }
}

const heat = 4e5
const heatFlow = ({ T, alpha, rate }: Sampled): Float64Array =>
  rate.map((value, i) => heat * value - 100 - 0.1 * ((T[i] as number) - 450) - 20 * (alpha[i] as number))

const convert = (run: Sampled, kind: 'area-proportional' | 'straight' = 'area-proportional') =>
  fromHeatFlow(run.time, run.T, heatFlow(run), kind, 'Run 4')

describe('a heat-flow run that does not hold its whole peak', () => {
  it.each([560, 570, 575, 580])('is refused where it ends at %d K, above half height (apex 570.5 K)', (end) => {
    const run = sampled(ramp(380, 20, end))
    const normal = normalNumbers(31)
    expect(() => convert(run)).toThrow(/Run 4: at the end of the window the heat flow stands at \d+ %/)
    const noisy = heatFlow(run).map((value) => value + 30 * normal()) // 1 % of the peak
    expect(() => fromHeatFlow(run.time, run.T, noisy, 'area-proportional', 'Run 4')).toThrow(
      /Run 4: at the end of the window the heat flow stands at \d+ %/,
    )
  })

  it.each([600, 605])('says how high it stands where it ends at %d K', (end) => {
    const run = sampled(ramp(380, 20, end))
    const share = (run.rate.at(-1) as number) / Math.max(...run.rate)
    for (const kind of ['area-proportional', 'straight'] as const) {
      const { rateAtEnds: ends } = convert(run, kind)
      // Read from the line before the peak, over which the heat capacity of the product lies 20 W/kg lower; or over the outermost 2 %, in which it is still falling.
      expect(ends?.end).toBeGreaterThan(0.9 * share - 20 / (heat * Math.max(...run.rate)))
      expect(ends?.end).toBeLessThan(3 * share + 0.02)
      expect(ends?.start).toBeLessThan(0.03)
    }
  })

  it('says so at the start too', () => {
    const { rateAtEnds: ends } = convert(sampled(ramp(480, 2, 850)))
    expect(ends?.start).toBeGreaterThan(0.03)
    expect(ends?.end).toBeLessThan(0.03)
  })

  it('a whole peak is not cut', () => {
    const { rateAtEnds: ends } = convert(sampled(ramp(380, 20, 850)))
    expect(Math.max(ends?.start ?? 1, ends?.end ?? 1)).toBeLessThan(0.01)
  })
})

describe('a heat flow in a hold', () => {
  it.each([
    [1, true],
    [2, true],
    [6, false],
    [10, false],
  ])('that ends after %d reciprocal rate constants: still drifting is %s', (length, drifts) => {
    const run = sampled(holdAt(540, length / kAt(540)))
    for (const noise of [0, 0.002 * heat * kAt(540)]) {
      const normal = normalNumbers(8)
      const y = run.rate.map((rate) => heat * rate + noise * normal())
      const { rateAtEnds: ends, baselineKind } = fromHeatFlow(run.time, run.T, y, 'level-at-end', 'Run')
      expect((ends?.end ?? 0) > 0.03).toBe(drifts)
      expect(baselineKind).toBe('level-at-end')
    }
  })

  it('without anything but noise is refused', () => {
    const run = sampled(holdAt(300, 3000))
    const normal = normalNumbers(3)
    expect(() =>
      fromHeatFlow(
        run.time,
        run.T,
        run.rate.map(() => normal()),
        'level-at-end',
        'Run 2',
      ),
    ).toThrow(/Run 2: there is no peak/)
  })

  it('is looked for in the hold alone: the heating before it, with its transient, is left out of the window', () => {
    const heating_s = 600
    const programme = {
      start_K: 330,
      pieces: [
        { rate_K_per_s: 200 / heating_s, duration_s: heating_s },
        { rate_K_per_s: 0, duration_s: 12 / kAt(530) },
      ],
    }
    const run = sampled(programme, 4000)
    const y = run.rate.map((rate, i) => {
      const t = run.time[i] as number
      return heat * rate - 50 * (t < heating_s ? 1 - Math.exp(-t / 10) : Math.exp(-(t - heating_s) / 10))
    })
    for (const kind of ['peak-with-tangents', 'peak-alone'] as const) {
      const { first, last } = findWindow(run.time, run.T, y, kind)
      expect(Math.abs((run.time[first] as number) - heating_s)).toBeLessThan(15)
      expect(last).toBe(3999)
    }
    const { first } = findWindow(run.time, run.T, y, 'peak-with-tangents')
    const from = <U extends 's' | 'K'>(values: Column<U>, unit: U): Column<U> => column(values.slice(first), unit)
    const { area } = fromHeatFlow(from(run.time, 's'), from(run.T, 'K'), y.slice(first), 'level-at-end', 'Run')
    // What reacted before is not in it, and the rest of the transient is: 500 J/kg and 4 % of the heat.
    expect(area / (heat * (1 - (run.alpha[first] as number)))).toBeCloseTo(1, 1)
  })

  it('is not looked for where a whole peak lies in the heating before', () => {
    const run = sampled({
      start_K: 380,
      pieces: [
        { rate_K_per_s: 1 / 6, duration_s: 2820 },
        { rate_K_per_s: 0, duration_s: 9000 },
      ],
    })
    const { first, last } = findWindow(run.time, run.T, heatFlow(run), 'peak-with-tangents')
    expect(run.alpha[first]).toBeLessThan(0.005)
    expect(run.alpha[last]).toBeGreaterThan(0.995)
    expect(run.T[last]).toBeLessThan(849)
  })
})

describe('holds', () => {
  const programme = {
    start_K: 400,
    pieces: [
      { rate_K_per_s: 0.1, duration_s: 1000 },
      { rate_K_per_s: 0, duration_s: 2000 },
      { rate_K_per_s: 0.1, duration_s: 500 },
    ],
  }
  it('are found in time, with their start, also with noise', () => {
    for (const noise of [0, 0.3]) {
      const normal = normalNumbers(5)
      const time = evenTimes(3500, 3501)
      const T = time.map((t) => temperatureOf(programme, t) + noise * normal())
      const all = { first: 0, last: 3500 }
      expect(isHold(T, all)).toBe(false)
      const hold = longestHold(time, T, all)
      // Within the band of 3 K, which 0.1 K/s crosses in 30 s.
      expect(Math.abs(hold.first - 1000)).toBeLessThan(31)
      expect(Math.abs(hold.last - 3000)).toBeLessThan(31)
      expect(isHold(T, hold)).toBe(true)
      expect(Math.abs(startOfHold(T, { first: 0, last: 3000 }, 500) - 985)).toBeLessThan(noise === 0 ? 2 : 12)
    }
  })
})

describe('plateaus', () => {
  const run = sampled(ramp(360, 10, 850), 5000)
  it('are averaged over their length where a filter has spread the noise over many rows', () => {
    let squares = 0
    for (let seed = 1; seed <= 20; seed++) {
      const normal = normalNumbers(seed)
      let error = 0
      // Autoregressive noise of 5e-3, each row 0.9 of the one before.
      const y = run.alpha.map((a) => {
        error = 0.9 * error + Math.sqrt(1 - 0.81) * 5e-3 * normal()
        return 1 - 0.6 * a + error
      })
      const noise = noiseOf(run.time, y, 0, y.length - 1)
      squares += (valueAtEnd(run.time, y, 'start', noise) - 1) ** 2 + (valueAtEnd(run.time, y, 'end', noise) - 0.4) ** 2
    }
    // Some 1,700 rows lie on each: 5e-3·√(19/1700) = 5.3e-4 is the best there is.
    expect(Math.sqrt(squares / 40)).toBeLessThan(1e-3)
  })

  it('the rate at an end is that of the end itself', () => {
    for (const end of [595, 585, 575, 560]) {
      const cut = sampled(ramp(380, 10, end))
      const mass = cut.alpha.map((a) => 5e-6 * (1 - 0.6 * a))
      const { curve } = fromMass(cut.time, cut.T, mass, 'Run')
      const true_per_s = (cut.rate.at(-1) as number) / (cut.alpha.at(-1) as number)
      expect(rateAtEnds(curve).end / (true_per_s * curve.duration_s)).toBeGreaterThan(0.9)
      expect(rateAtEnds(curve).end / (true_per_s * curve.duration_s)).toBeLessThan(1.2)
    }
  })
})
