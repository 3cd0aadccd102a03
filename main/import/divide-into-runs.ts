import { type HeatingRateText, heatingRateIn } from './heating-rate-text.ts'
import { type Refuse, quoted } from './import-refusal.ts'
import type { PlannedColumn } from './plan-columns.ts'
import type { RawTable } from './read-columns.ts'

/** The columns of one run. */
export interface RunOfColumns {
  readonly time: PlannedColumn | null
  readonly temperature: PlannedColumn
  /** In the order in which they are listed in the run. */
  readonly signals: readonly PlannedColumn[]
  readonly heatingRate: HeatingRateText | null
  /** What tells this run from the others of the file; null where it is the only one. */
  readonly part: string | null
}

export interface Division {
  readonly runs: readonly RunOfColumns[]
  /** Columns that belong to no run after all, with the reason. */
  readonly leftOver: readonly { readonly column: PlannedColumn; readonly why: string }[]
}

interface Block {
  readonly times: PlannedColumn[]
  readonly temperatures: PlannedColumn[]
  readonly signals: PlannedColumn[]
}

const isSignal = (column: PlannedColumn): boolean => column.quantity !== 'time' && column.quantity !== 'temperature'

/**
 * Divides the columns into runs that stand side by side: a pattern that repeats (time, temperature, mass, time, …), or else a new run at
 * each time or temperature behind a signal. Signals of one quantity under several heating rates beside one temperature are a run each.
 * @throws ImportRefusal where there is no temperature or no signal
 */
export function divideIntoRuns(
  plan: readonly PlannedColumn[],
  table: RawTable,
  titles: readonly string[],
  line: number,
  refuse: Refuse,
): Division {
  const used = plan.filter((column) => column.quantity !== null && (table.filled[column.index] ?? 0) > 0)
  refuseWhatIsMissing(plan, used, line, refuse)
  const leftOver: { column: PlannedColumn; why: string }[] = []
  const blocks = repeatedBlocks(used) ?? walkedBlocks(used)
  const shared = sharedTime(blocks, table)
  const runs: Omit<RunOfColumns, 'part'>[] = []
  for (const block of blocks) {
    const [temperature, ...otherTemperatures] = block.temperatures
    const [time = shared ?? null, ...otherTimes] = block.times
    if (temperature === undefined || block.signals.length === 0) {
      const all = [...block.times, ...block.temperatures, ...block.signals]
      leftOver.push(...all.map((column) => ({ column, why: 'no temperature and signal stand with it' })))
      continue
    }
    const again = [...otherTemperatures, ...otherTimes]
    leftOver.push(...again.map((column) => ({ column, why: 'the run has such a column already' })))
    for (const signals of time === null ? byHeatingRate(block.signals) : [block.signals]) {
      const rates = [temperature, ...signals, ...block.times].map((column) => column.heading.heatingRate)
      runs.push({ time, temperature, signals: listed(signals), heatingRate: agreed(rates) })
    }
  }
  const titleOf = titlesOf(runs, titles)
  const titled = runs.map((run, i) => ({ ...run, heatingRate: run.heatingRate ?? heatingRateIn(titleOf?.[i] ?? '') }))
  const parts = partsOf(titled, titleOf)
  return { runs: titled.map((run, i) => ({ ...run, part: parts[i] ?? null })), leftOver }
}

function refuseWhatIsMissing(plan: readonly PlannedColumn[], used: readonly PlannedColumn[], line: number, refuse: Refuse): void {
  const listing = plan
    .filter((column) => (column.quantity ?? column.setAside) !== null && column.heading.text !== '')
    .map((column) => quoted(column.label))
  const seen = listing.length === 0 ? '' : ` The columns are ${listing.slice(0, 12).join(', ')}${listing.length > 12 ? ', …' : ''}.`
  const empty = plan.filter((column) => column.quantity !== null && !used.includes(column))
  const blank = empty.length === 0 ? '' : ` Empty in every row: ${empty.map((column) => quoted(column.label)).join(', ')}.`
  const weighty = plan
    .filter((column) => column.weighty)
    .map((column) => ` ${quoted(column.label)} was set aside: ${column.setAside ?? ''}.`)
  if (!used.some((column) => column.quantity === 'temperature')) {
    throw refuse(
      line,
      `No column holds the temperature of the sample.${seen}${blank}`,
      'State which column is “temperature”, and its unit (on the command line: --column), or name it in the heading.',
    )
  }
  if (!used.some(isSignal)) {
    const remedy =
      'State which column is “mass”, “conversion”, “heat-flow” or “heat-release”, and its unit (on the command line: --column), or name it in the heading.'
    throw refuse(
      line,
      `No column holds a signal (mass, heat flow, heat-release rate or conversion).${weighty.join('')}${seen}${blank}`,
      remedy,
    )
  }
}

