import { KineticsError } from '../errors.ts'
import { gaussLegendre, type QuadratureRule } from '../numerics/quadrature.ts'
import { twoPointRule } from '../numerics/two-point-rule.ts'
import type { TemperatureHistory } from '../series/programme.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { Column } from '../units/quantity.ts'
import { linearSegments } from './linear-segments.ts'
import type { IntegralValue, TimeIntegral } from './time-integral.ts'

/** Samples closer than this to a chord are joined to it, in K: far below any thermometer, far above the rounding of an exact ramp. */
const collinearWithin_K = 1e-7

/**
 * J(Ea) = ∫ exp(-Ea/(R T(t))) dt over a measured history, from its first sample to the time of each level, T(t) linear between samples. What lies before the first
 * sample contributes nothing.
 *
 * The history is turned once into nodes: each straight piece, cut at the times of the levels and where Ea/(R T) would change by more than 6, gets a Gauss–Legendre
 * rule of as many points as keep its relative error below 1e-9 at `largestEa`. Where samples lie so close in temperature that many nodes fall within a small
 * change of Ea/(R T), two nodes of the same moments stand for them all (below 2e-7 at `largestEa`, and 2e-10 at a fifth of it). For any Ea, J is then a plain
 * sum over the nodes, and its terms are all positive, so that nothing cancels; a closed form would be a difference of two near numbers on a short or flat piece.
 *
 * @param levelTime_s - from the first sample; NaN where the run does not reach the level
 * @throws KineticsError `column-length`, `not-finite`, `time-not-ascending` where the history is no history
 */
export function historyIntegral(history: TemperatureHistory, levelTime_s: Column<'s'>, largestEa: number): TimeIntegral {
  checkHistory(history)
  const { order, nodeEnd, lowestInverseT, inverseT: nodes, weight } = layNodes(history, levelTime_s, largestEa / gasConstant_J_per_mol_K)

  const atLevel = (Ea: number, level: number): IntegralValue => {
    const k = Ea / gasConstant_J_per_mol_K
    const end = nodeEnd[level] ?? 0
    const reference = lowestInverseT[level] ?? Number.NaN
    let sum = 0
    let first = 0
    for (let i = 0; i < end; i++) {
      const offset = (nodes[i] as number) - reference
      const term = (weight[i] as number) * Math.exp(-k * offset)
      sum += term
      first += term * offset
    }
    return { lnJ: Math.log(sum) - k * reference, inverseT: reference + first / sum }
  }

  return {
    reaches: (level) => (nodeEnd[level] ?? 0) > 0,
    atLevel,
    atAllLevels(Ea, lnJ, inverseT) {
      const k = Ea / gasConstant_J_per_mol_K
      // Exponents are taken from the hottest node so far, so that they are never positive; where a hotter one comes, the sums are brought to it.
      let reference = Number.POSITIVE_INFINITY
      let sum = 0
      let first = 0
      let i = 0
      for (const level of order) {
        const hotter = lowestInverseT[level] as number
        if (hotter < reference) {
          const shift = reference - hotter
          const factor = sum > 0 ? Math.exp(-k * shift) : 0
          first = sum > 0 ? factor * (first + sum * shift) : 0
          sum *= factor
          reference = hotter
        }
        for (const end = nodeEnd[level] as number; i < end; i++) {
          const offset = (nodes[i] as number) - reference
          const term = (weight[i] as number) * Math.exp(-k * offset)
          sum += term
          first += term * offset
        }
        lnJ[level] = Math.log(sum) - k * reference
        inverseT[level] = reference + first / sum
      }
    },
  }
}

function checkHistory({ time_s, temperature_K }: TemperatureHistory): void {
  if (time_s.length !== temperature_K.length) {
    throw new KineticsError('column-length', `A temperature history has ${time_s.length} times and ${temperature_K.length} temperatures.`)
  }
  for (let i = 0; i < time_s.length; i++) {
    const t = time_s[i] as number
    const T = temperature_K[i] as number
    if (!Number.isFinite(t) || !Number.isFinite(T) || T <= 0) {
      throw new KineticsError('not-finite', `Row ${i + 1} of a temperature history is no time and temperature (${t} s, ${T} K).`, {
        row: i,
      })
    }
    if (i > 0 && t < (time_s[i - 1] as number)) {
      throw new KineticsError('time-not-ascending', `Time goes back at row ${i + 1} of a temperature history.`, { row: i })
    }
  }
}

interface Nodes {
  /** Levels reached, in the order of their times. */
  readonly order: readonly number[]
  /** Indexed by level: number of nodes up to it, 0 where it is not reached. */
  readonly nodeEnd: Int32Array
  /** Indexed by level: 1/T of the hottest node up to it. */
  readonly lowestInverseT: Float64Array
  readonly inverseT: Float64Array
  /** In s. */
  readonly weight: Float64Array
}

