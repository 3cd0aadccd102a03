// `npm run docs`: a page per method, made from the docstring beside its code; `pages.test.ts` holds that they are those of the code as it is.
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

const here = dirname(fileURLToPath(import.meta.url))
const kinetics = resolve(here, '..')

/** Folders whose methods have pages, with what they are called in the contents. */
const folders = {
  isoconversional: 'Ea against conversion',
  'peak-methods': 'From peaks, and from single runs',
  'rate-constants': 'From rate constants against temperature',
  uncertainty: 'How far to trust it',
  'temperature-integral': 'The temperature integral',
  'kinetic-model': 'Models',
  'reaction-models': 'Reaction models',
  prediction: 'Predictions',
}

/** Titles that a file's name does not give. */
const titles = {
  'factor-per-10-k': 'Factor per 10 K',
  'ln-pre-exponential': 'ln A from one rate constant',
  'monte-carlo': 'Measured sources, by Monte Carlo',
  budget: 'Budget of measured sources',
  'combined-interval': 'Combined interval',
  'draw-interval': 'Interval of draws',
  'vyazovkin-wight': 'F-type interval of Vyazovkin and Wight',
  'p-of-x': 'p(x), exact',
  'senum-yang': 'Rational forms of Senum and Yang',
  'doyle-table': "Doyle's a and b, and the table of ASTM E1641",
  'systematic-error': 'Systematic error of the approximate integral methods',
  'kissinger-for-model': 'Kissinger for any reaction model',
  'half-life-temperature': 'Temperature of a half-life',
  'first-order-peak': 'Peak of a first-order reaction',
  phi: 'Phi(Ea)',
}

const citations = new Map(
  [...readFileSync(join(kinetics, 'sources.ts'), 'utf8').matchAll(/'([a-z0-9-]+)':\s*'((?:[^'\\]|\\.)*)'/g)].map(([, key, text]) => [
    key,
    text.replaceAll("\\'", "'"),
  ]),
)

/** All pages: path under `docs` to text. */
export function pages() {
  const all = new Map()
  const contents = [
    '# Methods',
    '',
    'Made from the docstrings by `npm run docs`; not edited by hand. Quantities are SI (K, s, K/s, J/mol, 1/s) where nothing else is said.',
    '',
  ]
  for (const [folder, title] of Object.entries(folders)) {
    const made = filesOf(folder).flatMap((file) => pageOf(folder, file))
    if (made.length === 0) continue
    contents.push(`## ${title}`, '')
    for (const { path, title: name, summary, text } of made) {
      all.set(path, text)
      contents.push(`- [${name}](${path}): ${summary}`)
    }
    contents.push('')
  }
  all.set('methods.md', `${contents.join('\n').trimEnd()}\n`)
  return all
}

function filesOf(folder) {
  try {
    return readdirSync(join(kinetics, folder))
      .filter((name) => name.endsWith('.ts') && !name.endsWith('.test.ts'))
      .sort()
  } catch (error) {
    if (error.code === 'ENOENT') return []
    throw error
  }
}

/** The page of one file; none where no export of it names a source. */
function pageOf(folder, file) {
  const code = readFileSync(join(kinetics, folder, file), 'utf8')
  const documented = [...code.matchAll(/\/\*\*((?:(?!\*\/)[^])*?)\*\/\s*export (?:const|function) (\w+)/g)]
    .map(([, comment, name]) => ({ name, lines: linesOf(comment) }))
    .filter(({ lines }) => lines.some((line) => line.startsWith('@source')))
  if (documented.length === 0) return []
  const name = file.replace('.ts', '')
  const title = titles[name] ?? /^\s*label: '([^']+)'/m.exec(code)?.[1] ?? sentence(name)
  const sections = documented.map(
    ({ name, lines }) => `${documented.length > 1 ? `## ${name}\n\n` : ''}${markdown(lines, `${folder}/${file}`)}`,
  )
  const path = `${folder}/${file.replace('.ts', '.md')}`
  const text = `# ${title}\n\n${sections.join('\n\n')}\n\nCode: [\`${folder}/${file}\`](../../${folder}/${file})\n`
  return [{ path, title, summary: firstSentence(documented[0].lines), text }]
}

