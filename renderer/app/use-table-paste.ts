import { useEffect } from 'react'

/** Text that is pasted anywhere but into a field; two numbers in it at least, else it is no table of anything. */
export function useTablePaste(isWanted: boolean, onText: (text: string) => void): void {
  useEffect(() => {
    if (!isWanted) return
    const onPaste = (event: ClipboardEvent): void => {
      const { target } = event
      if (target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement) return
      const text = event.clipboardData?.getData('text/plain') ?? ''
      if (!/\d[\s\S]*[\s;,|][\s\S]*\d/.test(text)) return
      event.preventDefault()
      onText(text)
    }
    window.addEventListener('paste', onPaste)
    return () => window.removeEventListener('paste', onPaste)
  }, [isWanted, onText])
}
