import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { HostEvent } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { openSavedCopy } from '../study/saved-copy.ts'
import type { Host } from './create-host.ts'
import { importTexts, rejectionOf, sampleHost, sampleTasks, textBytes } from './testing/host-testing.ts'
import { createInProcessPool } from './in-process-pool.ts'
import { uploadToHost } from './upload-to-host.ts'

let folder = ''
const hosts: Host[] = []

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-host-'))
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
const started = (): Host => start({ dataFolder: folder })
const labels = async (host: Host): Promise<string[]> => (await host.call('study.read', {})).document.runs.map((run) => run.label)
const revisionOf = async (host: Host): Promise<number> => (await host.call('study.read', {})).revision

describe('importing files', () => {
  it('adds the good ones as one change, slow to fast and then by name as a person counts, and lists the refused', async () => {
    const host = start()
    const answer = await importTexts(host, {
      'run 10.csv': 'rate 20 ',
      'bad.csv': 'nonsense',
      'run 2.csv': 'rate 20.1',
      'hold.csv': 'rate 0',
      'slow.csv': 'rate 2',
    })
    expect(await labels(host)).toEqual(['hold', 'slow', 'run 2', 'run 10'])
    expect(answer.addedRunIds).toEqual(answer.snapshot.document.runs.map((run) => run.id))
    expect(answer.refused).toEqual([{ fileName: 'bad.csv', line: 1, reason: 'There is no rate.', remedy: 'Write one.' }])
    expect(answer.snapshot.undo).toBe('adding 4 runs')
    expect((await host.call('study.undo', { revision: answer.snapshot.revision })).document.runs).toEqual([])
  })

  it('refuses a file that is in the study already, and one added twice in one go', async () => {
    const host = start()
    await importTexts(host, { 'a.csv': 'rate 5' })
    const answer = await importTexts(host, { 'again.csv': 'rate 5', 'b.csv': 'rate 10', 'c.csv': 'rate 10' })
    expect(await labels(host)).toEqual(['a', 'b'])
    expect(answer.refused.map((file) => [file.fileName, file.reason])).toEqual([
      ['again.csv', 'This file is in the study already, as a.'],
      ['c.csv', 'The same content is among these files twice, and counts once.'],
    ])
  })

  it('changes nothing when every file is refused', async () => {
    const host = start()
    const before = await host.call('study.read', {})
    expect((await importTexts(host, { 'bad.csv': 'x' })).snapshot).toEqual(before)
  })

  it('refuses a file that has arrived in part, and takes the whole ones', async () => {
    const host = start()
    const { uploadId } = await host.call('upload.begin', { fileName: 'part.csv', byteLength: 10 })
    await host.call('upload.append', { uploadId, bytes: textBytes('rate') })
    const [whole = ''] = await uploadToHost(host, [{ fileName: 'a.csv', bytes: textBytes('rate 5') }])
    const answer = await host.call('runs.import', { uploadIds: [uploadId, whole] })
    expect(answer.refused).toMatchObject([{ fileName: 'part.csv', reason: 'Only 4 of its 10 bytes arrived.' }])
    expect(await labels(host)).toEqual(['a'])
  })

  it('is cancelled when asked, and when another study is opened meanwhile', async () => {
    const tasks = sampleTasks()
    const slow = createInProcessPool({
      ...tasks,
      'import-file': async (input, context) => {
        await new Promise((resolve) => setTimeout(resolve, 20))
        context.checkCancelled()
        return tasks['import-file'](input, context)
      },
    })
    const host = start({ pool: slow })
    const first = rejectionOf(importTexts(host, { 'a.csv': 'rate 5' }))
    await new Promise((resolve) => setTimeout(resolve, 10))
    await host.call('work.cancel', { work: 'import' })
    expect(await first).toBeInstanceOf(Cancelled)
    const second = rejectionOf(importTexts(host, { 'a.csv': 'rate 5' }))
    await new Promise((resolve) => setTimeout(resolve, 10))
    await host.call('study.new', {})
    expect(await second).toBeInstanceOf(Cancelled)
    expect(await labels(host)).toEqual([])
  })

  it.each(['evaluate', 'uncertainty'] as const)('goes on when other work is cancelled: %s', async (work) => {
    const tasks = sampleTasks()
    const begun: (() => void)[] = []
    const reading = new Promise<void>((resolve) => begun.push(resolve))
    const goOn: (() => void)[] = []
    const asked = new Promise<void>((resolve) => goOn.push(resolve))
    const pool = createInProcessPool({
      ...tasks,
      'import-file': async (input, context) => {
        for (const tell of begun) tell()
        await asked
        context.checkCancelled()
        return tasks['import-file'](input, context)
      },
    })
    const host = start({ pool })
    const importing = importTexts(host, { 'a.csv': 'rate 5' })
    await reading
    await host.call('work.cancel', { work })
    for (const tell of goOn) tell()
    expect((await importing).refused).toEqual([])
    expect(await labels(host)).toEqual(['a'])
  })

  it('opens the demo as a study of its own', async () => {
    const host = start()
    await importTexts(host, { 'a.csv': 'rate 5' })
    const { document, undo } = await host.call('study.open-demo', {})
    expect(document.name).toBe('Sample demo')
    expect(document.runs.map((run) => run.label)).toEqual(['a slow one', 'b fast'])
    expect(undo).toBe('adding 2 runs')
  })

  it('takes no runs that did not come from a file', async () => {
    const host = start()
    const { document } = (await importTexts(host, { 'a.csv': 'rate 5' })).snapshot
    const change = { kind: 'add-runs', runs: structuredClone(document.runs), importNotes: [] } as never
    expect(await rejectionOf(host.call('study.change', { revision: await revisionOf(host), change }))).toMatchObject({
      code: 'bad-request',
    })
  })
})

