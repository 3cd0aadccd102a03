import { describe, expect, it } from 'vitest'
import { methodsWith } from './methods-with.ts'

describe('methods on request', () => {
  it('stand beside those that ran anyway', () => {
    expect(methodsWith(['friedman', 'starink'], ['tang'])).toEqual(['friedman', 'starink', 'tang'])
    expect(methodsWith(['friedman', 'starink', 'tang'], ['tang', 'astm-e1641'])).toEqual(['friedman', 'starink', 'tang', 'astm-e1641'])
    expect(methodsWith(['friedman', 'tang', 'astm-e1641'], ['astm-e1641'])).toEqual(['friedman', 'astm-e1641'])
  })

  it('give the choice back to the program once none is wanted', () => {
    expect(methodsWith(['friedman', 'starink', 'tang'], [])).toBeNull()
  })
})
