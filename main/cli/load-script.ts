import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { Script } from 'node:vm'

/** Lies beside a script and holds the code that V8 made of it while it did its usual work. */
export const codeCacheOf = (file: string): string => `${file}.cache`

type CommonJs = (exports: Record<string, unknown>, require: NodeJS.Require) => void

/**
 * Loads a script of the build: one expression, a CommonJS function. A process that starts for a single job spends a good part of its time on compiling, so the code kept
 * from an earlier run is taken where there is one. V8 itself refuses code that another version of it made or that belongs to another script; all is then compiled afresh.
 *
 * @param file - ASCII, so that it can be read as it is
 */
export function loadScript(file: string): { readonly script: Script; readonly exports: Readonly<Record<string, unknown>> } {
  const cachedData = codeKept(file)
  const script = new Script(readFileSync(file, 'latin1'), { filename: file, ...(cachedData === null ? {} : { cachedData }) })
  const exports: Record<string, unknown> = {}
  const define = script.runInThisContext() as CommonJs
  define(exports, createRequire(file))
  return { script, exports }
}

function codeKept(file: string): Buffer | null {
  try {
    return readFileSync(codeCacheOf(file))
  } catch {
    return null
  }
}
