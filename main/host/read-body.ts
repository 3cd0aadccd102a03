import type { IncomingMessage } from 'node:http'
import { KineticsError } from '../../shared-kinetics/errors.ts'

/**
 * The body of a request, read as it arrives.
 * @throws KineticsError `too-large` as soon as it is seen to pass the limit; the rest is not read
 */
export async function readBody(request: IncomingMessage, limitBytes: number): Promise<Uint8Array> {
  const tooLarge = (): KineticsError => new KineticsError('too-large', `A request holds at most ${limitBytes} bytes.`, { limitBytes })
  if (Number(request.headers['content-length'] ?? 0) > limitBytes) throw tooLarge()
  const pieces: Buffer[] = []
  let length = 0
  for await (const piece of request as AsyncIterable<Buffer>) {
    length += piece.byteLength
    if (length > limitBytes) throw tooLarge()
    pieces.push(piece)
  }
  return Buffer.concat(pieces)
}