/** `largest` is the largest Ea/R, in K. */
function layNodes({ time_s, temperature_K }: TemperatureHistory, levelTime_s: Column<'s'>, largest: number): Nodes {
  const start = time_s[0] ?? Number.NaN
  const duration = (time_s[time_s.length - 1] ?? Number.NaN) - start
  const order = Array.from(levelTime_s.keys())
    .filter((level) => (levelTime_s[level] as number) > 0 && (levelTime_s[level] as number) <= duration * (1 + 1e-9))
    .sort((a, b) => (levelTime_s[a] as number) - (levelTime_s[b] as number))
  const nodeEnd = new Int32Array(levelTime_s.length)
  const lowestInverseT = new Float64Array(levelTime_s.length).fill(Number.NaN)
  const inverseT: number[] = []
  const weight: number[] = []
  let lowest = Number.POSITIVE_INFINITY

  // Nodes not yet laid down: successive ones within `closest` of each other.
  let waiting = { x: [] as number[], weight: [] as number[], from: Number.NaN, to: Number.NaN }
  const settle = (): void => {
    const close = waiting.x.length > 2 ? twoPointRule(waiting.x, waiting.weight) : waiting
    close.x.forEach((node, k) => {
      lowest = Math.min(lowest, node)
      inverseT.push(node)
      weight.push(close.weight[k] as number)
    })
    waiting = { x: [], weight: [], from: Number.NaN, to: Number.NaN }
  }
  const add = (node: number, w: number): void => {
    if (Math.max(waiting.to, node) - Math.min(waiting.from, node) > closest / largest) settle()
    waiting.from = waiting.x.length === 0 ? node : Math.min(waiting.from, node)
    waiting.to = waiting.x.length === 0 ? node : Math.max(waiting.to, node)
    waiting.x.push(node)
    waiting.weight.push(w)
  }

  /** Nodes of one straight piece from (t, T) to (tEnd, TEnd). */
  const lay = (t: number, T: number, tEnd: number, TEnd: number): void => {
    if (!(tEnd > t)) return
    const change = largest * Math.abs(1 / T - 1 / TEnd)
    const pieces = Math.max(1, Math.ceil(change / widest))
    const rule = ruleFor(change / pieces)
    const half = (tEnd - t) / (2 * pieces)
    for (let piece = 0; piece < pieces; piece++) {
      for (let k = 0; k < rule.nodes.length; k++) {
        const share = (2 * piece + 1 + (rule.nodes[k] as number)) / (2 * pieces)
        add(1 / (T + (TEnd - T) * share), half * (rule.weights[k] as number))
      }
    }
  }

  const kept = linearSegments(time_s, temperature_K, collinearWithin_K)
  let next = 0
  for (let s = 1; s < kept.length && next < order.length; s++) {
    const [a, b] = [kept[s - 1] as number, kept[s] as number]
    const [ta, tb] = [(time_s[a] as number) - start, (time_s[b] as number) - start]
    const [Ta, Tb] = [temperature_K[a] as number, temperature_K[b] as number]
    const at = (t: number): number => (tb > ta ? Ta + ((Tb - Ta) * (t - ta)) / (tb - ta) : Tb)
    let t = ta
    for (; next < order.length; next++) {
      const level = order[next] as number
      const until = Math.min(levelTime_s[level] as number, duration)
      if (until > tb) break
      lay(t, at(t), until, at(until))
      t = until
      settle()
      nodeEnd[level] = inverseT.length
      lowestInverseT[level] = lowest
    }
    lay(t, at(t), tb, Tb)
  }
  return { order, nodeEnd, lowestInverseT, inverseT: Float64Array.from(inverseT), weight: Float64Array.from(weight) }
}

/** Largest change of Ea/(R T) over nodes for which two may stand, at the largest Ea. */
const closest = 0.15

/** Largest change of Ea/(R T) over one application of a rule. */
const widest = 6

/**
 * Rules by the change d of the exponent that they serve, up to the 8 points of `widest`. Over a piece the n-point rule errs by d^(2n) (n!)⁴/((2n + 1)((2n)!)³)
 * relative to a constant integrand; the limits keep this, times the e^d by which the integrand can exceed its mean, below 1e-9.
 */
const rules = [
  { upTo: 0.045, rule: gaussLegendre(2) },
  { upTo: 0.32, rule: gaussLegendre(3) },
  { upTo: 0.9, rule: gaussLegendre(4) },
  { upTo: 3, rule: gaussLegendre(6) },
] as const
const widestRule = gaussLegendre(8)

const ruleFor = (change: number): QuadratureRule => rules.find((entry) => change <= entry.upTo)?.rule ?? widestRule
