// `npm test`: every check of the project in one go; the last line counts them.
import { spawnSync } from 'node:child_process'
import { mkdirSync, readFileSync, rmSync } from 'node:fs'
import { dirname, join, relative, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { findOrInstallBrowser } from './browser.mjs'

const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')
const results = join(root, 'e2e/results')
rmSync(results, { recursive: true, force: true })
mkdirSync(results, { recursive: true })

const total = { passed: 0, failed: 0, skipped: 0 }
const failures = []
const add = (passed, failed, skipped = 0) => {
  total.passed += passed
  total.failed += failed
  total.skipped += skipped
}

const started = Date.now()
const bin = (name) => join(root, 'node_modules/.bin', process.platform === 'win32' ? `${name}.cmd` : name)
const run = (title, command, args, env = {}) => {
  console.log(`\n== ${title} (${Math.round((Date.now() - started) / 1000)} s)`)
  return (
    spawnSync(command, args, { cwd: root, stdio: 'inherit', env: { ...process.env, ...env }, shell: process.platform === 'win32' })
      .status === 0
  )
}
const gate = (title, command, args) => {
  const fine = run(title, command, args)
  if (!fine) failures.push({ title, reason: 'see its output above' })
  add(fine ? 1 : 0, fine ? 0 : 1)
}

gate('Types, each folder with its own library list', bin('tsc'), ['-b'])
gate('Lint, import rules included', bin('oxlint'), ['--deny-warnings'])
gate('Format', bin('biome'), ['format', '.'])
gate('Build', bin('electron-vite'), ['build', '--logLevel', 'warn'])

for (const folder of ['shared-kinetics', 'main', 'renderer', 'e2e']) {
  const file = join(results, `${folder}.json`)
  const fine = run(`Unit tests: ${folder}`, bin('vitest'), [
    'run',
    '--root',
    folder,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${file}`,
  ])
  count(fine, file, (report) => {
    for (const { name, assertionResults, message } of report.testResults) {
      if (assertionResults.length === 0 && message) failures.push({ title: name, reason: message })
      for (const test of assertionResults.filter(({ status }) => status === 'failed')) {
        failures.push({ title: `${relative(root, name)} › ${test.fullName}`, reason: test.failureMessages.join('\n') })
      }
    }
    return [report.numPassedTests, report.numFailedTests, report.numPendingTests + report.numTodoTests]
  })
}

const file = join(results, 'journeys.json')
try {
  const browser = await findOrInstallBrowser()
  const fine = run('Journeys in Chromium', bin('playwright'), ['test', '--config', 'e2e/playwright.config.ts'], {
    CHROMIUM_PATH: browser,
    PLAYWRIGHT_JSON_OUTPUT_FILE: file,
  })
  count(fine, file, ({ stats, suites }) => {
    failures.push(...failedJourneys(suites ?? []))
    return [stats.expected + stats.flaky, stats.unexpected, stats.skipped]
  })
} catch (error) {
  failures.push({ title: 'Journeys in Chromium', reason: String(error) })
  add(0, 1)
}

/** Failed specs of a journeys' report, whose suites nest. */
function failedJourneys(suites) {
  return suites.flatMap((suite) => [
    ...failedJourneys(suite.suites ?? []),
    ...(suite.specs ?? [])
      .filter(({ ok }) => !ok)
      .map(({ title, tests }) => ({
        title: `${suite.file} › ${title}`,
        reason: tests.flatMap(({ results }) => results.flatMap(({ errors }) => errors.map(({ message }) => message))).join('\n'),
      })),
  ])
}

/** A runner that dies, or fails outside any one test, counts as one failure more. */
function count(fine, file, read) {
  try {
    const [passed, failed, skipped] = read(JSON.parse(readFileSync(file, 'utf8')))
    add(passed, !fine && failed === 0 ? 1 : failed, skipped)
  } catch (error) {
    failures.push({ title: file, reason: `no report of the run: ${error}` })
    add(0, 1)
  }
}

// The last lines of a long log are what is kept of it: what failed stands there, with the seed of a property.
if (failures.length > 0) console.log('\nFailed:')
for (const { title, reason } of failures) console.log(`  ${title}\n    ${reason.split('\n').slice(0, 8).join('\n    ')}`)
console.log(`\nAll checks took ${Math.round((Date.now() - started) / 1000)} s.`)
console.log(`${total.passed} passed, ${total.failed} failed, ${total.skipped} skipped`)
process.exit(total.failed === 0 && total.passed > 0 ? 0 : 1)
