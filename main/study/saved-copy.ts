import { createHash } from 'node:crypto'
import { unzipSync, zipSync, type Zippable } from 'fflate/browser'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { columnsFit, decodeColumns, encodeColumns } from './columns-file.ts'
import { largestStudyJsonBytes, readStudyJson, writeStudyJson } from './read-study-json.ts'

/** What a saved copy may unpack to: a damaged or hostile one must not exhaust the machine. */
const savedCopyLimits = { unpackedBytes: 2 ** 30, entries: 1000, freeBytes: 64 * 2 ** 20, ratio: 200 } as const

/** A study with all it needs: document, measured columns, and the original files as they were added. */
export interface SavedCopy {
  readonly document: StudyDocument
  readonly columns: ReadonlyMap<string, RunColumns>
  /** By SHA-256; a file that was never kept is left out. */
  readonly files: ReadonlyMap<string, Uint8Array>
}

/** The `.rampfold` file of a study: a ZIP of `study.json`, `columns/<key>.bin` and `exports/<sha256>`. */
export function packSavedCopy(copy: SavedCopy): Uint8Array {
  const entries = new Map<string, Uint8Array>([['study.json', new TextEncoder().encode(writeStudyJson(copy.document))]])
  for (const [key, columns] of copy.columns) entries.set(`columns/${key}.bin`, encodeColumns(columns))
  for (const [sum, bytes] of copy.files) entries.set(`exports/${sum}`, new Uint8Array(bytes))
  const packed = zip(entries, 6)
  const unpacked = [...entries.values()].reduce((sum, bytes) => sum + bytes.byteLength, 0)
  // Constant columns can shrink so far that our own limit on reading would take the copy for a trap.
  return unpacked <= mostUnpacked(packed.byteLength) ? packed : zip(entries, 0)
}

/**
 * Reads a `.rampfold` file, trusting nothing in it: names from a fixed pattern, sizes and their ratio bounded, checksums verified.
 * @throws KineticsError `bad-study` with what is wrong; a copy of a newer version is refused with that word
 */
export function openSavedCopy(bytes: Uint8Array): SavedCopy {
  const entries = unzip(bytes)
  const description = entries.get('study.json')
  if (description === undefined) throw damaged('it holds no study.json')
  const document = readStudyJson(description)
  const columns = new Map<string, RunColumns>()
  const files = new Map<string, Uint8Array>()
  for (const run of document.runs) {
    const held = columns.get(run.columnsKey) ?? readColumns(entries, run.columnsKey)
    if (!columnsFit(run, held)) throw damaged(`the columns of ${run.label} are not those its description speaks of`)
    columns.set(run.columnsKey, held)
    const file = entries.get(`exports/${run.file.sha256}`)
    if (file === undefined) continue
    if (sha256(file) !== run.file.sha256) throw damaged(`the original file of ${run.label} is damaged`)
    files.set(run.file.sha256, file)
  }
  return { document, columns, files }
}

function readColumns(entries: ReadonlyMap<string, Uint8Array>, key: string): RunColumns {
  const bytes = entries.get(`columns/${key}.bin`)
  if (bytes === undefined) throw damaged('the columns of a run are missing')
  return decodeColumns(bytes)
}

const entryName = /^(study\.json|columns\/[0-9a-f]{64}\.bin|exports\/[0-9a-f]{64})$/

function unzip(bytes: Uint8Array): ReadonlyMap<string, Uint8Array> {
  const seen = new Set<string>()
  let unpacked = 0
  const allowed = mostUnpacked(bytes.byteLength)
  try {
    const found = unzipSync(bytes, {
      filter: ({ name, originalSize }) => {
        if (!entryName.test(name)) throw damaged('it holds a file that a study does not have')
        if (seen.has(name)) throw damaged('it holds one file twice')
        seen.add(name)
        unpacked += originalSize
        const tooLarge = unpacked > allowed || (name === 'study.json' && originalSize > largestStudyJsonBytes)
        if (tooLarge || seen.size > savedCopyLimits.entries) throw damaged('it would unpack to more than a study may hold')
        return true
      },
    })
    return new Map(Object.entries(found))
  } catch (error) {
    if (error instanceof KineticsError) throw error
    throw damaged('it is not a whole file of this kind')
  }
}

function zip(entries: ReadonlyMap<string, Uint8Array>, level: 0 | 6): Uint8Array {
  // A fixed date: the same study gives the same bytes, and the file does not tell when it was made.
  const options = { level, mtime: '1980-01-01T00:00:00' } as const
  const files: Zippable = {}
  for (const [name, bytes] of entries) files[name] = [bytes, options]
  return zipSync(files)
}

const mostUnpacked = (packedBytes: number): number =>
  Math.min(savedCopyLimits.unpackedBytes, savedCopyLimits.freeBytes + savedCopyLimits.ratio * packedBytes)
const sha256 = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex')
const damaged = (why: string): KineticsError =>
  new KineticsError('bad-study', `The saved study cannot be read: ${why}. Use another copy of it.`)
