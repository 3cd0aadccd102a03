import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type * as CommandLine from './command-line.ts'
import { codeCacheOf, loadScript, sealed } from './load-script.ts'

// Part of the build: the command line does its usual work once, on the demo series, and the code that V8 made for it is kept beside the script.
void (async () => {
  const file = join(import.meta.dirname, 'command-line.cjs')
  await rm(codeCacheOf(file), { force: true })
  const { script, exports } = loadScript(file)
  const { demoSeries, run } = exports as unknown as typeof CommandLine
  const folder = await mkdtemp(join(tmpdir(), 'keep-code-'))
  try {
    const runs = join(folder, 'runs')
    await mkdir(runs)
    for (const { fileName, bytes } of demoSeries().files) await writeFile(join(runs, fileName), bytes)
    const nowhere = new URL('file:///')
    const messages: string[] = []
    const io = {
      stdout: () => undefined,
      stderr: (text: string) => void messages.push(text),
      stderrIsTerminal: false,
      version: '0',
      workerUrl: nowhere,
      rendererUrl: nowhere,
    }
    for (const words of [
      ['inspect', runs],
      ['activation', runs, '--out', join(folder, 'results')],
    ]) {
      if ((await run(words, io)) !== 0) throw new Error(`${words.join(' ')}: ${messages.join('')}`)
    }
    await writeFile(codeCacheOf(file), sealed(await readFile(file), script.createCachedData()))
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
})()
