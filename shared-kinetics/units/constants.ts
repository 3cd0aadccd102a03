/** Molar gas constant, J/(mol K): k·N_A, exact since the 2019 SI (1.380649e-23 × 6.02214076e23; CODATA 2018 and 2022 alike). */
export const gasConstant_J_per_mol_K = 8.31446261815324

/** 0 °C in kelvin, exact by definition of the degree Celsius (SI brochure, 9th ed., 2019). */
export const zeroCelsius_K = 273.15

/** ln of k_B/h in 1/(K s): k_B = 1.380649e-23 J/K and h = 6.62607015e-34 J s, both exact since the 2019 SI. */
export const lnBoltzmannOverPlanck_per_K_s = Math.log(1.380649e-23 / 6.62607015e-34)
