import { EventEmitter } from 'node:events'
import type { Worker } from 'node:worker_threads'
import { describe, expect, it } from 'vitest'
import { describeFailure } from '../../shared-kinetics/contract/failure.ts'
import type { FromWorker, ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { createHelpedPool } from './helped-pool.ts'
import type { TaskInput } from './host-tasks.ts'
import { sampleTasks } from './testing/host-testing.ts'

class FakeHelper extends EventEmitter {
  readonly posted: ToWorker[] = []
  terminated = false
  postMessage(message: ToWorker): void {
    this.posted.push(message)
  }
  async terminate(): Promise<number> {
    this.terminated = true
    this.emit('exit', 1)
    return Promise.resolve(1)
  }
  answer(message: FromWorker): void {
    this.emit('message', message)
  }
}

const order = { order: null, columns: null } as unknown as TaskInput<'convert-run'>
const file = { fileName: 'a.csv', bytes: new TextEncoder().encode('rate 10') }

function started(): { helper: FakeHelper; pool: ReturnType<typeof createHelpedPool> } {
  const helper = new FakeHelper()
  return { helper, pool: createHelpedPool(sampleTasks(), helper as unknown as Worker) }
}

describe('a pool with a helper thread', () => {
  it('posts conversions as they come and gives each its own answer', async () => {
    const { helper, pool } = started()
    const answers = [pool.run('convert-run', order), pool.run('convert-run', order)]
    expect(helper.posted.map(({ task }) => task)).toEqual(['convert-run', 'convert-run'])
    const [first, second] = helper.posted.map(({ id }) => id)
    helper.answer({ kind: 'answer', id: second ?? 0, value: 'second' })
    helper.answer({ kind: 'progress', id: first ?? 0, done: 1, total: 2 })
    helper.answer({ kind: 'answer', id: first ?? 0, value: 'first' })
    expect(await Promise.all(answers)).toEqual(['first', 'second'])
  })

  it('does everything else in this thread', async () => {
    const { helper, pool } = started()
    expect(await pool.run('import-file', file)).toMatchObject({ kind: 'runs' })
    expect(helper.posted).toEqual([])
  })

  it('hands on what the helper failed with', async () => {
    const { helper, pool } = started()
    const failed = pool.run('convert-run', order)
    helper.answer({
      kind: 'failure',
      id: helper.posted[0]?.id ?? 0,
      failure: describeFailure(new KineticsError('no-signal', 'No signal.')),
    })
    await expect(failed).rejects.toMatchObject({ code: 'no-signal' })
  })

  it('does here what a helper that died left undone, and what comes after', async () => {
    const { helper, pool } = started()
    const undone = pool.run('convert-run', order)
    helper.emit('error', new Error('out of memory'))
    // The table of these tests converts to null.
    expect(await undone).toBeNull()
    expect(await pool.run('convert-run', order)).toBeNull()
    expect(helper.posted).toHaveLength(1)
  })

  it('raises the flag of a conversion that is given up, and refuses one that was given up before', async () => {
    const { helper, pool } = started()
    const stop = new AbortController()
    const given = pool.run('convert-run', order, { signal: stop.signal }).catch((error: unknown) => error)
    stop.abort()
    const [message] = helper.posted
    expect(message?.cancelFlag[0]).toBe(1)
    helper.answer({ kind: 'failure', id: message?.id ?? 0, failure: describeFailure(new Cancelled()) })
    expect(await given).toBeInstanceOf(Cancelled)
    await expect(pool.run('convert-run', order, { signal: stop.signal })).rejects.toBeInstanceOf(Cancelled)
  })

  it('ends its helper, and what waits for it, when it is closed', async () => {
    const { helper, pool } = started()
    const waiting = pool.run('convert-run', order).catch((error: unknown) => error)
    await pool.close()
    expect(helper.terminated).toBe(true)
    expect(await waiting).toBeInstanceOf(Cancelled)
    await expect(pool.run('import-file', file)).rejects.toBeInstanceOf(Cancelled)
  })
})
