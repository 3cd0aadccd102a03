import type { DecimalSignWord } from '../../shared-kinetics/contract/import-options.ts'
import type { Dialect } from './decide-dialect.ts'
import { unitOf } from './file-unit.ts'
import type { Layout } from './find-layout.ts'
import { type HeatingRateText, heatingRateIn } from './heating-rate-text.ts'
import { parseNumber } from './parse-number.ts'
import { splitCells } from './split-cells.ts'
import { lineText, type TextLines } from './text-lines.ts'

/** What the lines above the table say. */
export interface Preamble {
  readonly initialMass_kg: number | null
  readonly heatingRate: HeatingRateText | null
  readonly exothermic: 'up' | 'down' | null
  /** Everything else, as written. */
  readonly metadata: readonly { readonly key: string; readonly value: string }[]
}

interface Entry {
  readonly key: string
  readonly value: string
}

const most = { entries: 1000, text: 4000, line: 20_000 }

/** Reads `key: value`, `key;value;unit`, `key<TAB>value`, `key = value` and `# remark` lines. */
export function parsePreamble(lines: TextLines, layout: Layout, dialect: Dialect): Preamble {
  const entries = layout.preamble.slice(0, most.entries).map((i) => entryOf(lineText(lines, i).slice(0, most.line), dialect))
  const rateEntry = (wanted: RegExp): { rate: HeatingRateText; entry: Entry } | null => {
    const found = entries
      .filter((entry) => wanted.test(entry.key) && !/\bcool/i.test(entry.key))
      .map((entry) => ({ rate: rateOf(entry, dialect.decimal), entry }))
      .filter((pair): pair is { rate: HeatingRateText; entry: Entry } => pair.rate !== null)
    const [first] = found
    // Two programmes in one preamble: neither is this run's heating rate.
    return first !== undefined && found.every((pair) => pair.rate.heatingRate_K_per_s === first.rate.heatingRate_K_per_s) ? first : null
  }
  const rate =
    rateEntry(/\b(?:heating|ramp|scan(?:ning)?) ?rate\b|\bbeta\b|^\u03b2$/i) ??
    rateEntry(/\b(?:heating|ramp|program(?:me)?|method|segment|step|rate)\b/i)
  const massEntry = entries.find((entry) => massKey.test(entry.key) && massOf(entry, dialect.decimal) !== null)
  const exothermic = exothermicIn(entries.map((entry) => `${entry.key} ${entry.value}`))
  const isUsed = (entry: Entry): boolean =>
    entry === massEntry ||
    (entry === rate?.entry && rate.rate.text.length >= entry.value.trim().length - 2) ||
    exothermicIn([`${entry.key} ${entry.value}`]) !== null
  return {
    initialMass_kg: massEntry === undefined ? null : massOf(massEntry, dialect.decimal),
    heatingRate: rate?.rate ?? null,
    exothermic,
    metadata: entries
      .filter((entry) => !isUsed(entry))
      .map(({ key, value }) => ({ key: key.slice(0, most.text), value: value.slice(0, most.text) })),
  }
}

function entryOf(line: string, dialect: Dialect): Entry {
  const plain = line.replace(/^\s*(?:#+|%+|\/\/)\s*/, '').trim()
  const cells = splitCells(plain, dialect.delimiter === 'blanks' ? 'tab' : dialect.delimiter).filter((cell) => cell !== '')
  const sign = /^(.{1,80}?)\s*(?::(?=\s|$)|=|\t)\s*(.*)$/.exec(plain)
  const [first = ''] = cells
  const signIsFirst = sign !== null && ((sign[1] ?? '').length < first.length || cells.length < 2)
  if (signIsFirst) {
    // `Sample mass:;5,11;mg`: the value stands in cells of its own.
    const behind = (sign[2] ?? '').trim()
    const inCells = cells.length >= 2 && first.endsWith(':')
    const value = inCells ? cells.slice(1).join(' ') : behind
    return { key: (sign[1] ?? '').trim(), value }
  }
  if (cells.length >= 2) return { key: first.replace(/:$/, '').trim(), value: cells.slice(1).join(' ') }
  return { key: 'remark', value: first.replace(/:$/, '') }
}

/** The rate in the value, or in `Heating rate (K/min): 10` the number with the unit of the key. */
function rateOf(entry: Entry, decimal: DecimalSignWord): HeatingRateText | null {
  const inValue = heatingRateIn(entry.value)
  if (inValue !== null) return inValue
  const unit = /[([]\s*([^()[\]]*\/\s*(?:min|s|h)[^()[\]]*)[)\]]/.exec(entry.key)?.[1]
  const number = unambiguousNumber(entry.value, decimal)
  return unit === undefined || number === null ? null : heatingRateIn(`${number} ${unit}`)
}

const massKey =
  /^(?:(?:initial|sample|specimen|starting) )*(?:mass|weight|size)(?: of (?:the )?sample)?\s*(?:[([/,].*)?$|^m_?0\s*(?:[([/,].*)?$/i

function massOf(entry: Entry, decimal: DecimalSignWord): number | null {
  const split = /^\s*([-+]?[\d.,\u2009\u202f\u00a0']+)\s*(.*)$/.exec(entry.value)
  const number = split === null ? null : unambiguousNumber(split[1] ?? '', decimal)
  const written = (split?.[2] ?? '').trim() === '' ? (/[([]\s*([^()[\]]*)[)\]]/.exec(entry.key)?.[1] ?? '') : (split?.[2] ?? '')
  const unit = unitOf(written)
  if (number === null || unit?.dimension !== 'mass') return null
  const mass = unit.toSI(number)
  return mass > 0 ? mass : null
}

/** A preamble may keep a decimal sign other than the table's; `1,234` beside a decimal point is then passed over. */
function unambiguousNumber(text: string, decimal: DecimalSignWord): number | null {
  const plain = text.trim()
  const [own, other] = decimal === 'point' ? (['.', ','] as const) : ([',', '.'] as const)
  if (plain.includes(own) && plain.includes(other)) return null
  if (plain.includes(other) && /^[-+]?[1-9]\d{0,2}[.,]\d{3}$/.test(plain)) return null
  const sign = plain.includes(other) ? (decimal === 'point' ? 'comma' : 'point') : decimal
  const value = parseNumber(plain, 0, plain.length, sign)
  return Number.isNaN(value) ? null : value
}

/** Which way an exothermic event points, where all of the texts that say so agree: `Exothermic: down`, `exo up`, `Endo ↑`. */
export function exothermicIn(texts: readonly string[]): 'up' | 'down' | null {
  const said = new Set<'up' | 'down'>()
  for (const text of texts) {
    for (const [, kind = '', way = ''] of text.matchAll(
      /\b(exo|endo)(?:thermic|thermal|therm)?\b(?:\s+(?:direction|effects?|events?|peaks?|signal|is))*[\s:;,=()[\]]*(up(?:wards?)?|down(?:wards?)?|positive|negative|\u2191|\u2193)/gi,
    )) {
      const up = /^(?:up|positive|\u2191)/i.test(way)
      said.add(up === /^exo/i.test(kind) ? 'up' : 'down')
    }
  }
  const [only] = said
  return said.size === 1 && only !== undefined ? only : null
}
