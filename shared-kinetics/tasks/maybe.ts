import type { Maybe } from './study-result.ts'

/** What is not to be had (NaN inside) is null on every wire. */
export const maybe = (value: number): Maybe => (Number.isFinite(value) ? value : null)

export function maybes(values: ArrayLike<number>): Maybe[] {
  const found: Maybe[] = []
  for (let i = 0; i < values.length; i++) found.push(maybe(values[i] as number))
  return found
}