describe('evaluating', () => {
  it('works a revision out once, and again after a change', async () => {
    const counts = { evaluations: 0, imports: 0 }
    const host = start({ pool: createInProcessPool(sampleTasks(counts)) })
    await importTexts(host, { 'a.csv': 'rate 5' })
    const revision = await revisionOf(host)
    const answers = await Promise.all([host.call('study.evaluate', { revision }), host.call('study.evaluate', { revision })])
    await host.call('results.export', { revision, format: 'csv' })
    expect(counts.evaluations).toBe(1)
    expect(answers.map((answer) => answer.revision)).toEqual([revision, revision])
    await host.call('study.change', { revision, change: { kind: 'set-levels', levels: [0.5] } })
    expect((await host.call('study.evaluate', { revision: revision + 1 })).result.levels).toEqual([0.5])
    expect(counts.evaluations).toBe(2)
    expect(await rejectionOf(host.call('study.evaluate', { revision }))).toMatchObject({ code: 'revision-conflict' })
  })

  it('gives up the older one for a newer one, and tries again after a failure', async () => {
    const host = start()
    const { snapshot, addedRunIds } = await importTexts(host, { 'slow.csv': 'rate 5' })
    const older = rejectionOf(host.call('study.evaluate', { revision: snapshot.revision }))
    const change = { kind: 'relabel-run', runId: addedRunIds[0] ?? '', label: 'quick' } as const
    const { revision } = await host.call('study.change', { revision: snapshot.revision, change })
    await expect(host.call('study.evaluate', { revision })).resolves.toHaveProperty('revision', revision)
    expect(await older).toBeInstanceOf(Cancelled)
    const undone = await host.call('study.undo', { revision })
    const stopped = rejectionOf(host.call('study.evaluate', { revision: undone.revision }))
    await host.call('work.cancel', { work: 'evaluate' })
    expect(await stopped).toBeInstanceOf(Cancelled)
    const again = rejectionOf(host.call('study.evaluate', { revision: undone.revision }))
    await host.call('work.cancel', { work: 'evaluate' })
    expect(await again).toBeInstanceOf(Cancelled)
  })

  it('tells progress at most ten times a second, and the last step always', async () => {
    let now = 0
    const tasks = sampleTasks()
    const pool = createInProcessPool({
      ...tasks,
      'evaluate-study': (input, context) => {
        context.progress(1, 1)
        return tasks['evaluate-study'](input, context)
      },
    })
    const host = start({ pool, now: () => now })
    const told: HostEvent[] = []
    host.subscribe((event) => told.push(event))
    const texts = Object.fromEntries(Array.from({ length: 30 }, (_, i) => [`${i}.csv`, `rate ${i + 1}`]))
    await importTexts(host, texts)
    const progress = told.filter((event) => event.kind === 'progress' && event.work === 'import')
    expect(progress).toHaveLength(2)
    expect(progress.at(-1)).toMatchObject({ done: 30, total: 30 })
    now += 1000
    await host.call('study.evaluate', { revision: await revisionOf(host) })
    expect(told.at(-1)).toMatchObject({ kind: 'progress', work: 'evaluate', done: 1, total: 1 })
  })
})

