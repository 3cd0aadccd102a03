// `npm run bench [-- --rounds N] [-- --write]`: this program beside a script that does the same with pandas, NumPy and SciPy, in one run, turn by turn, as ratios.
// Plain Node with what the build already has: the code that is measured is TypeScript bundled by Vite as for the program, and each round is a process of its own, so that
// a first call is as cold as on the command line. A benchmark runner would only show the warm ones.
import { execFileSync, spawnSync } from 'node:child_process'
import { existsSync, writeFileSync } from 'node:fs'
import { cpus } from 'node:os'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { build } from 'vite'
import { findPeer } from './peer.mjs'

const here = dirname(fileURLToPath(import.meta.url))
const root = resolve(here, '../..')
const bundles = join(root, 'out/bench')
const { values: words } = parseArgs({ options: { rounds: { type: 'string', default: '9' }, write: { type: 'boolean', default: false } } })
const rounds = Math.max(3, Number.parseInt(words.rounds, 10) || 9)

const commandLine = join(root, 'out/main/cli.cjs')
if (!existsSync(commandLine)) {
  console.error('There is no built command line to measure. Run npm run build first.')
  process.exit(1)
}
const peer = findPeer(root)
if (peer.missing !== null) {
  console.log(`Benchmarks skipped: ${peer.missing}`)
  process.exit(0)
}

await build({
  configFile: false,
  root,
  logLevel: 'warn',
  build: {
    ssr: true,
    outDir: bundles,
    target: 'node20.19',
    rolldownOptions: {
      input: {
        phases: join(here, 'phases.ts'),
        'study-to-measure': join(here, 'study-to-measure.ts'),
        'share-columns': join(root, 'main/study/share-columns.ts'),
        uncertainty: join(root, 'main/host/uncertainty.ts'),
        'read-export': join(root, 'main/import/read-export.ts'),
        'worker-pool': join(root, 'main/host/worker-pool.ts'),
      },
      output: { entryFileNames: '[name].js' },
    },
  },
  ssr: { noExternal: true },
})

function wall(command, args) {
  const start = performance.now()
  const { status, stderr } = spawnSync(command, args, { stdio: ['ignore', 'ignore', 'pipe'], encoding: 'utf8' })
  if (status !== 0) throw new Error(`${command} ended with ${status}: ${stderr.trim().split('\n').at(-1)}`)
  return performance.now() - start
}
const within = () =>
  JSON.parse(execFileSync(process.execPath, [join(here, 'measured-process.mjs'), bundles, peer.data], { encoding: 'utf8' }))
const draws = () =>
  JSON.parse(
    execFileSync(process.execPath, [join(here, 'measured-draws.mjs'), bundles, join(root, 'out/main/worker-entry.js'), peer.data], {
      encoding: 'utf8',
    }),
  )
const activation = ['activation', peer.data, '--out', join(peer.scratch, 'out'), '--levels', '0.01:0.99:0.01', '--quiet']

/** One round: everything once, this program and the peer in turn, so that what else the machine does hits both. */
function round() {
  const own = within()
  const others = peer.phases()
  return {
    methodsWarm: [own.methods.warm_ms, others.methods],
    methodsFirst: [own.methods.first_ms, others.methods],
    whole: [wall(process.execPath, [commandLine, ...activation]), wall(...peer.whole)],
    floor: [wall(process.execPath, ['-e', '0']), Number.NaN],
    bare: [wall(process.execPath, [join(here, 'bare-job.mjs'), peer.data, join(peer.scratch, 'bare.csv')]), wall(...peer.whole)],
    readFirst: [own.read.first_ms, others.read],
    readWarm: [own.read.warm_ms, others.read],
    conversion: [own.conversion_ms, others.conversion],
    names: own.methods.names,
    draws: draws(),
  }
}

