import type { RateConstantNote } from '../../rate-constants/rate-constant-table.ts'
import type { Finding } from '../finding.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

const titles: Readonly<Record<RateConstantNote['code'], string>> = {
  'rows-set-aside': 'Rows set aside',
  'columns-set-aside': 'Columns set aside while reading',
  'heading-missing': 'No row of headings',
  'heading-read-as': 'How a heading was read',
  'uncertainty-read-as': 'How an uncertainty was read',
  'model-assumed': 'Rate constants rest on a chosen model',
}

/** What was noticed while the table was read, and a unit of k that nobody stated. */
export function tableNotes({ table, result }: RateConstantReview): Finding[] {
  const notes = table.notes.map((note) =>
    aboutTable({
      ...note,
      title: titles[note.code],
      basis:
        note.code === 'model-assumed'
          ? 'A model is assumed where k is read from a run'
          : 'Nothing is guessed silently while a table is read',
      sources: note.code === 'model-assumed' ? ['ictac-2011'] : note.code === 'uncertainty-read-as' ? ['jcgm-100-2008'] : [],
    }),
  )
  if (result.rateUnit !== '') return notes
  return [
    ...notes,
    aboutTable({
      code: 'rate-unit-missing',
      severity: 'note',
      title: 'The unit of k is not stated',
      message:
        'Nothing says in which unit the rate constants are. Ea does not depend on it; A is in that same unit, and the entropy of activation cannot be given. State it, e.g. 1/s, 1/min or L/(mol s).',
      evidence: { unit: null },
      basis: 'A has the unit of k',
      sources: ['iupac-arrhenius'],
    }),
  ]
}
