import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { basename, dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import type { NominalSource } from '../../shared-kinetics/series/run.ts'
import { readExport } from './read-export.ts'

// What is right for each file, typed from the READMEs beside the data (rows, columns, units, sign) and the files' own first and last rows.
const root = fileURLToPath(new URL('../../../shared/data', import.meta.url))
const here = existsSync(root)
const context = { checkCancelled: () => undefined, progress: () => undefined }

/** `time|s`, `temperature|degC`, `mass|mg|kg|Mass (mg)`: quantity, unit in the file, SI unit as held, heading. */
type ColumnTruth = string
interface RunTruth {
  readonly file: string
  readonly run?: number
  readonly label?: string
  readonly rows: number
  readonly rate: number | null
  readonly source?: NominalSource
  readonly first: readonly number[]
  readonly last: readonly number[]
  readonly initialMass_mg?: number | null
}
interface FolderTruth {
  readonly folder: string
  readonly columns: readonly ColumnTruth[]
  readonly exothermic?: 'up' | 'down'
  readonly encoding: readonly string[]
  readonly delimiter: string
  readonly decimal: string
  readonly notes?: readonly string[]
  readonly metadata?: readonly string[]
  readonly runs: readonly RunTruth[]
}

const row = (
  file: string,
  rows: number,
  rate: number | null,
  first: readonly number[],
  last: readonly number[],
  more: Partial<RunTruth> = {},
): RunTruth => ({ file, rows, rate, first, last, source: 'name', ...more })

const plain = { delimiter: 'comma', decimal: 'point', encoding: ['utf-8'] } as const

const truth: readonly FolderTruth[] = [
  {
    ...plain,
    folder: 'measured/pine-tga-dsc-n2-three-rates',
    columns: ['time|s', 'temperature|K', 'mass|mg|kg|Mass (mg)', 'heat-flow|W/g|W/kg|Heat Flow Rate (W/g)'],
    runs: [
      row('FSRI_Wood_STA_N2_3K_R1.csv', 1494, 3, [0, 324, 3.9936, 0.022], [14916.116371850012, 1070.5, 0.635, -0.0042], {
        initialMass_mg: 3.9936,
      }),
      row('FSRI_Wood_STA_N2_10K_R1.csv', 1490, 10, [0, 324.5, 3.9592, 0.017], [4464.493825549097, 1069, 0.7599, 0.0342], {
        initialMass_mg: 3.9592,
      }),
      row('FSRI_Wood_STA_N2_10K_R2.csv', 1491, 10, [0, 324.5, 3.9476, 0.0116], [4465.293296755608, 1069.5, 0.7501, 0.0474], {
        initialMass_mg: 3.9476,
      }),
      row('FSRI_Wood_STA_N2_10K_R3.csv', 1492, 10, [0, 324.5, 3.9243, 0.0157], [4492.094950988934, 1070, 0.7503, 0.132], {
        initialMass_mg: 3.9243,
      }),
      row('FSRI_Wood_STA_N2_30K_R1.csv', 1478, 30, [0, 325, 4.0427, -0.0048], [1484.403450964343, 1063.5, 0.9233, -0.1748], {
        initialMass_mg: 4.0427,
      }),
      row('FSRI_Wood_STA_N2_30K_R2.csv', 1477, 30, [0, 325, 4.046, -0.0037], [1484.0304940698666, 1063, 0.8835, 0.0228], {
        initialMass_mg: 4.046,
      }),
      row('FSRI_Wood_STA_N2_30K_R3.csv', 1479, 30, [0, 325.5, 3.9683, 0.0327], [1465.874049585125, 1064.5, 0.8336, -0.273], {
        initialMass_mg: 3.9683,
      }),
    ],
  },
  {
    ...plain,
    folder: 'measured/pmma-dsc-tga-n2-four-rates#DSC',
    columns: ['time|s', 'temperature|K', 'heat-flow|mW/mg|W/kg|Heat Flow Rate'],
    runs: [
      row('FSRI_DSC_N2_3K_1.csv', 1004, 3, [31.6, 323.5, 0.0129], [9996.8, 825, 0.0428]),
      row('FSRI_DSC_N2_10K_1.csv', 999, 10, [28.4, 323, 0.00687], [2999.4, 822, 0.11372]),
      row('FSRI_DSC_N2_10K_2.csv', 999, 10, [0, 323, 0.000892], [2998.7, 822, 0.0613]),
      row('FSRI_DSC_N2_10K_3.csv', 999, 10, [0, 323, -0.00216], [2998.6, 822, 0.075]),
      row('FSRI_DSC_N2_20K_1.csv', 991, 20, [31.2, 322.5, 0.04848], [1497.5, 817.5, 0.17]),
      row('FSRI_DSC_N2_20K_2.csv', 992, 20, [20.2, 322, 0.01312], [1497.7, 817.5, 0.22165]),
      row('FSRI_DSC_N2_20K_3.csv', 991, 20, [30.7, 322.5, 0.08064], [1497.3, 817.5, 0.24408]),
      row('FSRI_DSC_N2_30K_1.csv', 985, 30, [27.3, 322.5, 0.0296], [998.7, 814.5, 0.2262]),
      row('FSRI_DSC_N2_30K_2.csv', 985, 30, [27.7, 322.5, 0.0168], [999, 814.5, -0.00857]),
      row('FSRI_DSC_N2_30K_3.csv', 985, 30, [24.9, 322.5, 0.016], [998.7, 814.5, 0.20763]),
    ],
  },
  {
    ...plain,
    folder: 'measured/pmma-dsc-tga-n2-four-rates#TGA',
    columns: ['time|s', 'temperature|K', 'mass|mg|kg'],
    runs: [
      row('FSRI_TGA_N2_3K_1.csv', 1004, 3, [31.6, 323.5, 3.9819], [9996.8, 825, 0.0031], { initialMass_mg: 3.9819 }),
      row('FSRI_TGA_N2_10K_1.csv', 999, 10, [28.4, 323, 3.9791], [2999.4, 822, 0.0372], { initialMass_mg: 3.9791 }),
      row('FSRI_TGA_N2_10K_2.csv', 999, 10, [0, 323, 3.9537], [2998.7, 822, -0.0929], { initialMass_mg: 3.9537 }),
      row('FSRI_TGA_N2_10K_3.csv', 999, 10, [0, 323, 3.9002], [2998.6, 822, -0.0669], { initialMass_mg: 3.9002 }),
      row('FSRI_TGA_N2_20K_1.csv', 991, 20, [31.2, 322.5, 3.9576], [1497.5, 817.5, -0.0083], { initialMass_mg: 3.9576 }),
      row('FSRI_TGA_N2_20K_2.csv', 992, 20, [20.2, 322, 3.9488], [1497.7, 817.5, 0.0322], { initialMass_mg: 3.9488 }),
      row('FSRI_TGA_N2_20K_3.csv', 991, 20, [30.7, 322.5, 3.979], [1497.3, 817.5, 0.0201], { initialMass_mg: 3.979 }),
      row('FSRI_TGA_N2_30K_1.csv', 985, 30, [27.3, 322.5, 4.029], [998.7, 814.5, -0.0311], { initialMass_mg: 4.029 }),
      row('FSRI_TGA_N2_30K_2.csv', 985, 30, [27.7, 322.5, 4.0646], [999, 814.5, -0.0448], { initialMass_mg: 4.0646 }),
      row('FSRI_TGA_N2_30K_3.csv', 985, 30, [24.9, 322.5, 3.9301], [998.7, 814.5, 0.0213], { initialMass_mg: 3.9301 }),
    ],
  },
  {
    ...plain,
    folder: 'measured/pmma-tga-n2-seven-rates',
    columns: ['time|s', 'temperature|K', 'mass|mg|kg|Mass'],
    runs: [
      row('UMET_TGA_N2_1K_1.csv', 922, 1, [0, 313.115, 4.3361], [27630, 773.615, 0], { initialMass_mg: 4.3361 }),
      row('UMET_TGA_N2_2K_1.csv', 922, 2, [0, 313.115, 4.8446], [13815, 773.615, 0], { initialMass_mg: 4.8446 }),
      row('UMET_TGA_N2_5K_1.csv', 922, 5, [0, 313.115, 4.0931], [5526, 773.615, 0], { initialMass_mg: 4.0931 }),
      row('UMET_TGA_N2_10K_1.csv', 922, 10, [0, 313.115, 5.3388], [2763, 773.615, 0], { initialMass_mg: 5.3388 }),
      row('UMET_TGA_N2_20K_1.csv', 922, 20, [0, 313.115, 3.9289], [1381.5, 773.615, 0], { initialMass_mg: 3.9289 }),
      row('UMET_TGA_N2_50K_1.csv', 922, 50, [0, 313.115, 5.9802], [552.6, 773.615, 0], { initialMass_mg: 5.9802 }),
      row('UMET_TGA_N2_100K_1.csv', 922, 100, [0, 313.115, 5.3644], [276.3, 773.615, 0], { initialMass_mg: 5.3644 }),
    ],
  },
  {
    ...plain,
    folder: 'measured/untidy-layouts/pine-tga-n2-three-rates',
    columns: ['time|s', 'temperature|K', 'mass|mg|kg|Mass (mg)'],
    runs: [
      row('Aalto_Wood_TGA_N2_5K_R1.csv', 1518, 5, [0, 313.2, 8.873], [9114.0666, 1071.7, 1.342], { initialMass_mg: 8.873 }),
      row('Aalto_Wood_TGA_N2_5K_R2.csv', 1518, 5, [0, 313.1, 7.709], [9113.6712, 1071.6, 1.196], { initialMass_mg: 7.709 }),
      row('Aalto_Wood_TGA_N2_5K_R3.csv', 1527, 5, [0, 309, 8.771], [9118.5288, 1072, 1.532], { initialMass_mg: 8.771 }),
      row('Aalto_Wood_TGA_N2_10K_R1.csv', 1520, 10, [0, 313.2, 7.427], [4556.3538, 1070.9, 1.052], { initialMass_mg: 7.427 }),
      row('Aalto_Wood_TGA_N2_10K_R2.csv', 1516, 10, [0, 313.1, 8.077], [4554.4446, 1070.6, 1.061], { initialMass_mg: 8.077 }),
      row('Aalto_Wood_TGA_N2_10K_R3.csv', 1516, 10, [0, 313.2, 8.054], [4555.2894, 1070.7, 1.121], { initialMass_mg: 8.054 }),
      row('Aalto_Wood_TGA_N2_20K_R1.csv', 1513, 20, [0, 313.1, 8.3625], [2279.3994, 1069.1, 1.3171], { initialMass_mg: 8.3625 }),
      row('Aalto_Wood_TGA_N2_20K_R2.csv', 1522, 20, [0, 308.4, 8.233], [2279.3526, 1068.9, 1.332], { initialMass_mg: 8.233 }),
      row('Aalto_Wood_TGA_N2_20K_R3.csv', 1513, 20, [0, 313.2, 7.919], [2279.585, 1069.2, 1.249], { initialMass_mg: 7.919 }),
    ],
  },
  {
    ...plain,
    folder: 'measured/untidy-layouts/import-only/semicolon',
    delimiter: 'semicolon',
    columns: ['time|s', 'temperature|K', 'heat-flow|mW/mg|W/kg|Heat Flow'],
    runs: [row('UMET_DSC_N2_10K_1.csv', 6114, 10, [0, 273.15, 0], [6113, 194.962, -0.0766242])],
  },
  {
    ...plain,
    folder: 'measured/untidy-layouts/import-only/lost-header',
    columns: ['time|s', 'temperature|K', 'heat-flow|mW/mg|W/kg|column 3'],
    notes: ['heading-missing', 'rows-set-aside'],
    runs: [row('UMET_DSC_N2_20K_1.csv', 6115, 20, [0, 273.15, 0], [6114, 194.883, -0.0755312])],
  },
  {
    ...plain,
    folder: 'measured/untidy-layouts/import-only/many-columns#UMET',
    columns: [
      'time|s',
      'temperature|K',
      'heat-flow|W/g|W/kg|Total Heat Flow (Normalized) W/g',
      'heat-flow|W/g|W/kg|Reversing Heat Flow (Normalized) W/g',
      'heat-flow|W/g|W/kg|Non-Reversing Heat Flow (Normalized) W/g',
    ],
    notes: ['several-columns-of-one-quantity'],
    runs: [row('UMET_WOOD_TM-DSC_N2_3K_R1.csv', 722, 3, [794.4, 296.85, 0.161, 0.08, 0.081], [13409.4, 467.23, 0.119, 0.112, 0.006])],
  },
  {
    ...plain,
    folder: 'measured/untidy-layouts/import-only/many-columns#Lund',
    columns: ['time|s', 'temperature|K', 'heat-release|W/g|W/kg|HRR (W/g)'],
    notes: ['columns-set-aside'],
    runs: [row('Lund_Wood_MCC_N2_60K_R1.csv', 764, 60, [0.465, 410, -0.128], [395.251, 791.5, 0.485])],
  },
  {
    ...plain,
    folder: 'simulated/conversion-only',
    columns: ['temperature|degC', 'conversion|1|1|Conversion'],
    notes: ['time-missing', 'unit-from-values'],
    runs: [
      row('run-2.csv', 940, null, [156.85, 0.00457149], [250.75, 0.99999985]),
      row('run-5.csv', 1105, null, [156.85, 0.00183027], [267.25, 0.99999922]),
      row('run-12.csv', 1273, null, [156.85, 0.00076288], [284.05, 0.99999915]),
      row('run-25.csv', 1422, null, [156.85, 0.00036623], [298.95, 0.99999931]),
    ],
  },
  {
    ...plain,
    folder: 'simulated/dsc-per-gram-exo-down',
    columns: ['time|s', 'temperature|degC', 'heat-flow|mW/mg|W/kg|Heat flow/mW/mg'],
    exothermic: 'down',
    runs: [
      row('cure 2.5 K per min.csv', 6001, 2.5, [0, 16.85, -0.069723], [6960, 306.85, -0.217414], {
        source: 'preamble',
        initialMass_mg: 5.02,
      }),
      row('cure 5 K per min.csv', 6001, 5, [0, 16.85, -0.065668], [3480, 306.85, -0.204769], { source: 'preamble', initialMass_mg: 5.33 }),
      row('cure 10 K per min.csv', 6001, 10, [0, 16.85, -0.068495], [1740, 306.85, -0.213587], {
        source: 'preamble',
        initialMass_mg: 5.11,
      }),
      row('cure 15 K per min.csv', 6001, 15, [0, 16.85, -0.071871], [1160, 306.85, -0.224124], {
        source: 'preamble',
        initialMass_mg: 4.87,
      }),
    ],
  },
  {
    ...plain,
    folder: 'simulated/isothermal-holds',
    columns: ['time|minute', 'temperature|degC', 'conversion|1|1|Conversion (-)'],
    runs: [
      row('hold 120 C.csv', 1500, null, [0, 120, 0], [347.353863, 120, 0.95021293]),
      row('hold 130 C.csv', 1500, null, [0, 130, 0], [152.246772, 130, 0.95021293]),
      row('hold 140 C.csv', 1500, null, [0, 140, 0], [69.448868, 140, 0.95021293]),
      row('hold 150 C.csv', 1500, null, [0, 150, 0], [32.877132, 150, 0.95021293]),
    ],
  },
  {
    ...plain,
    folder: 'simulated/ramp-hold-ramp',
    columns: ['time|minute', 'temperature|degC', 'mass|%|1|mass_percent'],
    runs: [
      row('programme-1.csv', 7002, null, [0, 46.85, 100], [104.76875, 486.85, 38.7]),
      row('programme-2.csv', 7002, null, [0, 46.85, 100], [93.05333, 486.85, 38.7]),
      row('programme-3.csv', 7002, null, [0, 46.85, 100], [113.87667, 486.85, 38.7]),
    ],
  },
  {
    ...plain,
    folder: 'simulated/several-runs-in-one-sheet',
    columns: ['temperature|degC', 'mass|%|1'],
    notes: ['time-missing'],
    runs: (
      [
        [4, 99.999971],
        [8, 99.999986],
        [16, 99.999993],
      ] as const
    ).map(([rate, first], run) =>
      row('all runs.csv', 1440, rate, [126.85, first], [486.6, 20], { run, source: 'heading', label: `all runs · ${rate} K/min` }),
    ),
  },
  {
    ...plain,
    folder: 'simulated/tga-mg',
    delimiter: 'semicolon',
    decimal: 'comma',
    encoding: ['windows-1252'],
    columns: ['time|minute', 'temperature|degC', 'mass|mg|kg|Mass'],
    metadata: ['Sample', 'Atmosphere', 'Program'],
    runs: [
      row('lk3_1Kmin.txt', 6969, 1, [0, 30, 6.204], [696.8, 726.8, 2.556048], { source: 'preamble', initialMass_mg: 6.204 }),
      row('lk3_3Kmin.txt', 6969, 3, [0, 30, 6.551], [232.2667, 726.8, 2.699012], { source: 'preamble', initialMass_mg: 6.551 }),
      row('lk3_9Kmin.txt', 3098, 9, [0, 30, 6.118], [77.425, 726.825, 2.520616], { source: 'preamble', initialMass_mg: 6.118 }),
      row('lk3_18Kmin.txt', 1549, 18, [0, 30, 6.337], [38.7, 726.6, 2.610844], { source: 'preamble', initialMass_mg: 6.337 }),
    ],
  },
  {
    ...plain,
    folder: 'simulated/tga-percent-two-step',
    delimiter: 'tab',
    encoding: ['utf-16le'],
    columns: ['time|s', 'temperature|K', 'mass|%|1|Weight (%)'],
    metadata: ['Gas'],
    runs: [
      row('tz_2.txt', 5250, 2, [0, 320, 99.999987], [18896.4, 949.88, 25.4], { source: 'preamble' }),
      row('tz_4.txt', 5250, 4, [0, 320, 99.999994], [9448.2, 949.88, 25.4], { source: 'preamble' }),
      row('tz_8.txt', 5250, 8, [0, 320, 99.999997], [4724.1, 949.88, 25.4], { source: 'preamble' }),
      row('tz_16.txt', 5250, 16, [0, 320, 99.999998], [2362.05, 949.88, 25.4], { source: 'preamble' }),
    ],
  },
]

const unreachable = (): never => {
  throw new Error('the run or column is missing')
}

/** Oracle: the unit tables of mathjs. */
function inSI(value: number, fileUnit: string, siUnit: string): number {
  if (fileUnit === '%') return value / 100
  if (fileUnit === '1' || fileUnit === siUnit) return value
  return unit(value, fileUnit).toNumber(siUnit)
}

const tests = truth.flatMap((folder) =>
  folder.runs.map((run) => ({ folder, run, title: `${folder.folder}/${run.file}${run.run === undefined ? '' : ` run ${run.run + 1}`}` })),
)

describe.skipIf(!here)('exports of the shared data folder (skipped where ../shared/data is absent)', () => {
  it.each(tests)('$title is read right with no option given', ({ folder, run }) => {
    const path = join(root, folder.folder.replace(/#.*/, ''), run.file)
    const imported = readExport(run.file, readFileSync(path), {}, context)
    expect(imported.runs).toHaveLength(folder.runs.filter((other) => other.file === run.file).length)
    const { info, columns } = imported.runs[run.run ?? 0] ?? unreachable()
    const [withTime, ...rest] = folder.columns
    const hasTime = withTime?.startsWith('time') === true
    const signals = (hasTime ? rest : folder.columns).slice(1).map((text) => text.split('|'))

    expect(info.rows).toBe(run.rows)
    expect(info.hasTime).toBe(hasTime)
    expect(info.signals.map((signal) => [signal.quantity, signal.unit])).toEqual(signals.map(([quantity, , si]) => [quantity, si]))
    expect(info.signals.map((signal, i) => (signals[i]?.[3] === undefined ? undefined : signal.label))).toEqual(
      signals.map(([, , , label]) => label),
    )
    const read = [...(columns.time_s === null ? [] : [columns.time_s]), columns.temperature_K, ...columns.signals]
    folder.columns.forEach((text, i) => {
      const [quantity, fileUnit = '', si = quantity === 'time' ? 's' : 'K'] = text.split('|')
      const column = read[i] ?? unreachable()
      expect(column).toHaveLength(run.rows)
      expect(column.buffer).toBeInstanceOf(SharedArrayBuffer)
      const firstTruth = inSI(run.first[i] ?? Number.NaN, fileUnit, si)
      const lastTruth = inSI(run.last[i] ?? Number.NaN, fileUnit, si)
      expect(Math.abs((column[0] ?? Number.NaN) - firstTruth)).toBeLessThanOrEqual(1e-13 * Math.abs(firstTruth))
      expect(Math.abs((column.at(-1) ?? Number.NaN) - lastTruth)).toBeLessThanOrEqual(1e-13 * Math.abs(lastTruth))
    })
    const nominal = info.nominalHeatingRate
    expect(nominal === null ? null : [nominal.source, Number((nominal.heatingRate_K_per_s * 60).toPrecision(13))]).toEqual(
      run.rate === null ? null : [run.source, run.rate],
    )
    const mass_mg = info.initialMass_kg === null ? null : Number((info.initialMass_kg * 1e6).toPrecision(13))
    expect(mass_mg).toBe(run.initialMass_mg ?? null)
    expect(info.exothermic).toBe(folder.exothermic ?? null)
    expect(info.label).toBe(run.label ?? basename(run.file).replace(/\.(csv|txt)$/, ''))
    expect(info.importNotes.map((note) => note.code).toSorted()).toEqual([...(folder.notes ?? [])].toSorted())
    expect(info.metadata.map((entry) => entry.key)).toEqual(folder.metadata ?? [])
    const decided = (step: string): string | undefined => info.importDecisions.find((decision) => decision.step === step)?.value
    expect(folder.encoding).toContain(decided('encoding'))
    expect(decided('delimiter')).toBe(folder.delimiter)
    expect(decided('decimal sign')).toBe(folder.decimal)
  })

  it('has a row in this table for every export of the folder', () => {
    const onDisk = readdirSync(root, { recursive: true })
      .map((name) => String(name).replaceAll('\\', '/'))
      .filter((name) => /\.(?:csv|txt)$/.test(name) && !basename(name).startsWith('LICENSE'))
    const inTable = new Set(truth.flatMap((folder) => folder.runs.map((run) => `${folder.folder.replace(/#.*/, '')}/${run.file}`)))
    expect(onDisk.filter((name) => !inTable.has(name))).toEqual([])
    expect(new Set(onDisk.map(dirname)).size).toBeGreaterThan(10)
  })

  it('names the trailing line of the export with the lost header', () => {
    const path = join(root, 'measured/untidy-layouts/import-only/lost-header/UMET_DSC_N2_20K_1.csv')
    const note = readExport('a.csv', readFileSync(path), {}, context).runs[0]?.info.importNotes.find((n) => n.code === 'rows-set-aside')
    expect(note).toMatchObject({ severity: 'caution', evidence: { lines: '6117', count: 1 } })
  })

  it('sets aside what is no signal in the export of fifteen columns, and says which were empty', () => {
    const path = join(root, 'measured/untidy-layouts/import-only/many-columns/Lund_Wood_MCC_N2_60K_R1.csv')
    const note = readExport('a.csv', readFileSync(path), {}, context).runs[0]?.info.importNotes.find((n) => n.code === 'columns-set-aside')
    expect(note?.evidence).toEqual({ columns: 12, empty: 8 })
    expect(note?.message).toMatch(/Oxygen \(%\).*Fit 5 \(W\/g\)” \(empty in every row\)/)
  })
})
