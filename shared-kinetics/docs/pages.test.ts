import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { methodIds } from '../isoconversional/result.ts'
import { methods } from '../isoconversional/registry.ts'
import { pages } from './write-pages.mjs'

const here = import.meta.dirname

describe('the page of each method', () => {
  it('is the one its docstring makes (npm run docs)', () => {
    for (const [path, text] of pages()) {
      expect({ path, text: existsSync(join(here, path)) ? readFileSync(join(here, path), 'utf8') : null }).toEqual({ path, text })
    }
  })

  it('stands for code that is there', () => {
    const made = new Set(pages().keys())
    const folders = readdirSync(here, { withFileTypes: true }).filter((entry) => entry.isDirectory())
    expect(folders.length).toBeGreaterThan(3)
    for (const { name } of folders) for (const file of readdirSync(join(here, name))) expect(made).toContain(`${name}/${file}`)
  })

  it.each(methodIds)('is there for %s, with a title, an equation and a source', (id) => {
    const { label } = methods[id].info
    const page = [...pages().values()].find((text) => text.startsWith(`# ${label}\n`))
    expect(page).toContain('```text')
    expect(page).toMatch(/Sources:\n\n- \S/)
  })
})
