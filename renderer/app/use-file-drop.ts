import { useEffect, useState } from 'react'
import { droppedFiles, type Dropped } from './dropped-files.ts'

/** Whether files hang over the window, and what to do with those that are dropped: anywhere counts, and a folder stands for its files. */
export function useFileDrop(onDropped: (dropped: Dropped) => void): boolean {
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
      if (event.dataTransfer !== null) void droppedFiles(event.dataTransfer).then(onDropped)
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
  }, [onDropped])
  return over
}
