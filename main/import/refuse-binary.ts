import type { Refuse } from './import-refusal.ts'

const asText = 'Save the table as text there: CSV with one row of headings, and open that file.'

/** First bytes of kinds of files that people drop here and that are no text. */
const signatures: readonly { readonly bytes: readonly number[]; readonly what: string; readonly remedy: string }[] = [
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    what: 'a spreadsheet (.xlsx, .ods) or a ZIP archive',
    remedy: `Open it in its own program. ${asText}`,
  },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0],
    what: 'a spreadsheet or document of the old binary kind (.xls, .doc)',
    remedy: `Open it in its own program. ${asText}`,
  },
  { bytes: [0x89, 0x50, 0x4e, 0x47], what: 'a picture (PNG)', remedy: 'Export the numbers of the curve, not its picture.' },
  { bytes: [0xff, 0xd8, 0xff], what: 'a picture (JPEG)', remedy: 'Export the numbers of the curve, not its picture.' },
  { bytes: [0x47, 0x49, 0x46, 0x38], what: 'a picture (GIF)', remedy: 'Export the numbers of the curve, not its picture.' },
  { bytes: [0x25, 0x50, 0x44, 0x46], what: 'a PDF document', remedy: 'Export the numbers from the program that measured them, as text.' },
  { bytes: [0x1f, 0x8b], what: 'a compressed file (gzip)', remedy: 'Unpack it and open the text file inside.' },
  { bytes: [0x37, 0x7a, 0xbc, 0xaf], what: 'a compressed archive (7z)', remedy: 'Unpack it and open the text files inside.' },
  { bytes: [0x52, 0x61, 0x72, 0x21], what: 'a compressed archive (RAR)', remedy: 'Unpack it and open the text files inside.' },
  { bytes: [0x7b, 0x5c, 0x72, 0x74, 0x66], what: 'a word-processor document (RTF)', remedy: asText },
]

export const binaryRemedy = 'Export the run as text (CSV, TXT) from the program that measured it, and open that file.'

/** Throws a refusal for an empty file and for one whose first bytes say that it is no text. */
export function refuseBinary(bytes: Uint8Array, refuse: Refuse): void {
  if (bytes.byteLength === 0) throw refuse(null, 'The file is empty.', 'Export the run again.')
  for (const { bytes: start, what, remedy } of signatures) {
    if (start.every((byte, i) => bytes[i] === byte)) throw refuse(null, `The file is not text but ${what}.`, remedy)
  }
}
