import { useEffect, useState } from 'react'

/** Whether files hang over the window, and what to do with those that are dropped: anywhere counts. */
export function useFileDrop(onFiles: (files: readonly File[]) => void): boolean {
  const [over, setOver] = useState(false)
  useEffect(() => {
    // Entering a child leaves its parent, so the depth tells when the window itself is left.
    let depth = 0
    const holdsFiles = (event: DragEvent): boolean => event.dataTransfer?.types.includes('Files') === true
    const onEnter = (event: DragEvent): void => {
      if (!holdsFiles(event)) return
      event.preventDefault()
      depth += 1
      setOver(true)
    }
    const onOver = (event: DragEvent): void => {
      if (holdsFiles(event)) event.preventDefault()
    }
    const onLeave = (event: DragEvent): void => {
      if (!holdsFiles(event)) return
      depth = Math.max(0, depth - 1)
      if (depth === 0) setOver(false)
    }
    const onDrop = (event: DragEvent): void => {
      if (!holdsFiles(event)) return
      event.preventDefault()
      depth = 0
      setOver(false)
      const files = Array.from(event.dataTransfer?.files ?? [])
      if (files.length > 0) onFiles(files)
    }
    window.addEventListener('dragenter', onEnter)
    window.addEventListener('dragover', onOver)
    window.addEventListener('dragleave', onLeave)
    window.addEventListener('drop', onDrop)
    return () => {
      window.removeEventListener('dragenter', onEnter)
      window.removeEventListener('dragover', onOver)
      window.removeEventListener('dragleave', onLeave)
      window.removeEventListener('drop', onDrop)
    }
  }, [onFiles])
  return over
}
