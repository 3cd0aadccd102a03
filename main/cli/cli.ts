#!/usr/bin/env node
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { isatty } from 'node:tty'
import { pathToFileURL } from 'node:url'
import type * as CommandLine from './command-line.ts'
import { loadScript } from './load-script.ts'

// Its place in the build (out/main/cli.cjs) is what the addresses below count from.
const place = import.meta.dirname
const { version } = JSON.parse(readFileSync(join(place, '../../package.json'), 'utf8')) as { readonly version: string }
const { run } = loadScript(join(place, 'command-line.cjs')).exports as unknown as typeof CommandLine

let watched = false

function writeOut(text: string): void {
  // A reader such as `head` that has seen enough is no failure.
  if (!watched) {
    watched = true
    process.stdout.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EPIPE') process.exit(0)
      process.stderr.write(`rampfold: standard output cannot be written: ${error.message}\n`)
      process.exit(1)
    })
  }
  process.stdout.write(text)
}

void (async () => {
  process.exitCode = await run(process.argv.slice(2), {
    stdout: writeOut,
    stderr: (text) => void process.stderr.write(text),
    stderrIsTerminal: isatty(2),
    version,
    workerUrl: pathToFileURL(join(place, 'worker-entry.js')),
    rendererUrl: pathToFileURL(join(place, '../renderer/')),
  })
})()
