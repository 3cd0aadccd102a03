import * as z from 'zod/mini'
import { parseStudyDocument, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'

/** Largest study.json that is read; 200 runs with full notes stay far below it. */
export const largestStudyJsonBytes = 64 * 2 ** 20

/**
 * A study document from the bytes of a study.json.
 * @throws KineticsError `bad-study` for bytes that are no study, and, with other words, for a study of a later format
 */
export function readStudyJson(bytes: Uint8Array): StudyDocument {
  if (bytes.byteLength > largestStudyJsonBytes) throw damaged('its description is too large')
  let value: unknown
  try {
    value = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch {
    throw damaged('its description is not JSON')
  }
  checkFormat(value)
  try {
    return parseStudyDocument(value)
  } catch (error) {
    throw damaged(error instanceof z.core.$ZodError ? `the field ${fieldOf(error)} is not as it should be` : 'its description is damaged')
  }
}

export const writeStudyJson = (document: StudyDocument): string => `${JSON.stringify(document, null, 1)}\n`

function checkFormat(value: unknown): void {
  const format = typeof value === 'object' && value !== null && 'format' in value ? value.format : undefined
  const version = typeof format === 'string' ? /^rampfold\.study\/(\d{1,6})$/.exec(format)?.[1] : undefined
  if (version === undefined) throw damaged('it does not say that it is a study')
  if (Number(version) > 1) {
    throw new KineticsError(
      'bad-study',
      'This study was saved by a newer version of Rampfold and cannot be read by this one. Open it with the newer version.',
      { format: String(format) },
    )
  }
}

const fieldOf = (error: z.core.$ZodError): string => error.issues[0]?.path.map(String).join('.') || '(the whole)'
const damaged = (why: string): KineticsError => new KineticsError('bad-study', `The study cannot be read: ${why}.`)
