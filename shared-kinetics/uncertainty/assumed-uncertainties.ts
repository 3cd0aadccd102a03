import type { StatedUncertainties } from './measured-sources.ts'

/** What is taken where nobody has stated anything: the same numbers as in a new study (`defaultUncertainty` of contract says what they rest on). */
export const assumedUncertainties: StatedUncertainties = {
  temperatureCommon_K: 0.5,
  temperatureRun_K: 0.5,
  lag_s: 1,
  statedHeatingRate_share: 0.02,
}

/** Whether a value is the one that is taken where nobody has stated anything. */
export const isAssumed = (stated: StatedUncertainties, key: keyof StatedUncertainties): boolean => stated[key] === assumedUncertainties[key]
