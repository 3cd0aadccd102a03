import { safetyCaution } from '../../shared-kinetics/tasks/safety-caution.ts'
import { exitCodes, InputError, UsageError, type CliIo } from './cli-io.ts'

interface Command {
  readonly help: string
  /** It prints calculated values: the caution closes them, unless the call is quiet. */
  readonly givesValues: boolean
  readonly load: () => Promise<(words: readonly string[], io: CliIo) => Promise<number>>
}

/** Commands are loaded when they are called, so that help and mistakes answer at once. */
async function commands(): Promise<Readonly<Record<string, Command>>> {
  const help = await import('./help-texts.ts')
  return {
    inspect: { help: help.inspectHelp, givesValues: false, load: async () => (await import('./commands/inspect.ts')).inspect },
    activation: { help: help.activationHelp, givesValues: true, load: async () => (await import('./commands/activation.ts')).activation },
    'rate-constants': {
      help: help.rateConstantsHelp,
      givesValues: true,
      load: async () => (await import('./commands/rate-constants.ts')).rateConstants,
    },
    open: { help: help.openHelp, givesValues: false, load: async () => (await import('./commands/open.ts')).open },
  }
}

/**
 * Runs one call of the command line. Whatever goes wrong is one plain message on standard error.
 * @returns the exit code, as `exitCodes` names them
 */
export async function run(argv: readonly string[], io: CliIo): Promise<number> {
  try {
    return await runCommand(argv, io)
  } catch (error) {
    if (error instanceof UsageError) {
      io.stderr(`rampfold: ${error.message}\n`)
      return exitCodes.wordsOff
    }
    const message =
      error instanceof InputError
        ? error.message
        : `something went wrong inside the program: ${error instanceof Error ? error.message : String(error)}`
    io.stderr(`rampfold: ${message}\n`)
    return exitCodes.inputUnusable
  }
}

async function runCommand(argv: readonly string[], io: CliIo): Promise<number> {
  const [name, ...words] = argv
  const asked = words.includes('--') ? words.slice(0, words.indexOf('--')) : words
  if (name === '--version' || asked.includes('--version')) {
    io.stdout(`rampfold ${io.version}\n`)
    return exitCodes.done
  }
  const known = await commands()
  const { generalHelp } = await import('./help-texts.ts')
  if (name === '--help' || name === '-h') {
    io.stdout(generalHelp)
    return exitCodes.done
  }
  const names = Object.keys(known).join(', ')
  if (name === undefined) throw new UsageError(`a command is missing; there are: ${names}. rampfold --help tells more.`)
  const command = Object.hasOwn(known, name) ? known[name] : undefined
  if (command === undefined) throw new UsageError(`there is no command ${name}; there are: ${names}. rampfold --help tells more.`)
  if (asked.includes('--help') || asked.includes('-h')) {
    io.stdout(command.help)
    return exitCodes.done
  }
  const code = await (await command.load())(words, io)
  if (command.givesValues && !asked.includes('--quiet')) io.stdout(`${safetyCaution}\n`)
  return code
}
