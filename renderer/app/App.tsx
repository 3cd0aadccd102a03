import { useCallback, useEffect, useMemo, useState } from 'react'
import { Button } from 'react-aria-components'
import { exportSuffixWords } from '../../shared-kinetics/contract/export-names.ts'
import { ColoursContext, useServices, useStudy, useView } from '../state/services.ts'
import type { Dropped } from './dropped-files.ts'
import { createSheetActions } from './sheet-actions.ts'
import { Sheet } from './Sheet.tsx'
import { storeTheme, usePaper } from './theme.ts'
import { useFileDrop } from './use-file-drop.ts'
import { useTablePaste } from './use-table-paste.ts'
import { useShortcuts } from './use-shortcuts.ts'

/** The whole window. */
export function App() {
  const services = useServices()
  const { session, view } = services
  const [fileInput, setFileInput] = useState<HTMLInputElement | null>(null)
  const theme = useView((state) => state.theme)
  const connection = useStudy((state) => state.connection)
  const replica = useStudy((state) => state.replica)
  const { paper, colours } = usePaper(theme)
  const importFiles = useCallback(
    (files: readonly File[]) => {
      void session.importFiles(files).then(() => session.store.getState().offer !== null && view.setState({ stage: 'runs' }))
    },
    [session, view],
  )
  const actions = useMemo(() => createSheetActions(services, () => fileInput?.click()), [services, fileInput])
  const takeDrop = useCallback(
    ({ files, emptyFolders }: Dropped) => {
      if (files.length > 0) importFiles(files)
      else if (emptyFolders.length > 0)
        session.say('failure', `There are no exports in ${emptyFolders.join(', ')}: a folder is asked to hold ${exportSuffixWords}.`)
    },
    [importFiles, session],
  )
  const filesHangOver = useFileDrop(takeDrop)
  useShortcuts(actions)
  const holdsTable = (replica?.document.rateConstants ?? null) !== null && replica?.document.runs.length === 0
  const takesTable = replica !== null && replica.document.runs.length === 0
  const pasteTable = useCallback(
    (text: string) => {
      view.setState({ stage: 'runs' })
      void session.offerTable({ kind: 'text', text })
    },
    [session, view],
  )
  useTablePaste(takesTable, pasteTable)

  useEffect(() => view.subscribe((now, before) => now.theme !== before.theme && storeTheme(now.theme)), [view])
  useEffect(() => {
    // Another window may have changed the study while this one was out of sight.
    const onFocus = (): void => void session.refresh()
    window.addEventListener('focus', onFocus)
    return () => window.removeEventListener('focus', onFocus)
  }, [session])

  return (
    <ColoursContext value={colours}>
      <div className="window">
        {connection.kind === 'lost' && <ConnectionLost message={connection.message} whole={replica === null} />}
        {replica === null && connection.kind === 'connecting' && <Connecting />}
        {replica !== null && <Sheet replica={replica} actions={actions} paper={paper} />}
        {filesHangOver && (
          <div className="drop-veil">
            <p>{holdsTable ? 'Drop a table of rate constants' : 'Drop to add the runs to this study'}</p>
          </div>
        )}
        <input
          ref={setFileInput}
          type="file"
          multiple
          hidden
          aria-label="Files to open"
          onChange={(event) => {
            const files = Array.from(event.target.files ?? [])
            // The same file may be chosen again after it was mended.
            event.target.value = ''
            if (files.length > 0) importFiles(files)
          }}
        />
      </div>
    </ColoursContext>
  )
}

/** Nothing to see for a moment; a word only when the moment grows long. */
function Connecting() {
  const [slow, setSlow] = useState(false)
  useEffect(() => {
    const timer = setTimeout(() => setSlow(true), 800)
    return () => clearTimeout(timer)
  }, [])
  return (
    <main className="connecting" aria-busy="true">
      {slow && <p>Opening the study…</p>}
    </main>
  )
}

function ConnectionLost({ message, whole }: { readonly message: string; readonly whole: boolean }) {
  const { session } = useServices()
  const [trying, setTrying] = useState(false)
  const tryAgain = (): void => {
    setTrying(true)
    void session.refresh().finally(() => setTrying(false))
  }
  return (
    <div className={whole ? 'lost lost-whole' : 'lost'} role="alert">
      <p>
        <strong>Rampfold is not reachable.</strong> {message}{' '}
        {whole ? '' : 'What you see is still here, but nothing you change is saved until it answers.'}
      </p>
      <Button className="button" isDisabled={trying} onPress={tryAgain}>
        Try again
      </Button>
    </div>
  )
}
