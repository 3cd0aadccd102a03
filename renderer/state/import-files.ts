import type { HostTransport, RefusedFile, StudySnapshot } from '../../shared-kinetics/contract/host-api.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import { discardUploads, uploadFiles } from '../transport/upload-files.ts'
import type { ImportWork } from './study-state.ts'

/**
 * Sends files and has the host read them into runs. `snapshot` is null when no file was fit to be sent.
 * @throws Cancelled when `signal` is raised before the host begins to read
 */
export async function importFiles(
  transport: HostTransport,
  files: readonly File[],
  signal: AbortSignal,
  report: (work: ImportWork) => void,
): Promise<{ readonly snapshot: StudySnapshot | null; readonly refused: readonly RefusedFile[] }> {
  const { uploadIds, refused } = await uploadFiles(transport, files, signal, (progress) => {
    report({ phase: 'sending', what: progress.fileName, done: progress.sentBytes, total: progress.totalBytes })
  })
  if (uploadIds.length === 0) return { snapshot: null, refused }
  report({ phase: 'reading', what: '', done: 0, total: uploadIds.length })
  try {
    if (signal.aborted) throw new Cancelled()
    const answer = await transport.call('runs.import', { uploadIds: [...uploadIds] })
    return { snapshot: answer.snapshot, refused: [...refused, ...answer.refused] }
  } catch (error) {
    await discardUploads(transport, uploadIds)
    throw error
  }
}
