import type { FileOut, TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { arrheniusFigure } from '../../shared-kinetics/figure/arrhenius-figure.ts'
import { defaultTableStyle } from './csv-table.ts'
import type { ExportFormat } from './export-results.ts'
import { figureSvg } from './figure-svg.ts'
import { rateConstantsCsv } from './rate-constants-csv.ts'
import { rateConstantsJson, type RateConstantsSource } from './rate-constants-json.ts'
import { rateConstantsNotes } from './rate-constants-notes.ts'

/** The files of one export of rate constants: what the command line writes and what a window offers are the same bytes. */
export function exportRateConstants(
  source: RateConstantsSource,
  format: ExportFormat,
  style: TableStyle = defaultTableStyle,
): readonly FileOut[] {
  switch (format) {
    case 'json':
      return [file('rate-constants.json', 'application/json', rateConstantsJson(source))]
    case 'csv':
      return [
        file('rate-constants.csv', 'text/csv; charset=utf-8', rateConstantsCsv(source.result, style)),
        file('rate-constants.csv.txt', 'text/plain; charset=utf-8', rateConstantsNotes(source)),
      ]
    case 'svg':
      return [file('rate-constants.svg', 'image/svg+xml', figureSvg(arrheniusFigure(source.result)))]
  }
}

const file = (fileName: string, mediaType: string, content: string): FileOut => ({
  fileName,
  mediaType,
  bytes: new TextEncoder().encode(content),
})
