import * as fc from 'fast-check'
import iconv from 'iconv-lite'
import { describe, expect, it } from 'vitest'
import { fromUtf16, textOf } from './text-bytes.ts'

// Oracle: the encodings of iconv-lite.
describe('texts as bytes', () => {
  it('reads each byte of Windows-1252 as the character it stands for', () => {
    const bytes = Buffer.from(Uint8Array.from({ length: 256 }, (_, byte) => byte))
    expect(textOf({ bytes, encoding: 'windows-1252' })).toBe(iconv.decode(bytes, 'windows-1252'))
  })

  it('keeps any text that was written in UTF-8, Windows-1252 or UTF-16', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme' }), fc.constantFrom('little' as const, 'big' as const), (text, endian) => {
        expect(textOf({ bytes: Buffer.from(text, 'utf8'), encoding: 'utf-8' })).toBe(text)
        const wide = iconv.encode(text, endian === 'little' ? 'utf-16le' : 'utf-16be', { addBOM: false })
        expect(textOf(fromUtf16(wide, endian))).toBe(text)
        const narrow = iconv.encode(text, 'windows-1252')
        expect(textOf({ bytes: narrow, encoding: 'windows-1252' })).toBe(iconv.decode(narrow, 'windows-1252'))
      }),
      { numRuns: 500, seed: 37 },
    )
  })

  it('takes a piece from byte to byte', () => {
    expect(textOf({ bytes: Buffer.from('°C; m µg', 'utf8'), encoding: 'utf-8' }, 5, 9)).toBe('m µ')
    expect(textOf({ bytes: Buffer.from('\xb0C;\x80', 'latin1'), encoding: 'windows-1252' }, 2)).toBe(';€')
  })

  it('leaves out half a character at the end of UTF-16', () => {
    expect(textOf(fromUtf16(Buffer.from([0x41, 0, 0x42]), 'little'))).toBe('A')
  })
})
