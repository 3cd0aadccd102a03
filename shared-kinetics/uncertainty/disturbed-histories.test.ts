import { describe, expect, it } from 'vitest'
import { quiet, seriesOf } from '../check-values/series-of-values.ts'
import { durationOf, reducedTime, temperatureOf, type Pieces } from '../check-values/simulated-run.ts'
import { Cancelled } from '../errors.ts'
import { methods } from '../isoconversional/registry.ts'
import { randomStream } from '../numerics/random.ts'
import { bracketedRoot } from '../numerics/root.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { budgetOf } from './budget.ts'
import { disturbedEnergy, roomFor, type Disturbance } from './disturbed-energy.ts'
import { energyModel } from './energy-model.ts'
import type { MeasuredSources } from './measured-sources.ts'

const step = { Ea_J_per_mol: 140e3, A_per_s: 1e12 }
const levels = [0.1, 0.15, 0.2, 0.35, 0.5, 0.65, 0.8, 0.85, 0.9]

/** Ramp, hold, ramp: five runs with their own rates and holds. */
const programmes: readonly Pieces[] = [
  [2, 455, 1500],
  [3, 460, 1200],
  [5, 470, 900],
  [8, 475, 600],
  [12, 480, 400],
].map(([rate, hold, duration]) => {
  const perSecond = (rate ?? 0) / 60
  return {
    start_K: 380,
    pieces: [
      { rate_K_per_s: perSecond, duration_s: ((hold ?? 0) - 380) / perSecond },
      { rate_K_per_s: 0, duration_s: duration ?? 0 },
      { rate_K_per_s: perSecond, duration_s: 160 / perSecond },
    ],
  }
})

/** dT/dt, at a corner that of the piece before or after it. */
function rateOf({ pieces }: Pieces, time: number, side: 'before' | 'after'): number {
  let end = 0
  for (const piece of pieces) {
    end += piece.duration_s
    if (side === 'before' ? time <= end + 1e-9 : time < end - 1e-9) return piece.rate_K_per_s
  }
  return pieces.at(-1)?.rate_K_per_s ?? Number.NaN
}

const corners = ({ pieces }: Pieces): number[] => {
  let end = 0
  return pieces.map((piece) => (end += piece.duration_s))
}

/** When each run reaches each level, first order: θ = -ln(1 - α). */
const times = programmes.map((programme) =>
  levels.map((level) => {
    const wanted = -Math.log1p(-level)
    const theta = (t: number): number => (reducedTime(step, programme, [t])[0] ?? Number.NaN) - wanted
    return bracketedRoot(theta, 1, durationOf(programme)).x
  }),
)

/** The runs as a thermometer sees them that is off by so much, and behind (ahead) by a lag; and as noise reads the levels. */
function seriesWith(disturbance: Disturbance | null): SeriesAtLevels {
  const runs = programmes.length
  return seriesOf(
    levels,
    programmes.map((programme, i) => {
      const shift = disturbance?.temperature_K[i] ?? 0
      const lag = disturbance?.lag_s ?? 0
      const seen = (t: number, side: 'before' | 'after'): number => temperatureOf(programme, t) + shift + lag * rateOf(programme, t, side)
      const end = durationOf(programme)
      const ends = corners(programme).slice(0, -1)
      const grid = [
        ...Array.from({ length: 4000 }, (_, n) => (end * n) / 3999).filter((t) => ends.every((corner) => Math.abs(t - corner) > 1e-6)),
        ...ends,
      ].sort((a, b) => a - b)
      // At a corner the lag steps: both sides stand at one time.
      const rows = grid.flatMap((t) =>
        ends.includes(t)
          ? [
              { t, T: seen(t, 'before') },
              { t, T: seen(t, 'after') },
            ]
          : [{ t, T: seen(t, 'after') }],
      )
      const at = (times[i] ?? []).map((t, k) => t + (disturbance?.time_s[k * runs + i] ?? 0))
      return {
        programme: { kind: 'general' },
        programmeGroup: i,
        history: { time_s: rows.map(({ t }) => t), temperature_K: rows.map(({ T }) => T) },
        time_s: at,
        temperature_K: at.map((t) => seen(t, 'after')),
        reactionRate_per_s: (times[i] ?? []).map((t, k) => {
          const k1 = step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * temperatureOf(programme, t)))
          return k1 * (1 - (levels[k] ?? 0)) * Math.exp(disturbance?.lnReactionRate[k * runs + i] ?? 0)
        }),
      }
    }),
  )
}

