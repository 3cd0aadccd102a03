// One process that is measured from within: 2,000 draws of the measured sources by two workers of the built program, how soon they stop when cancelled, and how long this thread,
// which answers the sheet, was ever kept from answering. Begun by run-benchmarks.mjs.
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { monitorEventLoopDelay } from 'node:perf_hooks'
import { setTimeout as wait } from 'node:timers/promises'
import { pathToFileURL } from 'node:url'

const [bundles, workerEntry, folder] = process.argv.slice(2)
const bundle = (name) => import(pathToFileURL(join(bundles, `${name}.js`)).href)
const { drawOrder } = await bundle('draw-order')
const { readExport } = await bundle('read-export')
const { createWorkerPool } = await bundle('worker-pool')
const context = { checkCancelled: () => undefined, progress: () => undefined }
const runs = readdirSync(folder)
  .filter((name) => name.endsWith('.csv'))
  .toSorted()
  .flatMap((name) => readExport(name, readFileSync(join(folder, name)), {}, context).runs)
const order = drawOrder(runs)
const pool = createWorkerPool({ workerUrl: pathToFileURL(workerEntry), workers: 2 })

async function draw(draws, signal) {
  const half = draws / 2
  const ranges = [
    { seed: 1, from: 0, to: half },
    { seed: 1, from: half, to: draws },
  ]
  const shares = await Promise.all(ranges.map((range) => pool.run('draw-energies', { ...order, range }, { signal })))
  return pool.run('intervals-of-draws', { order, shares, seed: 1 }, { signal })
}

async function timed(work) {
  const start = performance.now()
  await work()
  return performance.now() - start
}

const first_ms = await timed(() => draw(2000))
const delay = monitorEventLoopDelay({ resolution: 1 })
delay.enable()
const warm_ms = await timed(() => draw(2000))
delay.disable()

const cancels = []
for (let i = 0; i < 5; i++) {
  const stop = new AbortController()
  const work = draw(200_000, stop.signal).then(
    () => {
      throw new Error('The draws were over before they could be cancelled.')
    },
    () => performance.now(),
  )
  await wait(100)
  const asked = performance.now()
  stop.abort()
  cancels.push((await work) - asked)
  // Both workers are free again only when this is answered.
  await draw(200)
}
await pool.close()
console.log(JSON.stringify({ first_ms, warm_ms, cancel_ms: Math.max(...cancels), blocked_ms: delay.max / 1e6 }))
