/** Stands wherever a number may be used to store, ship, dry, cure or heat something. */
export const safetyCaution =
  'A calculated value is an estimate for planning; it does not replace tests on the real amount, package and plant; ' +
  'follow local codes and the judgement of licensed or otherwise competent people.'
