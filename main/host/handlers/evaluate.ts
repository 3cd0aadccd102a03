import { checkRevision } from './check-revision.ts'
import type { HandlerContext, HandlerTable } from './handler-table.ts'
import { tableOf } from './rate-constants.ts'

/** Results of the study, and files made from them. */
export function evaluateHandlers(context: HandlerContext): Pick<HandlerTable, 'study.evaluate' | 'study.uncertainty' | 'results.export'> {
  const { workspace, evaluation, uncertainty, parts, version } = context
  return {
    'study.evaluate': async ({ revision }) => {
      checkRevision(workspace, revision)
      uncertainty.cancelUnless(revision)
      return { revision, result: await evaluation.of(revision) }
    },
    'study.uncertainty': async ({ revision }) => {
      checkRevision(workspace, revision)
      // First what it rests on: the worker then has every step of it at hand.
      await evaluation.of(revision)
      return { revision, result: await uncertainty.of(revision) }
    },
    'results.export': async ({ revision, format, tableStyle, of, withUncertainty = false }) => {
      checkRevision(workspace, revision)
      const { document } = workspace.session
      const isTable = of === undefined ? document.runs.length === 0 && document.rateConstants !== null : of === 'rate-constants'
      if (isTable) {
        const result = await context.pool.run('evaluate-rate-constants', { table: tableOf(document.rateConstants) })
        return { files: parts.exportRateConstants({ document, result, program: { name: 'rampfold', version } }, format, tableStyle) }
      }
      const result = await evaluation.of(revision)
      const apart = withUncertainty ? { uncertainty: await uncertainty.of(revision) } : {}
      return { files: parts.exportResults({ document, result, ...apart, program: { name: 'rampfold', version } }, format, tableStyle) }
    },
  }
}
