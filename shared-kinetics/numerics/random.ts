import { KineticsError } from '../errors.ts'

/** A stream of reproducible random numbers. Each call moves it on; two streams never share a state. */
export interface RandomStream {
  /** Uniform in the open interval (0, 1), in steps of 2⁻⁵²; never 0 and never 1. */
  readonly uniform: () => number
  /** Normal with mean 0 and variance 1. */
  readonly normal: () => number
  /** Whole number from 0 to n - 1, all equally likely. @throws KineticsError `bad-option` unless n is whole, 1 to 2³² */
  readonly integerBelow: (n: number) => number
}

/**
 * The stream numbered `stream` of the generator seeded with `seed`: Philox-4x32 with ten rounds, a keyed bijection of a 128-bit counter. The seed is the key; the
 * upper half of the counter is the stream's number, the lower half counts blocks of four words. Streams are therefore disjoint by construction, cost nothing to
 * begin, and work shared out over workers gives the same draws however it is shared out, as long as each draw (each replicate) has a stream of its own.
 *
 * Normal numbers by the polar method; the second of a pair is kept for the next call.
 *
 * @param seed - whole, 0 to 2⁵³ - 1
 * @param stream - whole, 0 to 2⁵³ - 1
 * @throws KineticsError `bad-option` outside these
 * @source salmon-2011
 * @source marsaglia-bray-1964
 */
export function randomStream(seed: number, stream = 0): RandomStream {
  assertWhole('seed', seed)
  assertWhole('stream', stream)
  const counter = new Uint32Array([0, 0, stream >>> 0, Math.floor(stream / 2 ** 32)])
  const key0 = seed >>> 0
  const key1 = Math.floor(seed / 2 ** 32)
  const block = new Uint32Array(4)
  let used = 4
  let spare = Number.NaN

  const word = (): number => {
    if (used === 4) {
      philoxBlock(counter, key0, key1, block)
      counter[0] = (counter[0] ?? 0) + 1
      if (counter[0] === 0) counter[1] = (counter[1] ?? 0) + 1
      used = 0
    }
    return block[used++] ?? 0
  }
  const uniform = (): number => {
    const high = word() >>> 6
    const low = word() >>> 6
    return (high * 2 ** 26 + low + 0.5) * 2 ** -52
  }
  const normal = (): number => {
    if (!Number.isNaN(spare)) {
      const kept = spare
      spare = Number.NaN
      return kept
    }
    for (;;) {
      const u = 2 * uniform() - 1
      const v = 2 * uniform() - 1
      const square = u * u + v * v
      if (square >= 1 || square === 0) continue
      const factor = Math.sqrt((-2 * Math.log(square)) / square)
      spare = v * factor
      return u * factor
    }
  }
  const integerBelow = (n: number): number => {
    if (!Number.isInteger(n) || n < 1 || n > 2 ** 32) {
      throw new KineticsError('bad-option', `A random whole number needs a bound from 1 to 4294967296, not ${n}.`, { n })
    }
    // Words beyond the last whole multiple of n would favour small numbers.
    const limit = 2 ** 32 - (2 ** 32 % n)
    for (;;) {
      const drawn = word()
      if (drawn < limit) return drawn % n
    }
  }
  return { uniform, normal, integerBelow }
}

function assertWhole(name: string, value: number): void {
  if (!Number.isSafeInteger(value) || value < 0) {
    throw new KineticsError('bad-option', `The ${name} of random numbers must be a whole number from 0 to 2^53 - 1, not ${value}.`, {
      [name]: value,
    })
  }
}

const multiplier0 = 0xd2511f53
const multiplier1 = 0xcd9e8d57
const bump0 = 0x9e3779b9
const bump1 = 0xbb67ae85

/**
 * One block of Philox-4x32-10: four words from a counter of four words and a key of two. Each round multiplies two words to 64 bits and mixes the halves crosswise.
 *
 * @param out - receives the four words
 * @source salmon-2011
 */
export function philoxBlock(counter: Uint32Array, key0: number, key1: number, out: Uint32Array): void {
  let c0 = counter[0] ?? 0
  let c1 = counter[1] ?? 0
  let c2 = counter[2] ?? 0
  let c3 = counter[3] ?? 0
  let k0 = key0
  let k1 = key1
  for (let round = 0; round < 10; round++) {
    const high0 = upperProduct(multiplier0, c0)
    const low0 = Math.imul(multiplier0, c0)
    const high1 = upperProduct(multiplier1, c2)
    const low1 = Math.imul(multiplier1, c2)
    c0 = high1 ^ c1 ^ k0
    c2 = high0 ^ c3 ^ k1
    c1 = low1
    c3 = low0
    k0 = (k0 + bump0) | 0
    k1 = (k1 + bump1) | 0
  }
  out[0] = c0
  out[1] = c1
  out[2] = c2
  out[3] = c3
}

/** Upper 32 bits of the product of two unsigned 32-bit words, by halves of 16 bits: the whole product does not fit a double. */
function upperProduct(a: number, b: number): number {
  const aLow = a & 0xffff
  const aHigh = a >>> 16
  const bLow = b & 0xffff
  const bHigh = b >>> 16
  const middle = aHigh * bLow + ((aLow * bLow) >>> 16)
  const other = aLow * bHigh + (middle & 0xffff)
  return (aHigh * bHigh + Math.floor(middle / 65536) + (other >>> 16)) >>> 0
}
