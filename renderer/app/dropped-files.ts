import { exportsAmong } from '../../shared-kinetics/contract/export-names.ts'

export interface Dropped {
  readonly files: readonly File[]
  /** Folders without an export in them, by name. */
  readonly emptyFolders: readonly string[]
}

/**
 * The files of a drop; a folder stands for the exports in it, as on the command line. Must be called while the drop is being handled:
 * afterwards the browser has emptied it.
 */
export async function droppedFiles(transfer: DataTransfer): Promise<Dropped> {
  const pending = Array.from(transfer.items)
    .filter((item) => item.kind === 'file')
    .map((item) => ({ entry: item.webkitGetAsEntry(), file: item.getAsFile() }))
  const files: File[] = []
  const emptyFolders: string[] = []
  for (const { entry, file } of pending) {
    if (entry !== null && isFolder(entry)) {
      const inside = await exportsIn(entry)
      files.push(...inside)
      if (inside.length === 0) emptyFolders.push(entry.name)
    } else if (file !== null) files.push(file)
  }
  return { files, emptyFolders }
}

async function exportsIn(folder: FileSystemDirectoryEntry): Promise<readonly File[]> {
  const entries = (await allEntries(folder.createReader())).filter(isFile)
  const byName = new Map(entries.map((entry) => [entry.name, entry]))
  const chosen = exportsAmong([...byName.keys()]).flatMap((name) => byName.get(name) ?? [])
  return Promise.all(chosen.map(async (entry) => new Promise<File>((resolve, reject) => entry.file(resolve, reject))))
}

/** A reader hands out a folder in portions and ends with an empty one. */
async function allEntries(reader: FileSystemDirectoryReader): Promise<readonly FileSystemEntry[]> {
  const entries: FileSystemEntry[] = []
  for (;;) {
    const portion = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject))
    if (portion.length === 0) return entries
    entries.push(...portion)
  }
}

const isFile = (entry: FileSystemEntry): entry is FileSystemFileEntry => entry.isFile
const isFolder = (entry: FileSystemEntry): entry is FileSystemDirectoryEntry => entry.isDirectory
