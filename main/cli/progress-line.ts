import type { CliIo } from './cli-io.ts'

/** One line on standard error that tells how far long work is; nothing at all where nobody watches. */
export interface ProgressLine {
  show(text: string): void
  clear(): void
}

export function createProgressLine(io: CliIo, quiet: boolean): ProgressLine {
  let shown = false
  const watched = io.stderrIsTerminal && !quiet
  return {
    show: (text) => {
      if (!watched) return
      shown = true
      io.stderr(`\r\u001b[K${text}`)
    },
    clear: () => {
      if (shown) io.stderr('\r\u001b[K')
      shown = false
    },
  }
}
