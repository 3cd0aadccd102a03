import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'

const rows = 20_000

/** A Python that has what the peer needs, with the versions of it; null where there is none. */
function findPython() {
  for (const command of [process.env['PYTHON'], 'python3', '/usr/bin/python3', 'python']) {
    if (command === undefined) continue
    const asked = spawnSync(
      command,
      [
        '-c',
        'import platform, numpy, pandas, scipy; print(platform.python_version(), numpy.__version__, pandas.__version__, scipy.__version__)',
      ],
      { encoding: 'utf8' },
    )
    const [python, numpy, pandas, scipy] = (asked.stdout ?? '').trim().split(' ')
    if (asked.status === 0) return { command, words: `Python ${python}, NumPy ${numpy}, pandas ${pandas}, SciPy ${scipy}` }
  }
  return null
}

/**
 * The script that does the same job with pandas, NumPy and SciPy, and the data both read. `missing` says in words why there is none.
 * @param root - of the repository
 */
export function findPeer(root) {
  const script = resolve(root, '../shared/peer/scipy_peer.py')
  if (!existsSync(script)) return { missing: 'The peer script ../shared/peer/scipy_peer.py is not there.' }
  const python = findPython()
  if (python === null) return { missing: 'No Python with NumPy, pandas and SciPy was found (set PYTHON to one).' }
  const scratch = mkdtempSync(join(tmpdir(), 'rampfold-bench-'))
  const data = join(scratch, 'data')
  const call = (...words) => {
    const answer = spawnSync(python.command, [script, ...words], { encoding: 'utf8' })
    if (answer.status !== 0) throw new Error(`The peer failed: ${answer.stderr.trim().split('\n').at(-1)}`)
    return answer.stdout
  }
  call('make', data, String(rows))
  return {
    missing: null,
    words: python.words,
    rows,
    scratch,
    data,
    /** The whole process, as a command and its words. */
    whole: [python.command, [script, 'energy', data, join(scratch, 'peer.csv')]],
    /** Milliseconds by phase, measured within the process. */
    phases: () =>
      Object.fromEntries([...call('phases', data).matchAll(/^(\w+): ([\d.]+) ms$/gm)].map(([, name, ms]) => [name, Number(ms)])),
    end: () => rmSync(scratch, { recursive: true, force: true }),
  }
}
