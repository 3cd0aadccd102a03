import { describe, expect, it } from 'vitest'
import { durationOf, evenTimes, holdAt, normalNumbers, ramp, temperatureOf, type Pieces } from '../check-values/simulated-run.ts'
import { column } from '../units/quantity.ts'
import { longestGapFreeStretch } from './gap-free-stretch.ts'
import { mainHeating } from './main-heating.ts'
import { programmeGroups, type RunToGroup } from './programme-groups.ts'
import { tellProgramme, type ToldProgramme } from './tell-programme.ts'
import { valueAt } from './value-at.ts'

const sampled = (programme: Pieces, samples = 1000): { time: Float64Array; T: Float64Array } => {
  const time = evenTimes(durationOf(programme), samples)
  return { time, T: time.map((t) => temperatureOf(programme, t)) }
}
const tell = (programme: Pieces, noise_K = 0): ToldProgramme => {
  const { time, T } = sampled(programme)
  const normal = normalNumbers(1)
  return tellProgramme(
    time,
    T.map((value) => value + noise_K * normal()),
    0,
    time.length - 1,
    null,
  )
}

describe('programme told from T(t)', () => {
  it('a constant heating rate, with its standard error', () => {
    const told = tell(ramp(400, 10, 500), 0.1)
    const { programme } = told
    if (programme.kind !== 'constant-heating-rate') throw new Error(programme.kind)
    // Standard error of a slope: σ/√Σ(t - t̄)² with n samples evenly over 600 s.
    const exact = 0.1 / Math.sqrt((1000 * 600 ** 2) / 12)
    expect(programme.standardError / exact).toBeCloseTo(1, 1)
    expect(Math.abs(programme.heatingRate - 10 / 60)).toBeLessThan(4 * exact)
    expect(programme.source).toBe('measured')
  })

  it('one that wanders by 7 % is still constant, and the wandering is told', () => {
    const time = evenTimes(1200, 1000)
    const told = tellProgramme(
      time,
      time.map((t) => 400 + t / 6 + ((0.07 / 6) * 300 * Math.sin((2 * Math.PI * t) / 1200)) / Math.PI),
      0,
      999,
      null,
    )
    expect(told.programme.kind).toBe('constant-heating-rate')
    expect(told.heatingRateSpread).toBeGreaterThan(0.03)
    expect(told.heatingRateSpread).toBeLessThan(0.07)
  })

  it.each([
    ['within 15 % in every eighth: constant', 1.1, 'constant-heating-rate'],
    ['a rate that doubles: general', 2, 'general'],
  ])('%s', (_, factor, kind) => {
    const programme = {
      start_K: 400,
      pieces: [
        { rate_K_per_s: 0.1, duration_s: 300 },
        { rate_K_per_s: 0.1 * factor, duration_s: 300 },
      ],
    }
    expect(tell(programme).programme.kind).toBe(kind)
  })

  it('ramp, hold, ramp is general; so is cooling', () => {
    const steps = {
      start_K: 400,
      pieces: [
        { rate_K_per_s: 0.1, duration_s: 600 },
        { rate_K_per_s: 0, duration_s: 900 },
        { rate_K_per_s: 0.2, duration_s: 300 },
      ],
    }
    expect(tell(steps).programme.kind).toBe('general')
    expect(tell({ start_K: 500, pieces: [{ rate_K_per_s: -0.1, duration_s: 600 }] }).programme.kind).toBe('general')
  })

  it.each([4, 6, 10, 20, 40])('is not taken for constant for want of rows: ramp, hold, ramp in %d rows', (rows) => {
    const steps = {
      start_K: 400,
      pieces: [
        { rate_K_per_s: 0.1, duration_s: 600 },
        { rate_K_per_s: 0, duration_s: 900 },
        { rate_K_per_s: 0.2, duration_s: 300 },
      ],
    }
    const few = sampled(steps, rows)
    expect(tellProgramme(few.time, few.T, 0, rows - 1, null).programme.kind).toBe('general')
    const even = sampled(ramp(400, 10, 500), rows)
    expect(tellProgramme(even.time, even.T, 0, rows - 1, null).programme.kind).toBe('constant-heating-rate')
  })

  it.each([
    [2.9, 'isothermal'],
    [3.3, 'constant-heating-rate'],
  ])('a drift of %d K is %s', (drift, kind) => {
    const told = tell({ start_K: 400, pieces: [{ rate_K_per_s: drift / 3600, duration_s: 3600 }] })
    expect(told.programme.kind).toBe(kind)
  })

  it('a hold with a few wild samples is a hold, at its mean temperature', () => {
    const { time, T } = sampled(holdAt(420, 3600))
    T[17] = 300
    const { programme } = tellProgramme(time, T, 0, 999, null)
    if (programme.kind !== 'isothermal') throw new Error(programme.kind)
    expect(programme.temperature).toBeCloseTo(420, 0)
  })

  it('fits no slope across a gap or a splice', () => {
    // 10 K/min twice, with half an hour missing between and the temperature where it was: one line through all would give 4 K/min.
    const time = Float64Array.from({ length: 400 }, (_, i) => (i < 250 ? i : i + 1800))
    const T = Float64Array.from({ length: 400 }, (_, i) => 400 + i / 6)
    const stretch = longestGapFreeStretch(time, T, 0, 399)
    expect(stretch).toEqual({ first: 0, last: 249 })
    const { programme } = tellProgramme(time, T, 0, 399, null)
    if (programme.kind !== 'constant-heating-rate') throw new Error(programme.kind)
    expect(programme.heatingRate * 60).toBeCloseTo(10, 6)
    const even = Float64Array.from({ length: 400 }, (_, i) => i)
    const spliced = even.map((t) => 400 + t / 6 + (t >= 180 ? 25 : 0))
    expect(longestGapFreeStretch(even, spliced, 0, 399)).toEqual({ first: 180, last: 399 })
  })

  it('a rebuilt time has the rate it was made from, with no standard error', () => {
    const { time, T } = sampled(ramp(400, 10, 500))
    for (const source of ['option', 'name', 'heading', 'preamble'] as const) {
      const { programme } = tellProgramme(time, T, 0, 999, { heatingRate_K_per_s: 10 / 60, source, text: '10' })
      expect(programme).toEqual({
        kind: 'constant-heating-rate',
        heatingRate: 10 / 60,
        standardError: Number.NaN,
        source: source === 'option' ? 'option' : 'nominal',
      })
    }
  })
})

