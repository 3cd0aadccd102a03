import { lnBeta } from './ln-beta.ts'

export interface RunsTest {
  /** `tested`; `too-few-signs`: even the fewest runs there can be would not be rarer than the threshold. */
  readonly status: 'tested' | 'too-few-signs'
  readonly above: number
  readonly below: number
  /** Stretches of one sign. */
  readonly runs: number
  /** Chance of so few runs or fewer, were the order of the signs random. */
  readonly probability: number
}

/**
 * Runs test of residuals in the order of time: how many stretches of one sign, and how rarely a random order of as many signs would have so few. Exact, from the
 * numbers of signs above and below (n, m):
 *
 *   P(2i runs) = 2 C(n-1, i-1) C(m-1, i-1)/C(n+m, n),  P(2i+1 runs) = [C(n-1, i) C(m-1, i-1) + C(n-1, i-1) C(m-1, i)]/C(n+m, n)
 *
 * Residuals that are 0 have no sign and are left out. One-sided: a misfit gives few runs.
 *
 * @param threshold - chance below which the runs are to be called too few
 * @source wald-wolfowitz-1940
 * @source swed-eisenhart-1943
 */
export function runsTest(residuals: ArrayLike<number>, threshold: number): RunsTest {
  let [above, below, runs, last] = [0, 0, 0, 0]
  for (const sign of Array.from(residuals, Math.sign)) {
    if (sign === 0 || Number.isNaN(sign)) continue
    if (sign > 0) above++
    else below++
    if (sign !== last) runs++
    last = sign
  }
  const fewest = above > 0 && below > 0 ? probabilityOfRuns(2, above, below) : 1
  return {
    status: fewest <= threshold ? 'tested' : 'too-few-signs',
    above,
    below,
    runs,
    probability: probabilityUpTo(runs, above, below),
  }
}

function probabilityUpTo(runs: number, above: number, below: number): number {
  if (above === 0 || below === 0) return 1
  let sum = 0
  for (let r = 2; r <= runs; r++) sum += probabilityOfRuns(r, above, below)
  return Math.min(1, sum)
}

function probabilityOfRuns(runs: number, above: number, below: number): number {
  const i = Math.floor(runs / 2)
  const ways = (one: number, other: number): number => lnChoose(above - 1, one) + lnChoose(below - 1, other)
  const all = lnChoose(above + below, above)
  return runs % 2 === 0 ? 2 * Math.exp(ways(i - 1, i - 1) - all) : Math.exp(ways(i, i - 1) - all) + Math.exp(ways(i - 1, i) - all)
}

const lnChoose = (n: number, k: number): number => (k < 0 || k > n ? Number.NEGATIVE_INFINITY : -Math.log(n + 1) - lnBeta(n - k + 1, k + 1))