const blockOf = (columns: readonly PlannedColumn[]): Block => ({
  times: columns.filter((column) => column.quantity === 'time'),
  temperatures: columns.filter((column) => column.quantity === 'temperature'),
  signals: columns.filter(isSignal),
})

function repeatedBlocks(used: readonly PlannedColumn[]): readonly Block[] | null {
  const temperatures = used.filter((column) => column.quantity === 'temperature').length
  const period = used.length / temperatures
  if (temperatures < 2 || !Number.isInteger(period) || period < 2) return null
  if (used.some((column, i) => column.quantity !== used[i % period]?.quantity)) return null
  const blocks = Array.from({ length: temperatures }, (_, k) => blockOf(used.slice(k * period, (k + 1) * period)))
  return blocks.every((block) => block.temperatures.length === 1 && block.times.length <= 1) ? blocks : null
}

function walkedBlocks(used: readonly PlannedColumn[]): readonly Block[] {
  if (used.filter((column) => column.quantity === 'temperature').length === 1) return [blockOf(used)]
  const groups: PlannedColumn[][] = [[]]
  for (const column of used) {
    const group = groups.at(-1) ?? []
    const whole = group.some(isSignal) && group.some((other) => other.quantity === 'temperature')
    if (!isSignal(column) && whole) groups.push([column])
    else group.push(column)
  }
  return groups.map(blockOf)
}

/** One time column in front of several runs of its own length serves them all. */
function sharedTime(blocks: readonly Block[], table: RawTable): PlannedColumn | undefined {
  const [first, ...others] = blocks
  const time = first?.times[0]
  if (time === undefined || others.length === 0 || others.some((block) => block.times.length > 0)) return undefined
  const rows = table.filled[time.index]
  return others.every((block) => block.temperatures.every((column) => table.filled[column.index] === rows)) ? time : undefined
}

function byHeatingRate(signals: readonly PlannedColumn[]): readonly (readonly PlannedColumn[])[] {
  const groups = new Map<number, PlannedColumn[]>()
  for (const signal of signals) {
    const rate = signal.heading.heatingRate?.heatingRate_K_per_s
    if (rate === undefined) return [signals]
    groups.set(rate, [...(groups.get(rate) ?? []), signal])
  }
  return groups.size > 1 ? [...groups.values()] : [signals]
}

/** Of several columns of one quantity the total, or else the first, comes first. */
const listed = (signals: readonly PlannedColumn[]): readonly PlannedColumn[] => signals.toSorted((a, b) => a.rank - b.rank)

function agreed(rates: readonly (HeatingRateText | null)[]): HeatingRateText | null {
  const found = rates.filter((rate) => rate !== null)
  const [first] = found
  return first !== undefined && found.every((rate) => rate.heatingRate_K_per_s === first.heatingRate_K_per_s) ? first : null
}

type Untold = Omit<RunOfColumns, 'part'>

/** Titles above the headings, where each run has exactly one above its columns. */
function titlesOf(runs: readonly Untold[], titles: readonly string[]): readonly string[] | null {
  const columnsOf = (run: Untold): readonly number[] =>
    [run.time, run.temperature, ...run.signals].flatMap((column) => (column === null ? [] : [column.index]))
  const starts = runs.map((run) => Math.min(...columnsOf(run)))
  const own = starts.map((start, i) => titles.slice(i === 0 ? 0 : start, starts[i + 1] ?? titles.length).filter((title) => title !== ''))
  return runs.length > 1 && own.every((mine) => mine.length === 1) ? own.map(([title = '']) => title) : null
}

/** Title above the run, or heating rate where it tells the runs apart, else the words of the headings that do, else a number. */
function partsOf(runs: readonly Untold[], titles: readonly string[] | null): readonly (string | null)[] {
  if (runs.length < 2) return [null]
  if (titles !== null) return numbered(titles)
  const rates = runs.map((run) => run.heatingRate?.text ?? '')
  if (!rates.includes('')) return numbered(rates)
  const words = runs.map((run) => [run.temperature, ...run.signals].flatMap((column) => column.heading.name.split(/[\s_]+/)))
  const own = words.map((mine) => [...new Set(mine.filter((word) => !words.every((other) => other.includes(word))))].join(' '))
  return own.includes('') ? runs.map((_, i) => `run ${i + 1}`) : numbered(own)
}

function numbered(parts: readonly string[]): readonly string[] {
  const seen = new Map<string, number>()
  return parts.map((part) => {
    const count = (seen.get(part) ?? 0) + 1
    seen.set(part, count)
    return count === 1 ? part : `${part} (${count})`
  })
}
