import type { LevelPhi } from './result.ts'

/** Phi around a minimum that is worked out when somebody looks at it: most calls want Ea alone, and a curve costs more than its minimum. */
export class PhiLater implements LevelPhi {
  readonly #make: () => LevelPhi
  #made: LevelPhi | null = null

  constructor(make: () => LevelPhi) {
    this.#make = make
  }

  get #phi(): LevelPhi {
    this.#made ??= this.#make()
    return this.#made
  }

  get Ea_J_per_mol(): LevelPhi['Ea_J_per_mol'] {
    return this.#phi.Ea_J_per_mol
  }

  get phi(): LevelPhi['phi'] {
    return this.#phi.phi
  }

  get phiMinimum(): number {
    return this.#phi.phiMinimum
  }

  get phiThreshold(): number {
    return this.#phi.phiThreshold
  }
}
