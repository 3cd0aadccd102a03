import { useEffect } from 'react'
import type { SheetActions } from '../stages/stage-props.ts'

/** Ctrl or Cmd with O, S, Z, Shift+Z. Copying a table is the table's own affair; a text field keeps its own undo. */
export function useShortcuts(actions: SheetActions): void {
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent): void => {
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return
      const action = actionOf(event, actions)
      if (action === null) return
      event.preventDefault()
      action()
    }
    window.addEventListener('keydown', onKeyDown)
    return () => window.removeEventListener('keydown', onKeyDown)
  }, [actions])
}

function actionOf(event: KeyboardEvent, actions: SheetActions): (() => void) | null {
  const inField = event.target instanceof HTMLInputElement && event.target.type !== 'checkbox'
  switch (event.key.toLowerCase()) {
    case 'o':
      return actions.openFiles
    case 's':
      return actions.saveCopy
    case 'z':
      return inField ? null : event.shiftKey ? actions.redo : actions.undo
    case 'y':
      return inField ? null : actions.redo
    default:
      return null
  }
}
