import { whyNoWindow, hasDisplay, type WindowQuestion } from './electron-binary.ts'
import type { DesktopEnd } from './run-electron.ts'

/** What starting touches outside itself; tests put their own in place. */
export interface StartSteps {
  readonly question: WindowQuestion
  readonly version: string
  readonly print: (line: string) => void
  readonly warn: (line: string) => void
  findBinary(): string | null
  /** null once the binary is there, else why it is not. */
  fetchBinary(): Promise<string | null>
  runDesktop(binary: string): Promise<DesktopEnd>
  /** Resolves when the browser shell has ended. */
  runBrowser(options: { readonly openBrowser: boolean }): Promise<void>
}

const startHelp = `Starts Rampfold: the desktop window where it can be opened, else the sheet in a browser.

npm start                  the desktop window
npm start -- --browser     the sheet in a browser

--browser    go to the browser at once
--help       this text
--version    the version

Studies are kept in the user's data folder, or in the one that RAMPFOLD_DATA names.`

/**
 * Starts the desktop window if it can be opened, fetching Electron's binary once where it is missing; on any failure the browser
 * shell, and one line says why.
 * @returns the exit code: 2 for words it does not know
 */
export async function startProgram(words: readonly string[], steps: StartSteps): Promise<number> {
  const unknown = words.find((word) => !['--browser', '--help', '--version'].includes(word))
  if (unknown !== undefined) {
    steps.warn(`${unknown} is not a word that npm start knows. See npm start -- --help.`)
    return 2
  }
  if (words.includes('--help')) {
    steps.print(startHelp)
    return 0
  }
  if (words.includes('--version')) {
    steps.print(steps.version)
    return 0
  }
  const openBrowser = hasDisplay(steps.question)
  if (!words.includes('--browser')) {
    const outcome = await tryDesktop(steps)
    if (outcome.kind === 'ended') return outcome.exitCode
    steps.warn(
      `The desktop window cannot be opened: ${withoutStop(outcome.reason)}. ${openBrowser ? 'The sheet opens in a browser instead.' : 'Open the address below in a browser.'}`,
    )
  }
  await steps.runBrowser({ openBrowser })
  return 0
}

async function tryDesktop(steps: StartSteps): Promise<DesktopEnd> {
  const reason = whyNoWindow(steps.question)
  if (reason !== null) return { kind: 'not-started', reason }
  let binary = steps.findBinary()
  if (binary === null) {
    const failure = await steps.fetchBinary()
    if (failure !== null) return { kind: 'not-started', reason: `Electron is missing and could not be fetched (${withoutStop(failure)})` }
    binary = steps.findBinary()
  }
  return binary === null ? { kind: 'not-started', reason: 'Electron is missing' } : steps.runDesktop(binary)
}

const withoutStop = (text: string): string => text.replace(/[.\s]+$/, '')
