import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { unzipSync } from 'fflate/browser'
import { afterAll, describe, expect, it } from 'vitest'
import { defaultUncertainty } from '../../shared-kinetics/contract/study-document.ts'
import type { StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { demoSeries } from '../demo/demo-series.ts'
import { createHost, type Host } from '../host/create-host.ts'
import { createInProcessPool } from '../host/in-process-pool.ts'
import { createTaskTable } from '../host/task-table.ts'
import { uploadToHost } from '../host/upload-to-host.ts'

const kept = join(import.meta.dirname, '../../e2e/studies')
const copyPath = join(kept, 'before-uncertainty.rampfold')
const folders: string[] = []
afterAll(async () => {
  for (const folder of folders) await rm(folder, { recursive: true, force: true })
})

const hostOn = (dataFolder: string | null): Host =>
  createHost({ dataFolder, pool: createInProcessPool(createTaskTable()), version: '0.1.0', shell: 'browser' })

const evaluated = async (host: Host): Promise<StudyResult> => {
  const { revision } = await host.call('study.read', {})
  return (await host.call('study.evaluate', { revision })).result
}

/** What the same exports give when they are read today. */
async function readToday(): Promise<StudyResult> {
  const host = hostOn(null)
  const uploadIds = await uploadToHost(host, demoSeries().files.slice(0, 3))
  await host.call('runs.import', { uploadIds: [...uploadIds] })
  const result = await evaluated(host)
  await host.close()
  return result
}

/** A data folder as the earlier version left it: the study's own folder with its description and its columns. */
async function folderOfThen(): Promise<{ readonly folder: string; readonly studyId: string }> {
  const folder = await mkdtemp(join(tmpdir(), 'earlier-'))
  folders.push(folder)
  const description = await readFile(join(kept, 'before-uncertainty.study.json'))
  const { id } = JSON.parse(description.toString()) as { readonly id: string }
  const study = join(folder, 'studies', id)
  await mkdir(join(study, 'columns'), { recursive: true })
  await mkdir(join(study, 'exports'))
  await writeFile(join(study, 'study.json'), description)
  for (const [name, bytes] of Object.entries(unzipSync(await readFile(copyPath)))) {
    if (name !== 'study.json') await writeFile(join(study, name), bytes)
  }
  return { folder, studyId: id }
}

async function expectWhole(host: Host): Promise<void> {
  const { document } = await host.call('study.read', {})
  expect(document.name).toBe('Study of the earlier version')
  expect(document.runs).toHaveLength(3)
  expect(document.uncertainty).toEqual(defaultUncertainty)
  expect(document.rateConstants).toBeNull()
  const [then, today] = [await evaluated(host), await readToday()]
  expect(then.profiles.map((profile) => profile.method)).toEqual(today.profiles.map((profile) => profile.method))
  expect(then.profiles.length).toBeGreaterThan(3)
  expect(then.profiles.map((profile) => profile.Ea_kJ_per_mol)).toEqual(today.profiles.map((profile) => profile.Ea_kJ_per_mol))
  expect(then.profiles.every((profile) => profile.Ea_kJ_per_mol.every((Ea) => Ea !== null && Ea > 0))).toBe(true)
  await host.close()
}

describe('a study saved before studies held measured uncertainties and rate constants', () => {
  it('does not speak of them', async () => {
    const description = await readFile(join(kept, 'before-uncertainty.study.json'), 'utf8')
    expect(description).not.toMatch(/uncertainty|rateConstants/i)
  })

  it('opens from its saved copy, takes what is assumed of every instrument, and is worked out as its exports are today', async () => {
    const host = hostOn(null)
    const uploadIds = await uploadToHost(host, [{ fileName: 'before-uncertainty.rampfold', bytes: await readFile(copyPath) }])
    const { openedStudy, refused } = await host.call('runs.import', { uploadIds: [...uploadIds] })
    expect(refused).toEqual([])
    expect(openedStudy).toBe(true)
    await expectWhole(host)
  })

  it('opens from the data folder as well', async () => {
    const { folder, studyId } = await folderOfThen()
    const host = hostOn(folder)
    const { document } = await host.call('study.open-recent', { studyId })
    expect(document.id).toBe(studyId)
    await expectWhole(host)
  })
})
