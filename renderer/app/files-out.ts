import type { FileOut } from '../../shared-kinetics/contract/host-api.ts'

/** Hands a file to the person: the browser's or the desktop window's own way of saving. */
export function download(file: FileOut): void {
  const url = URL.createObjectURL(new Blob([file.bytes as Uint8Array<ArrayBuffer>], { type: file.mediaType }))
  const link = document.createElement('a')
  link.href = url
  link.download = file.fileName
  document.body.append(link)
  link.click()
  link.remove()
  // The window needs the address until it has begun to save; a minute is plenty, and the memory is given back.
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}

/**
 * Puts text on the clipboard. Windows that refuse the asynchronous way (no permission, no focus) are given it by a copy command.
 * @throws Error when neither way is allowed
 */
export async function copyToClipboard(text: string): Promise<void> {
  try {
    await navigator.clipboard.writeText(text)
  } catch {
    if (!copyByCommand(text)) throw new Error('This window may not write to the clipboard. Focus the table and press Ctrl+C instead.')
  }
}

function copyByCommand(text: string): boolean {
  let done = false
  const fill = (event: ClipboardEvent): void => {
    event.clipboardData?.setData('text/plain', text)
    event.preventDefault()
    event.stopImmediatePropagation()
    done = true
  }
  document.addEventListener('copy', fill, { capture: true, once: true })
  // oxlint-disable-next-line typescript/no-deprecated -- the only way left where the permission is refused
  document.execCommand('copy')
  document.removeEventListener('copy', fill, { capture: true })
  return done
}
