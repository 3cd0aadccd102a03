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
  if (kept.status !== 0) throw new Error('The command line could not be tried after it was built.')
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

/** The same program in ASCII, which is read without decoding; beyond it there is nothing but text in quotation marks, patterns and remarks. */
const asAscii = (text: string): string => text.replace(/[^\0-\x7f]/g, (unit) => `\\u${unit.charCodeAt(0).toString(16).padStart(4, '0')}`)
