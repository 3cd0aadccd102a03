import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { Script } from 'node:vm'

/** Lies beside a script and holds the code that V8 made of it while it did its usual work, behind a seal. */
export const codeCacheOf = (file: string): string => `${file}.cache`

/** Length of the seal. */
export const sealBytes = 32

type CommonJs = (exports: Record<string, unknown>, require: NodeJS.Require) => void

/**
 * Loads a script of the build: one expression, a CommonJS function. A process that starts for a single job spends a good part of its time on compiling, so the code kept
 * from an earlier run is taken where there is one whose seal holds. Else, or where V8 refuses it, all is compiled afresh.
 *
 * @param file - ASCII, so that it can be read as it is
 */
export function loadScript(file: string): { readonly script: Script; readonly exports: Readonly<Record<string, unknown>> } {
  const text = readFileSync(file)
  const cachedData = codeKept(file, text)
  const script = new Script(text.toString('latin1'), { filename: file, ...(cachedData === null ? {} : { cachedData }) })
  const exports: Record<string, unknown> = {}
  const define = script.runInThisContext() as CommonJs
  define(exports, createRequire(file))
  return { script, exports }
}

/** Code to be kept of a script, with the seal that ties it to the script's text and to this Node. */
export const sealed = (text: Buffer, code: Buffer): Buffer => Buffer.concat([sealOf(text, code), code])

// V8 knows a script by its length alone and does not look whether code is whole: it would run that of another build of equal length, or damaged code.
const sealOf = (text: Buffer, code: Buffer): Buffer =>
  createHash('sha256').update(`${process.version} ${process.platform} ${process.arch} ${text.length} `).update(text).update(code).digest()

function codeKept(file: string, text: Buffer): Buffer | null {
  let kept: Buffer
  try {
    kept = readFileSync(codeCacheOf(file))
  } catch {
    return null
  }
  const code = kept.subarray(sealBytes)
  return kept.subarray(0, sealBytes).equals(sealOf(text, code)) ? code : null
}
