/** Time between a change and its save; a run of changes is saved once. */
const autosaveDelay_ms = 1000
/** Yet while changes keep coming a save is never put off for longer than this. */
const autosaveLongest_ms = 5000

/** Saves the study a moment after each change. Saves never overlap. */
export interface Autosave {
  changed(): void
  /** Saves now what is not saved yet, and resolves when it is on the disk or the failure has been told. */
  flush(): Promise<void>
  /** Ends the waiting; what is not saved yet stays unsaved. */
  drop(): Promise<void>
}

export function createAutosave(save: () => Promise<void>, failed: (error: unknown) => void): Autosave {
  let timer: NodeJS.Timeout | null = null
  let unsavedSince: number | null = null
  let saving = Promise.resolve()

  const stopTimer = (): void => {
    if (timer !== null) clearTimeout(timer)
    timer = null
  }
  const saveNow = (): void => {
    stopTimer()
    unsavedSince = null
    saving = saving.then(save).catch((error: unknown) => {
      // Still unsaved: the next change or the end of the program tries again.
      unsavedSince ??= performance.now()
      failed(error)
    })
  }
  return {
    changed: () => {
      const now = performance.now()
      unsavedSince ??= now
      stopTimer()
      timer = setTimeout(saveNow, Math.max(0, Math.min(autosaveDelay_ms, unsavedSince + autosaveLongest_ms - now)))
      timer.unref()
    },
    flush: async () => {
      if (unsavedSince !== null) saveNow()
      await saving
    },
    drop: async () => {
      stopTimer()
      unsavedSince = null
      await saving
    },
  }
}
