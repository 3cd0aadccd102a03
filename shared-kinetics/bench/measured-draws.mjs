// One process that is measured from within: the uncertainty of a study as the host works it out, by two workers of the built program. How long the draws of the measured sources take;
// how soon both workers are free again when all is cancelled, at whatever stage that is; and how long this thread, which answers the sheet, was ever kept from answering.
// Begun by run-benchmarks.mjs.
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { monitorEventLoopDelay } from 'node:perf_hooks'
import { setTimeout as wait } from 'node:timers/promises'
import { pathToFileURL } from 'node:url'

const [bundles, workerEntry, folder] = process.argv.slice(2)
const bundle = (name) => import(pathToFileURL(join(bundles, `${name}.js`)).href)
const { studyToMeasure } = await bundle('study-to-measure')
const { readExport } = await bundle('read-export')
const { shareColumns } = await bundle('share-columns')
const { createUncertainty } = await bundle('uncertainty')
const { createWorkerPool } = await bundle('worker-pool')

const context = { checkCancelled: () => undefined, progress: () => undefined }
const runs = readdirSync(folder)
  .filter((name) => name.endsWith('.csv'))
  .toSorted()
  .flatMap((name) => readExport(name, readFileSync(join(folder, name)), {}, context).runs)
const columns = new Map(runs.map((run) => [run.info.columnsKey, shareColumns(run.columns)]))

/** A pool of two workers that notes when each task began and was over. */
function watchedPool() {
  const pool = createWorkerPool({ workerUrl: pathToFileURL(workerEntry), workers: 2 })
  const done = []
  return {
    ...pool,
    done,
    run: async (name, input, options = {}) => {
      const task = { name, asked: performance.now(), began: Number.NaN }
      const progress = (...told) => {
        if (Number.isNaN(task.began)) task.began = performance.now()
        options.progress?.(...told)
      }
      try {
        return await pool.run(name, input, { ...options, progress })
      } finally {
        done.push({ ...task, over: performance.now() })
      }
    },
    /** When the last worker is free. */
    free: async () => {
      await pool.whenIdle()
      return performance.now()
    },
  }
}

/** The host's own way to the uncertainty of a study, with nothing remembered between two calls but what the workers keep. */
const uncertaintyOf = (study, pool) =>
  createUncertainty({ session: { document: study, revision: 1 }, study: { columns: { get: (key) => columns.get(key) } } }, pool, {
    progressOf: () => () => undefined,
  })

/** From the first draw that is asked for to the last interval. */
function timeOfDraws(done) {
  const draws = done.filter(({ name }) => name === 'draw-energies' || name === 'intervals-of-draws')
  return Math.max(...draws.map(({ over }) => over)) - Math.min(...draws.map(({ asked }) => asked))
}

async function whole(study, pool) {
  const delay = monitorEventLoopDelay({ resolution: 1 })
  pool.done.length = 0
  delay.enable()
  await uncertaintyOf(study, pool).of(1)
  delay.disable()
  const slices = pool.done.filter(({ name }) => name === 'draw-energies')
  return {
    draws_ms: timeOfDraws(pool.done),
    slice_ms: Math.max(...slices.map(({ began, over }) => over - began)),
    blocked_ms: delay.max / 1e6,
  }
}

/** The longest time from a cancel until both workers are free, over cancels after each of these times; the last one cancels while it draws. */
async function slowestCancel(study, pool, after_ms) {
  let slowest = 0
  for (const after of [...after_ms, 'drawing']) {
    pool.done.length = 0
    const uncertainty = uncertaintyOf(study, pool)
    const work = uncertainty.of(1).then(
      () => 'over',
      () => 'cancelled',
    )
    const drawing = async () => {
      while (!pool.done.some(({ name }) => name === 'draw-energies')) await wait(5)
    }
    await Promise.race([work, after === 'drawing' ? drawing() : wait(after)])
    const asked = performance.now()
    uncertainty.cancel()
    if ((await work) === 'over') continue
    slowest = Math.max(slowest, (await pool.free()) - asked)
  }
  return slowest
}

const common = studyToMeasure(runs, 99, ['vyazovkin'])
const all = studyToMeasure(runs, 99, null)
const large = studyToMeasure(runs, 2000, null)

const pool = watchedPool()
const first = await whole(common, pool)
const warm = await whole(common, pool)
const cancel_ms = await slowestCancel(all, pool, [0, 5, 10, 20, 50, 100, 200, 400])
await pool.close()

// Cold again: the levels are new to the workers as well.
const another = watchedPool()
const largeCancel_ms = await slowestCancel(large, another, [300, 50, 100, 200, 500, 1000, 2000])
const few = await whole({ ...large, uncertainty: { ...large.uncertainty, draws: 200 } }, another)
await another.close()
console.log(
  JSON.stringify({
    first_ms: first.draws_ms,
    warm_ms: warm.draws_ms,
    cancel_ms,
    blocked_ms: Math.max(first.blocked_ms, warm.blocked_ms),
    largeCancel_ms,
    largeSlice_ms: few.slice_ms,
    largeBlocked_ms: few.blocked_ms,
  }),
)