const constant = (rate: number): RunToGroup => {
  const { time, T } = sampled(ramp(400, rate, 500))
  return {
    programme: { kind: 'constant-heating-rate', heatingRate: rate / 60, standardError: 0, source: 'measured' } as RunToGroup['programme'],
    reaction: { time_s: column(time, 's'), temperature_K: column(T, 'K') },
    meanHeatingRate_K_per_s: rate / 60,
    meanTemperature_K: 450,
  }
}
const hold = (T: number): RunToGroup => ({
  ...constant(1),
  programme: { kind: 'isothermal', temperature: T } as RunToGroup['programme'],
  meanTemperature_K: T,
  meanHeatingRate_K_per_s: 0,
})
const general = (holdTemperature: number, shift = 0): RunToGroup => {
  const { time, T } = sampled({
    start_K: 400,
    pieces: [
      { rate_K_per_s: 0.1, duration_s: (holdTemperature - 400) / 0.1 },
      { rate_K_per_s: 0, duration_s: 1000 },
    ],
  })
  return {
    programme: { kind: 'general' },
    reaction: {
      time_s: column(time, 's'),
      temperature_K: column(
        T.map((value) => value + shift),
        'K',
      ),
    },
    meanHeatingRate_K_per_s: (holdTemperature - 400) / (time.at(-1) ?? 1),
    meanTemperature_K: holdTemperature,
  }
}

