import type { MethodId } from '../isoconversional/result.ts'
import type { ProfileResult } from '../tasks/study-result.ts'

const preferred: readonly MethodId[] = ['vyazovkin', 'friedman', 'starink', 'kas', 'ofw', 'isothermal-integral']

const hasNumbers = (profile: ProfileResult): boolean =>
  2 * profile.Ea_kJ_per_mol.filter((Ea) => Ea !== null).length >= profile.Ea_kJ_per_mol.length

/** The method that rules on Ea look at: the first of the preferred ones that has a number at half of the levels or more. */
export const leadingProfile = (profiles: readonly ProfileResult[]): ProfileResult | undefined =>
  preferred.flatMap((method) => profiles.find((profile) => profile.method === method) ?? []).find(hasNumbers)
