/** Share of a heating rate that is the rounding of its arithmetic. */
const rounding = 1e-9

/** Whether a line through T(t) leaves nothing but rounding: such a temperature was set or calculated, and its standard error says nothing of a measurement. */
export const isOnlyRounding = (error: number, heatingRate: number): boolean => error < rounding * Math.abs(heatingRate)
