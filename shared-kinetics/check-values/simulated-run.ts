import type { RunColumns, RunInfo, SignalInfo } from '../series/run.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column } from '../units/quantity.ts'
import { runInfoOf } from './run-info-of.ts'

/** A temperature programme in straight pieces, from time 0 on. */
export interface Pieces {
  readonly start_K: number
  /** Each piece heats (or holds, or cools) at one rate for so long. */
  readonly pieces: readonly { readonly rate_K_per_s: number; readonly duration_s: number }[]
}

export const ramp = (start_K: number, rate_K_per_min: number, end_K: number): Pieces => ({
  start_K,
  pieces: [{ rate_K_per_s: rate_K_per_min / 60, duration_s: (60 * (end_K - start_K)) / rate_K_per_min }],
})

export const holdAt = (temperature_K: number, duration_s: number): Pieces => ({
  start_K: temperature_K,
  pieces: [{ rate_K_per_s: 0, duration_s }],
})

export const durationOf = ({ pieces }: Pieces): number => pieces.reduce((sum, piece) => sum + piece.duration_s, 0)

export function temperatureOf({ start_K, pieces }: Pieces, time: number): number {
  let T = start_K
  let rest = time
  for (const { rate_K_per_s, duration_s } of pieces) {
    T += rate_K_per_s * Math.min(rest, duration_s)
    rest -= duration_s
    if (rest <= 0) break
  }
  return T
}

/** Points and weights of the 5-point Gauss–Legendre rule on [-1, 1] (Abramowitz & Stegun 1964, table 25.4). */
const gauss = [
  [0, 0.568888888888889],
  [-0.538469310105683, 0.478628670499366],
  [0.538469310105683, 0.478628670499366],
  [-0.906179845938664, 0.236926885056189],
  [0.906179845938664, 0.236926885056189],
] as const

/**
 * θ(t) = ∫ A exp(-Ea/(R T)) dt from 0 to each time, by Gauss quadrature between neighbouring times and corners of the programme: exact to some 1e-12 for steps of
 * a few kelvin. A one-step reaction is then α = F(θ) in closed form, whatever the programme.
 */
export function reducedTime(
  step: { readonly Ea_J_per_mol: number; readonly A_per_s: number },
  programme: Pieces,
  times: ArrayLike<number>,
): Float64Array {
  const corners: number[] = []
  let corner = 0
  for (const piece of programme.pieces) corners.push((corner += piece.duration_s))
  const k = (time: number): number =>
    step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * temperatureOf(programme, time)))
  const between = (a: number, b: number): number => {
    const half = 0.5 * (b - a)
    return half * gauss.reduce((sum, [x, weight]) => sum + weight * k(0.5 * (a + b) + half * x), 0)
  }
  const theta = new Float64Array(times.length)
  let from = 0
  let sum = 0
  for (let i = 0; i < times.length; i++) {
    const to = times[i] as number
    for (const stop of [...corners.filter((c) => c > from && c < to), to]) {
      sum += between(from, stop)
      from = stop
    }
    theta[i] = sum
  }
  return theta
}

/** First order, dα/dθ = 1 - α. */
export const firstOrder = (theta: number): number => -Math.expm1(-theta)

/** Autocatalytic, dα/dθ = α(1 - α) from the seed α₀ on: the logistic curve, brought to 0 at θ = 0. */
export const autocatalytic =
  (seed: number) =>
  (theta: number): number => {
    const grown = seed / (seed + (1 - seed) * Math.exp(-theta))
    return (grown - seed) / (1 - seed)
  }

/** Random numbers from a seed (a 32-bit multiplicative congruential generator), normal with standard deviation 1 (Box–Muller). */
export function normalNumbers(seed: number): () => number {
  let state = seed >>> 0
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return (state + 0.5) / 2 ** 32
  }
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
}

export const evenTimes = (duration_s: number, samples: number): Float64Array =>
  Float64Array.from({ length: samples }, (_, i) => (duration_s * i) / (samples - 1))

/** A run made of plain columns; whatever is left out is as in an export that says nothing about it. */
export function runOf(
  id: string,
  values: {
    readonly time_s: Float64Array | null
    readonly temperature_K: Float64Array
    readonly signals: readonly (Pick<SignalInfo, 'quantity' | 'unit'> & { readonly values: Float64Array })[]
  },
  info: Partial<RunInfo> = {},
): { readonly info: RunInfo; readonly columns: RunColumns } {
  return {
    info: runInfoOf(id, {
      columnsKey: `columns ${id}`,
      rows: values.temperature_K.length,
      hasTime: values.time_s !== null,
      signals: values.signals.map(({ quantity, unit }) => ({ quantity, unit, label: quantity, fileUnit: unit })),
      ...info,
    }),
    columns: {
      time_s: values.time_s === null ? null : column(values.time_s, 's'),
      temperature_K: column(values.temperature_K, 'K'),
      signals: values.signals.map((signal) => signal.values),
    },
  }
}
