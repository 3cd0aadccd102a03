import type { FileOut, TableStyle } from '../../shared-kinetics/contract/host-api.ts'
import { activationFigure } from '../../shared-kinetics/figure/activation-figure.ts'
import type { MethodId } from '../../shared-kinetics/isoconversional/result.ts'
import { activationCsv } from './activation-csv.ts'
import { activationJson, type ExportSource } from './activation-json.ts'
import { activationNotes } from './activation-notes.ts'
import { defaultTableStyle } from './csv-table.ts'
import { figureSvg } from './figure-svg.ts'

export type ExportFormat = 'csv' | 'json' | 'svg'

/** The files of one export: what the command line writes and what a window offers are the same bytes. */
export function exportResults(source: ExportSource, format: ExportFormat, style: TableStyle = defaultTableStyle): readonly FileOut[] {
  switch (format) {
    case 'json':
      return [file('activation.json', 'application/json', activationJson(source))]
    case 'csv':
      return [
        file('activation.csv', 'text/csv; charset=utf-8', activationCsv(source, style)),
        file('activation.csv.txt', 'text/plain; charset=utf-8', activationNotes(source)),
      ]
    case 'svg': {
      const methods = source.result.profiles.map((profile) => profile.method)
      return [file('activation.svg', 'image/svg+xml', figureSvg(activationFigure(source.result, methods, leadingMethod(source))))]
    }
  }
}

const preference: readonly MethodId[] = ['starink', 'vyazovkin', 'isothermal-integral', 'friedman']

/** The method drawn with its band: the first one that was asked for by name, else the first of a fixed order that gave a profile. */
function leadingMethod({ document, result }: ExportSource): MethodId {
  const given = new Set(result.profiles.map((profile) => profile.method))
  const candidates = [...(document.settings.methods ?? []), ...preference, ...given]
  return candidates.find((method) => given.has(method)) ?? 'starink'
}

const file = (fileName: string, mediaType: string, content: string): FileOut => ({
  fileName,
  mediaType,
  bytes: new TextEncoder().encode(content),
})
