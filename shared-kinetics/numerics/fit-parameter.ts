import { KineticsError } from '../errors.ts'

/** One parameter of a fit. */
export interface FitParameter {
  readonly name: string
  readonly start: number
  /** Bounds, inclusive; a parameter with equal bounds is held at them. */
  readonly lower?: number
  readonly upper?: number
  /** `log`: fitted as its logarithm, hence kept positive; for what ranges over powers of ten. */
  readonly scale?: 'plain' | 'log'
  /** A typical size, for a plain parameter that may come near 0: steps and tolerances are parts of the larger of this and the value. Default: |start|/1000, or 1. */
  readonly typical?: number
}

/** Parameters as the algorithm sees them: `inner` coordinates are ln p where the parameter is log-scaled, else p. */
export interface ParameterSpace {
  readonly n: number
  readonly lower: Float64Array
  readonly upper: Float64Array
  readonly held: readonly boolean[]
  readonly toInner: (outer: ArrayLike<number>) => Float64Array
  readonly toOuter: (inner: Float64Array) => Float64Array
  /** d outer / d inner at a point. */
  readonly slopes: (inner: Float64Array) => Float64Array
  /** Size of each inner coordinate: 1 on a logarithmic scale, else the larger of |p| and its typical size. */
  readonly sizes: (inner: Float64Array) => Float64Array
  /** Whether a parameter at `end` is more than 10,000 times its size at `start`, or on a logarithmic scale less than a 10,000th of it. */
  readonly ranAway: (start: Float64Array, end: Float64Array) => boolean
}

const farAway = 1e4

/** @throws KineticsError `bad-option` for bounds in the wrong order, starts outside them or not finite, log-scaled parameters that are not positive */
export function parameterSpace(parameters: readonly FitParameter[]): ParameterSpace {
  const isLog = parameters.map(({ scale }) => scale === 'log')
  for (const parameter of parameters) assertUsable(parameter)
  const inner = (value: number, j: number): number => (isLog[j] ? Math.log(value) : value)
  const outer = (value: number, j: number): number => (isLog[j] ? Math.exp(value) : value)
  const typical = parameters.map(({ typical: size, start }) => size ?? (start === 0 ? 1 : Math.abs(start) / 1000))
  const lower = Float64Array.from(parameters, ({ lower: bound }, j) =>
    isLog[j] ? Math.log(Math.max(0, bound ?? 0)) : (bound ?? Number.NEGATIVE_INFINITY),
  )
  const upper = Float64Array.from(parameters, ({ upper: bound }, j) => inner(bound ?? Number.POSITIVE_INFINITY, j))
  const sizes = (values: Float64Array): Float64Array =>
    values.map((value, j) => (isLog[j] ? 1 : Math.max(Math.abs(value), typical[j] ?? 1)))
  return {
    n: parameters.length,
    lower,
    upper,
    held: parameters.map((_, j) => lower[j] === upper[j]),
    toInner: (values) => Float64Array.from(values, inner),
    toOuter: (values) => values.map(outer),
    slopes: (values) => values.map((value, j) => (isLog[j] ? Math.exp(value) : 1)),
    sizes,
    ranAway: (start, end) => {
      const before = sizes(start)
      return end.some((value, j) => Math.abs(value - (start[j] ?? 0)) > (isLog[j] ? Math.log(farAway) : farAway * (before[j] ?? 1)))
    },
  }
}

function assertUsable({ name, start, lower, upper, scale, typical }: FitParameter): void {
  const low = lower ?? Number.NEGATIVE_INFINITY
  const high = upper ?? Number.POSITIVE_INFINITY
  const problem = !Number.isFinite(start)
    ? `starts at ${start}, which is no finite number`
    : !(low <= high)
      ? `has a lower bound ${low} that is not below its upper bound ${high}`
      : !(start >= low && start <= high)
        ? `starts at ${start}, outside its bounds ${low} to ${high}`
        : scale === 'log' && !(start > 0)
          ? `is fitted as its logarithm and needs a start above 0, not ${start}`
          : typical !== undefined && !(typical > 0 && Number.isFinite(typical))
            ? `needs a typical size above 0, not ${typical}`
            : null
  if (problem !== null) throw new KineticsError('bad-option', `Parameter ${name} ${problem}.`, { parameter: name })
}
