import type { NamedUncertainties, StatedUncertainties } from './measured-sources.ts'

/** What is taken where nobody has stated anything: the same numbers as in a new study (`defaultUncertainty` of contract says what they rest on). */
export const assumedUncertainties: StatedUncertainties = {
  temperatureCommon_K: 0.5,
  temperatureRun_K: 0.5,
  lag_s: 1,
  statedHeatingRate_share: 0.02,
}

/** Whether nobody has stated a value: it was not named, and is the one that is taken where nothing was. */
export const isAssumed = (stated: NamedUncertainties, key: keyof StatedUncertainties): boolean =>
  stated.stated?.includes(key) !== true && stated[key] === assumedUncertainties[key]
