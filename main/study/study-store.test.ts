import { mkdtemp, readdir, readFile, rm, stat, utimes, writeFile } from 'node:fs/promises'
import { hostname, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { emptyStudy, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { rejectionOf, sampleRun, textBytes } from '../host/testing/host-testing.ts'
import { openStudyStore, type StudyParts, type StudyStore } from './study-store.ts'
import { lockStale_ms } from './lock-file.ts'
import { createAutosave } from './autosave.ts'
import { defaultDataFolder } from './data-folder.ts'

let folder = ''
let store: StudyStore

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-store-'))
  store = await openStudyStore(folder, 'first', Date.now)
})
afterEach(async () => {
  await rm(folder, { recursive: true, force: true })
})

const bytes = textBytes('rate 10')
const run = sampleRun('Calcite 10.csv', 10, bytes)
const document: StudyDocument = { ...emptyStudy('calcite', 'Calcite'), runs: [run.info] }
const parts: StudyParts = { columns: () => run.columns, originalFile: () => bytes }
const notNamed = { columnsKeys: new Set<string>(), fileSums: new Set<string>() }

async function saved(): Promise<void> {
  const held = await store.lock('calcite')
  await held?.save(document, parts)
  await held?.release()
}

async function refused(id: string): Promise<string> {
  const error = await rejectionOf(store.read(id))
  expect(error).toMatchObject({ name: 'KineticsError', code: 'bad-study' })
  return error instanceof Error ? error.message : ''
}

describe('the study store', () => {
  it('gives back what was saved: document, columns and original file', async () => {
    await saved()
    const again = await openStudyStore(folder, 'second', Date.now)
    const { document: read, columns } = await again.read('calcite')
    expect(read).toEqual(document)
    expect(columns.get(run.info.columnsKey)?.signals).toEqual(run.columns.signals)
    expect(columns.get(run.info.columnsKey)?.signals[0]?.buffer).toBeInstanceOf(SharedArrayBuffer)
    expect(new Uint8Array((await again.originalFile('calcite', run.info.file.sha256)) ?? [])).toEqual(bytes)
  })

  it.skipIf(process.platform === 'win32')('keeps studies readable by their owner alone', async () => {
    await saved()
    for (const path of ['studies', 'studies/calcite/columns']) expect((await stat(join(folder, path))).mode & 0o077).toBe(0)
    expect((await stat(join(folder, 'studies/calcite/study.json'))).mode & 0o077).toBe(0)
  })

  it('leaves no temporary files behind', async () => {
    await saved()
    const names = await readdir(folder, { recursive: true })
    expect(names.filter((name) => name.includes('.tmp') || name.includes('lock'))).toEqual([])
  })

  it('never writes columns twice', async () => {
    await saved()
    const held = await store.lock('calcite')
    const asked: string[] = []
    await held?.save({ ...document, name: 'Renamed' }, { columns: (key) => (asked.push(key), run.columns), originalFile: () => bytes })
    expect(asked).toEqual([])
    expect((await store.read('calcite')).document.name).toBe('Renamed')
  })

  it('prunes what nothing names any more, and nothing else', async () => {
    await saved()
    const held = await store.lock('calcite')
    await held?.prune({ columnsKeys: new Set([run.info.columnsKey]), fileSums: new Set([run.info.file.sha256]) })
    expect(await readdir(join(folder, 'studies/calcite/columns'))).toHaveLength(1)
    await held?.prune(notNamed)
    expect(await readdir(join(folder, 'studies/calcite/columns'))).toEqual([])
    expect(await readdir(join(folder, 'studies/calcite/exports'))).toEqual([])
  })

  it('lists studies newest first and leaves out what is damaged', async () => {
    await saved()
    for (const [id, name] of [
      ['older', 'Older'],
      ['damaged', 'Damaged'],
    ] as const) {
      const held = await store.lock(id)
      await held?.save({ ...document, id, name }, parts)
      await held?.release()
    }
    await utimes(join(folder, 'studies/older/study.json'), 1000, 1000)
    await writeFile(join(folder, 'studies/damaged/study.json'), '{"format":')
    const recent = await store.recent()
    expect(recent.map((study) => study.name)).toEqual(['Calcite', 'Older'])
    expect(recent[1]).toMatchObject({ studyId: 'older', runs: 1, changedAt: '1970-01-01T00:16:40.000Z' })
  })

  it('refuses ids that are paths, and studies that are gone, damaged, swapped or of a newer version', async () => {
    await saved()
    const path = join(folder, 'studies/calcite/study.json')
    for (const id of ['../calcite', 'a/b', '', 'CON.txt', '..']) expect(await refused(id)).toMatch(/no study of this name/)
    expect(await refused('gone')).toMatch(/not on the disk/)
    await writeFile(path, JSON.stringify({ ...document, format: 'rampfold.study/7' }))
    expect(await refused('calcite')).toMatch(/newer version/)
    await writeFile(path, JSON.stringify({ ...document, id: 'other' }))
    expect(await refused('calcite')).toMatch(/another study/)
    await writeFile(path, JSON.stringify(document).slice(0, -20))
    expect(await refused('calcite')).toMatch(/not JSON/)
    await writeFile(path, JSON.stringify(document))
    await writeFile(join(folder, `studies/calcite/columns/${run.info.columnsKey}.bin`), 'RFCOLUMN')
    expect(await refused('calcite')).toMatch(/not a file of columns/)
  })
})

