/** Why a number that follows from rate constants has an interval, or none. */
export type RateIntervalStatus = 'ok' | 'two-temperatures' | 'model-does-not-follow-holds' | 'no-line'

const words: Readonly<Record<Exclude<RateIntervalStatus, 'ok'>, string>> = {
  'two-temperatures': 'no interval: two temperatures',
  'model-does-not-follow-holds': 'no interval: the reaction model does not follow the holds',
  'no-line': 'no interval: there is no line',
}

/** What is said where an interval would stand; null where there is one. */
export const noIntervalWords = (status: RateIntervalStatus): string | null => (status === 'ok' ? null : words[status])

/** Said of the interval of Ea, and of what follows from Ea alone, where the model does not follow the holds. */
export const scatterOnlyWords = 'of the scatter only: the reaction model does not follow the holds'
