import { isAscii, isUtf8 } from 'node:buffer'
import type { EncodingWord } from '../../shared-kinetics/contract/import-options.ts'
import type { ImportDecision } from '../../shared-kinetics/series/run.ts'
import type { Refuse } from './import-refusal.ts'
import { binaryRemedy } from './refuse-binary.ts'
import { fromUtf16, type TextBytes, textOf } from './text-bytes.ts'

interface Encoding {
  readonly word: EncodingWord
  /** Bytes of the byte-order mark in front of the text. */
  readonly skip: number
  readonly reason: string
}

/**
 * Tells the encoding. In this order: what was stated, a byte-order mark, the NUL bytes of UTF-16, strict UTF-8, else Windows-1252
 * (of which Latin-1 as instruments write it is a part). The text stays bytes, since numbers are read from those: UTF-16 becomes UTF-8.
 * @throws ImportRefusal for what is no text in any of these
 */
export function decodeText(
  bytes: Uint8Array,
  stated: EncodingWord | undefined,
  refuse: Refuse,
): { readonly text: TextBytes; readonly decision: ImportDecision } {
  const encoding = decideEncoding(bytes, stated, refuse)
  const body = Buffer.from(bytes.buffer, bytes.byteOffset + encoding.skip, bytes.byteLength - encoding.skip)
  if (encoding.word === 'utf-8' && !isUtf8(body)) {
    throw refuse(null, 'The file is not valid UTF-8.', 'State another “encoding”: windows-1252, utf-16le or utf-16be.')
  }
  const text = asBytes(body, encoding.word, refuse)
  if (isBlank(text)) throw refuse(null, 'The file holds nothing but blanks.', 'Export the run again.')
  return { text, decision: { step: 'encoding', value: encoding.word, reason: encoding.reason } }
}

function decideEncoding(bytes: Uint8Array, stated: EncodingWord | undefined, refuse: Refuse): Encoding {
  const mark = byteOrderMark(bytes)
  if (stated !== undefined) return { word: stated, skip: mark?.word === stated ? mark.skip : 0, reason: 'stated' }
  if (mark !== null) return mark
  const wide = wideByNulBytes(bytes)
  if (wide !== null) return wide
  if (bytes.subarray(0, 65_536).includes(0)) {
    throw refuse(null, 'The file is not text: it holds NUL bytes.', binaryRemedy)
  }
  if (isAscii(bytes)) return { word: 'utf-8', skip: 0, reason: 'plain ASCII, the same in every encoding' }
  if (isUtf8(bytes)) return { word: 'utf-8', skip: 0, reason: 'every byte is valid UTF-8' }
  return { word: 'windows-1252', skip: 0, reason: 'not valid UTF-8, one byte a character' }
}

function byteOrderMark(bytes: Uint8Array): Encoding | null {
  const [a, b, c] = bytes
  if (a === 0xef && b === 0xbb && c === 0xbf) return { word: 'utf-8', skip: 3, reason: 'byte-order mark' }
  if (a === 0xff && b === 0xfe) return { word: 'utf-16le', skip: 2, reason: 'byte-order mark' }
  if (a === 0xfe && b === 0xff) return { word: 'utf-16be', skip: 2, reason: 'byte-order mark' }
  return null
}

/** Text of mostly ASCII characters in UTF-16 has a NUL in nearly every second place. */
function wideByNulBytes(bytes: Uint8Array): Encoding | null {
  const length = Math.min(bytes.byteLength & ~1, 8192)
  if (!bytes.subarray(0, length).includes(0)) return null
  let even = 0
  let odd = 0
  for (let i = 0; i < length; i += 2) {
    if (bytes[i] === 0) even++
    if (bytes[i + 1] === 0) odd++
  }
  const pairs = length / 2
  if (pairs < 4) return null
  if (odd > 0.7 * pairs && even === 0) return { word: 'utf-16le', skip: 0, reason: 'a NUL byte after nearly every character' }
  if (even > 0.7 * pairs && odd === 0) return { word: 'utf-16be', skip: 0, reason: 'a NUL byte before nearly every character' }
  return null
}

function asBytes(body: Buffer, word: EncodingWord, refuse: Refuse): TextBytes {
  // Plain ASCII is the same in both, and UTF-8 is the quicker to decode.
  if (word === 'utf-8' || (word === 'windows-1252' && isAscii(body))) return { bytes: body, encoding: 'utf-8' }
  if (word === 'windows-1252') return { bytes: body, encoding: word }
  try {
    return fromUtf16(body, word === 'utf-16le' ? 'little' : 'big')
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ERR_STRING_TOO_LONG') {
      throw refuse(null, 'The file is longer than one text can be.', 'Export it in parts, or with a coarser time step.')
    }
    throw error
  }
}

/** Nothing but blanks and line ends. */
function isBlank(text: TextBytes): boolean {
  const first = text.bytes.find((byte) => byte !== 32 && (byte < 9 || byte > 13))
  return first === undefined || (first >= 0x80 && textOf(text).trim() === '')
}
