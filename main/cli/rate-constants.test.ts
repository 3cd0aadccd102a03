import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import Papa from 'papaparse'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import tables from '../../shared-kinetics/check-values/published/arrhenius-tables.json' with { type: 'json' }
import { reactionModelCodes } from '../../shared-kinetics/reaction-models/registry.ts'
import { run } from './run.ts'

let place = ''
beforeAll(async () => {
  place = await mkdtemp(join(tmpdir(), 'rate-constants-'))
})
afterAll(async () => rm(place, { recursive: true, force: true }))

async function rampfold(...words: readonly string[]): Promise<{ code: number; stdout: string; stderr: string }> {
  let [stdout, stderr] = ['', '']
  const code = await run(words, {
    stdout: (text) => (stdout += text),
    stderr: (text) => (stderr += text),
    stderrIsTerminal: false,
    version: '0.0.0',
    workerUrl: new URL('file:///nowhere/worker-entry.js'),
    rendererUrl: new URL('file:///nowhere/renderer/'),
  })
  return { code, stdout, stderr }
}

async function tableFile(name: string, text: string): Promise<string> {
  const path = join(place, name)
  await writeFile(path, text)
  return path
}
// Daniels & Johnston, J. Am. Chem. Soc. 43 (1921) 53: N2O5; recomputed Ea 102.8979 ± 0.4713 kJ/mol, A 3.8163e13 1/s.
const N2O5 = tables.lines.find((line) => line.id === 'W8')
const textOf = (heading: string, scale = 1): string =>
  `${heading}\n${(N2O5?.temperature_K ?? []).map((T, i) => `${T},${(N2O5?.k[i] ?? 0) * scale}`).join('\n')}\n`
const jsonOf = async (folder: string): Promise<Record<string, unknown> & { line: Record<string, number> }> =>
  JSON.parse(await readFile(join(folder, 'rate-constants.json'), 'utf8')) as Record<string, unknown> & { line: Record<string, number> }

