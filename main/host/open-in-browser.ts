/** Asks the system to open an address in its browser. It is printed as well, so a system that cannot is no failure. */
export async function openInBrowser(address: string): Promise<void> {
  const [command, words] = commandFor(process.platform, address)
  const { spawn } = await import('node:child_process')
  const child = spawn(command, words, { stdio: 'ignore', detached: true })
  child.on('error', () => undefined)
  child.unref()
}

/** No shell in between, so that nothing in an address can be taken for a command. */
export function commandFor(platform: string, address: string): readonly [string, string[]] {
  if (platform === 'win32') return ['rundll32.exe', ['url.dll,FileProtocolHandler', address]]
  return [platform === 'darwin' ? 'open' : 'xdg-open', [address]]
}
