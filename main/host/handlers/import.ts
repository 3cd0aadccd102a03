import type { HandlerContext, HandlerTable } from './handler-table.ts'
import { importFiles } from './import-files.ts'

/** Uploaded files into runs; and the stop for long work. */
export function importHandlers(context: HandlerContext): Pick<HandlerTable, 'runs.import' | 'work.cancel'> {
  return {
    'runs.import': async ({ uploadIds, noteLeftOut }) => importFiles(context, context.uploads.take(uploadIds), noteLeftOut),
    'work.cancel': ({ work }) => {
      switch (work) {
        case 'evaluate':
          context.evaluation.cancel()
          break
        case 'uncertainty':
          context.uncertainty.cancel()
          break
        case 'import':
          for (const running of context.imports) running.abort()
      }
      return {}
    },
  }
}
