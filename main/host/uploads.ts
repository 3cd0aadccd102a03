import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'

/** All uploads together hold at most this much. */
export const largestUploadsTogetherBytes = 2 * largestUploadBytes
/** More files than one import takes are never waiting at once. */
export const mostUploads = 1000
/** An upload that gets no piece for so long is given up. */
export const uploadPatience_ms = 5 * 60_000

export interface UploadedFile {
  readonly fileName: string
  /** On shared memory; shorter than declared while pieces are missing. */
  readonly bytes: Uint8Array
  readonly declaredBytes: number
}

/** Files on their way in, in pieces; nothing of them touches the disk. */
export interface Uploads {
  /** @throws KineticsError `too-large` for a file, or files together, beyond the bounds */
  begin(fileName: string, byteLength: number): string
  /** @throws KineticsError `unknown-upload`, or `too-large` when more arrives than was declared (the upload is then discarded) */
  append(uploadId: string, piece: Uint8Array): number
  discard(uploadId: string): void
  /** Hands the files over and forgets them. @throws KineticsError `unknown-upload`; then none is taken */
  take(uploadIds: readonly string[]): readonly UploadedFile[]
  /** Bytes that are held or promised. */
  readonly heldBytes: number
  close(): void
}

interface Upload {
  readonly fileName: string
  readonly bytes: Uint8Array
  received: number
  timer: NodeJS.Timeout
}

export function createUploads(randomId: () => string): Uploads {
  const uploads = new Map<string, Upload>()
  let heldBytes = 0

  const find = (uploadId: string): Upload => {
    const upload = uploads.get(uploadId)
    if (upload !== undefined) return upload
    throw new KineticsError('unknown-upload', 'This upload is not known (any more). Add the file again.', { uploadId })
  }
  const discard = (uploadId: string): void => {
    const upload = uploads.get(uploadId)
    if (upload === undefined) return
    clearTimeout(upload.timer)
    uploads.delete(uploadId)
    heldBytes -= upload.bytes.byteLength
  }
  const waitFor = (uploadId: string): NodeJS.Timeout => {
    const timer = setTimeout(() => {
      discard(uploadId)
    }, uploadPatience_ms)
    timer.unref()
    return timer
  }

  return {
    begin: (fileName, byteLength) => {
      if (byteLength > largestUploadBytes) {
        throw new KineticsError(
          'too-large',
          `${fileName} is larger than ${largestUploadBytes / 2 ** 20} MiB. Export the run with fewer rows.`,
          {
            fileName,
            byteLength,
          },
        )
      }
      if (heldBytes + byteLength > largestUploadsTogetherBytes || uploads.size >= mostUploads) {
        throw new KineticsError('too-large', `Too much is being added at once, ${fileName} included. Add the files in several goes.`, {
          fileName,
        })
      }
      const uploadId = randomId()
      uploads.set(uploadId, { fileName, bytes: new Uint8Array(new SharedArrayBuffer(byteLength)), received: 0, timer: waitFor(uploadId) })
      heldBytes += byteLength
      return uploadId
    },
    append: (uploadId, piece) => {
      const upload = find(uploadId)
      if (upload.received + piece.byteLength > upload.bytes.byteLength) {
        discard(uploadId)
        throw new KineticsError('too-large', `More of ${upload.fileName} arrived than was announced. Add the file again.`, { uploadId })
      }
      upload.bytes.set(piece, upload.received)
      upload.received += piece.byteLength
      clearTimeout(upload.timer)
      upload.timer = waitFor(uploadId)
      return upload.received
    },
    discard,
    take: (uploadIds) => {
      const found = [...new Set(uploadIds)].map((uploadId) => [uploadId, find(uploadId)] as const)
      return found.map(([uploadId, { fileName, bytes, received }]) => {
        discard(uploadId)
        return { fileName, bytes: bytes.subarray(0, received), declaredBytes: bytes.byteLength }
      })
    },
    get heldBytes() {
      return heldBytes
    },
    close: () => {
      for (const uploadId of uploads.keys()) discard(uploadId)
    },
  }
}
