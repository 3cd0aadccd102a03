import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { root } from './program.ts'

/** `activation.csv` as the built command line writes it for these exports with these options. */
export function csvOfCommandLine(paths: readonly string[], options: readonly string[] = []): string {
  const out = mkdtempSync(join(tmpdir(), 'rampfold-table-'))
  try {
    const run = spawnSync(process.execPath, [join(root, 'out/main/cli.cjs'), 'activation', ...paths, '--out', out, ...options], {
      encoding: 'utf8',
    })
    if (run.status !== 0) throw new Error(run.stderr)
    return readFileSync(join(out, 'activation.csv'), 'utf8')
  } finally {
    rmSync(out, { recursive: true, force: true })
  }
}
