import type {
  HostEvent,
  HostTransport,
  ImportAnswer,
  RateConstantsRead,
  RequestAnswers,
  RequestInput,
  RequestName,
  StudySnapshot,
} from '../../../shared-kinetics/contract/host-api.ts'
import { applyChange, labelOfChange, type StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import { emptyStudy, type StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type {
  RateConstantsResult,
  RateConstantTable,
  RunInfo,
  StudyResult,
  UncertaintyResult,
} from '../../../shared-kinetics/contract/study-result.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'

type Call = { readonly [Name in RequestName]: { readonly name: Name; readonly input: RequestInput<Name> } }[RequestName]

export interface MemoryHostOptions {
  readonly document?: StudyDocument
  readonly demo?: StudyDocument
  /** Results of a study; may take its time. */
  readonly evaluate?: (document: StudyDocument) => StudyResult | Promise<StudyResult>
  /** What `study.uncertainty` answers; may take its time. */
  readonly estimate?: (document: StudyDocument) => UncertaintyResult | Promise<UncertaintyResult>
  /** Runs made of uploaded files, by name. */
  readonly read?: (fileNames: readonly string[]) => { readonly runs: readonly RunInfo[]; readonly refused: ImportAnswer['refused'] }
  /** What a text or a file (by its name) reads as; no table where left out. */
  readonly readTable?: (textOrName: string) => RateConstantsRead
  readonly evaluateTable?: (table: RateConstantTable) => RateConstantsResult
  /** Called before every request is answered; what it throws is the answer. */
  readonly before?: (call: Call) => void | Promise<void>
}

/** A host in memory for tests: the same revisions, conflicts, undo and uploads as the real one, with results made by the test. */
export interface MemoryHost extends HostTransport {
  readonly calls: readonly Call[]
  /** A change made in another window. */
  readonly changeElsewhere: (change: StudyChange) => void
  readonly tell: (event: HostEvent) => void
  /** Its process has ended, and the way to it has noticed. */
  readonly loseConnection: (error: Error) => void
  readonly received: ReadonlyMap<string, { readonly fileName: string; readonly bytes: number }>
}

interface Past {
  readonly document: StudyDocument
  readonly label: string
}

const noTable = (fileName: string): RateConstantsRead => ({
  kind: 'refused',
  refused: { fileName, line: null, reason: 'There is no table of rate constants.', remedy: 'Give one row for each temperature.' },
  ask: null,
})

export function createMemoryHost(options: MemoryHostOptions = {}): MemoryHost {
  const listeners = new Set<(event: HostEvent) => void>()
  const losses = new Set<(error: Error) => void>()
  const calls: Call[] = []
  const received = new Map<string, { fileName: string; bytes: number }>()
  let document = options.document ?? emptyStudy('study-1')
  let revision = 1
  let past: readonly Past[] = []
  let future: readonly Past[] = []

  const tell = (event: HostEvent): void => {
    for (const listener of listeners) listener(event)
  }
  const snapshot = (): StudySnapshot => ({ revision, document, undo: past.at(-1)?.label ?? null, redo: future.at(-1)?.label ?? null })

  function become(next: StudyDocument): StudySnapshot {
    document = next
    revision += 1
    tell({ kind: 'study-changed', revision })
    return snapshot()
  }

  function change(one: StudyChange): StudySnapshot {
    past = [...past, { document, label: labelOfChange(document, one) }]
    future = []
    return become(applyChange(document, one))
  }

  function open(next: StudyDocument): StudySnapshot {
    past = []
    future = []
    return become(next)
  }

  function checkRevision(seen: number): void {
    if (seen !== revision) throw new KineticsError('revision-conflict', 'The study has changed.', { seen, current: revision })
  }

  function step(seen: number, from: readonly Past[], way: 'back' | 'forth'): StudySnapshot {
    checkRevision(seen)
    const target = from.at(-1)
    if (target === undefined) return snapshot()
    const here: Past = { document, label: target.label }
    past = way === 'back' ? past.slice(0, -1) : [...past, here]
    future = way === 'back' ? [...future, here] : future.slice(0, -1)
    return become(target.document)
  }

  async function answer(call: Call): Promise<unknown> {
    switch (call.name) {
      case 'program.describe':
        return { name: 'rampfold', version: '0.0.0', shell: 'browser' }
      case 'study.read':
        return snapshot()
      case 'study.change':
        checkRevision(call.input.revision)
        return change(call.input.change)
      case 'study.undo':
        return step(call.input.revision, past, 'back')
      case 'study.redo':
        return step(call.input.revision, future, 'forth')
      case 'study.new':
        return open(emptyStudy(`study-${revision + 1}`))
      case 'study.open-demo':
      case 'study.open-recent':
        return open(options.demo ?? emptyStudy('demo', 'Demo'))
      case 'study.recent':
        return { studies: [] }
      case 'study.save-copy':
        return { fileName: `${document.name}.rampfold`, mediaType: 'application/octet-stream', bytes: new Uint8Array(1) }
      case 'study.evaluate': {
        checkRevision(call.input.revision)
        if (options.evaluate === undefined) throw new Error('this host evaluates nothing')
        return { revision: call.input.revision, result: await options.evaluate(document) }
      }
      case 'study.uncertainty': {
        checkRevision(call.input.revision)
        if (options.estimate === undefined) throw new Error('this host estimates nothing')
        return { revision: call.input.revision, result: await options.estimate(document) }
      }
      case 'upload.begin': {
        const uploadId = `upload-${received.size + 1}`
        received.set(uploadId, { fileName: call.input.fileName, bytes: 0 })
        return { uploadId }
      }
      case 'upload.append': {
        const upload = received.get(call.input.uploadId)
        if (upload === undefined) throw new KineticsError('unknown-upload', 'There is no such upload.')
        upload.bytes += call.input.bytes.byteLength
        return { receivedBytes: upload.bytes }
      }
      case 'upload.discard':
        received.delete(call.input.uploadId)
        return {}
      case 'runs.import': {
        const names = call.input.uploadIds.map((id) => received.get(id)?.fileName ?? '')
        const { runs, refused } = options.read?.(names) ?? { runs: [], refused: [] }
        const after = runs.length === 0 ? snapshot() : change({ kind: 'add-runs', runs: [...runs] as never, importNotes: [] })
        return { addedRunIds: runs.map((run) => run.id), refused, openedStudy: false, snapshot: after }
      }
      case 'rate-constants.read-text':
        return options.readTable?.(call.input.text) ?? noTable('The pasted table')
      case 'rate-constants.read-file': {
        const { fileName = '' } = received.get(call.input.uploadId) ?? {}
        return options.readTable?.(fileName) ?? noTable(fileName)
      }
      case 'rate-constants.from-holds':
        throw new KineticsError('bad-request', 'No rate constant can be made from the runs of this study.')
      case 'rate-constants.evaluate': {
        checkRevision(call.input.revision)
        if (options.evaluateTable === undefined || document.rateConstants === null) throw new Error('this host evaluates no such table')
        return { revision, result: options.evaluateTable(document.rateConstants) }
      }
      case 'work.cancel':
        return {}
      case 'results.export':
        checkRevision(call.input.revision)
        return { files: [] }
    }
  }

  return {
    calls,
    received,
    tell,
    loseConnection: (error) => {
      for (const lost of losses) lost(error)
    },
    changeElsewhere: (one) => void change(one),
    async call<Name extends RequestName>(name: Name, input: RequestInput<Name>) {
      const call = { name, input } as unknown as Call
      calls.push(call)
      await options.before?.(call)
      return (await answer(call)) as RequestAnswers[Name]
    },
    subscribe(listener, lost) {
      listeners.add(listener)
      if (lost !== undefined) losses.add(lost)
      return () => {
        listeners.delete(listener)
        if (lost !== undefined) losses.delete(lost)
      }
    },
  }
}