describe('the study across starts', () => {
  it('is found as it was, runs and results included, and undo begins anew', async () => {
    const first = started()
    await importTexts(first, { 'a.csv': 'rate 5', 'b.csv': 'rate 10' })
    await first.call('study.change', { revision: await revisionOf(first), change: { kind: 'rename-study', name: 'Calcite' } })
    const last = await first.call('study.read', {})
    await first.close()

    const second = started()
    const found = await second.call('study.read', {})
    expect(found.document).toEqual(last.document)
    expect(found.undo).toBeNull()
    const { result } = await second.call('study.evaluate', { revision: found.revision })
    expect(result.runs[0]?.curve.temperature_K).toHaveLength(50)
  })

  it('is found again after a crash that left its lock, at latest as it was a second before', async () => {
    const first = started()
    await importTexts(first, { 'a.csv': 'rate 5' })
    await expect.poll(async () => readdir(join(folder, 'studies')), { timeout: 5000 }).toHaveLength(1)
    const [id = ''] = await readdir(join(folder, 'studies'))
    await expect.poll(async () => readdir(join(folder, 'studies', id)), { timeout: 5000 }).toContain('study.json')
    await expect.poll(async () => readdir(folder), { timeout: 5000 }).toContain('last-study.json')
    // The crash: the process is gone and its lock is not.
    const lock = join(folder, 'studies', id, 'lock.json')
    await writeFile(lock, JSON.stringify({ ...(JSON.parse(await readFile(lock, 'utf8')) as object), pid: 2 ** 30 }))
    const second = started()
    expect(await labels(second)).toEqual(['a'])
  })

  it('that was never changed leaves nothing on the disk', async () => {
    const host = started()
    await host.call('study.read', {})
    await host.call('study.new', {})
    await host.close()
    expect(await readdir(join(folder, 'studies'))).toEqual([])
  })

  it('that was discarded on closing leaves the disk as it was', async () => {
    const host = started()
    await importTexts(host, { 'a.csv': 'rate 5' })
    await host.close({ save: false })
    expect(await readdir(join(folder, 'studies'))).toEqual([])
  })

  it('is kept when a new one is begun, and found in the recent list', async () => {
    const host = started()
    await importTexts(host, { 'a.csv': 'rate 5' })
    const before = await host.call('study.read', {})
    const fresh = await host.call('study.new', {})
    expect(fresh.document.runs).toEqual([])
    expect(fresh.revision).toBe(before.revision + 1)
    const { studies } = await host.call('study.recent', {})
    expect(studies).toMatchObject([{ studyId: before.document.id, runs: 1 }])
    const opened = await host.call('study.open-recent', { studyId: before.document.id })
    expect(opened.document).toEqual(before.document)
    expect(await rejectionOf(host.call('study.open-recent', { studyId: 'gone' }))).toMatchObject({ code: 'bad-study' })
    expect((await host.call('study.read', {})).document).toEqual(before.document)
  })

  it('that cannot be read any more is said in a word, and an empty one is begun', async () => {
    const first = started()
    await importTexts(first, { 'a.csv': 'rate 5' })
    const { document } = await first.call('study.read', {})
    await first.close()
    await writeFile(join(folder, 'studies', document.id, 'study.json'), '{')
    const said: string[] = []
    const second = start({ dataFolder: folder, warn: (message) => said.push(message) })
    expect(await labels(second)).toEqual([])
    expect(said).toEqual([expect.stringMatching(/could not be opened again: .*not JSON/)])
    await second.close()
    expect(await readdir(join(folder, 'studies', document.id))).toContain('study.json')
  })

  it('belongs to the host that opened it: a second one begins with its own, and opens the first as a copy', async () => {
    const first = started()
    await importTexts(first, { 'a.csv': 'rate 5' })
    await first.close()
    const holder = started()
    const held = await holder.call('study.read', {})
    const second = started()
    expect(await labels(second)).toEqual([])
    const copy = await second.call('study.open-recent', { studyId: held.document.id })
    expect(copy.document.name).toBe(`${held.document.name} (copy)`)
    expect(copy.document.id).not.toBe(held.document.id)
    await second.call('study.change', { revision: copy.revision, change: { kind: 'rename-study', name: 'Mine' } })
    await holder.call('study.change', { revision: held.revision, change: { kind: 'rename-study', name: 'Theirs' } })
    await second.close()
    await holder.close()
    const third = started()
    const names = (await third.call('study.recent', {})).studies.map((study) => study.name)
    expect(names.toSorted()).toEqual(['Mine', 'Theirs'])
    const savedCopy = await third.call('study.save-copy', {})
    expect(openSavedCopy(savedCopy.bytes).files.size).toBe(1)
  })

  it('is worked on without being kept where the folder cannot be used, and that is said', async () => {
    const file = join(folder, 'a file')
    await writeFile(file, '')
    const said: string[] = []
    const host = start({ dataFolder: join(file, 'x'), warn: (message) => said.push(message) })
    await importTexts(host, { 'a.csv': 'rate 5' })
    expect(await labels(host)).toEqual(['a'])
    expect(said).toEqual([expect.stringMatching(/Studies are not kept: the folder .* Set RAMPFOLD_DATA/)])
  })

  it('tells every window when a save fails, and saves with the next change', async () => {
    const said: string[] = []
    const host = start({ dataFolder: folder, warn: (message) => said.push(message) })
    await host.call('study.read', {})
    const told: HostEvent[] = []
    host.subscribe((event) => told.push(event))
    // A file where the study's folder should be.
    const { document } = await host.call('study.read', {})
    const blocked = join(folder, 'studies', document.id)
    await writeFile(blocked, '')
    await importTexts(host, { 'a.csv': 'rate 5' })
    await expect.poll(() => told.map((event) => event.kind), { timeout: 5000 }).toContain('not-saved')
    expect(said[0]).toMatch(/could not be saved/)
    await rm(blocked)
    await host.close()
    expect(await readdir(blocked)).toContain('study.json')
  })
})

