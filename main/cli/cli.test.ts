import { createHash } from 'node:crypto'
import { execFile, spawn, spawnSync } from 'node:child_process'
import { chmod, cp, mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { existsSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { promisify } from 'node:util'
import Papa from 'papaparse'
import { build } from 'vite'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { demoSeries } from '../demo/demo-series.ts'
import { buildCommandLine } from './build-command-line.ts'
import { codeCacheOf, sealBytes, sealed } from './load-script.ts'
import { run } from './run.ts'

const root = resolve(import.meta.dirname, '../..')
let place = ''
let cli = ''
let demo = ''

/** The command line as it is built, in a folder that has no packages beside it: neither Electron nor anything else can be needed. */
beforeAll(async () => {
  place = await mkdtemp(join(tmpdir(), 'command-line-'))
  await build({
    configFile: false,
    root,
    logLevel: 'error',
    ssr: { noExternal: true },
    build: {
      ssr: true,
      target: 'node20.19',
      outDir: join(place, 'out/main'),
      rolldownOptions: {
        input: { 'worker-entry': join(root, 'main/host/worker-entry.ts') },
        output: { entryFileNames: '[name].js', chunkFileNames: 'chunks/[name]-[hash].js' },
      },
    },
  })
  await buildCommandLine(root, join(place, 'out/main'))
  await cp(join(root, 'package.json'), join(place, 'package.json'))
  await mkdir(join(place, 'out/renderer'))
  await writeFile(join(place, 'out/renderer/index.html'), '<!doctype html><html><head><title>page</title></head></html>')
  cli = join(place, 'out/main/cli.cjs')
  demo = join(place, 'demo')
  await mkdir(demo)
  for (const { fileName, bytes } of demoSeries().files) await writeFile(join(demo, fileName), bytes)
})
afterAll(async () => rm(place, { recursive: true, force: true }))

interface Outcome {
  readonly code: number | null
  readonly stdout: string
  readonly stderr: string
}

function rampfold(...words: readonly string[]): Outcome {
  const { status, stdout, stderr } = spawnSync(process.execPath, [cli, ...words], { encoding: 'utf8', cwd: place })
  return { code: status, stdout, stderr }
}

const script = (): string => join(place, 'out/main/command-line.cjs')
/** What a call prints before its findings and the folder it wrote to. */
const table = (stdout: string): string => stdout.split('\n\n')[0] ?? ''

describe('the code that is kept of the command line', () => {
  it('is taken by another process of the same Node', () => {
    const take = `const { readFileSync } = require('node:fs')
      const [file, cache] = process.argv.slice(1)
      const script = new (require('node:vm').Script)(readFileSync(file, 'latin1'), { filename: file, cachedData: readFileSync(cache).subarray(${sealBytes}) })
      process.stdout.write(String(script.cachedDataRejected))`
    const { stdout } = spawnSync(process.execPath, ['-e', take, script(), codeCacheOf(script())], { encoding: 'utf8' })
    expect(stdout).toBe('false')
  })

  it('is sealed together with the script', async () => {
    const [text, kept] = [await readFile(script()), await readFile(codeCacheOf(script()))]
    expect(kept.equals(sealed(text, kept.subarray(sealBytes)))).toBe(true)
  })

  it('is not needed', async () => {
    const alone = join(place, 'without-kept-code')
    await mkdir(alone)
    for (const name of ['package.json', 'out/main/cli.cjs', 'out/main/command-line.cjs']) await cp(join(place, name), join(alone, name))
    const withKept = rampfold('activation', demo, '--out', join(place, 'with'))
    const without = spawnSync(process.execPath, [join(alone, 'out/main/cli.cjs'), 'activation', demo, '--out', join(place, 'without')], {
      encoding: 'utf8',
    })
    expect([without.status, without.stderr]).toEqual([0, ''])
    expect(table(without.stdout)).toContain('Vyazovkin')
    expect(table(without.stdout)).toBe(table(withKept.stdout))
  })

  it('and the script it belongs to is ASCII, since it is read as such', async () => {
    expect((await readFile(script())).every((byte) => byte < 128)).toBe(true)
  })
})

const io = {
  stderrIsTerminal: false,
  version: '0.0.0',
  workerUrl: new URL('file:///nowhere/worker-entry.js'),
  rendererUrl: new URL('file:///nowhere/renderer/'),
}

const plain = (text: string): void => {
  expect(text).toMatch(/^rampfold: .+\n$/s)
  expect(text).not.toMatch(/\n\s+at |node:internal|\.js:\d/)
}

interface ActivationFile {
  readonly runs: readonly Record<string, unknown>[]
  readonly levels: readonly number[]
  readonly profiles: readonly ({ readonly method: string } & Readonly<Record<string, readonly unknown[]>>)[]
  readonly findings: readonly { readonly code: string; readonly severity: string; readonly message: string }[]
}

const activationFile = async (folder: string): Promise<ActivationFile> =>
  JSON.parse(await readFile(join(folder, 'activation.json'), 'utf8')) as ActivationFile
const csvRows = async (folder: string, delimiter: string): Promise<string[][]> =>
  Papa.parse<string[]>(await readFile(join(folder, 'activation.csv'), 'utf8'), { delimiter, skipEmptyLines: true }).data
const newFolder = async (name: string): Promise<string> => mkdtemp(join(place, `${name}-`))

describe('every call', () => {
  it.each([[['--help']], [['activation', '--help']], [['inspect', '-h']], [['open', '--help']]])(
    '%j answers with help and exit 0',
    (words) => {
      const { code, stdout, stderr } = rampfold(...words)
      expect([code, stderr]).toEqual([0, ''])
      expect(stdout).toMatch(/^rampfold /)
    },
  )

  it.each([[['--version']], [['activation', '--version']], [['inspect', 'x', '--version']], [['open', '--version']]])(
    '%j tells the version',
    async (words) => {
      const { version } = JSON.parse(await readFile(join(root, 'package.json'), 'utf8')) as { version: string }
      expect(rampfold(...words)).toEqual({ code: 0, stdout: `rampfold ${version}\n`, stderr: '' })
    },
  )

  it.each([
    [[], /a command is missing/],
    [['fold'], /there is no command fold/],
    [['rate-constants', 'x'], /needs --out DIR/],
    [['batch', 'x'], /there is no command batch/],
    [['__proto__'], /there is no command __proto__/],
    [['inspect'], /needs a file or a folder/],
    [['activation', '--out', 'o'], /needs the files or the folder/],
    [['activation', 'demo'], /needs --out DIR/],
    [['activation', 'demo', '--out'], /--out <value> needs a value|--out needs a value/],
    [['activation', 'demo', '--out', 'o', '--loud'], /activation has no option --loud/],
    [['activation', 'demo', '--out', 'o', '--strict=yes'], /--strict takes no value/],
    [['activation', 'demo', '--out', 'o', '--out', 'p'], /--out is given more than once/],
    [['activation', 'demo', '--out', 'o', '--window', '-10C:50C'], /--window=VALUE/],
    [['activation', 'demo', '--out', 'o', '--levels', '0:1:0.1'], /0 is not between 0 and 1/],
    [['activation', 'demo', '--out', 'o', '--levels', '0.1:0.9'], /first level, last level and step/],
    [['activation', 'demo', '--out', 'o', '--levels', '0.1,x'], /"x" is not a number/],
    [['activation', 'demo', '--out', 'o', '--levels', '0.1,0.1'], /given twice/],
    [['activation', 'demo', '--out', 'o', '--levels', '0.1:0.9:1e-9'], /at most 2000/],
    [
      ['activation', 'demo', '--out', 'o', '--methods', 'friedman,coats'],
      /coats is not known; known are: friedman, ofw, ofw-corrected, kas, starink, vyazovkin, vyazovkin-incremental, isothermal-integral, starink-1996/,
    ],
    [['activation', 'demo', '--out', 'o', '--signal', 'colour'], /known are: mass, conversion, heat-release, heat-flow/],
    [['activation', 'demo', '--out', 'o', '--baseline', 'none'], /known are: area-proportional, straight/],
    [['activation', 'demo', '--out', 'o', '--window', '430:870'], /with their unit/],
    [['activation', 'demo', '--out', 'o', '--window', '870K:430K'], /end must lie above the start/],
    [['activation', 'demo', '--out', 'o', '--window', '10min:870K'], /both be temperatures or both be times/],
    [['activation', 'demo', '--out', 'o', '--window', '1X:2X'], /no unit of temperature/],
    [['activation', 'demo', '--out', 'o', '--heating-rates', '2,fast'], /"fast" does not start with a number/],
    [['activation', 'demo', '--out', 'o', '--heating-rates', '2,4,6'], /names 3, but there are 5 runs/],
    [['activation', 'demo', '--out', 'o', '--seed', '1.5'], /whole number/],
    [['activation', 'demo', '--out', 'o', '--draws', '5'], /whole number from 100 to 20000/],
    [['activation', 'demo', '--out', 'o', '--lag', '3 K'], /--lag: "k" is no unit of time/],
    [['activation', 'demo', '--out', 'o', '--temperature-run=-1K'], /not negative/],
    [['activation', 'demo', '--out', 'o', '--stated-heating-rate', '150'], /below 100 %/],
    [['activation', 'demo', '--out', 'o', '--decimal', 'dot'], /point, comma/],
    [['activation', 'demo', '--out', 'o', '--separator', 'space'], /comma, semicolon, tab/],
    [['activation', 'demo', '--out', 'o', '--decimal', 'comma', '--separator', 'comma'], /cannot be the same sign/],
    [['activation', 'demo', '--out', 'o', '--encoding', 'ebcdic'], /known are: utf-8/],
    [['activation', 'demo', '--out', 'o', '--first-data-line', '0'], /number of a line/],
    [['inspect', 'demo', '--column', 'mass'], /does not describe a column/],
    [['open', '--port', '1'], /open has no option --port/],
  ])('%j is off: exit 2 and one plain message, nothing written', async (words, message) => {
    let [stdout, stderr] = ['', '']
    const code = await run(
      words.map(
        (word) =>
          new Map([
            ['demo', demo],
            ['o', join(place, 'o')],
          ]).get(word) ?? word,
      ),
      { ...io, stdout: (text) => (stdout += text), stderr: (text) => (stderr += text) },
    )
    expect([code, stdout]).toEqual([2, ''])
    plain(stderr)
    expect(stderr).toMatch(message)
    expect(existsSync(join(place, 'o'))).toBe(false)
  })

  it('ends with 2 as a process, too', () => {
    expect(rampfold('fold')).toMatchObject({ code: 2, stdout: '' })
  })

  it('names no command of later versions in any help', () => {
    for (const words of [['--help'], ['activation', '--help'], ['inspect', '--help'], ['open', '--help']]) {
      expect(rampfold(...words).stdout).not.toMatch(/batch/)
    }
  })
})

const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex')

describe('activation', () => {
  it('writes every file and shows the table, from a folder in natural order', async () => {
    const out = await newFolder('out')
    await writeFile(join(out, 'mine.txt'), 'keep')
    const { code, stdout, stderr } = rampfold('activation', demo, '--out', out)
    expect([code, stderr]).toEqual([0, ''])
    expect((await readdir(out)).sort()).toEqual(['activation.csv', 'activation.csv.txt', 'activation.json', 'activation.svg', 'mine.txt'])
    expect(stdout).toMatch(/conversion +Friedman/)
    expect(stdout).toContain('activation.json, activation.csv, activation.csv.txt, activation.svg')
    const json = await activationFile(out)
    expect(json.runs.map((run) => run['file'])).toEqual(demoSeries().files.map((file) => file.fileName))
    expect(json.levels).toEqual([0.05, 0.1, 0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6, 0.65, 0.7, 0.75, 0.8, 0.85, 0.9, 0.95])
    expect(json.profiles.map((profile) => profile.method)).toEqual([
      'friedman',
      'ofw',
      'ofw-corrected',
      'kas',
      'starink',
      'vyazovkin',
      'vyazovkin-incremental',
    ])
    expect(json.findings.map((finding) => finding.code)).toContain('heating-rate-differs-from-nominal')
  })

  it('replaces its own files, and gives the same bytes for the same input', async () => {
    const out = await newFolder('out')
    await writeFile(join(out, 'activation.json'), 'old')
    expect(rampfold('activation', demo, '--out', out, '--quiet')).toEqual({ code: 0, stdout: '', stderr: '' })
    const first = await readFile(join(out, 'activation.json'), 'utf8')
    rampfold('activation', demo, '--out', out, '--quiet')
    expect(await readFile(join(out, 'activation.json'), 'utf8')).toBe(first)
    expect(first).not.toBe('old')
  })

  it('does not take its own results for exports when they lie beside the runs', async () => {
    const both = await newFolder('both')
    await cp(demo, both, { recursive: true })
    await writeFile(join(both, 'README.txt'), 'what these files are')
    for (const _ of [1, 2]) expect(rampfold('activation', both, '--out', both, '--quiet').code).toBe(0)
    expect((await activationFile(both)).runs).toHaveLength(5)
  })

  it('takes levels, methods and window as they are asked for', async () => {
    const out = await newFolder('out')
    const words = ['--levels', '0.2,0.5', '--methods', 'kas,friedman', '--window', '100C:450C', '--seed', '1']
    expect(rampfold('activation', demo, '--out', out, '--quiet', ...words).code).toBe(0)
    const json = await activationFile(out)
    expect(json.levels).toEqual([0.2, 0.5])
    expect(json.profiles.map((profile) => profile.method).sort()).toEqual(['friedman', 'kas'])
    for (const run of json.runs)
      expect(run['window']).toMatchObject({ start_K: expect.closeTo(373.15, 0) as number, end_K: expect.closeTo(723.15, 0) as number })
  })

  it('adds intervals by resampling and from measured sources where they are asked for, the same for the same seed', async () => {
    const texts: string[] = []
    for (const seed of ['3', '3', '4']) {
      const out = await newFolder('out')
      const words = ['--levels', '0.3,0.6', '--methods', 'starink,vyazovkin', '--temperature-common', '2K', '--lag', '0', '--seed', seed]
      expect(rampfold('activation', demo, '--out', out, '--quiet', ...words).code).toBe(0)
      texts.push(await readFile(join(out, 'activation.json'), 'utf8'))
      expect(await readFile(join(out, 'activation.csv.txt'), 'utf8')).toContain('Temperature, common to all runs, 2 K, as stated')
    }
    expect(texts[1]).toBe(texts[0])
    expect(texts[2]).not.toBe(texts[0])
    const json = JSON.parse(texts[0] ?? '') as { uncertainty: unknown; profiles: { otherIntervals: { kind: string }[] }[] }
    expect(json.uncertainty).toEqual({ seed: 3, draws: 2000 })
    expect(json.profiles[1]?.otherIntervals.map((interval) => interval.kind).sort()).toEqual([
      'bootstrap',
      'combined',
      'jackknife',
      'measured-sources',
      'vyazovkin-wight-f',
    ])
  })

  it('writes the table with the decimal sign and separator asked for, with the same numbers', async () => {
    const [point, comma, tab] = [await newFolder('out'), await newFolder('out'), await newFolder('out')]
    rampfold('activation', demo, '--out', point, '--quiet')
    rampfold('activation', demo, '--out', comma, '--quiet', '--decimal', 'comma')
    rampfold('activation', demo, '--out', tab, '--quiet', '--separator', 'tab')
    const plainRows = await csvRows(point, ',')
    expect(plainRows).toHaveLength(20)
    expect((await csvRows(comma, ';')).map((row) => row.map((cell) => cell.replace(',', '.')))).toEqual(plainRows)
    expect(await csvRows(tab, '\t')).toEqual(plainRows)
    const json = await activationFile(point)
    expect(Number(plainRows[5]?.[1])).toBeCloseTo(Number(json.profiles[0]?.['Ea_kJ_per_mol']?.[4]), 4)
  })

  it('refuses one bad file among several with file, line, reason and remedy, and writes nothing', async () => {
    const folder = await newFolder('bad')
    await cp(demo, folder, { recursive: true })
    await writeFile(join(folder, 'spoilt.csv'), 'Time (min),Temperature (°C),Mass (mg)\n0,30,8.1\n1,here,8.1\n2,50\nend\n')
    const out = join(folder, 'out')
    const { code, stdout, stderr } = rampfold('activation', folder, '--out', out)
    expect([code, stdout]).toEqual([1, ''])
    plain(stderr)
    expect(stderr).toContain(join(folder, 'spoilt.csv'))
    expect(existsSync(out)).toBe(false)
  })

  it('leaves a bad file out on request, with a finding', async () => {
    const folder = await newFolder('bad')
    await cp(demo, folder, { recursive: true })
    await writeFile(join(folder, 'spoilt.csv'), Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0, 1, 2, 3))
    const out = await newFolder('out')
    expect(rampfold('activation', folder, '--out', out, '--skip-unusable', '--quiet').code).toBe(0)
    const json = await activationFile(out)
    expect(json.runs).toHaveLength(5)
    const [left] = json.findings.filter((finding) => finding.code === 'file-left-out')
    expect(left?.message).toContain('spoilt.csv')
    expect(await readFile(join(out, 'activation.csv.txt'), 'utf8')).toContain('file-left-out')
  })

  it.each([
    ['a path that is not there', ['nowhere'], /nowhere: there is no such file or folder/],
    ['a folder without exports', ['empty'], /there are no exports in this folder/],
    ['the same measurement twice', ['twice'], /twice|already/],
    ['nothing usable, even when the unusable is skipped', ['junk', '--skip-unusable'], /None of the files can be used/],
  ])('cannot use %s: exit 1, plainly', async (_, words, message) => {
    await mkdir(join(place, 'empty'), { recursive: true })
    await mkdir(join(place, 'twice'), { recursive: true })
    await mkdir(join(place, 'junk'), { recursive: true })
    for (const name of ['a.csv', 'b.csv']) await writeFile(join(place, 'twice', name), demoSeries().files[0]?.bytes ?? '')
    await writeFile(join(place, 'junk/junk.csv'), 'nothing here\n')
    const out = await newFolder('out')
    const { code, stdout, stderr } = rampfold('activation', ...words, '--out', out)
    expect([code, stdout]).toEqual([1, ''])
    plain(stderr)
    expect(stderr).toMatch(message)
    expect(await readdir(out)).toEqual([])
  })

  it('takes a file that is named twice, or with its folder, once', async () => {
    const out = await newFolder('out')
    const [first = ''] = demoSeries().files.map((file) => join(demo, file.fileName))
    expect(rampfold('activation', first, demo, first, '--out', out, '--quiet').code).toBe(0)
    expect((await activationFile(out)).runs).toHaveLength(5)
  })

  it('says why when the results cannot be written', async () => {
    const file = join(place, 'file-in-the-way')
    await writeFile(file, '')
    const { code, stderr } = rampfold('activation', demo, '--out', file)
    expect(code).toBe(1)
    plain(stderr)
    expect(stderr).toContain('cannot be written: a file has that name')
  })

  it('ends with 3 when strict and a finding of severity stop stands, with the files written', async () => {
    const [out, relaxed] = [await newFolder('out'), await newFolder('out')]
    const [one = ''] = demoSeries().files.map((file) => join(demo, file.fileName))
    const strict = rampfold('activation', one, '--out', out, '--strict', '--quiet')
    const json = await activationFile(out)
    expect(json.findings.some((finding) => finding.severity === 'stop')).toBe(true)
    expect(strict.code).toBe(3)
    expect(rampfold('activation', one, '--out', relaxed, '--quiet').code).toBe(0)
  })

  it('needs a heating rate for exports without time, and takes those named in the order of the runs', async () => {
    const folder = await newFolder('timeless')
    for (const [i, { bytes }] of demoSeries().files.entries()) {
      const rows = new TextDecoder().decode(bytes).split('\n').slice(7)
      await writeFile(join(folder, `${'abcde'[i]}.csv`), rows.map((row) => row.split(',').slice(1).join(',')).join('\n'))
    }
    const out = await newFolder('out')
    const without = rampfold('activation', folder, '--out', out)
    expect(without.code).toBe(1)
    plain(without.stderr)
    expect(without.stderr).toMatch(/heating rate/)
    const given = rampfold('activation', folder, '--out', out, '--quiet', '--heating-rates', '2,4,6,10.4,20')
    expect(given).toEqual({ code: 0, stdout: '', stderr: '' })
    const json = await activationFile(out)
    expect(json.runs.map((run) => [run['file'], run['heatingRateSource']])).toEqual(
      ['a', 'b', 'c', 'd', 'e'].map((name) => [`${name}.csv`, 'option']),
    )
    const reversed = rampfold(
      'activation',
      ...['e', 'd', 'c', 'b', 'a'].map((name) => join(folder, `${name}.csv`)),
      '--out',
      out,
      '--quiet',
      '--heating-rates',
      '20,10.4,6,4,2',
    )
    expect(reversed.code).toBe(0)
    expect((await activationFile(out)).profiles).toEqual(json.profiles)
  })

  it('gives each heating rate to the run it stands for, also where files of two folders have one name', async () => {
    const [first, second] = [await newFolder('first'), await newFolder('second')]
    const timeless = demoSeries()
      .files.slice(0, 3)
      .map(({ bytes }) =>
        new TextDecoder()
          .decode(bytes)
          .split('\n')
          .slice(7)
          .map((row) => row.split(',').slice(1).join(','))
          .join('\n'),
      )
    const paths = [join(second, 'run.csv'), join(first, 'z.csv'), join(first, 'run.csv')]
    for (const [i, path] of paths.entries()) await writeFile(path, timeless[i] ?? '')
    const out = await newFolder('out')
    expect(rampfold('activation', ...paths, '--out', out, '--quiet', '--heating-rates', '2,4,6').code).toBe(0)
    const rateOf = new Map((await activationFile(out)).runs.map((run) => [run['sha256'], run['heatingRate_K_per_min'] as number]))
    for (const [i, rate] of [2, 4, 6].entries()) expect(rateOf.get(sha256(timeless[i] ?? ''))).toBeCloseTo(rate, 9)
  })

  it('names the command for a saved study instead of reading it as an export', async () => {
    const folder = await newFolder('saved')
    await writeFile(join(folder, 'copy.rampfold'), 'PK')
    for (const command of [['inspect'], ['activation', '--out', join(folder, 'out')]]) {
      const { code, stderr } = rampfold(...command, join(folder, 'copy.rampfold'))
      expect(code).toBe(1)
      plain(stderr)
      expect(stderr).toContain(`rampfold open ${join(folder, 'copy.rampfold')}`)
    }
  })

  it('passes import overrides on', async () => {
    const folder = await newFolder('override')
    await cp(demo, folder, { recursive: true })
    const { code, stderr } = rampfold('activation', folder, '--out', join(folder, 'out'), '--column', '3=set-aside')
    expect(code).toBe(1)
    plain(stderr)
  })

  it('reads a file it may not read as a plain refusal', async (context) => {
    context.skip(process.getuid?.() === 0, 'the superuser may read everything')
    const file = join(await newFolder('closed'), 'closed.csv')
    await writeFile(file, 'x')
    await chmod(file, 0)
    expect(rampfold('inspect', file)).toMatchObject({ code: 1, stderr: expect.stringContaining('no permission') as string })
  })
})

describe('inspect', () => {
  it('prints how each file was read', () => {
    const { code, stdout, stderr } = rampfold('inspect', demo)
    expect([code, stderr]).toEqual([0, ''])
    for (const { fileName } of demoSeries().files) expect(stdout).toContain(fileName)
    for (const line of [
      /encoding +utf-8/,
      /delimiter +comma/,
      /decimal sign +point/,
      /mass +Mass \(mg\) +in mg/,
      /rows +1291/,
      /Gas +nitrogen/,
    ]) {
      expect(stdout).toMatch(line)
    }
    expect(stdout).toMatch(/heating rate +10\.4\d\d ±<?[\d.]+ K\/min, measured +nominal 10 K\/min from the preamble/)
  })

  it('says the same as JSON', () => {
    const { code, stdout } = rampfold('inspect', demo, '--json')
    const json = JSON.parse(stdout) as { format: string; files: { file: string; runs: Record<string, unknown>[] }[] }
    expect([code, json.format, json.files.length]).toEqual([0, 'rampfold.inspect/1', 5])
    expect(json.files[3]?.runs[0]).toMatchObject({
      rows: 1241,
      hasTime: true,
      programme: 'constant-heating-rate',
      heatingRateSource: 'measured',
      nominalHeatingRate_K_per_min: 10,
      columns: [{ quantity: 'mass', heading: 'Mass (mg)', unit: 'mg', heldIn: 'kg' }],
    })
  })

  it('reports the readable files and names the others', async () => {
    const folder = await newFolder('mixed')
    await cp(demo, folder, { recursive: true })
    await writeFile(join(folder, 'zz.csv'), 'nothing here\n')
    const { code, stdout, stderr } = rampfold('inspect', folder)
    expect(code).toBe(1)
    expect(stdout).toContain('20 K per min')
    plain(stderr)
    expect(stderr).toContain(join(folder, 'zz.csv'))
  })

  it('is not upset by a reader that has seen enough', async () => {
    const child = promisify(execFile)('sh', ['-c', `"${process.execPath}" "${cli}" inspect demo | head -n 1`], { cwd: place })
    expect(await child).toMatchObject({ stderr: '' })
  })
})

describe('open', () => {
  it('prints its address and serves until it is told to end', async () => {
    const child = spawn(process.execPath, [cli, 'open', '--no-browser'], {
      cwd: place,
      env: { ...process.env, RAMPFOLD_DATA: join(place, 'data') },
    })
    try {
      let said = ''
      child.stdout.setEncoding('utf8').on('data', (text: string) => {
        said += text
      })
      await expect.poll(() => said, { timeout: 20_000 }).toMatch(/http:\/\/127\.0\.0\.1:\d+\/\?key=\S+/)
      const address = /http:\/\/127\.0\.0\.1:\d+\/\?key=\S+/.exec(said)?.[0] ?? ''
      expect((await fetch(address, { redirect: 'manual' })).status).toBe(303)
      expect((await fetch(new URL('/', address))).status).toBeGreaterThanOrEqual(400)
    } finally {
      const ended = new Promise<number | null>((settle) => child.on('exit', settle))
      child.kill('SIGTERM')
      expect(await ended).toBe(0)
    }
  })

  it('refuses files it cannot use before it serves anything', async () => {
    await mkdir(join(place, 'junk'), { recursive: true })
    await writeFile(join(place, 'junk/junk.csv'), 'nothing here\n')
    const { code, stderr } = rampfold('open', '--no-browser', 'junk')
    expect(code).toBe(1)
    plain(stderr)
    expect(stderr).toContain('junk.csv')
  })
})
