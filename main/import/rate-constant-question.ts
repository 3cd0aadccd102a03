import { ImportRefusal } from './import-refusal.ts'

/** A table that can be read once a person states what it does not say. */
export class RateConstantQuestion extends ImportRefusal {
  readonly ask: 'temperature-unit' | 'decimal-sign'

  constructor(fileName: string, line: number | null, reason: string, remedy: string, ask: RateConstantQuestion['ask']) {
    super(fileName, line, reason, remedy)
    this.ask = ask
  }
}

/** Makes the question about the table in hand; the steps of reading throw what it returns. */
export type Ask = (line: number | null, reason: string, remedy: string, what: RateConstantQuestion['ask']) => RateConstantQuestion

export const unitRemedy = 'Units of rate constants are such as 1/s, 1/min, 1/h or L/(mol s).'
