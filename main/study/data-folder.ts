import { homedir } from 'node:os'
import { join } from 'node:path'

export interface DataFolderQuestion {
  readonly env: Readonly<Record<string, string | undefined>>
  readonly platform: string
  readonly home: string
}

/** Where the user's studies live: RAMPFOLD_DATA, else the place this system keeps a program's data in. */
export function defaultDataFolder(
  { env, platform, home }: DataFolderQuestion = { env: process.env, platform: process.platform, home: homedir() },
): string {
  const named = env['RAMPFOLD_DATA']
  if (named !== undefined && named !== '') return named
  if (platform === 'win32') return join(env['APPDATA'] ?? join(home, 'AppData', 'Roaming'), 'rampfold')
  if (platform === 'darwin') return join(home, 'Library', 'Application Support', 'rampfold')
  const data = env['XDG_DATA_HOME']
  return join(data !== undefined && data.startsWith('/') ? data : join(home, '.local', 'share'), 'rampfold')
}
