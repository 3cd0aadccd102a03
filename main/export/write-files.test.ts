import { chmod, mkdir, mkdtemp, readdir, readFile, rm, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { WriteRefusal, writeFiles } from './write-files.ts'

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'write-files-'))
})
afterEach(async () => {
  await chmod(folder, 0o700)
  await rm(folder, { recursive: true, force: true })
})

const fileOf = (fileName: string, text: string) => ({ fileName, mediaType: 'text/plain', bytes: new TextEncoder().encode(text) })

describe('writing results', () => {
  it('makes the folder, replaces files of its own names and leaves others alone', async () => {
    const out = join(folder, 'a', 'b')
    await writeFiles(out, [fileOf('one.txt', 'first')])
    await writeFile(join(out, 'mine.txt'), 'keep')
    const leftover = join(out, '.one.txt.0123456789ab.part')
    await writeFile(leftover, 'half')
    await utimes(leftover, 0, 0)
    await writeFiles(out, [fileOf('one.txt', 'second'), fileOf('two.txt', 'new')])
    expect((await readdir(out)).sort()).toEqual(['mine.txt', 'one.txt', 'two.txt'])
    expect(await readFile(join(out, 'one.txt'), 'utf8')).toBe('second')
    expect(await readFile(join(out, 'mine.txt'), 'utf8')).toBe('keep')
  })

  it('replaces nothing and leaves nothing behind when one file cannot be written', async () => {
    await writeFile(join(folder, 'one.txt'), 'old')
    await mkdir(join(folder, 'two.txt'))
    await expect(writeFiles(folder, [fileOf('one.txt', 'new'), fileOf('two.txt', 'new')])).rejects.toThrow(
      /two\.txt cannot be written: a folder has that name/,
    )
    expect((await readdir(folder)).sort()).toEqual(['one.txt', 'two.txt'])
    expect(await readFile(join(folder, 'one.txt'), 'utf8')).toBe('old')
  })

  it('takes a folder it made away again when it fails', async () => {
    const long = 'x'.repeat(300)
    await expect(writeFiles(join(folder, 'new', 'deep'), [fileOf(long, 'text')])).rejects.toThrow(WriteRefusal)
    expect(await readdir(folder)).toEqual([])
  })

  it('says in words why a path cannot be written', async () => {
    await writeFile(join(folder, 'file'), '')
    await expect(writeFiles(join(folder, 'file'), [fileOf('a', '')])).rejects.toThrow(/a file has that name/)
    await expect(writeFiles(join(folder, 'file', 'deeper'), [fileOf('a', '')])).rejects.toThrow(/a part of the path is a file/)
  })
})
