import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { createHash } from 'node:crypto'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { buildForTests } from './testing/build-for-tests.ts'
import { rejectionOf, textBytes } from './testing/host-testing.ts'
import { createWorkerPool, type WorkerPool } from './worker-pool.ts'

let built: Awaited<ReturnType<typeof buildForTests>>
let pool: WorkerPool

beforeAll(async () => {
  built = await buildForTests(new URL('./testing/pool-test-worker.ts', import.meta.url))
})
afterAll(async () => {
  await built.remove()
})
afterEach(async () => {
  await pool.close()
})

const start = (workers = 2): WorkerPool => {
  pool = createWorkerPool({ workerUrl: built.url, workers })
  return pool
}
const file = (fileName: string, text = 'rate 10') => ({ fileName, bytes: textBytes(text) })

describe('the worker pool', () => {
  it('answers from a thread, with progress and columns on shared memory', async () => {
    const reports: [number, number][] = []
    const answer = await start().run('import-file', file('a.csv'), { progress: (done, total) => reports.push([done, total]) })
    expect(reports).toEqual([
      [0, 1],
      [1, 1],
    ])
    if (answer.kind !== 'runs') throw new Error('refused')
    expect(answer.runs[0]?.columns.temperature_K).toHaveLength(50)
  })

  it('passes columns on shared memory without a copy', async () => {
    const bytes = new Uint8Array(new SharedArrayBuffer(8))
    await start().run('import-file', { fileName: 'write back', bytes })
    expect(bytes[0]).toBe(42)
  })

  it('cancels a loop that never gives its thread back, and the worker goes on', async () => {
    const stop = new AbortController()
    const running = start(1).run('import-file', file('spin'), { signal: stop.signal, progress: () => stop.abort() })
    await expect(running).rejects.toBeInstanceOf(Cancelled)
    await expect(pool.run('import-file', file('a.csv'))).resolves.toHaveProperty('kind', 'runs')
  })

  it('ends the worker of a cancelled task that does not look, and the next task gets a new one', async () => {
    const stop = new AbortController()
    const deaf = rejectionOf(start(1).run('import-file', file('hang'), { signal: stop.signal, progress: () => stop.abort() }))
    const next = pool.run('import-file', file('a.csv'))
    expect(await deaf).toBeInstanceOf(Cancelled)
    await expect(next).resolves.toHaveProperty('kind', 'runs')
  })

  it('cancels what still waits, without running it', async () => {
    const stop = new AbortController()
    const first = rejectionOf(start(1).run('import-file', file('hang')))
    const second = pool.run('import-file', file('a.csv'), { signal: stop.signal })
    stop.abort()
    await expect(second).rejects.toBeInstanceOf(Cancelled)
    await expect(pool.run('import-file', file('b.csv'), { signal: AbortSignal.abort() })).rejects.toBeInstanceOf(Cancelled)
    await pool.close()
    expect(await first).toBeInstanceOf(Cancelled)
  })

  it('keeps the type of a mistake, and tells a bug as a plain error', async () => {
    start()
    const mistake: unknown = await pool.run('import-file', file('mistake')).catch((error: unknown) => error)
    expect(mistake).toBeInstanceOf(KineticsError)
    expect(mistake).toMatchObject({ code: 'bad-option', message: 'A mistake.', details: { where: 'here' } })
    const bug: unknown = await pool.run('import-file', file('fault')).catch((error: unknown) => error)
    expect(bug).not.toBeInstanceOf(KineticsError)
    expect(bug).toHaveProperty('message', 'a bug')
  })

  it.each(['exit', 'throw later'])('fails the task whose worker dies (%s), and the next task gets a new worker', async (how) => {
    start(1)
    const waiting = [file(how), file('a.csv')].map(async (input) => pool.run('import-file', input))
    await expect(waiting[0]).rejects.toThrow(/stopped unexpectedly/)
    await expect(waiting[1]).resolves.toHaveProperty('kind', 'runs')
  })

  it('fails every task of a worker that cannot be started', async () => {
    pool = createWorkerPool({ workerUrl: new URL('./no-such-worker.js', built.url) })
    await expect(pool.run('import-file', file('a.csv'))).rejects.toThrow(/stopped unexpectedly/)
    await expect(pool.run('import-file', file('a.csv'))).rejects.toThrow(/stopped unexpectedly/)
  })

  it('reads two files at once with two workers, and goes on with one that hangs', async () => {
    start(2)
    const hanging = rejectionOf(pool.run('import-file', file('hang')))
    const others = await Promise.all(['a', 'b', 'c'].map(async (name) => pool.run('import-file', file(name))))
    expect(others.map((answer) => answer.kind)).toEqual(['runs', 'runs', 'runs'])
    await pool.close()
    expect(await hanging).toBeInstanceOf(Cancelled)
    await expect(pool.run('import-file', file('a.csv'))).rejects.toBeInstanceOf(Cancelled)
  })

  it('tells whoever cancels at once, also where the thread has not even started', async () => {
    start(1)
    const stop = new AbortController()
    const cancelled = rejectionOf(pool.run('import-file', file('spin'), { signal: stop.signal }))
    stop.abort()
    const nextTurn = new Promise((resolve) => setImmediate(resolve, 'later'))
    expect(await Promise.race([cancelled, nextTurn])).toBeInstanceOf(Cancelled)
    let idle = false
    const whenIdle = (async () => {
      await pool.whenIdle()
      idle = true
    })()
    await cancelled
    expect(idle).toBe(false)
    await whenIdle
    await pool.whenIdle()
  })

  it('tells no progress of a task that was cancelled', async () => {
    const stop = new AbortController()
    let reports = 0
    const progress = (): void => {
      reports++
      stop.abort()
    }
    // Its worker tells of the end of the way as well.
    await rejectionOf(start(1).run('import-file', file('a.csv'), { signal: stop.signal, progress }))
    await pool.whenIdle()
    expect(reports).toBe(1)
  })

  it('keeps an evaluation for the worker that has its steps, while that one ends what was cancelled', async () => {
    start(2)
    const { emptyStudy } = await import('../../shared-kinetics/contract/study-document.ts')
    const input = { study: { runs: [], settings: emptyStudy('a').settings }, columns: new Map() }
    const evaluatedBy = async (): Promise<number | undefined> => (await pool.run('evaluate-study', input)).levels[0]
    const home = await evaluatedBy()
    const stop = new AbortController()
    // Cancelled within the home worker, which has not yet said so when the evaluation is asked for.
    const again: Promise<number | undefined>[] = []
    const cancelled = rejectionOf(
      pool.run('import-file', file('spin'), {
        signal: stop.signal,
        progress: () => {
          if (again.length > 0) return
          stop.abort()
          again.push(evaluatedBy())
        },
      }),
    )
    expect(await cancelled).toBeInstanceOf(Cancelled)
    expect(home).toBeGreaterThan(0)
    expect(await Promise.all(again)).toEqual([home])
  })

  it('refuses a task it does not know', async () => {
    const unknown: unknown = await (start() as unknown as { run(name: string, input: unknown): Promise<unknown> })
      .run('toString', {})
      .catch((error: unknown) => error)
    expect(unknown).toMatchObject({ code: 'unknown-task' })
  })
})