const entries = programmes.length * levels.length
const zeros = (length: number): Float64Array => new Float64Array(length)
const none: Disturbance = {
  temperature_K: zeros(5),
  lnHeatingRate: zeros(5),
  lag_s: 0,
  time_s: zeros(entries),
  lnReactionRate: zeros(entries),
}
const exact = seriesWith(null)
const minimising = ['vyazovkin', 'vyazovkin-incremental'] as const

it.each(minimising)('a model by %s on such programmes is given up between any two levels of a run', (method) => {
  let looks = 0
  const looked = (least: number) => ({
    checkCancelled: (): void => {
      if (++looks > least) throw new Cancelled()
    },
  })
  const result = methods[method].run(exact, quiet)
  expect(energyModel(exact, result, looked(Number.POSITIVE_INFINITY)).form.kind).toBe('integral')
  expect(looks).toBeGreaterThan(programmes.length * levels.length)
  looks = 0
  expect(() => energyModel(exact, result, looked(20))).toThrow(Cancelled)
  expect(looks).toBe(21)
})

describe.each([...minimising, 'friedman'] as const)('errors carried into Ea by %s on programmes of ramp, hold and ramp', (method) => {
  const result = methods[method].run(exact, quiet)
  const model = energyModel(exact, result)
  const room = roomFor(5)
  const compare = (disturbance: Disturbance, within: (change: number) => number): number => {
    const { Ea, status } = methods[method].run(seriesWith(disturbance), quiet)
    let most = 0
    levels.forEach((level, k) => {
      const wanted = Ea[k] ?? Number.NaN
      const found = disturbedEnergy(model, k, disturbance, room)
      // Of several minima a draw takes one; the method none.
      if (status[k] === 'several-minima') return
      if (Number.isNaN(wanted)) {
        expect(found, `at ${level}`).toBeNaN()
        return
      }
      const change = wanted - (model.Ea[k] ?? Number.NaN)
      most = Math.max(most, Math.abs(change))
      expect(Math.abs(found - wanted), `${found} for ${wanted}, from ${model.Ea[k]}, at ${level}`).toBeLessThan(within(Math.abs(change)))
    })
    return most
  }

  it('finds the Ea that was put in', () => {
    expect(result.status).toEqual(levels.map(() => 'ok'))
    for (const Ea of result.Ea) expect(Math.abs(Ea / step.Ea_J_per_mol - 1)).toBeLessThan(1e-3)
  })

  it('a lag of the thermometer moves every time of the history, not its end alone', () => {
    let most = 0
    for (const lag_s of [-10, -2, 2, 10])
      most = Math.max(
        most,
        compare({ ...none, lag_s }, (change) => 0.05 * change + 150),
      )
    expect(most).toBeGreaterThan(1000)
    const stated = { temperatureCommon_K: 0, temperatureRun_K: 0, lag_s: 1, statedHeatingRate_share: 0 }
    const quietNoise = {
      time_s: column(zeros(entries), 's'),
      lnReactionRate: zeros(entries),
      lnReactionRateSlope_per_s: zeros(entries),
      correlationWithBefore: zeros(entries),
    }
    const sources: MeasuredSources = { stated, heatingRate_share: zeros(5), noise: quietNoise, baseline: null }
    const up = methods[method].run(seriesWith({ ...none, lag_s: 1 }), quiet).Ea
    const down = methods[method].run(seriesWith({ ...none, lag_s: -1 }), quiet).Ea
    budgetOf(model, sources)['temperature-lag'].forEach((u, k) => {
      const slope = Math.abs((up[k] ?? Number.NaN) - (down[k] ?? Number.NaN)) / 2
      expect(Math.abs(u - slope)).toBeLessThan(0.05 * slope + 20)
    })
  })

  it.each([0.1, 1])('temperatures of runs, off by some %f K, and noise of the times', (size) => {
    let most = 0
    for (let draw = 0; draw < 12; draw++) {
      const random = randomStream(17, draw)
      const normals = (length: number, sd: number): Float64Array => Float64Array.from({ length }, () => sd * random.normal())
      const change = compare(
        { ...none, temperature_K: normals(5, size), time_s: normals(entries, 0.3 * size), lag_s: size * random.normal() },
        (change) => 0.06 * change + 250,
      )
      most = Math.max(most, change)
    }
    expect(most).toBeGreaterThan(500 * size)
  })
})