describe('a saved copy', () => {
  it('opens as the study it was, original files included, in place of the open one and under an id of its own', async () => {
    const host = started()
    await importTexts(host, { 'a.csv': 'rate 5' })
    await host.call('study.change', { revision: await revisionOf(host), change: { kind: 'rename-study', name: 'Calcite: 1/2 ' } })
    const before = await host.call('study.read', {})
    const copy = await host.call('study.save-copy', {})
    expect(copy).toMatchObject({ fileName: 'Calcite 1 2.rampfold', mediaType: 'application/zip' })
    await host.call('study.new', {})
    const [uploadId = ''] = await uploadToHost(host, [{ fileName: copy.fileName, bytes: new Uint8Array(copy.bytes) }])
    const answer = await host.call('runs.import', { uploadIds: [uploadId] })
    expect(answer.openedStudy).toBe(true)
    expect(answer.snapshot.document).toEqual({ ...before.document, id: answer.snapshot.document.id })
    expect(answer.snapshot.document.id).not.toBe(before.document.id)
    await host.close()
    const exports = join(folder, 'studies', answer.snapshot.document.id, 'exports')
    expect(await readdir(exports)).toHaveLength(1)
    expect(await readFile(join(exports, before.document.runs[0]?.file.sha256 ?? ''), 'utf8')).toBe('rate 5')
  })

  it('with exports beside it opens first, and the exports are added to it', async () => {
    const host = start()
    await importTexts(host, { 'a.csv': 'rate 5' })
    const bytes = new Uint8Array((await host.call('study.save-copy', {})).bytes)
    const uploadIds = await uploadToHost(host, [
      { fileName: 'b.csv', bytes: textBytes('rate 10') },
      { fileName: 'one.rampfold', bytes },
      { fileName: 'two.RAMPFOLD', bytes },
    ])
    const answer = await host.call('runs.import', { uploadIds })
    expect(await labels(host)).toEqual(['a', 'b'])
    expect(answer.addedRunIds).toHaveLength(1)
    expect(answer.refused).toMatchObject([{ fileName: 'two.RAMPFOLD', reason: 'Another saved study was opened.' }])
  })

  it('that is damaged is refused, and the open study stays', async () => {
    const host = start()
    await importTexts(host, { 'a.csv': 'rate 5' })
    const before = await host.call('study.read', {})
    const answer = await importTexts(host, { 'x.rampfold': 'PK no' })
    expect(answer).toMatchObject({
      openedStudy: false,
      refused: [{ fileName: 'x.rampfold', reason: expect.stringMatching(/not a whole file/) as string }],
    })
    expect(answer.snapshot).toEqual(before)
  })
})

describe('columns', () => {
  it('are kept while undo can bring a run back', async () => {
    const host = start()
    const { snapshot, addedRunIds } = await importTexts(host, { 'a.csv': 'rate 5' })
    const removed = await host.call('study.change', {
      revision: snapshot.revision,
      change: { kind: 'remove-run', runId: addedRunIds[0] ?? '' },
    })
    const back = await host.call('study.undo', { revision: removed.revision })
    const { result } = await host.call('study.evaluate', { revision: back.revision })
    expect(result.runs).toHaveLength(1)
  })
})

describe('errors', () => {
  it('of a caller name the request and the field', async () => {
    const error = await rejectionOf(start().call('study.change', { revision: 1, change: { kind: 'rename-study', name: '' } }))
    expect(error).toBeInstanceOf(KineticsError)
    expect(error).toMatchObject({ code: 'bad-request', message: expect.stringMatching(/study\.change.*change\.name/) as string })
  })
})