const linesOf = (comment) =>
  comment
    .split('\n')
    .map((line) => line.replace(/^\s*\* ?/, '').trimEnd())
    .filter((line, i, lines) => line !== '' || (i > 0 && i < lines.length - 1))

function markdown(lines, where) {
  const text = []
  const given = []
  const failures = []
  const rests = []
  let open = text
  let isEquation = false
  for (const line of lines) {
    const tag = /^@(\w+)\s*(.*)$/.exec(line)
    if (tag !== null) {
      const [, name, rest] = tag
      if (name === 'source') for (const entry of entries(rest)) rests.push(cited(entry, where))
      else if (name === 'throws') failures.push(`- ${rest}`)
      else if (name === 'param') given.push(`- ${rest.replace(/^(\w+) - /, '`$1`: ')}`)
      else if (name === 'returns') given.push(`- returns ${rest}`)
      open = { source: rests, throws: failures, param: given, returns: given }[name] ?? text
      continue
    }
    if (open !== text && line !== '') {
      open[open.length - 1] += ` ${line.trim()}`
      continue
    }
    const equation = /^ {2}\S/.test(line) && !line.startsWith('  - ')
    if (equation !== isEquation) text.push('```')
    if (equation && !isEquation) text[text.length - 1] = '```text'
    isEquation = equation
    text.push(equation ? line.trim() : line)
  }
  if (isEquation) text.push('```')
  const parts = [
    text
      .join('\n')
      .replace(/\n{3,}/g, '\n\n')
      .trim(),
  ]
  if (given.length > 0) parts.push(given.join('\n'))
  if (failures.length > 0) parts.push(`Errors:\n\n${failures.join('\n')}`)
  parts.push(`Sources:\n\n${rests.map((rest) => `- ${rest}`).join('\n')}`)
  return parts.join('\n\n')
}

/** The works that one @source line names; a semicolon inside a remark parts nothing. */
function entries(rest) {
  const parts = []
  for (const part of rest.split(';').map((one) => one.trim())) {
    if (parts.length === 0 || citations.has(part.split(' ')[0])) parts.push(part)
    else parts[parts.length - 1] += `; ${part}`
  }
  return parts
}

/** A key of `sources.ts`, with what the docstring adds to it (a section, a remark). */
function cited(entry, where) {
  const [, key, rest] = /^([a-z0-9-]+)\s*(.*)$/.exec(entry) ?? []
  const citation = citations.get(key)
  if (citation === undefined) throw new Error(`${where} names the source "${entry}", which is not in sources.ts.`)
  return rest === '' ? citation : `${citation}; ${rest}`
}

const sentence = (kebab) => {
  const words = kebab.replaceAll('-', ' ')
  return words[0].toUpperCase() + words.slice(1)
}

/** The first sentence, with the equation that follows where it ends in a colon. */
function firstSentence(lines) {
  const upTo = lines.findIndex((line) => line === '' || line.startsWith('@'))
  const paragraph = lines
    .slice(0, upTo === -1 ? lines.length : upTo)
    .join(' ')
    .trim()
  const sentence = /^.*?\.(?= |$)/.exec(paragraph)?.[0] ?? paragraph
  const equation = sentence.endsWith('.') ? undefined : lines[upTo + 1]?.trim().replace(/,$/, '')
  return equation === undefined ? sentence : `${sentence.replace(/[,:]$/, '')} \`${equation}\``
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const made = pages()
  for (const folder of Object.keys(folders)) rmSync(join(here, folder), { recursive: true, force: true })
  for (const [path, text] of made) {
    mkdirSync(dirname(join(here, path)), { recursive: true })
    writeFileSync(join(here, path), text)
  }
  console.log(`${made.size} pages in ${here}`)
}
