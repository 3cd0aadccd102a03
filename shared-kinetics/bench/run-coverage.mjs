// `npm run study:coverage [-- --quick] [-- --write] [-- --seed N]`: how often the intervals hold, by simulation. The study is TypeScript bundled by Vite as the program is; its shares go to
// worker threads. Ends with 1 where a gated cell lies outside its bounds.
import { writeFileSync } from 'node:fs'
import { availableParallelism } from 'node:os'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { parseArgs } from 'node:util'
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads'

const here = fileURLToPath(import.meta.url)
const root = resolve(dirname(here), '../..')

if (isMainThread) await study()
else await work()

async function study() {
  const { values: words } = parseArgs({
    options: {
      quick: { type: 'boolean', default: false },
      write: { type: 'boolean', default: false },
      seed: { type: 'string', default: '1' },
      threads: { type: 'string', default: String(Math.max(2, Math.min(4, availableParallelism()))) },
    },
  })
  const seed = Number(words.seed)
  const threads = Number(words.threads)
  if (!Number.isInteger(seed) || seed < 0 || seed > 1000) throw new Error(`--seed takes a whole number from 0 to 1000, not ${words.seed}.`)
  if (!Number.isInteger(threads) || threads < 1) throw new Error(`--threads takes a whole number from 1 on, not ${words.threads}.`)
  if (words.quick && words.write) throw new Error('The page is written from the whole study. Leave --quick or --write out.')
  const bundle = await bundled()
  const { sharesOf, reportOf } = await import(bundle)
  const replicates = words.quick ? 200 : 2000
  const shares = sharesOf(replicates, seed)
  const results = await workedOut(shares, bundle, threads)
  const { page, gatedCells, failures } = reportOf(results, replicates, seed)
  console.log(page.slice(0, page.indexOf('## How wide')))
  if (words.write) writeFileSync(join(root, 'shared-kinetics/docs/coverage.md'), page)
  for (const failure of failures) console.error(`Outside the gate: ${failure}`)
  console.error(`${gatedCells - failures.length} of ${gatedCells} gated cells lie inside.`)
  process.exitCode = failures.length === 0 ? 0 : 1
}

async function bundled() {
  const { build } = await import('vite')
  const outDir = join(root, 'out/bench/coverage')
  await build({
    configFile: false,
    root,
    logLevel: 'warn',
    build: {
      ssr: true,
      outDir,
      target: 'node20.19',
      rolldownOptions: {
        input: { study: join(root, 'shared-kinetics/bench/coverage-study/study.ts') },
        output: { entryFileNames: '[name].js' },
      },
    },
    ssr: { noExternal: true },
  })
  return pathToFileURL(join(outDir, 'study.js')).href
}

/** The result of every share, in their order, whichever thread had it. */
async function workedOut(shares, bundle, threads) {
  const started = performance.now()
  const results = Array.from(shares, () => null)
  let next = 0
  let done = 0
  const workers = Array.from({ length: threads }, () => new Worker(here, { workerData: { bundle } }))
  const all = new Promise((fulfil, refuse) => {
    for (const worker of workers) {
      const give = () => {
        if (next < shares.length) worker.postMessage({ place: next, share: shares[next++] }, [])
      }
      worker.on('error', refuse)
      worker.on('message', ({ place, result }) => {
        results[place] = result
        done++
        showProgress(done, shares.length, (performance.now() - started) / 1000)
        if (done === shares.length) fulfil(results)
        else give()
      })
      give()
    }
  })
  try {
    return await all
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()))
  }
}

/** A line that is written over on a terminal, a line for every tenth of the work elsewhere. */
function showProgress(done, total, seconds) {
  const left = (seconds / done) * (total - done)
  const text = `${Math.floor((100 * done) / total)} % of the study, ${seconds.toFixed(0)} s, about ${left.toFixed(0)} s left`
  if (process.stderr.isTTY) process.stderr.write(`\r\u001b[K${text}${done === total ? '\n' : ''}`)
  else if (Math.floor((10 * done) / total) > Math.floor((10 * (done - 1)) / total)) console.error(text)
}

async function work() {
  const { runShare } = await import(workerData.bundle)
  parentPort.on('message', ({ place, share }) => parentPort.postMessage({ place, result: runShare(share) }, []))
}
