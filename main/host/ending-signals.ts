/** Signals that end the program after the last save: Ctrl+C, a kind request, a terminal that is closed; Ctrl+Break on Windows. */
export const endingSignals: readonly NodeJS.Signals[] =
  process.platform === 'win32' ? ['SIGINT', 'SIGTERM', 'SIGHUP', 'SIGBREAK'] : ['SIGINT', 'SIGTERM', 'SIGHUP']