describe('the program’s own worker', () => {
  it('reads an export and works out a study in a thread', async () => {
    const own = await buildForTests(new URL('./worker-entry.ts', import.meta.url))
    try {
      pool = createWorkerPool({ workerUrl: own.url })
      // One first-order step, Ea 150 kJ/mol, A 1e12 1/s, integrated to machine precision is not needed here: 3 runs that ascend suffice.
      const rates = [5, 10, 20]
      const answers = await Promise.all(
        rates.map(async (rate) => pool.run('import-file', { fileName: `${rate} K per min.csv`, bytes: textBytes(exportText(rate)) })),
      )
      const runs = answers.flatMap((answer) => (answer.kind === 'runs' ? answer.runs : []))
      expect(runs).toHaveLength(3)
      const { emptyStudy } = await import('../../shared-kinetics/contract/study-document.ts')
      const result = await pool.run('evaluate-study', {
        study: { runs: runs.map((run) => run.info), settings: emptyStudy('a').settings },
        columns: new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
      })
      const friedman = result.profiles.find((profile) => profile.method === 'friedman')
      expect(friedman?.Ea_kJ_per_mol[9]).toBeGreaterThan(150 * 0.98)
      expect(friedman?.Ea_kJ_per_mol[9]).toBeLessThan(150 * 1.02)
      const refused = await pool.run('import-file', { fileName: 'x.csv', bytes: textBytes('nothing to see\n') })
      expect(refused).toMatchObject({ kind: 'refused', refused: { fileName: 'x.csv' } })
      expect(
        createHash('sha256')
          .update(textBytes(exportText(5)))
          .digest('hex'),
      ).toBe(runs[0]?.info.file.sha256)
    } finally {
      await own.remove()
    }
  })
})

/** An export of a first-order loss of mass (Ea 150 kJ/mol, A 1e12 1/s), by small explicit steps. */
function exportText(rate_K_per_min: number): string {
  const lines = ['Time (s),Temperature (K),Mass (mg)']
  const step_s = 0.6 / rate_K_per_min
  let unreacted = 1
  for (let i = 0; i <= 40_000; i += 1) {
    const temperature_K = 400 + (rate_K_per_min / 60) * i * step_s
    if (i % 40 === 0) lines.push(`${(i * step_s).toFixed(3)},${temperature_K.toFixed(4)},${(4 + 6 * unreacted).toFixed(7)}`)
    unreacted *= Math.exp(-1e12 * Math.exp(-150_000 / (8.31446261815324 * temperature_K)) * step_s)
  }
  return `${lines.join('\n')}\n`
}