describe('the lock of a study', () => {
  it('is held by one host at a time and free again when given back', async () => {
    const second = await openStudyStore(folder, 'second', Date.now)
    const held = await store.lock('calcite')
    expect(held).not.toBeNull()
    expect(await second.lock('calcite')).toBeNull()
    expect(await second.lock('other')).not.toBeNull()
    await held?.release()
    expect(await second.lock('calcite')).not.toBeNull()
  })

  it('is taken over from a process that has ended, and from one that has not beaten it for a minute', async () => {
    const path = join(folder, 'studies/calcite/lock.json')
    await (await store.lock('calcite'))?.release()
    // No Linux, macOS or Windows process has this number.
    await writeFile(path, JSON.stringify({ pid: 2 ** 30, host: hostname(), token: 'gone' }))
    const afterCrash = await store.lock('calcite')
    expect(afterCrash).not.toBeNull()
    expect(JSON.parse(await readFile(path, 'utf8'))).toMatchObject({ pid: process.pid, token: 'first' })
    const later = await openStudyStore(folder, 'later', () => Date.now() + 2 * lockStale_ms)
    expect(await later.lock('calcite')).not.toBeNull()
    // The first one notices before it writes over the other's work.
    await expect(afterCrash?.save(document, parts)).rejects.toThrow(/taken this study over/)
    await afterCrash?.release()
    expect(JSON.parse(await readFile(path, 'utf8'))).toMatchObject({ token: 'later' })
  })

  it('is taken over when it says nothing, as after a crash while it was written', async () => {
    await (await store.lock('calcite'))?.release()
    await writeFile(join(folder, 'studies/calcite/lock.json'), '{"pid"')
    expect(await store.lock('calcite')).not.toBeNull()
  })
})

describe('autosave', () => {
  it('saves a run of changes once, never two at a time, and again after a failure', async () => {
    let saving = 0
    let saves = 0
    const failures: unknown[] = []
    const autosave = createAutosave(
      async () => {
        expect((saving += 1)).toBe(1)
        await new Promise((resolve) => setTimeout(resolve, 5))
        saving -= 1
        saves += 1
        if (saves === 1) throw new Error('disk full')
      },
      (error) => failures.push(error),
    )
    for (let i = 0; i < 10; i += 1) autosave.changed()
    await Promise.all([autosave.flush(), autosave.flush()])
    expect(saves).toBe(1)
    expect(failures).toHaveLength(1)
    await autosave.flush()
    expect(saves).toBe(2)
    await autosave.flush()
    expect(saves).toBe(2)
    autosave.changed()
    await autosave.drop()
    await autosave.flush()
    expect(saves).toBe(2)
  })
})

describe('the data folder', () => {
  const home = '/home/ana'
  it.each([
    ['linux', {}, '/home/ana/.local/share/rampfold'],
    ['linux', { XDG_DATA_HOME: '/data' }, '/data/rampfold'],
    ['linux', { XDG_DATA_HOME: 'relative' }, '/home/ana/.local/share/rampfold'],
    ['darwin', { XDG_DATA_HOME: '/data' }, '/home/ana/Library/Application Support/rampfold'],
    ['linux', { RAMPFOLD_DATA: '/mine', XDG_DATA_HOME: '/data' }, '/mine'],
  ])('is where %s keeps it with %j', (platform, env, expected) => {
    expect(defaultDataFolder({ env, platform, home })).toBe(expected)
  })

  it('is under APPDATA on Windows', () => {
    expect(defaultDataFolder({ env: { APPDATA: '/appdata' }, platform: 'win32', home })).toBe('/appdata/rampfold')
  })
})
