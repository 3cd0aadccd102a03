import type { HostTransport, RateConstantsRead } from '../../shared-kinetics/contract/host-api.ts'
import type { RateConstantReadOptions } from '../../shared-kinetics/contract/rate-constant-schema.ts'
import { uploadFiles } from '../transport/upload-files.ts'

/** Where a table of rate constants may come from before it is part of the study. */
export type TableOrigin = { readonly kind: 'text'; readonly text: string } | { readonly kind: 'file'; readonly file: File }

/** A table that was pasted, typed as text or dropped, as it would be read: nothing of it is in the study until somebody takes it. */
export interface TableOffer {
  readonly origin: TableOrigin
  readonly options: RateConstantReadOptions
  /** null while it is being read, and for a text that holds nothing. */
  readonly read: RateConstantsRead | null
}

/** Has the host read a table; null for a blank text. */
export async function readTable(
  transport: HostTransport,
  origin: TableOrigin,
  options: RateConstantReadOptions,
): Promise<RateConstantsRead | null> {
  if (origin.kind === 'text') {
    if (origin.text.trim() === '') return null
    return transport.call('rate-constants.read-text', { text: origin.text, source: 'pasted', options })
  }
  const { uploadIds, refused } = await uploadFiles(transport, [origin.file], new AbortController().signal, () => undefined)
  const [uploadId] = uploadIds
  const [why] = refused
  if (uploadId !== undefined) return transport.call('rate-constants.read-file', { uploadId, options })
  return why === undefined ? null : { kind: 'refused', refused: why, ask: null }
}

/** Whether a table was read, or would be once a person states what it does not say. */
export const isTable = (read: RateConstantsRead | null): boolean => read !== null && (read.kind === 'table' || read.ask !== null)
