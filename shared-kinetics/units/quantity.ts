declare const unit: unique symbol

/** Units used inside the program: SI only. `'1'` is a pure number (conversion, mass as a fraction of the initial mass). */
export type Unit = '1' | '1/s' | 'K' | 'K/s' | '1/K' | 's' | 'J/mol' | 'J/kg' | 'kg' | 'W' | 'W/kg'

/** A number that carries its unit in its type. Arithmetic drops the brand; tag again where a function ends. */
export type Quantity<U extends Unit> = number & { readonly [unit]: U }

/** A column of numbers of one unit. A number that is not to be had is NaN, never 0. */
export type Column<U extends Unit> = Float64Array & { readonly [unit]: U }

/** Tags a bare number that is already in the SI unit named. */
export const quantity = <U extends Unit>(value: number, _unit: U): Quantity<U> => value as Quantity<U>

/** Tags an array that is already in the SI unit named; nothing is copied. */
export const column = <U extends Unit>(values: Float64Array, _unit: U): Column<U> => values as Column<U>
