import type { Maybe } from './study-result.ts'

/** What is not to be had (NaN inside) is null on every wire. */
export const maybe = (value: number): Maybe => (Number.isFinite(value) ? value : null)

export const maybes = (values: ArrayLike<number>): Maybe[] => Array.from(values, maybe)
