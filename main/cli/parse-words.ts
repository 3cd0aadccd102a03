import { parseArgs } from 'node:util'
import { UsageError } from './cli-io.ts'

/** Options of a command: `value` takes one value, `values` may be given several times, `flag` stands alone. */
export type OptionKinds = Readonly<Record<string, 'value' | 'values' | 'flag'>>

export interface ParsedWords {
  readonly paths: readonly string[]
  /** undefined where the option was not given. */
  value(name: string): string | undefined
  values(name: string): readonly string[]
  flag(name: string): boolean
}

/**
 * Takes the words of a call apart.
 * @throws UsageError for an option that is not known, lacks its value, has one too many, or is given twice
 */
export function parseWords(command: string, words: readonly string[], kinds: OptionKinds): ParsedWords {
  const options = Object.fromEntries(
    Object.entries(kinds).map(([name, kind]) => [name, { type: kind === 'flag' ? 'boolean' : 'string', multiple: true } as const]),
  )
  const { values, positionals } = parsed(command, words, options)
  for (const [name, given] of Object.entries(values)) {
    if (kinds[name] === 'value' && Array.isArray(given) && given.length > 1) throw new UsageError(`--${name} is given more than once.`)
  }
  const list = (name: string): readonly string[] => (values[name] ?? []).filter((value) => typeof value === 'string')
  return {
    paths: positionals,
    value: (name) => list(name)[0],
    values: list,
    flag: (name) => values[name] !== undefined,
  }
}

type Parsed = {
  readonly values: Readonly<Record<string, readonly (string | boolean)[] | undefined>>
  readonly positionals: readonly string[]
}

function parsed(
  command: string,
  words: readonly string[],
  options: Readonly<Record<string, { type: 'boolean' | 'string'; multiple: true }>>,
): Parsed {
  try {
    const { values, positionals } = parseArgs({ args: [...words], options, allowPositionals: true, strict: true })
    return { values: values, positionals }
  } catch (error) {
    throw new UsageError(plainReason(command, error, options))
  }
}

function plainReason(command: string, error: unknown, options: Readonly<Record<string, unknown>>): string {
  const message = error instanceof Error ? error.message : String(error)
  const code = error instanceof Error && 'code' in error ? error.code : ''
  const name = /'(-[^'\s]+)/.exec(message)?.[1] ?? ''
  if (code === 'ERR_PARSE_ARGS_UNKNOWN_OPTION') {
    const known = Object.keys(options)
      .map((option) => `--${option}`)
      .join(', ')
    return `${command} has no option ${name}. It has ${known}.`
  }
  if (code === 'ERR_PARSE_ARGS_INVALID_OPTION_VALUE') {
    if (message.includes('does not take')) return `${name} takes no value.`
    if (message.includes('ambiguous')) return `A value that begins with "-" follows its option after an equals sign: ${name}=VALUE.`
    return `${name} needs a value.`
  }
  return message
}
