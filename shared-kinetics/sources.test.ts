import { describe, expect, it } from 'vitest'
import { sources, type SourceKey } from './sources.ts'

describe('sources', () => {
  // Those that the collection of check values marks as remembered and not read again.
  const remembered: readonly SourceKey[] = [
    'doyle-1962',
    'ozawa-1965',
    'flynn-wall-1966',
    'vyazovkin-dollimore-1996',
    'vyazovkin-wight-2000',
    'starink-1996',
    'starink-2003',
    'tang-2003',
    'madhusudanan-1993',
    'li-1985',
    'agrawal-1987',
    'gorbachev-1975',
    'coats-redfern-1964',
    'murray-white-1955',
    'khawam-flanagan-2006',
    'malek-1992',
    'haynes-1971',
    'astm-e698',
    'astm-e1641',
    'astm-e1877',
    'astm-e2041',
    'iso-11358-2',
    'efron-tibshirani-1993',
    'tukey-1958',
  ]
  it.each(remembered)('%s says in the text that reports print that it is remembered', (key) => {
    expect(sources[key]).toMatch(/from memory\)$/)
  })

  it('do not call remembered what was read again for the check values', () => {
    for (const key of ['zhou-grant-2004', 'vyazovkin-wight-1999', 'nist-strd', 'ictac-2011'] as const) {
      expect(sources[key]).not.toContain('memory')
    }
  })
})
