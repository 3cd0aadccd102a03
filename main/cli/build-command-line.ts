import { spawnSync } from 'node:child_process'
import { chmodSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { build } from 'vite'

/**
 * Builds the command line, which starts anew for every call, so that it starts fast: one script, and beside it the code that V8 has made of it.
 *
 * @param root - the repository
 * @param outDir - the program's `out/main`
 */
export async function buildCommandLine(root: string, outDir: string): Promise<void> {
  const script = join(outDir, 'command-line.cjs')
  await bundle(root, outDir, 'command-line')
  writeFileSync(script, `(function (exports, require) {${asAscii(readFileSync(script, 'utf8'))}\n})`)
  await bundle(root, outDir, 'cli')
  chmodSync(join(outDir, 'cli.cjs'), 0o755)
  await bundle(root, outDir, 'keep-code')
  const kept = spawnSync(process.execPath, [join(outDir, 'keep-code.cjs')], { stdio: 'inherit' })
  if (kept.status === 0) return
  const why = kept.error?.message ?? `keep-code ended with ${kept.status ?? kept.signal}`
  console.warn(`The command line will start more slowly: its compiled code could not be kept (${why}).`)
}

const bundle = async (root: string, outDir: string, name: string): Promise<unknown> =>
  build({
    configFile: false,
    root,
    logLevel: 'warn',
    ssr: { noExternal: true },
    build: {
      ssr: true,
      target: 'node20.19',
      outDir,
      emptyOutDir: false,
      rolldownOptions: {
        input: { [name]: join(root, `main/cli/${name}.ts`) },
        output: { format: 'cjs', entryFileNames: '[name].cjs', codeSplitting: false, dynamicImportInCjs: false },
      },
    },
  })

/**
 * The same program in ASCII, which is read without decoding; beyond it there is nothing but text in quotation marks, patterns and remarks.
 * @throws Error where a backslash stands before such a character: written as an escape it would mean something else
 */
function asAscii(text: string): string {
  const escaped = /\\[^\0-\x7f].*/.exec(text)
  if (escaped !== null)
    throw new Error(`A backslash before a character beyond ASCII cannot be written in ASCII: ${escaped[0].slice(0, 40)}`)
  return text.replace(/[^\0-\x7f]/g, (unit) => `\\u${unit.charCodeAt(0).toString(16).padStart(4, '0')}`)
}
