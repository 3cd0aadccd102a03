import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bracketedRoot } from './root.ts'

const nearly = (x: number): number => Math.sinh(x - 200) + 0.01 * (x - 200)

describe('a root inside a bracket', () => {
  it.each<[string, (x: number) => number, number, number, number]>([
    ['cos x = x', (x) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ['x³ = 2x + 5 (Wallis)', (x) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ['x eˣ = 1', (x) => x * Math.exp(x) - 1, 0, 1, 0.5671432904097838],
    ['a root of ninth order', (x) => (x - 1) ** 9, 0, 2.5, 1],
    ['a function flat on one side', (x) => Math.exp(x) - 1e-5, -100, 5, Math.log(1e-5)],
  ])('is found for %s', (_, f, lower, upper, root) => {
    const found = bracketedRoot(f, lower, upper)
    expect(found.status).toBe('converged')
    expect(Math.abs(found.x - root)).toBeLessThan(_.includes('ninth') ? 1e-2 : 4e-15 * Math.abs(root))
    expect(found.evaluations).toBeLessThan(200)
  })

  it('takes few evaluations on a smooth function, given values at the ends', () => {
    const found = bracketedRoot(nearly, 196, 206, { fLower: nearly(196), fUpper: nearly(206), relativeTolerance: 1e-12 })
    expect(Math.abs(found.x - 200)).toBeLessThan(2e-10)
    expect(found.evaluations).toBeLessThan(14)
  })

  it('returns an end that is a root itself', () => {
    expect(bracketedRoot((x) => x - 1, 1, 2)).toMatchObject({ status: 'converged', x: 1 })
    expect(bracketedRoot((x) => x - 2, 1, 2)).toMatchObject({ status: 'converged', x: 2 })
  })

  it('says why there is none', () => {
    expect(bracketedRoot((x) => x * x + 1, -1, 1)).toMatchObject({ status: 'not-bracketed', x: Number.NaN })
    expect(bracketedRoot((x) => (x < 0 ? -1 : Number.NaN), -1, 1)).toMatchObject({ status: 'not-finite' })
    expect(bracketedRoot((x) => (Math.abs(x) < 0.9 ? Number.NaN : x), -1, 1)).toMatchObject({ status: 'not-finite' })
    expect(bracketedRoot((x) => Math.atan(x - 0.1), -1e6, 1e5, { mostEvaluations: 5 })).toMatchObject({
      status: 'iteration-limit',
      x: Number.NaN,
    })
  })

  it('finds the root of any monotone cubic, wherever the bracket lies', () => {
    const coefficient = fc.double({ min: 0.01, max: 5, noNaN: true })
    fc.assert(
      fc.property(fc.double({ min: -50, max: 50, noNaN: true }), coefficient, coefficient, coefficient, (root, a, b, width) => {
        fc.pre(Math.abs(root) > 0.01)
        const found = bracketedRoot((x) => a * (x - root) ** 3 + b * (x - root), root - width, root + 3 * width)
        expect(found.status).toBe('converged')
        expect(Math.abs(found.x / root - 1)).toBeLessThan(1e-14)
      }),
    )
  })
})
