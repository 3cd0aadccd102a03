import {
  columnOverrideFromWords,
  decimalSignWords,
  delimiterWords,
  encodingWords,
  type ImportOptions,
} from '../../shared-kinetics/contract/import-options.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import { UsageError } from './cli-io.ts'
import { oneOf } from './option-values.ts'
import type { OptionKinds, ParsedWords } from './parse-words.ts'

/** Options that overrule how files are read, by the words that `inspect` prints. */
export const importOptionKinds = {
  encoding: 'value',
  delimiter: 'value',
  'decimal-sign': 'value',
  'heading-line': 'value',
  'first-data-line': 'value',
  exothermic: 'value',
  column: 'values',
} as const satisfies OptionKinds

/** What the words of a call say about the files. @throws UsageError */
export function importOptionsFrom(words: ParsedWords): ImportOptions {
  const choose = <Word extends string>(option: string, known: readonly Word[]): Word | undefined => {
    const text = words.value(option)
    return text === undefined ? undefined : oneOf(`--${option}`, text, known)
  }
  const encoding = choose('encoding', encodingWords)
  const delimiter = choose('delimiter', delimiterWords)
  const decimalSign = choose('decimal-sign', decimalSignWords)
  const exothermic = choose('exothermic', ['up', 'down'] as const)
  const heading = words.value('heading-line')
  const headingLine = heading === undefined || heading === 'none' ? heading : lineNumber('--heading-line', heading)
  const firstData = words.value('first-data-line')
  const columns = words.values('column').map(columnOverride)
  return {
    ...(encoding === undefined ? {} : { encoding }),
    ...(delimiter === undefined ? {} : { delimiter }),
    ...(decimalSign === undefined ? {} : { decimalSign }),
    ...(exothermic === undefined ? {} : { exothermic }),
    ...(headingLine === undefined ? {} : { headingLine }),
    ...(firstData === undefined ? {} : { firstDataLine: lineNumber('--first-data-line', firstData) }),
    ...(columns.length === 0 ? {} : { columns }),
  }
}

function lineNumber(option: string, text: string): number {
  if (!/^[1-9]\d{0,8}$/.test(text)) throw new UsageError(`${option}: write the number of a line, counted from 1.`)
  return Number(text)
}

function columnOverride(text: string): ReturnType<typeof columnOverrideFromWords> {
  try {
    return columnOverrideFromWords(text)
  } catch (error) {
    throw error instanceof KineticsError ? new UsageError(`--column: ${error.message}`) : error
  }
}
