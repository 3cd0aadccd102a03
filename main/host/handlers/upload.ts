import type { HandlerContext, HandlerTable } from './handler-table.ts'

/** Files on their way in, piece by piece. */
export function uploadHandlers({ uploads }: HandlerContext): Pick<HandlerTable, 'upload.begin' | 'upload.append' | 'upload.discard'> {
  return {
    'upload.begin': ({ fileName, byteLength }) => ({ uploadId: uploads.begin(fileName, byteLength) }),
    'upload.append': ({ uploadId, bytes }) => ({ receivedBytes: uploads.append(uploadId, bytes) }),
    'upload.discard': ({ uploadId }) => {
      uploads.discard(uploadId)
      return {}
    },
  }
}
