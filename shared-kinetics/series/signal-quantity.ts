/**
 * What a signal column measures. In the order in which one is chosen when a run holds several and none is named.
 * `mass` is an extent read downwards, `conversion` an extent as it stands, the other two are proportional to the reaction rate.
 */
export const signalQuantities = ['mass', 'conversion', 'heat-release', 'heat-flow'] as const
export type SignalQuantity = (typeof signalQuantities)[number]

/** SI unit of a signal column as held: mass in kg or as a fraction, heat flow and heat release in W or W/kg, conversion as a fraction. */
export type SignalUnit = 'kg' | '1' | 'W' | 'W/kg'