/** What the peer does not do: the figure, and the milliseconds that are asked for. */
const alone = {
  first_ms: ['2,000 draws of measured sources, nonlinear method, 99 levels, two workers: the first in a process', 1000],
  warm_ms: ['The same after the first call', 1000],
  cancel_ms: ['From a cancel to two free workers, all methods, 99 levels: the slowest of nine at any stage', 100],
  blocked_ms: ["Longest time the host's own thread was busy with the draws of the nonlinear method", null],
  largeCancel_ms: ['From a cancel to two free workers, all methods, 2,000 levels: the slowest of eight', 100],
  largeSlice_ms: ['Longest slice of draws there, behind which other work waits', null],
  largeBlocked_ms: ["Longest time the host's own thread was busy there", null],
}

/** What is compared, and the ratio that is asked for. */
const rows = {
  methodsWarm: ['Methods with intervals, 99 levels, 5 runs: after the first call', 1 / 20],
  methodsFirst: ['Methods with intervals, 99 levels, 5 runs: first call in a process', null],
  whole: ['Whole `activation` command, start of Node and Python included', 0.3],
  bare: ['The limit: the bare job in a Node of its own, without checks, noise, intervals and findings', null],
  floor: ['Node starting and ending (`node -e 0`)', null],
  readFirst: ['Reading 5 exports, first call in a process (`pandas.read_csv`)', null],
  readWarm: ['Reading 5 exports, after the first call (`pandas.read_csv`)', null],
  conversion: ['Conversion and reading at the levels, first call in a process', null],
}

const median = (values) => values.toSorted((a, b) => a - b)[values.length >> 1]
const ms = (value) => (Number.isNaN(value) ? '' : value < 20 ? value.toFixed(1) : value.toFixed(0))
const ratioText = (value) => (Number.isNaN(value) ? '' : value.toPrecision(2))

function table(measured) {
  const lines = Object.entries(rows).map(([key, [title, goal]]) => {
    const pairs = measured.map((one) => one[key])
    const ratios = pairs.map(([own, other]) => own / other)
    const known = !ratios.some(Number.isNaN)
    const ratio = known ? `${ratioText(median(ratios))} (${ratioText(Math.min(...ratios))} to ${ratioText(Math.max(...ratios))})` : ''
    const [own, other] = [0, 1].map((side) => median(pairs.map((pair) => pair[side])))
    return `| ${title} | ${ms(own)} | ${ms(other)} | ${ratio} | ${goal === null ? '' : ratioText(goal)} |`
  })
  return ['| What | this program, ms | peer, ms | ratio, median (spread) | asked for, at most |', '|---|---:|---:|---|---|', ...lines].join(
    '\n',
  )
}

function tableAlone(measured) {
  const lines = Object.entries(alone).map(([key, [title, goal]]) => {
    const values = measured.map((one) => one.draws[key])
    return `| ${title} | ${ms(median(values))} (${ms(Math.min(...values))} to ${ms(Math.max(...values))}) | ${goal ?? ''} |`
  })
  return ['| What | this program, ms: median (spread) | asked for, at most |', '|---|---:|---:|', ...lines].join('\n')
}

try {
  round() // Files into the page cache; not counted.
  const measured = Array.from({ length: rounds }, (_, i) => {
    if (process.stderr.isTTY) process.stderr.write(`\rround ${i + 1} of ${rounds}`)
    return round()
  })
  if (process.stderr.isTTY) process.stderr.write('\r\u001b[K')
  const text = `# Benchmarks

Written by \`npm run bench -- --write\`. The peer is a script that reads the same exports and gives Ea by five methods with 95 % intervals with pandas, NumPy and SciPy. Both took turns,
${rounds} rounds; each ratio is of one round, own time over the peer's, and the table gives their median and spread. The data: 5 runs of ${peer.rows.toLocaleString('en')} rows, 99 levels.

${table(measured)}

What the peer does not do:

${tableAlone(measured)}

Methods: ${measured[0].names.join(', ')}. The peer: ${peer.words}. This program: Node ${process.versions.node}. Machine: ${cpus().length} × ${cpus()[0]?.model.trim() ?? 'unknown'}.
`
  console.log(text)
  if (words.write) writeFileSync(join(root, 'shared-kinetics/docs/benchmarks.md'), text)
} finally {
  peer.end()
}
