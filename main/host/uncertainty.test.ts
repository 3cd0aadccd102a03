import { afterEach, describe, expect, it } from 'vitest'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { createHost, type Host } from './create-host.ts'
import type { HostTasks, TaskPool } from './host-tasks.ts'
import { createInProcessPool } from './in-process-pool.ts'
import { createTaskTable } from './task-table.ts'

const hosts: Host[] = []
afterEach(async () => {
  for (const host of hosts.splice(0)) await host.close({ save: false })
})

async function hostWithDemo(
  pool: TaskPool = createInProcessPool(createTaskTable()),
): Promise<{ readonly host: Host; readonly revision: number }> {
  const host = createHost({ dataFolder: null, pool, version: '0', shell: 'command-line' })
  hosts.push(host)
  const { revision } = await host.call('study.open-demo', {})
  return { host, revision }
}

const common = (of: UncertaintyResult): number =>
  of.profiles[0]?.budget.find((entry) => entry.source === 'temperature-common')?.standardUncertainty_kJ_per_mol[5] ?? Number.NaN

describe('the uncertainty of the open study', () => {
  it('has every kind of interval and a budget for each method', async () => {
    const { host, revision } = await hostWithDemo()
    const { result } = await host.call('study.uncertainty', { revision })
    const evaluated = await host.call('study.evaluate', { revision })
    expect(result.draws).toBe(2000)
    expect(result.profiles.map((profile) => profile.method)).toEqual(evaluated.result.profiles.map((profile) => profile.method))
    for (const { intervals, budget } of result.profiles) {
      expect(intervals.map((interval) => interval.kind)).toEqual(['jackknife', 'bootstrap', 'combined', 'measured-sources'])
      expect(budget.length).toBeGreaterThanOrEqual(5)
      for (const interval of intervals) expect(interval.pointwise).toBe(true)
    }
  })

  it('is worked out once, and again when something is stated anew', async () => {
    const { host, revision } = await hostWithDemo()
    const first = await host.call('study.uncertainty', { revision })
    expect((await host.call('study.uncertainty', { revision })).result).toBe(first.result)
    const { document } = await host.call('study.read', {})
    const changed = await host.call('study.change', {
      revision,
      change: { kind: 'set-uncertainty', uncertainty: { ...document.uncertainty, temperatureCommon_K: 5, draws: 500 } },
    })
    expect(changed.undo).toBe('stated uncertainties')
    const { result } = await host.call('study.uncertainty', { revision: changed.revision })
    expect(result.draws).toBe(500)
    expect(common(result) / common(first.result)).toBeCloseTo(10, 6)
    await expect(host.call('study.uncertainty', { revision })).rejects.toMatchObject({ code: 'revision-conflict' })
  })

  it('stops when it is cancelled', async () => {
    const { host, revision } = await hostWithDemo()
    await host.call('study.evaluate', { revision })
    const stop = host.subscribe((event) => {
      if (event.kind === 'progress' && event.work === 'uncertainty') void host.call('work.cancel', { work: 'uncertainty' })
    })
    await expect(host.call('study.uncertainty', { revision })).rejects.toBeInstanceOf(Cancelled)
    stop()
    expect((await host.call('study.uncertainty', { revision })).result.profiles.length).toBeGreaterThan(0)
  })

  it('draws in slices, at most two at once, so that other tasks are served between them', async () => {
    const inner = createInProcessPool(createTaskTable())
    const ranges: (readonly [number, number])[] = []
    let atOnce = 0
    let most = 0
    const pool: TaskPool = {
      ...inner,
      run: async (name, input, options) => {
        if (name !== 'draw-energies') return inner.run(name, input, options)
        const { range } = input as HostTasks['draw-energies']['input']
        ranges.push([range.from, range.to])
        most = Math.max(most, ++atOnce)
        try {
          return await inner.run(name, input, options)
        } finally {
          atOnce--
        }
      },
    }
    const { host, revision } = await hostWithDemo(pool)
    await host.call('study.uncertainty', { revision })
    expect(most).toBe(2)
    // Every draw once, in order.
    expect(
      ranges
        .flat()
        .filter((_, i) => i % 2 === 0)
        .slice(1),
    ).toEqual(ranges.map(([, to]) => to).slice(0, -1))
    expect(ranges.at(-1)?.[1]).toBe(2000)
  })

  it('gives the same numbers whatever the slices', async () => {
    const inner = createInProcessPool(createTaskTable())
    const slicesOf = async (msPerDraw: number): Promise<{ readonly slices: number; readonly profiles: UncertaintyResult['profiles'] }> => {
      let slices = 0
      const pool: TaskPool = {
        ...inner,
        run: async (name, input, options) => {
          if (name !== 'draw-energies') return inner.run(name, input, options)
          slices++
          options?.progress?.(0, 1)
          const { range } = input as HostTasks['draw-energies']['input']
          await new Promise((resolve) => setTimeout(resolve, msPerDraw * (range.to - range.from)))
          return inner.run(name, input, options)
        },
      }
      const { host, revision } = await hostWithDemo(pool)
      const { document } = await host.call('study.read', {})
      const uncertainty = { ...document.uncertainty, draws: 2000, seed: 7 }
      const changed = await host.call('study.change', { revision, change: { kind: 'set-uncertainty', uncertainty } })
      const { result } = await host.call('study.uncertainty', { revision: changed.revision })
      return { slices, profiles: result.profiles }
    }
    const few = await slicesOf(0)
    const many = await slicesOf(1)
    expect(many.slices).toBeGreaterThan(few.slices)
    expect(many.profiles).toEqual(few.profiles)
  })

  it('stops the other slices when one fails, and tells no more of them', async () => {
    const inner = createInProcessPool(createTaskTable())
    const signals: AbortSignal[] = []
    const late: (() => void)[] = []
    const pool: TaskPool = {
      ...inner,
      run: async (name, input, options = {}) => {
        if (name !== 'draw-energies') return inner.run(name, input, options)
        if (options.signal !== undefined) signals.push(options.signal)
        if (signals.length === 2) throw new Error('The calculation stopped unexpectedly.')
        late.push(() => options.progress?.(100, 100))
        return new Promise((_, reject) => {
          options.signal?.addEventListener('abort', () => {
            reject(new Cancelled())
          })
        })
      },
    }
    const { host, revision } = await hostWithDemo(pool)
    const told: string[] = []
    host.subscribe((event) => {
      if (event.kind === 'progress' && event.work === 'uncertainty') told.push(event.what)
    })
    await expect(host.call('study.uncertainty', { revision })).rejects.toThrow('stopped unexpectedly')
    expect(signals.map((signal) => signal.aborted)).toEqual([true, true])
    const before = told.length
    await new Promise((resolve) => setTimeout(resolve, 150))
    expect(late).toHaveLength(1)
    for (const tell of late) tell()
    expect(told).toHaveLength(before)
  })

  it('goes into the exports where it is asked for', async () => {
    const { host, revision } = await hostWithDemo()
    const textOf = async (format: 'json' | 'csv', withUncertainty: boolean): Promise<string> =>
      (await host.call('results.export', { revision, format, withUncertainty })).files
        .map((file) => new TextDecoder().decode(file.bytes))
        .join('\n')
    expect(JSON.parse(await textOf('json', true))).toMatchObject({ uncertainty: { seed: 1, draws: 2000 } })
    expect(JSON.parse(await textOf('json', false))).toMatchObject({ uncertainty: null })
    expect(await textOf('csv', true)).toContain('Thermal lag, 1 s times the heating rate, assumed')
  })

  it.each([
    [{ temperatureRun_K: -1 }, /temperatureRun_K/],
    [{ draws: 10 }, /draws/],
    [{ seed: 0.5 }, /seed/],
  ])('refuses what cannot be stated: %o', async (wrong, message) => {
    const { host, revision } = await hostWithDemo()
    const { document } = await host.call('study.read', {})
    const change = { kind: 'set-uncertainty' as const, uncertainty: { ...document.uncertainty, ...wrong } }
    await expect(host.call('study.change', { revision, change })).rejects.toThrow(message)
  })
})
