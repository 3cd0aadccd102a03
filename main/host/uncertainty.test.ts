import { afterEach, describe, expect, it } from 'vitest'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { createHost, type Host } from './create-host.ts'
import { createInProcessPool } from './in-process-pool.ts'
import { createTaskTable } from './task-table.ts'

const hosts: Host[] = []
afterEach(async () => {
  for (const host of hosts.splice(0)) await host.close({ save: false })
})

async function hostWithDemo(): Promise<{ readonly host: Host; readonly revision: number }> {
  const host = createHost({ dataFolder: null, pool: createInProcessPool(createTaskTable()), version: '0', shell: 'command-line' })
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
