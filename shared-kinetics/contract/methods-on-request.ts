import type { MethodId } from '../isoconversional/result.ts'

/**
 * Methods that run only where they are asked for, in the order in which they are offered: forms of a method that runs anyway, and standards that a report may have to
 * follow. All of them are made for constant heating rates.
 */
export const methodsOnRequest = ['starink-1996', 'tang', 'astm-e1641', 'iso-11358-2'] as const satisfies readonly MethodId[]
