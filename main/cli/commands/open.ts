import { KineticsError } from '../../../shared-kinetics/errors.ts'
import { startBrowserShell } from '../../host/start-browser-shell.ts'
import { exitCodes, InputError, type CliIo } from '../cli-io.ts'
import { expandPaths } from '../expand-paths.ts'
import { parseWords } from '../parse-words.ts'

/** `rampfold open`: the browser shell, until it is ended. */
export async function open(words: readonly string[], io: CliIo): Promise<number> {
  const parsed = parseWords('open', words, { 'no-browser': 'flag' })
  const files = parsed.paths.length === 0 ? [] : expandPaths(parsed.paths, /\.rampfold$/i)
  try {
    const shell = await startBrowserShell({
      workerUrl: io.workerUrl,
      rendererUrl: io.rendererUrl,
      version: io.version,
      openBrowser: !parsed.flag('no-browser'),
      files,
      print: (line) => io.stdout(`${line}\n`),
      warn: (line) => io.stderr(`${line}\n`),
    })
    await shell.closed
  } catch (error) {
    throw error instanceof KineticsError ? new InputError(error.message) : error
  }
  return exitCodes.done
}
