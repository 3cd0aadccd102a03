import { describe, expect, it } from 'vitest'
import { emptyStudy } from '../../shared-kinetics/contract/study-document.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import type { StudyInput } from '../../shared-kinetics/tasks/study-input.ts'
import { createConversions } from './conversions.ts'
import type { TaskOptions, TaskPool } from './host-tasks.ts'
import { sampleRun } from './testing/host-testing.ts'

interface Asked {
  readonly label: string
  readonly options: TaskOptions
  readonly answer: (value: unknown) => void
  readonly fail: (error: Error) => void
}

/** A pool that writes down what it is asked and answers when it is told to. */
function askedPool(): { readonly pool: TaskPool; readonly asked: Asked[] } {
  const asked: Asked[] = []
  const run = async (_name: string, { order }: { order: { info: RunInfo } }, options: TaskOptions = {}): Promise<unknown> =>
    new Promise((answer, fail) => {
      asked.push({ label: order.info.label, options, answer, fail })
    })
  return { pool: { run, close: async () => Promise.resolve() } as unknown as TaskPool, asked }
}

const runs = [5, 10, 20].map((rate) => sampleRun(`${rate}.csv`, rate, new TextEncoder().encode(`rate ${rate}`)))
const study: StudyInput = { runs: runs.map(({ info }) => info), settings: emptyStudy('a').settings }
const columns: ReadonlyMap<string, RunColumns> = new Map(runs.map(({ info, columns: measured }) => [info.columnsKey, measured]))
const noProgress = (): void => undefined
const settle = async (): Promise<void> => new Promise((resolve) => setImmediate(resolve))
const go = (): AbortSignal => new AbortController().signal

describe('conversions', () => {
  it('are asked for all at once, counted as they come, and given by their keys', async () => {
    const { pool, asked } = askedPool()
    const seen: number[][] = []
    const missing = createConversions(pool).missing(study, columns, go(), (...at) => seen.push(at))
    await settle()
    expect(asked.map(({ label }) => label)).toEqual(runs.map(({ info }) => info.label))
    asked.forEach(({ label, answer }) => {
      answer(label)
    })
    expect([...(await missing).values()]).toEqual(runs.map(({ info }) => info.label))
    expect(seen).toEqual([
      [1, 3],
      [2, 3],
      [3, 3],
    ])
  })

  it('that were begun ahead are not asked for again, nor those the worker has', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    for (const { info, columns: measured } of runs) conversions.begin({ ...study, runs: [info] }, measured)
    const missing = conversions.missing(study, columns, go(), noProgress)
    await settle()
    expect(asked).toHaveLength(3)
    for (const { label, answer } of asked) answer(label)
    conversions.handedOver((await missing).keys())
    expect(await conversions.missing(study, columns, go(), noProgress)).toEqual(new Map())
    expect(asked).toHaveLength(3)
  })

  it('that were not handed over, since the evaluation was given up, are kept for the next', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    const first = conversions.missing(study, columns, go(), noProgress)
    await settle()
    for (const { label, answer } of asked) answer(label)
    await first
    expect((await conversions.missing(study, columns, go(), noProgress)).size).toBe(3)
    expect(asked).toHaveLength(3)
  })

  it('are asked for anew where the settings they were begun with are not those of the study', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    for (const { info, columns: measured } of runs) conversions.begin({ ...study, runs: [info] }, measured)
    const window = { kind: 'temperature', start_K: 400, end_K: 800 } as const
    void conversions.missing({ ...study, settings: { ...study.settings, window } }, columns, go(), noProgress)
    await settle()
    expect(asked).toHaveLength(6)
  })

  it('leave a single run, and one that cannot be converted, to the evaluation', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    expect(await conversions.missing({ ...study, runs: study.runs.slice(0, 1) }, columns, go(), noProgress)).toEqual(new Map())
    expect(asked).toHaveLength(0)
    const missing = conversions.missing(study, columns, go(), noProgress)
    await settle()
    asked.forEach(({ label, answer }, i) => {
      answer(i === 1 ? null : label)
    })
    expect((await missing).size).toBe(2)
  })

  it('stop with the evaluation that asks, and are begun again for another that waits for the same', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    const stop = new AbortController()
    const given = conversions.missing(study, columns, stop.signal, noProgress).catch((error: unknown) => error)
    await settle()
    const other = conversions.missing(study, columns, go(), noProgress)
    stop.abort()
    for (const { options, fail } of asked.slice()) if (options.signal?.aborted === true) fail(new Cancelled())
    await settle()
    expect(await given).toBeInstanceOf(Cancelled)
    expect(asked).toHaveLength(6)
    for (const { label, answer } of asked.slice(3)) answer(label)
    expect((await other).size).toBe(3)
  })

  it('that fail are tried again when asked for again', async () => {
    const { pool, asked } = askedPool()
    const conversions = createConversions(pool)
    const failed = conversions.missing(study, columns, go(), noProgress).catch((error: unknown) => error)
    await settle()
    for (const { fail } of asked) fail(new Error('the worker died'))
    expect(await failed).toEqual(new Error('the worker died'))
    void conversions.missing(study, columns, go(), noProgress)
    await settle()
    expect(asked).toHaveLength(6)
  })
})
