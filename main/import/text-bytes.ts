/** A text as bytes. In both encodings a byte below 0x80 is the ASCII character and nothing else, so that numbers are read from the bytes. */
export interface TextBytes {
  readonly bytes: Buffer
  readonly encoding: 'utf-8' | 'windows-1252'
}

/** Windows-1252 from 0x80 to 0x9F, where Latin-1 has control characters; the replacement character in its five empty places. */
const windows1252 =
  '\u20ac\ufffd\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\ufffd\u017d\ufffd\ufffd\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\ufffd\u017e\u0178'

/** The text, or from byte `from` up to `to` of it. Node 20's own decoder of Windows-1252 reads 0x80 to 0x9F as control characters. */
export function textOf({ bytes, encoding }: TextBytes, from = 0, to = bytes.length): string {
  if (encoding === 'utf-8') return bytes.toString('utf8', from, to)
  const latin = bytes.toString('latin1', from, to)
  return latin.replace(/[\u0080-\u009f]/g, (character) => windows1252[character.charCodeAt(0) - 0x80] ?? character)
}

/** UTF-16 as UTF-8; an odd byte at the end is no character. */
export function fromUtf16(bytes: Buffer, endian: 'little' | 'big'): TextBytes {
  const whole = bytes.subarray(0, bytes.length & ~1)
  const text = (endian === 'little' ? whole : Buffer.from(whole).swap16()).toString('utf16le')
  return { bytes: Buffer.from(text, 'utf8'), encoding: 'utf-8' }
}
