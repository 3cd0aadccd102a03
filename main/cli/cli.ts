#!/usr/bin/env node
import { readFileSync } from 'node:fs'
import { run } from './run.ts'

// Its place in the build (out/main/cli.js) is what the addresses below count from.
const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as { readonly version: string }

// A reader such as `head` that has seen enough is no failure.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0)
  process.stderr.write(`rampfold: standard output cannot be written: ${error.message}\n`)
  process.exit(1)
})

process.exitCode = await run(process.argv.slice(2), {
  stdout: (text) => void process.stdout.write(text),
  stderr: (text) => void process.stderr.write(text),
  stderrIsTerminal: process.stderr.isTTY,
  version,
  workerUrl: new URL('./worker-entry.js', import.meta.url),
  rendererUrl: new URL('../renderer/', import.meta.url),
})
