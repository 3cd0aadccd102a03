import { describe, expect, it } from 'vitest'
import { droppedFiles } from './dropped-files.ts'

const file = (name: string): File => new File(['x'], name)
const fileEntry = (name: string): FileSystemEntry =>
  ({ isFile: true, isDirectory: false, name, file: (take: (one: File) => void) => take(file(name)) }) as unknown as FileSystemEntry

/** A folder whose reader hands out two entries at a time, as browsers do with a hundred. */
function folder(name: string, children: readonly FileSystemEntry[]): FileSystemEntry {
  const createReader = () => {
    let at = 0
    return {
      readEntries: (take: (entries: readonly FileSystemEntry[]) => void) => {
        take(children.slice(at, (at += 2)))
      },
    }
  }
  return { isFile: false, isDirectory: true, name, createReader } as unknown as FileSystemEntry
}

const transfer = (items: readonly (FileSystemEntry | File)[]): DataTransfer =>
  ({
    items: items.map((item) => ({
      kind: 'file',
      webkitGetAsEntry: () => (item instanceof File ? null : item),
      getAsFile: () => (item instanceof File ? item : null),
    })),
  }) as unknown as DataTransfer

const namesOf = async (items: readonly (FileSystemEntry | File)[]): Promise<readonly string[]> =>
  (await droppedFiles(transfer(items))).files.map((one) => one.name)

describe('dropped files', () => {
  it('are taken as they are', async () => {
    expect(await namesOf([file('b.csv'), file('a.csv')])).toEqual(['b.csv', 'a.csv'])
  })

  it('of a folder are the exports in it, in the order a person counts; its sub-folders are other series', async () => {
    const inner = folder('inner', [fileEntry('c.csv')])
    const dropped = folder('series', [fileEntry('run 10.csv'), fileEntry('run 2.csv'), fileEntry('run 1.csv'), inner])
    expect(await namesOf([dropped])).toEqual(['run 1.csv', 'run 2.csv', 'run 10.csv'])
  })

  it('leave out what lies in a folder without being a measurement, and name a folder that holds nothing else', async () => {
    const mixed = folder('mixed', [
      fileEntry('README.txt'),
      fileEntry('.hidden.csv'),
      fileEntry('LICENSE-of-source.txt'),
      fileEntry('a.csv'),
    ])
    const empty = folder('empty', [fileEntry('notes.pdf')])
    const dropped = await droppedFiles(transfer([mixed, empty]))
    expect(dropped.files.map((one) => one.name)).toEqual(['a.csv'])
    expect(dropped.emptyFolders).toEqual(['empty'])
  })
})
