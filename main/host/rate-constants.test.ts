import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import tables from '../../shared-kinetics/check-values/published/arrhenius-tables.json' with { type: 'json' }
import type { RateConstantsRead, RequestAnswers } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { RateConstantTable } from '../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { openSavedCopy } from '../study/saved-copy.ts'
import type { Host } from './create-host.ts'
import type { TaskPool } from './host-tasks.ts'
import { createInProcessPool } from './in-process-pool.ts'
import { importTexts, rejectionOf, sampleHost, sampleTasks, textBytes } from './testing/host-testing.ts'
import { uploadToHost } from './upload-to-host.ts'

let folder = ''
const hosts: Host[] = []
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-rates-'))
})
afterEach(async () => {
  for (const host of hosts.splice(0)) await host.close()
  await rm(folder, { recursive: true, force: true })
})
const start = (options: Parameters<typeof sampleHost>[0] = {}): Host => {
  const host = sampleHost(options)
  hosts.push(host)
  return host
}

// OpenStax, Chemistry 2e: HI, recomputed 185.3079 ± 2.1774 kJ/mol.
const HI = tables.lines.find((line) => line.id === 'W1')
const text = `T (K);k (L/(mol s))\n${(HI?.temperature_K ?? []).map((T, i) => `${T};${HI?.k[i]}`).join('\n')}`
const tableOf = (read: RateConstantsRead): RateConstantTable => {
  if (read.kind === 'refused') throw new Error(read.refused.reason)
  return read.table
}
const pasted = async (host: Host): Promise<RateConstantTable> => tableOf(await host.call('rate-constants.read-text', { text }))
const put = async (host: Host, table: RateConstantTable | null): Promise<RequestAnswers['study.change']> => {
  const { revision } = await host.call('study.read', {})
  return host.call('study.change', { revision, change: { kind: 'set-rate-constants', table } })
}

describe('a table of rate constants in the host', () => {
  it('is made from holds by a worker, since that can take seconds', async () => {
    const within = createInProcessPool(sampleTasks())
    const asked: string[] = []
    const pool: TaskPool = {
      run: async (name, ...rest) => {
        asked.push(name)
        return within.run(name, ...rest)
      },
      close: async () => within.close(),
    }
    const host = start({ pool })
    await importTexts(host, { 'a.csv': 'rate 10' })
    const { revision } = await host.call('study.read', {})
    const refused = await rejectionOf(host.call('rate-constants.from-holds', { revision, model: 'F1' }))
    expect(refused).toMatchObject({ code: 'bad-request', message: expect.stringContaining('None of its runs is isothermal.') as string })
    expect(asked).toContain('rate-constants-of-holds')
  })

  it('is read, put into the study, evaluated and exported', async () => {
    const host = start()
    const before = await host.call('study.read', {})
    const table = await pasted(host)
    expect((await host.call('study.read', {})).revision).toBe(before.revision)
    const { revision, document, undo } = await put(host, table)
    expect([document.rateConstants, undo]).toEqual([table, 'table of rate constants'])
    const { result } = await host.call('rate-constants.evaluate', { revision })
    expect(result.line.Ea_kJ_per_mol).toBeCloseTo(185.3079, 4)
    const { files } = await host.call('results.export', { revision, format: 'csv' })
    expect(files.map((file) => file.fileName)).toEqual(['rate-constants.csv'])
    const undone = await host.call('study.undo', { revision })
    expect(undone.document.rateConstants).toBeNull()
    expect(await rejectionOf(host.call('rate-constants.evaluate', { revision: undone.revision }))).toMatchObject({ code: 'bad-request' })
    expect((await host.call('study.redo', { revision: undone.revision })).document.rateConstants).toEqual(table)
  })

  it('is read from a file, with the file as its source', async () => {
    const host = start()
    const [uploadId = ''] = await uploadToHost(host, [{ fileName: 'HI decay.csv', bytes: textBytes(text) }])
    const table = tableOf(await host.call('rate-constants.read-file', { uploadId }))
    expect(table.source).toMatchObject({ kind: 'file', name: 'HI decay.csv' })
    expect((await put(host, table)).document.name).toBe('HI decay')
    expect(await rejectionOf(host.call('rate-constants.read-file', { uploadId }))).toMatchObject({ code: 'unknown-upload' })
  })

  it('that lacks a unit of temperature is refused with what to ask', async () => {
    const host = start()
    const bare = '300 1e-5\n310 3e-5'
    expect(await host.call('rate-constants.read-text', { text: bare })).toMatchObject({
      kind: 'refused',
      ask: 'temperature-unit',
      refused: { fileName: 'The pasted table', line: 1 },
    })
    const stated = await host.call('rate-constants.read-text', {
      text: bare,
      source: 'typed',
      options: { temperatureUnit: 'K', rateUnit: 's-1' },
    })
    expect(tableOf(stated)).toMatchObject({ rateUnit: '1/s', source: { kind: 'typed', name: null } })
    expect(await host.call('rate-constants.read-text', { text: 'nothing of use' })).toMatchObject({ kind: 'refused', ask: null })
  })

  it('with numbers no study takes is refused on reading', async () => {
    const host = start()
    const long = 'x'.repeat(1500)
    const read = await host.call('rate-constants.read-text', { text: `T (K);k (1/s);sample\n300;1e-5;${long}\n310;1e-4;b` })
    expect(tableOf(read).rows[0]?.label).toHaveLength(1000)
    expect(await rejectionOf(host.call('rate-constants.read-text', { text: 'x'.repeat(1_000_001) }))).toBeInstanceOf(KineticsError)
  })

  it('stands instead of runs, not beside them', async () => {
    const host = start()
    await importTexts(host, { 'a.csv': 'rate 5' })
    expect(await rejectionOf(put(host, await pasted(host)))).toMatchObject({
      code: 'bad-request',
      message: expect.stringMatching(/new study/) as unknown,
    })
    const madeFromRuns = { ...(await pasted(host)), source: { kind: 'isothermal-runs', name: 'F1', sha256: null } } as const
    const { revision } = await put(host, madeFromRuns)
    const names = async (of?: 'activation' | 'rate-constants'): Promise<string[]> =>
      (await host.call('results.export', { revision, format: 'json', ...(of === undefined ? {} : { of }) })).files.map(
        (file) => file.fileName,
      )
    expect(await names()).toEqual(['activation.json'])
    expect(await names('rate-constants')).toEqual(['rate-constants.json'])

    const other = start()
    await put(other, await pasted(other))
    expect(await rejectionOf(importTexts(other, { 'a.csv': 'rate 5' }))).toMatchObject({
      code: 'bad-request',
      message: expect.stringMatching(/new study/) as unknown,
    })
    expect((await other.call('study.read', {})).document.runs).toEqual([])
  })

  it('is refused at an old revision', async () => {
    const host = start()
    const { revision } = await put(host, await pasted(host))
    await host.call('study.change', { revision, change: { kind: 'rename-study', name: 'other' } })
    expect(await rejectionOf(host.call('rate-constants.evaluate', { revision }))).toMatchObject({ code: 'revision-conflict' })
  })

  it('is kept across starts and in a saved copy', async () => {
    const first = start({ dataFolder: folder })
    const table = await pasted(first)
    await put(first, table)
    const copy = await first.call('study.save-copy', {})
    expect(openSavedCopy(copy.bytes).document.rateConstants).toEqual(table)
    await first.close()
    expect((await start({ dataFolder: folder }).call('study.read', {})).document.rateConstants).toEqual(table)
  })
})
