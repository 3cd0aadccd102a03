import { describe, expect, it } from 'vitest'
import { runInfoSchema } from '../../shared-kinetics/contract/study-document.ts'
import { ImportRefusal, readExport } from './read-export.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }

function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 2 ** 32
  }
}

const originals: readonly Buffer[] = [
  [
    'Sample mass: 5.1 mg',
    'Heating rate: 10 K/min',
    'Time (s),Temperature (K),Mass (mg)',
    ...Array.from({ length: 40 }, (_, i) => `${i * 6},${300 + i}.5,${(5.1 - i * 0.05).toFixed(3)}`),
  ].join('\n'),
  [
    'Program;30 °C to 720 °C, 9,0 K/min',
    '',
    'Time;Temperature;Mass',
    'min;°C;mg',
    ...Array.from(
      { length: 40 },
      (_, i) => `${(i * 0.1).toFixed(2).replace('.', ',')};${30 + i},25;${(6 - i * 0.01).toFixed(4).replace('.', ',')}`,
    ),
  ].join('\r\n'),
  [
    'Temp 4 K/min (°C)\tMass 4 K/min (%)\tTemp 8 K/min (°C)\tMass 8 K/min (%)',
    ...Array.from({ length: 40 }, (_, i) => `${100 + i}.5\t${100 - i}.25\t${110 + i}.5\t${100 - i}.5`),
  ].join('\n'),
].flatMap((text) => [Buffer.from(text, 'utf8'), Buffer.from(`\ufeff${text}`, 'utf16le'), Buffer.from(text, 'latin1')])

/** Bytes flipped, cut out, doubled, or moved. */
function mutate(original: Buffer, random: () => number): Buffer {
  const at = Math.floor(random() * original.length)
  const length = 1 + Math.floor(random() ** 3 * 200)
  const piece = original.subarray(at, at + length)
  const to = Math.floor(random() * original.length)
  switch (Math.floor(random() * 5)) {
    case 0: {
      const copy = Buffer.from(original)
      copy[at] = Math.floor(random() * 256)
      return copy
    }
    case 1:
      return Buffer.concat([original.subarray(0, at), original.subarray(at + length)])
    case 2:
      return Buffer.concat([original.subarray(0, at), piece, piece, original.subarray(at + length)])
    case 3:
      return Buffer.concat([original.subarray(0, to), piece, original.subarray(to)])
    default:
      return original.subarray(0, at)
  }
}

describe('exports that were damaged on the way', () => {
  it('are runs whose every number is finite, or are refused with a reason and a remedy', () => {
    const random = seeded(2026)
    let refused = 0
    let read = 0
    for (let i = 0; i < 3000; i++) {
      let bytes = originals[i % originals.length] ?? Buffer.alloc(0)
      for (let k = 0; k <= i % 3; k++) bytes = mutate(bytes, random)
      try {
        for (const { info, columns } of readExport('damaged.csv', bytes, {}, context).runs) {
          expect(runInfoSchema.safeParse(info).error).toBeUndefined()
          for (const column of [columns.temperature_K, ...columns.signals, ...(columns.time_s === null ? [] : [columns.time_s])]) {
            expect(column).toHaveLength(info.rows)
            expect(column.every(Number.isFinite)).toBe(true)
          }
          expect(columns.temperature_K.every((value) => value > 0)).toBe(true)
          expect(columns.time_s?.every((value, row) => row === 0 || value >= (columns.time_s?.[row - 1] ?? 0)) ?? true).toBe(true)
        }
        read++
      } catch (error) {
        if (!(error instanceof ImportRefusal)) throw error
        if (error.reason.length <= 10 || error.remedy.length <= 10) throw error
        refused++
      }
    }
    expect(read).toBeGreaterThan(500)
    expect(refused).toBeGreaterThan(500)
  })
})
