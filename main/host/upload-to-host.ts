import { uploadChunkBytes, type HostTransport } from '../../shared-kinetics/contract/host-api.ts'

export interface FileIn {
  readonly fileName: string
  readonly bytes: Uint8Array<ArrayBuffer>
}

/** Hands files over to a host in pieces, as a page does. @returns their upload ids, for `runs.import` */
export async function uploadToHost(host: Pick<HostTransport, 'call'>, files: readonly FileIn[]): Promise<readonly string[]> {
  const uploadIds: string[] = []
  for (const { fileName, bytes } of files) {
    const { uploadId } = await host.call('upload.begin', { fileName, byteLength: bytes.byteLength })
    uploadIds.push(uploadId)
    for (let at = 0; at < bytes.byteLength; at += uploadChunkBytes) {
      await host.call('upload.append', { uploadId, bytes: bytes.subarray(at, at + uploadChunkBytes) })
    }
  }
  return uploadIds
}
