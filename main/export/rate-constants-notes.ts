import { kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'
import { caution } from './caution.ts'
import { holdLines, modelLines } from './hold-fits-lines.ts'
import { runsBehind, type RateConstantsSource } from './rate-constants-json.ts'
import { rateConstantLines } from './rate-constants-lines.ts'

/** The text of `rate-constants.csv.txt`, which stands beside the table: caution, what was found, intervals, where the table came from, findings. */
export function rateConstantsNotes({ document, result, program }: RateConstantsSource): string {
  const used = result.rows.filter((row) => row.use).length
  const { span, source } = result
  const sections: readonly (readonly [string, readonly string[]])[] = [
    ['Caution', [caution]],
    ['Found', rateConstantLines(result)],
    ['Holds', holdLines(result)],
    ['Reaction models', modelLines(result)],
    ['Intervals', intervalLines(result)],
    [
      'Table',
      [
        `${originOf(source)}${source.sha256 === null ? '' : `, SHA-256 ${source.sha256}`}`,
        `${result.rows.length} rate constants, ${used} used; unit ${result.rateUnit === '' ? 'not stated' : result.rateUnit}`,
        ...runsBehind(document, result).map(({ label, file }) => `run ${label}: ${file.name}, SHA-256 ${file.sha256}`),
        span === null ? 'no temperature' : `${celsius(span.coldest_K)} to ${celsius(span.hottest_K)}`,
      ],
    ],
    ['Findings', result.findings.map(({ severity, code, message, basis }) => `${severity}, ${code}: ${message} Rule: ${basis}`)],
  ]
  const text = sections
    .filter(([, lines]) => lines.length > 0)
    .map(([heading, lines]) => `${heading}\n${lines.map((line) => `  ${oneLine(line)}\n`).join('')}`)
    .join('\n')
  return `Rate constants against temperature, ${oneLine(document.name)}\n${program.name} ${program.version}\n\n${text}`
}

function originOf({ kind, name }: RateConstantsSource['result']['source']): string {
  switch (kind) {
    case 'typed':
      return name === null ? 'typed' : `typed: ${name}`
    case 'pasted':
      return 'pasted'
    case 'file':
      return `file ${name ?? ''}`
    case 'isothermal-runs':
      return `made from isothermal runs${name === null ? '' : `, ${name}`}`
  }
}

function intervalLines({ line, weightedLine, eyring, modelFollowsHolds }: RateConstantsSource['result']): readonly string[] {
  const { dof } = line.interval
  const own =
    dof === 0
      ? ['no interval: fewer than three distinct temperatures']
      : [
          `unweighted line of ln k on 1/T: 95 % Student-t intervals, ${dof} degrees of freedom, each parameter and each temperature by itself. Method: ${line.sources.join('; ')}`,
          ...(modelFollowsHolds === false
            ? [
                'Ea, enthalpy of activation and factors per 10 K: of the scatter of ln k only; A, entropy and Gibbs energy of activation and predicted k: no interval: the reaction model does not follow the holds',
              ]
            : [`covariance of Ea and ln A: ${line.covarianceEaLnA_kJ_per_mol?.toPrecision(6) ?? 'none'} kJ/mol`]),
        ]
  const weighted =
    weightedLine === null
      ? []
      : [
          `line weighted by stated uncertainties: the scatter sets the size of the errors; reduced chi-square ${weightedLine.reducedChiSquare?.toPrecision(3) ?? 'none'} (about 1 where the stated uncertainties account for the scatter)`,
        ]
  const state = eyring === null ? [] : [`transition-state parameters: transmission coefficient 1. Method: ${eyring.sources.join('; ')}`]
  return [...own, ...weighted, ...state]
}

const celsius = (kelvin: number): string => `${kelvinToCelsius(kelvin).toFixed(2)} °C`
const oneLine = (text: string): string => text.replaceAll(/\s*[\r\n]+\s*/g, ' ')
