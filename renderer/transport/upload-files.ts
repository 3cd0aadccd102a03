import { largestUploadBytes, uploadChunkBytes, type HostTransport, type RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'

export interface UploadProgress {
  readonly fileName: string
  readonly file: number
  readonly files: number
  readonly sentBytes: number
  readonly totalBytes: number
}

export interface UploadedFiles {
  readonly uploadIds: readonly string[]
  /** Files that were not even sent, with the reason. */
  readonly refused: readonly RefusedFile[]
}

/**
 * Sends files to the host in pieces of 1 MiB, one after the other, so that memory holds one piece at a time.
 * @throws Cancelled when `signal` is raised; what had been sent is then discarded
 */
export async function uploadFiles(
  transport: HostTransport,
  files: readonly File[],
  signal: AbortSignal,
  report: (progress: UploadProgress) => void,
): Promise<UploadedFiles> {
  const refused: RefusedFile[] = []
  const fitting: File[] = []
  for (const file of files) {
    if (file.size <= largestUploadBytes) fitting.push(file)
    else refused.push(tooLarge(file))
  }
  const totalBytes = fitting.reduce((sum, file) => sum + file.size, 0)
  const uploadIds: string[] = []
  let sentBytes = 0
  try {
    for (const [index, file] of fitting.entries()) {
      stopIfRaised(signal)
      const { uploadId } = await transport.call('upload.begin', { fileName: file.name, byteLength: file.size })
      uploadIds.push(uploadId)
      for (let start = 0; start < file.size; start += uploadChunkBytes) {
        stopIfRaised(signal)
        report({ fileName: file.name, file: index + 1, files: fitting.length, sentBytes, totalBytes })
        const bytes = new Uint8Array(await file.slice(start, start + uploadChunkBytes).arrayBuffer())
        await transport.call('upload.append', { uploadId, bytes })
        sentBytes += bytes.byteLength
      }
    }
  } catch (error) {
    await discardUploads(transport, uploadIds)
    throw error
  }
  return { uploadIds, refused }
}

/** Tells the host to forget uploads; one it has forgotten already is as good as discarded. */
export async function discardUploads(transport: HostTransport, uploadIds: readonly string[]): Promise<void> {
  await Promise.allSettled(uploadIds.map(async (uploadId) => transport.call('upload.discard', { uploadId })))
}

function stopIfRaised(signal: AbortSignal): void {
  if (signal.aborted) throw new Cancelled()
}

const tooLarge = (file: File): RefusedFile => ({
  fileName: file.name,
  line: null,
  reason: `The file holds ${Math.round(file.size / 2 ** 20)} MiB; one export may hold ${largestUploadBytes / 2 ** 20} MiB at most.`,
  remedy: 'Export the run again with fewer points or fewer columns.',
})
