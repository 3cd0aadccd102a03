// One process that is measured from within: reads a folder of exports, times the phases and prints them as JSON. Begun by run-benchmarks.mjs, which bundles what it imports.
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'

const [bundles, folder] = process.argv.slice(2)
const { phases } = await import(pathToFileURL(join(bundles, 'phases.js')).href)
const { readExport } = await import(pathToFileURL(join(bundles, 'read-export.js')).href)
const clock = () => performance.now()
const context = { checkCancelled: () => undefined, progress: () => undefined }
const names = readdirSync(folder)
  .filter((name) => name.endsWith('.csv'))
  .toSorted()

const read = () => names.flatMap((name) => readExport(name, readFileSync(join(folder, name)), {}, context).runs)
const start = clock()
const runs = read()
const read_ms = clock() - start
const times = phases(runs, clock)
const again = Array.from({ length: 7 }, () => {
  const before = clock()
  read()
  return clock() - before
})
console.log(JSON.stringify({ ...times, read: { first_ms: read_ms, warm_ms: again.toSorted((a, b) => a - b)[3] } }))
