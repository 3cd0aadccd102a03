import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { HandlerContext, HandlerTable } from './handler-table.ts'

/** Results of the study, and files made from them. */
export function evaluateHandlers(context: HandlerContext): Pick<HandlerTable, 'study.evaluate' | 'results.export'> {
  const { workspace, evaluation, parts, version } = context
  const checkRevision = (seen: number): void => {
    const current = workspace.session.revision
    if (seen === current) return
    throw new KineticsError('revision-conflict', 'The study has changed since this page last saw it. Read it again.', { seen, current })
  }
  return {
    'study.evaluate': async ({ revision }) => {
      checkRevision(revision)
      return { revision, result: await evaluation.of(revision) }
    },
    'results.export': async ({ revision, format, tableStyle }) => {
      checkRevision(revision)
      const { document } = workspace.session
      const result = await evaluation.of(revision)
      return { files: parts.exportResults({ document, result, program: { name: 'rampfold', version } }, format, tableStyle) }
    },
  }
}
