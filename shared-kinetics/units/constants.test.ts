import { expect, it } from 'vitest'
import { gasConstant_J_per_mol_K } from './constants.ts'

it('takes the gas constant of the 2019 SI: the product of two exact constants, and no older value', () => {
  // 1.380649e-23 J/K × 6.02214076e23 /mol in whole numbers: 1380649 × 602214076 = 831446261815324.
  expect(BigInt(1_380_649) * BigInt(602_214_076)).toBe(831_446_261_815_324n)
  expect(gasConstant_J_per_mol_K).toBe(831_446_261_815_324 / 1e14)
  // CODATA 2014, 2010 and 2006 (from memory): close, but not it.
  for (const older of [8.314_459_8, 8.314_462_1, 8.314_472]) {
    expect(gasConstant_J_per_mol_K).not.toBe(older)
    expect(Math.abs(gasConstant_J_per_mol_K / older - 1)).toBeLessThan(2e-6)
  }
})
