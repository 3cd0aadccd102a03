import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { naturalOrder } from './natural-order.ts'

const collator = new Intl.Collator('en', { numeric: true })
const name = fc.oneof(
  fc.string({ maxLength: 12 }),
  fc
    .array(fc.constantFrom('run', 'Run', '_', '-', ' ', '.', '(', '2', '10', '002', 'K', 'k', 'min'), { maxLength: 6 })
    .map((words) => words.join('')),
)

describe('natural order', () => {
  it('is that of the collation algorithm for plain names', () => {
    fc.assert(
      fc.property(name, name, (a, b) => {
        expect(Math.sign(naturalOrder(a, b)), `${a} | ${b}`).toBe(Math.sign(collator.compare(a, b)))
      }),
      { numRuns: 5000 },
    )
  })

  it('counts, and takes other alphabets', () => {
    expect(['run 10.csv', 'run 2.csv', 'Run 1.csv', 'run_3.csv'].toSorted(naturalOrder)).toEqual([
      'Run 1.csv',
      'run 2.csv',
      'run 10.csv',
      'run_3.csv',
    ])
    expect(['Öl 10', 'Öl 2', 'Zr 1', 'Ag'].toSorted(naturalOrder)).toEqual(['Ag', 'Öl 2', 'Öl 10', 'Zr 1'])
  })
})