describe('groups of one programme', () => {
  it('number heating rates from slow to fast; replicates share a number', () => {
    expect(programmeGroups([constant(20), constant(5), constant(10.1), constant(9.9), constant(5.02)])).toEqual([2, 0, 1, 1, 0])
  })

  it('rates 5 % apart are replicates, 6 % apart are not', () => {
    expect(programmeGroups([constant(10), constant(10.49)])).toEqual([0, 0])
    expect(programmeGroups([constant(10), constant(10.6)])).toEqual([0, 1])
  })

  it('holds within 1 K are replicates and come before ramps', () => {
    expect(programmeGroups([hold(400.9), constant(5), hold(400), hold(401.5)])).toEqual([0, 2, 0, 1])
  })

  it('a constant rate and a general programme are one where they keep within 3 K, whenever they start', () => {
    // 5 K/min in turns of 20 % more and less, 5 K each, against an even 5 K/min that started 20 K higher.
    const wavy = sampled({
      start_K: 400,
      pieces: Array.from({ length: 20 }, (_, i) => {
        const rate_K_per_s = (5 / 60) * (i % 2 === 0 ? 0.8 : 1.2)
        return { rate_K_per_s, duration_s: 5 / rate_K_per_s }
      }),
    })
    const general: RunToGroup = {
      programme: { kind: 'general' },
      reaction: { time_s: column(wavy.time, 's'), temperature_K: column(wavy.T, 'K') },
      meanHeatingRate_K_per_s: 100 / (wavy.time.at(-1) as number),
      meanTemperature_K: 450,
    }
    const even = sampled(ramp(420, 5, 480))
    const later: RunToGroup = { ...constant(5), reaction: { time_s: column(even.time, 's'), temperature_K: column(even.T, 'K') } }
    expect(programmeGroups([later, general])).toEqual([0, 0])
    expect(new Set(programmeGroups([constant(10), general])).size).toBe(2)
    expect(new Set(programmeGroups([hold(450), general])).size).toBe(2)
  })

  it('general programmes are one where they keep within 3 K', () => {
    expect(programmeGroups([general(450), general(450, 2), general(470)])).toEqual([0, 0, 1])
    expect(programmeGroups([general(450), general(450, 4)])).toEqual([0, 1])
  })
})

const part = (programme: Pieces, noise = 0): { from: number; to: number } => {
  const { time, T } = sampled(programme, 2000)
  const normal = normalNumbers(2)
  const { first, last } = mainHeating(T.map((value) => value + noise * normal()))
  return { from: Math.round(time[first] ?? 0), to: Math.round(time[last] ?? 0) }
}
const piece = (rate_K_per_s: number, duration_s: number): Pieces['pieces'][number] => ({ rate_K_per_s, duration_s })

describe('main heating part', () => {
  it('is all of a ramp, of a hold, and of ramp-hold-ramp', () => {
    expect(part(ramp(300, 10, 900), 0.2)).toEqual({ from: 0, to: 3600 })
    expect(part(holdAt(400, 1000), 0.3)).toEqual({ from: 0, to: 1000 })
    expect(part({ start_K: 300, pieces: [piece(0.1, 1000), piece(0, 2000), piece(0.1, 1000)] })).toEqual({ from: 0, to: 4000 })
  })

  it('leaves out cooling before and after, but not the holds beside the ramp', () => {
    const { from, to } = part(
      { start_K: 400, pieces: [piece(-0.2, 500), piece(0, 500), piece(0.2, 2000), piece(0, 300), piece(-0.2, 500)] },
      0.05,
    )
    expect(Math.abs(from - 500)).toBeLessThan(25)
    expect(Math.abs(to - 3300)).toBeLessThan(25)
  })

  it('is the first of two like heatings', () => {
    const { to } = part({ start_K: 300, pieces: [piece(0.2, 500), piece(-0.2, 500), piece(0.2, 510)] })
    expect(Math.abs(to - 500)).toBeLessThan(10)
  })
})

describe('value between samples', () => {
  it('lies on the straight line, and is not to be had outside', () => {
    const x = Float64Array.from([0, 1, 3])
    const y = Float64Array.from([0, 10, 20])
    expect([0, 0.5, 1, 2, 3].map((at) => valueAt(x, y, at))).toEqual([0, 5, 10, 15, 20])
    expect(valueAt(x, y, -0.1)).toBeNaN()
    expect(valueAt(x, y, 3.1)).toBeNaN()
    expect(valueAt(x, y, Number.NaN)).toBeNaN()
  })
})
