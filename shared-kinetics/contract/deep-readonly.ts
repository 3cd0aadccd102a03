/** Nothing that has been parsed is written to: the type of a schema's output with every field and element read-only. */
export type DeepReadonly<T> = T extends Uint8Array ? T : T extends object ? { readonly [K in keyof T]: DeepReadonly<T[K]> } : T
