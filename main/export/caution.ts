/** Stands on every export whose numbers may be used to store, ship, dry, cure or heat something. */
export { safetyCaution as caution } from '../../shared-kinetics/tasks/safety-caution.ts'
