// The least a process of this kind can do and still give Ea: numbers out of the bytes of files whose layout is known, means of neighbouring rows, a sliding slope, three line methods and
// Vyazovkin's by a coarse search, a table. No checks, no noise, no intervals, no findings, no other layout. Its time beside that of the whole command tells how much of that is the
// start of a cold process, and how near the limit the program is. Begun by run-benchmarks.mjs: bare-job.mjs FOLDER OUT.csv
import { readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

const R = 8.31446261815324
const rowsKept = 4000
const [folder, out] = process.argv.slice(2)

/** Three columns of numbers behind one line of headings. */
function parse(bytes) {
  const columns = [0, 1, 2].map(() => new Float64Array(bytes.length >> 4))
  let rows = 0
  let column = 0
  let mantissa = 0
  let decimals = -1
  let sign = 1
  for (let at = bytes.indexOf(10) + 1; at < bytes.length; at++) {
    const byte = bytes[at]
    if (byte >= 48 && byte <= 57) {
      mantissa = mantissa * 10 + byte - 48
      if (decimals >= 0) decimals++
    } else if (byte === 46) decimals = 0
    else if (byte === 45) sign = -1
    else if (byte === 44 || byte === 10) {
      columns[column][rows] = (sign * mantissa) / 10 ** Math.max(0, decimals)
      column = byte === 44 ? column + 1 : 0
      if (byte === 10) rows++
      mantissa = 0
      decimals = -1
      sign = 1
    }
  }
  return { time: columns[0], temperature: columns[1], mass: columns[2], rows }
}

function convert({ time, temperature, mass, rows }) {
  const each = Math.max(1, Math.floor(rows / rowsKept))
  const n = Math.floor(rows / each)
  const [t, T, m] = [0, 1, 2].map(() => new Float64Array(n))
  for (let i = 0; i < n; i++) {
    for (let k = i * each; k < (i + 1) * each; k++) {
      t[i] += (60 * time[k]) / each
      T[i] += temperature[k] / each
      m[i] += mass[k] / each
    }
    T[i] += 273.15
  }
  const alpha = m.map((value) => (m[0] - value) / (m[0] - m[n - 1]))
  const rate = new Float64Array(n)
  const half = 12
  for (let i = half; i < n - half; i++) {
    let xx = 0
    let xy = 0
    for (let k = -half; k <= half; k++) {
      const dt = t[i + k] - t[i]
      xx += dt * dt
      xy += dt * alpha[i + k]
    }
    rate[i] = xy / xx
  }
  return { T, alpha, rate, beta: (T[n - 1] - T[0]) / (t[n - 1] - t[0]) }
}

/** Temperature and rate where alpha first reaches a level. */
function readAt({ T, alpha, rate }, level) {
  let i = 1
  while (i < alpha.length - 1 && alpha[i] < level) i++
  const s = (level - alpha[i - 1]) / (alpha[i] - alpha[i - 1])
  return { T: T[i - 1] + s * (T[i] - T[i - 1]), rate: rate[i - 1] + s * (rate[i] - rate[i - 1]) }
}

/** -R times the slope of y against 1/T. */
function energy(T, y) {
  const n = T.length
  const x = T.map((value) => 1 / value)
  const xMean = x.reduce((sum, value) => sum + value, 0) / n
  const yMean = y.reduce((sum, value) => sum + value, 0) / n
  let xx = 0
  let xy = 0
  for (let i = 0; i < n; i++) {
    xx += (x[i] - xMean) ** 2
    xy += (x[i] - xMean) * (y[i] - yMean)
  }
  return (-R * xy) / xx
}

/** The Ea of a coarse scan at which Phi is least; J by three terms of its asymptotic series. */
function vyazovkin(T, beta) {
  let least = Infinity
  let best = Number.NaN
  for (let Ea = 1e4; Ea < 6e5; Ea *= 1.02) {
    const J = T.map((value, i) => {
      const x = Ea / (R * value)
      return ((Math.exp(-x) * value) / (beta[i] * x)) * (1 - 2 / x + 6 / (x * x))
    })
    let phi = 0
    for (const a of J) for (const b of J) phi += a / b
    if (phi < least) {
      least = phi
      best = Ea
    }
  }
  return best
}

const runs = readdirSync(folder)
  .filter((name) => name.endsWith('.csv'))
  .toSorted()
  .map((name) => convert(parse(readFileSync(join(folder, name)))))
const beta = runs.map((run) => run.beta)
const lines = ['alpha,Friedman,OFW,KAS,Vyazovkin']
for (let percent = 1; percent < 100; percent++) {
  const read = runs.map((run) => readAt(run, percent / 100))
  const T = read.map((at) => at.T)
  const ofLine = (y) => energy(T, read.map(y))
  const energies = [
    ofLine((at) => Math.log(at.rate)),
    ofLine((_, i) => Math.log(beta[i])) / 1.052,
    ofLine((at, i) => Math.log(beta[i] / at.T ** 2)),
    vyazovkin(T, beta),
  ]
  lines.push([percent / 100, ...energies.map((value) => value.toPrecision(7))].join(','))
}
writeFileSync(out, `${lines.join('\n')}\n`)
