import * as z from 'zod/mini'
import { KineticsError } from '../errors.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'

/** The words by which the importer's decisions are printed, and by which each can be overruled. */
export const encodingWords = ['utf-8', 'utf-16le', 'utf-16be', 'windows-1252'] as const
export type EncodingWord = (typeof encodingWords)[number]
export const delimiterWords = ['comma', 'semicolon', 'tab', 'pipe', 'blanks'] as const
export type DelimiterWord = (typeof delimiterWords)[number]
export const decimalSignWords = ['point', 'comma'] as const
export type DecimalSignWord = (typeof decimalSignWords)[number]
export type ColumnQuantity = 'time' | 'temperature' | SignalQuantity | 'set-aside'
const columnQuantityWords: readonly ColumnQuantity[] = [
  'time',
  'temperature',
  'mass',
  'conversion',
  'heat-release',
  'heat-flow',
  'set-aside',
]

const lineNumber = z.int().check(z.positive())
const shortText = z.string().check(z.minLength(1), z.maxLength(200))

const columnOverrideSchema = z.strictObject({
  /** Number of the column, counted from 1, or its heading as the file has it. */
  column: z.union([z.int().check(z.positive()), shortText]),
  quantity: z.optional(z.enum(columnQuantityWords)),
  /** Unit as a file would write it: `mg`, `°C`, `W/g`, `%`. */
  unit: z.optional(shortText),
})
export type ColumnOverride = z.infer<typeof columnOverrideSchema>

/** What a person says about a file; whatever is left out the importer decides and explains. */
export const importOptionsSchema = z.strictObject({
  encoding: z.optional(z.enum(encodingWords)),
  delimiter: z.optional(z.enum(delimiterWords)),
  decimalSign: z.optional(z.enum(decimalSignWords)),
  /** Line of the column names, counted from 1; `none` where the file has no names. */
  headingLine: z.optional(z.union([lineNumber, z.literal('none')])),
  /** Line of the first row of numbers, counted from 1. */
  firstDataLine: z.optional(lineNumber),
  exothermic: z.optional(z.enum(['up', 'down'])),
  columns: z.optional(z.array(columnOverrideSchema).check(z.maxLength(1000))),
})
export type ImportOptions = z.infer<typeof importOptionsSchema>

/**
 * One column in words: `3=mass:mg`, `HRR (W/g)=heat-release`, `2=:K`, `4=set-aside`. What stands before the last `=` is the
 * number or the heading of the column.
 * @throws KineticsError `bad-option`
 */
export function columnOverrideFromWords(words: string): ColumnOverride {
  const equals = words.lastIndexOf('=')
  const colon = words.indexOf(':', equals)
  const column = words.slice(0, Math.max(equals, 0)).trim()
  const quantity = words.slice(equals + 1, colon < 0 ? undefined : colon).trim()
  const unit = colon < 0 ? '' : words.slice(colon + 1).trim()
  const parsed = columnOverrideSchema.safeParse({
    column: /^\d+$/.test(column) ? Number(column) : column,
    ...(quantity === '' ? {} : { quantity }),
    ...(unit === '' ? {} : { unit }),
  })
  if (equals > 0 && parsed.success && (quantity !== '' || unit !== '')) return parsed.data
  throw new KineticsError(
    'bad-option',
    `"${words}" does not describe a column. Write its number or heading, "=", its quantity (${columnQuantityWords.join(', ')}) and, ` +
      'after ":", its unit: 3=mass:mg or 2=:K.',
    { option: 'column', value: words },
  )
}
