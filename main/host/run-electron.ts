import { spawn } from 'node:child_process'
import { endingSignals } from './ending-signals.ts'

/** A desktop shell that ends within this time with an error has not been able to start. */
const startUp_ms = 10_000

export type DesktopEnd =
  | { readonly kind: 'ended'; readonly exitCode: number }
  /** The window never came: a library is missing, the sandbox is not allowed, the display refuses. */
  | { readonly kind: 'not-started'; readonly reason: string }

/** Runs the desktop shell and waits for its end. What it says while it starts is kept back until it is seen to be up. */
export async function runElectron(binary: string, appFolder: string): Promise<DesktopEnd> {
  const { ELECTRON_RUN_AS_NODE: _unwanted, ...env } = process.env
  const child = spawn(binary, [appFolder], { env, stdio: ['ignore', 'inherit', 'pipe'] })
  const started = performance.now()
  let said = ''
  let up = false
  child.stderr.on('data', (text: Buffer) => {
    if (up) process.stderr.write(text)
    else said = (said + text.toString()).slice(-8000)
  })
  const upTimer = setTimeout(() => {
    up = true
    process.stderr.write(said)
  }, startUp_ms)
  upTimer.unref()
  const pass = (signal: NodeJS.Signals): void => {
    child.kill(signal)
  }
  for (const signal of endingSignals) process.on(signal, pass)
  return new Promise((resolve) => {
    const end = (how: DesktopEnd): void => {
      clearTimeout(upTimer)
      for (const signal of endingSignals) process.off(signal, pass)
      resolve(how)
    }
    child.on('error', (error) => {
      end({ kind: 'not-started', reason: error.message })
    })
    child.on('exit', (code, signal) => {
      const failed = code !== 0 && !(signal !== null && endingSignals.includes(signal))
      if (failed && performance.now() - started < startUp_ms)
        end({ kind: 'not-started', reason: lastLine(said) ?? `it ended with ${code ?? signal ?? 'an error'}` })
      else end({ kind: 'ended', exitCode: code ?? 0 })
    })
  })
}

const lastLine = (text: string): string | null => text.trim().split('\n').at(-1)?.trim().slice(0, 200) || null
