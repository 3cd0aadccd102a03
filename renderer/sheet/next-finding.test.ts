import { describe, expect, it } from 'vitest'
import type { Finding, Severity } from '../../shared-kinetics/contract/study-result.ts'
import { nextFinding } from './next-finding.ts'

const finding = (title: string, stage: Finding['stage'], severity: Severity = 'caution'): Finding => ({
  code: 'sampling-coarse',
  severity,
  stage,
  title,
  message: '',
  run: null,
  level: null,
  evidence: {},
  basis: '',
  sources: [],
})
const [a, b, c, d] = [finding('a', 'runs'), finding('b', 'activation'), finding('c', 'activation'), finding('d', 'runs', 'note')]
const all = [a, b, c, d]
const on =
  (stage: Finding['stage']) =>
  (one: Finding): boolean =>
    one.stage === stage

describe('the finding that a count leads to', () => {
  it('is the first on the stage one is on, whatever stands before it', () => {
    expect(nextFinding(all, 'caution', null, on('activation'))).toBe(b)
    expect(nextFinding(all, 'caution', null, on('runs'))).toBe(a)
  })

  it('is on the other stage where this one has none, and none where there is none', () => {
    expect(nextFinding(all, 'note', null, on('activation'))).toBe(d)
    expect(nextFinding(all, 'stop', null, on('runs'))).toBeNull()
  })

  it('goes on to the next, over the stages and round', () => {
    expect([b, c].map((last) => nextFinding(all, 'caution', last, on('activation')))).toEqual([c, a])
    expect(nextFinding(all, 'caution', a, on('runs'))).toBe(b)
  })

  it('begins anew after another stage was gone to by hand', () => {
    expect(nextFinding(all, 'caution', a, on('activation'))).toBe(b)
  })
})