describe('rampfold rate-constants', () => {
  it('writes Ea, A, intervals and predictions of a published table', async () => {
    const out = join(place, 'out')
    const { code, stdout, stderr } = await rampfold(
      'rate-constants',
      await tableFile('N2O5.csv', textOf('T (K),k (1/s)')),
      '--out',
      out,
      '--at',
      '25 C,400K',
    )
    expect([code, stderr]).toEqual([0, ''])
    expect((await readdir(out)).toSorted()).toEqual([
      'rate-constants.csv',
      'rate-constants.csv.txt',
      'rate-constants.json',
      'rate-constants.svg',
    ])
    const json = await jsonOf(out)
    expect(json).toMatchObject({
      format: 'rampfold.rate-constants/1',
      rateUnit: '1/s',
      study: 'N2O5',
      source: { kind: 'file', name: 'N2O5.csv', sha256: expect.stringMatching(/^[0-9a-f]{64}$/) as unknown },
      caution: expect.stringMatching(/does not replace tests/) as unknown,
      predictions: [
        { temperature_K: 298.15, extrapolation: { side: 'inside' } },
        { temperature_K: 400, extrapolation: { side: 'above', beyond_K: 62 } },
      ],
    })
    expect(json.line['Ea_kJ_per_mol']).toBeCloseTo(102.8979, 4)
    expect(json.line['standardError_kJ_per_mol']).toBeCloseTo(0.4713, 4)
    expect(stdout).toMatch(/Ea: 102\.90 kJ\/mol, standard error 0\.47 \(101\.59 to 104\.21\)/)
    expect(stdout).toMatch(
      /k at 400 K \(126\.85 °C\): 1\.396 1\/s \(line 1\.236 to 1\.576, new measurement 1\.201 to 1\.622\); 62 K above the data/,
    )
    expect(stdout).toMatch(/1 note|caution: A prediction/)
    const csv = Papa.parse<string[]>(await readFile(join(out, 'rate-constants.csv'), 'utf8'), { skipEmptyLines: true }).data
    expect(new Set(csv.map((row) => row.length))).toEqual(new Set([12]))
    expect(csv.find((row) => row[0] === 'Ea')?.slice(4, 9)).toEqual(['kJ/mol', '102.8979', '0.4713285', '101.5892', '104.2065'])
    expect(csv.filter((row) => row[0] === 'k, measured').map((row) => [Number(row[2]), Number(row[5])])).toEqual(
      (N2O5?.temperature_K ?? []).map((T, i) => [T, N2O5?.k[i]]),
    )
    const svg = await readFile(join(out, 'rate-constants.svg'), 'utf8')
    expect(svg).toMatch(/1000\/T \(1\/K\)/)
    expect(svg).toMatch(/does not replace tests/)
    expect(await readFile(join(out, 'rate-constants.csv.txt'), 'utf8')).toMatch(/does not replace tests/)
  })

  it('asks for a unit of temperature that nobody stated, and takes it', async () => {
    const path = await tableFile('bare.csv', textOf('T,k'))
    const out = join(place, 'asked')
    const asked = await rampfold('rate-constants', path, '--out', out)
    expect(asked.code).toBe(1)
    expect(asked.stderr).toMatch(/^rampfold: .*bare\.csv, line 2: .*--temperature-unit/)
    await expect(readdir(out)).rejects.toThrow(/ENOENT/)
    const stated = await rampfold('rate-constants', path, '--out', out, '--temperature-unit', 'K', '--rate-unit', 'min-1')
    expect(stated.code).toBe(0)
    expect(await jsonOf(out)).toMatchObject({ rateUnit: '1/min' })
  })

  it('per hour or per second, in K or in °C: Ea is the same', async () => {
    const energies: number[] = []
    const celsius = `T (°C);k (1/h)\n${(N2O5?.temperature_K ?? [])
      .map((T, i) => `${(T - 273.15).toFixed(2)};${((N2O5?.k[i] ?? 0) * 3600).toExponential(12)}`.replaceAll('.', ','))
      .join('\n')}`
    for (const [i, text] of [textOf('T (K),k (1/s)'), textOf('T (K),k (1/h)', 3600), celsius].entries()) {
      const out = join(place, `unit-${i}`)
      expect((await rampfold('rate-constants', await tableFile(`unit-${i}.csv`, text), '--out', out, '--quiet')).code).toBe(0)
      energies.push((await jsonOf(out)).line['Ea_kJ_per_mol'] ?? Number.NaN)
    }
    for (const energy of energies) expect(energy).toBeCloseTo(energies[0] ?? 0, 8)
  })

  it('--strict is 3 where a stop stands, and the files are written', async () => {
    const out = join(place, 'strict')
    const path = await tableFile('one.csv', 'T (K),k (1/s)\n300,1e-3\n300,1.1e-3\n')
    expect((await rampfold('rate-constants', path, '--out', out, '--strict', '--quiet')).code).toBe(3)
    expect(await jsonOf(out)).toMatchObject({ line: { status: 'temperatures-not-distinct', Ea_kJ_per_mol: null } })
    expect((await rampfold('rate-constants', path, '--out', out, '--quiet')).code).toBe(0)
  })

  it('a decimal comma goes through all of the table', async () => {
    const out = join(place, 'comma')
    const path = await tableFile('comma.csv', textOf('T (K),k (1/s)'))
    expect((await rampfold('rate-constants', path, '--out', out, '--decimal', 'comma', '--quiet')).code).toBe(0)
    const csv = await readFile(join(out, 'rate-constants.csv'), 'utf8')
    expect(csv).toMatch(/^Ea;;;;kJ\/mol;102,8979;/m)
    expect(csv).toMatch(/k, measured;;273;-0,15;1\/s;7,870000e-7/)
  })

  it.each([
    [['rate-constants'], 2, /needs the file/],
    [['rate-constants', 'a', 'b', '--out', 'o'], 2, /takes one table/],
    [['rate-constants', 'a', '--out', 'o', '--model', 'Z9'], 2, /--model: Z9 is not known/],
    [['rate-constants', 'a', '--out', 'o', '--model', 'F1', '--rate-unit', '1/s'], 2, /--rate-unit is for a table/],
    [['rate-constants', 'a', '--out', 'o', '--range', '0.1:0.9'], 2, /--range is for isothermal runs/],
    [['rate-constants', 'a', '--out', 'o', '--model', 'F1', '--range', '0.9:0.1'], 2, /--range: write two conversions/],
    [['rate-constants', 'a', '--out', 'o', '--at', '25'], 2, /"25" has no unit/],
    [['rate-constants', 'a', '--out', 'o', '--at', '-300C'], 2, /--at=VALUE/],
    [['rate-constants', 'a', '--out', 'o', '--at=-300C'], 2, /below absolute zero/],
    [['rate-constants', 'a', '--out', 'o', '--at', '25 bar'], 2, /no unit of temperature/],
    [['rate-constants', 'a', '--out', 'o', '--temperature-unit', 'R'], 2, /--temperature-unit/],
    [['rate-constants', 'a', '--out', 'o', '--rate-unit', 'mg'], 2, /--rate-unit/],
    [['rate-constants', 'not-there.csv', '--out', 'o'], 1, /not-there\.csv: there is no such file/],
  ])('%j is exit %d', async (words, code, message) => {
    const outcome = await rampfold(...words)
    expect(outcome.stderr).toMatch(message)
    expect(outcome.code).toBe(code)
  })

  it('isothermal runs under a chosen model become rate constants', async () => {
    // Exact first-order holds to their end: alpha = 1 - exp(-k t), Ea 100 kJ/mol, A 1e11 1/s.
    const folder = join(place, 'holds')
    await mkdir(folder)
    for (const T of [370, 380, 390, 400]) {
      const k = 1e11 * Math.exp(-100e3 / (8.31446261815324 * T))
      const rows = Array.from({ length: 1600 }, (_, i) => {
        const t = (i * 16) / k / 1600
        return `${t.toPrecision(12)},${T.toFixed(2)},${(10 * (1 - 0.5 * (1 - Math.exp(-k * t)))).toFixed(9)}`
      })
      await writeFile(join(folder, `hold ${T} K.csv`), `time (s),temperature (K),mass (mg)\n${rows.join('\n')}\n`)
    }
    const out = join(place, 'from-holds')
    const { code, stderr } = await rampfold('rate-constants', folder, '--model', 'f1', '--out', out, '--quiet')
    expect([code, stderr]).toEqual([0, ''])
    const json = await jsonOf(out)
    expect(json).toMatchObject({
      rateUnit: '1/s',
      source: { kind: 'isothermal-runs', name: 'First order (F1)' },
      runs: [370, 380, 390, 400].map((T) => ({ file: `hold ${T} K.csv` })),
    })
    expect(await readFile(join(out, 'rate-constants.csv.txt'), 'utf8')).toMatch(/hold 370 K\.csv, SHA-256 [0-9a-f]{64}/)
    expect((json.line['Ea_kJ_per_mol'] ?? 0) / 100).toBeCloseTo(1, 3)
    expect(json.line['lnA_per_s'] ?? 0).toBeCloseTo(Math.log(1e11), 1)
    expect(JSON.stringify(json['findings'])).toMatch(/model-assumed/)
    expect(JSON.stringify(json['findings'])).toMatch(/g = -ln\(1 - alpha\) = k t/)
    expect(JSON.stringify(json['findings'])).not.toMatch(/model-fits-badly|other-models-fit-better/)
    expect(json['holdFits']).toMatchObject({
      model: 'F1',
      method: 'least-squares-of-conversion',
      models: { 0: { model: 'F1', fits: true } },
    })
    const wrong = await rampfold('rate-constants', folder, '--model', 'R2', '--out', out)
    expect(wrong.stdout).toMatch(/caution: R2 does not follow 4 of 4 holds/)
    expect(wrong.stdout).toMatch(/caution: F1 fits the holds better than R2/)
    expect(wrong.stdout).toMatch(/systematic residuals: hold 370 K, hold 380 K, hold 390 K, hold 400 K/)
    expect(wrong.stdout).toMatch(/by reaction model: F1 .*R2 0\.\d+.*; R2 is number \d+ of 21 over all 4 holds, left out or not\n/)
    expect(wrong.stdout).toMatch(/models that fit the holds .*: F1\n/)
    const beside = await readFile(join(out, 'rate-constants.csv.txt'), 'utf8')
    expect(beside).toMatch(/hold 370 K, 96\.85 °C: k .* runs of signs, chance .*: systematic/)
    expect(beside).toMatch(/ 1\. F1 \(First order\): sum of squares .*, fits; Ea (?:99\.9|100\.0)\d kJ\/mol/)
    expect(beside).toMatch(/R2 \(Contracting cylinder\), chosen: /)
    expect(beside).toMatch(/caution, model-fits-badly: .*hold 370 K/)
    const predicted = await rampfold('rate-constants', folder, '--model', 'R2', '--at', '25C', '--out', out, '--strict')
    expect(predicted.code).toBe(3)
    const why = 'no interval: the reaction model does not follow the holds'
    const lines = predicted.stdout.split('\n')
    for (const start of ['ln A: ', 'entropy of activation', 'Gibbs energy', 'k at 25 °C'])
      expect(lines.find((line) => line.startsWith(start))).toMatch(
        /^(?!.* to ).*; no interval: the reaction model does not follow the holds/,
      )
    expect(lines.find((line) => line.startsWith('Ea: '))).toMatch(
      /\d\), of the scatter only: the reaction model does not follow the holds$/,
    )
    expect(predicted.stdout).toMatch(/stop: R2 does not follow 4 of 4 holds/)
    const table = Papa.parse<Record<string, string>>(await readFile(join(out, 'rate-constants.csv'), 'utf8'), { header: true }).data
    const row = (quantity: string): Record<string, string> => table.find((other) => other['quantity'] === quantity) ?? {}
    for (const quantity of ['ln A', 'A', 'k, predicted', 'ln k, predicted'])
      expect(row(quantity)).toMatchObject({ 'lower 95 %': '', 'upper 95 %': '', 'interval of': '', remark: why })
    expect(table.filter((other) => other['quantity'] === 'k, predicted')).toHaveLength(1)
    expect(row('Ea')['remark']).toMatch(/^of the scatter only/)
    const wrongJson = await jsonOf(out)
    expect(wrongJson).toMatchObject({
      modelFollowsHolds: false,
      line: { lnAIntervalStatus: 'model-does-not-follow-holds', ALower95: null, intervalStatus: 'ok' },
      predictions: [{ intervalStatus: 'model-does-not-follow-holds', lineLower95: null }],
    })
    // The k of each hold with the standard error that its fit gave.
    const { holds } = wrongJson['holdFits'] as { readonly holds: readonly { readonly standardError_per_s: number }[] }
    const fitted = table.filter((other) => other['quantity'] === 'k, fitted under R2')
    expect(fitted).toHaveLength(4)
    fitted.forEach((other, i) => {
      expect(Number(other['standard error']) / (holds[i]?.standardError_per_s ?? Number.NaN)).toBeCloseTo(1, 5)
    })
    expect(wrongJson['rows']).toMatchObject(holds.map((hold) => ({ fitStandardError: hold.standardError_per_s, fittedUnder: 'R2' })))
    expect(await readFile(join(out, 'rate-constants.csv.txt'), 'utf8')).toContain(why)
    const noHolds = join(place, 'no-holds.csv')
    await writeFile(
      noHolds,
      `time (s),temperature (K),mass (mg)\n${Array.from({ length: 200 }, (_, i) => `${i},${300 + i},${10 - 5 / (1 + Math.exp((100 - i) / 8))}`).join('\n')}`,
    )
    const refused = await rampfold('rate-constants', noHolds, '--model', 'F1', '--out', out)
    expect(refused.code).toBe(1)
    expect(refused.stderr).toMatch(/None of its runs is isothermal/)
  })

  it('answers a prediction in the unit it was asked in, and says why two temperatures leave no interval', async () => {
    const path = await tableFile('two.csv', 'T (°F),k (1/s)\n77,3.46e-5\n95,1.35e-4\n')
    const out = join(place, 'two')
    const { code, stdout } = await rampfold('rate-constants', path, '--out', out, '--at', '5C,300K,80F')
    expect(code).toBe(0)
    const why = 'no interval: two temperatures'
    expect(stdout).toMatch(/^k at 5 °C: [^(]*; no interval: two temperatures; 20 K below the data/m)
    expect(stdout).toMatch(/^k at 300 K \(26\.85 °C\): [^(]*; no interval: two temperatures$/m)
    expect(stdout).toMatch(/^k at 80 °F: /m)
    expect(stdout).toMatch(/^Ea: [\d.]+ kJ\/mol; no interval: two temperatures$/m)
    const table = Papa.parse<Record<string, string>>(await readFile(join(out, 'rate-constants.csv'), 'utf8'), { header: true }).data
    const predicted = table.filter((row) => row['quantity'] === 'k, predicted')
    expect(predicted.map((row) => [row['interval of'], row['remark']])).toEqual([
      ['', why],
      ['', why],
      ['', why],
    ])
    expect(await jsonOf(out)).toMatchObject({ predictions: [{ intervalStatus: 'two-temperatures' }, {}, {}] })
    const stated = await tableFile('two-stated.csv', 'T (K),k (1/s),u(k) (1/s)\n298,3.46e-5,1e-6\n308,1.35e-4,4e-6\n')
    // R √(0.0289² + 0.0296²)/(1/298 - 1/308) by hand.
    expect((await rampfold('rate-constants', stated, '--out', out)).stdout).toMatch(
      /^Ea between 298 K .* 103\.\d\d kJ\/mol, standard uncertainty 3\.16 \(\d+\.\d\d to \d+\.\d\d\) by the stated uncertainties/m,
    )
  })

  it('names every reaction model in its help', async () => {
    const { stdout } = await rampfold('rate-constants', '--help')
    for (const code of reactionModelCodes) expect(stdout).toMatch(new RegExp(`[ ,]${code}[,\\s]`))
  })

  it('a row that cannot be used is named with file and line', async () => {
    const path = await tableFile('zero.csv', 'T (K),k (1/s)\n300,1e-3\n310,0\n320,3e-3\n')
    const { code, stderr } = await rampfold('rate-constants', path, '--out', join(place, 'zero'))
    expect(code).toBe(1)
    expect(stderr).toMatch(/zero\.csv, line 3: The rate constant “0” is not above 0/)
  })
})
