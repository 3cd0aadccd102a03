import { safetyCaution } from '../../shared-kinetics/figure/result-words.ts'

/** Said wherever a number may be used to store, ship, dry, cure or heat something. It has a place of its own that nothing scrolls away. */
export function Safety() {
  return <p className="safety">{safetyCaution}</p>
}
