import { KineticsError } from '../errors.ts'

/** @throws KineticsError `bad-option` where x = Ea/(RT) is not a positive finite number */
export function checkX(x: number): void {
  if (!(x > 0) || !Number.isFinite(x)) {
    throw new KineticsError('bad-option', `The temperature integral needs x = Ea/(RT) > 0, not ${x}.`, { x })
  }
}
