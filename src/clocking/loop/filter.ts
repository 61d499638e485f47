import { formula } from '../../derivation/formula.ts'

const FILTER =
  'F. M. Gardner, IEEE Trans. Commun. 28(11), 1980: C1 beside R and C2 in series, unity gain at f_c'

/** C1 + C2 = I_CP K_V √b/(N (2πf_c)²). I_CP [A], K_V [Hz/V], r_b [1], N [1], f_c [Hz] → [F]. */
export const filterCapacitance = formula(
  { symbol: 'C_sum', meaning: 'capacitance of the loop filter', unit: 'F', source: FILTER },
  (I_CP, K_V, r_b, N, f_c) => (I_CP * K_V * r_b) / (N * (2 * Math.PI * f_c) ** 2),
)

/** C1 = (C1 + C2)/b. C_sum [F], r_b [1] = √b → [F]. */
export const poleCapacitor = formula(
  { symbol: 'C1', meaning: 'capacitor of the pole', unit: 'F', source: FILTER },
  (C_sum, r_b) => C_sum / r_b ** 2,
)

/** C2 = (C1 + C2)(1 − 1/b). C_sum [F], r_b [1] = √b → [F]. */
export const zeroCapacitor = formula(
  { symbol: 'C2', meaning: 'capacitor of the zero', unit: 'F', source: FILTER },
  (C_sum, r_b) => C_sum * (1 - 1 / r_b ** 2),
)

/** R = √b/(2πf_c C2). r_b [1] = √b, f_c [Hz], C2 [F] → [Ω]. */
export const filterResistor = formula(
  { symbol: 'R', meaning: 'resistor of the loop filter', unit: 'ohm', source: FILTER },
  (r_b, f_c, C2) => r_b / (2 * Math.PI * f_c * C2),
)

/** q = 4π k_B T N K_V (1 − 1/b)/I_CP: density of the resistor's noise times f² over f_c. k_B [J/K], T [K], N [1], K_V [Hz/V], r_b [1] = √b, I_CP [A] → [1]. */
export const filterNoise = formula(
  {
    symbol: 'q_R',
    meaning: "noise of the filter's resistor, over the bandwidth",
    unit: '1',
    source: 'derived: 4 k_B T R through C2, R and C1 to the tuning input, with R of the filter',
  },
  (k_B, T, N, K_V, r_b, I_CP) => (4 * Math.PI * k_B * T * N * K_V * (1 - 1 / r_b ** 2)) / I_CP,
)
