import { formula } from '../../derivation/formula.ts'

const LINES = 'derived: the voltage between supply and ground is shared by the devices of the stack'

/** V_tail = max(3 U_T, V_t0). V_t0 [V] least voltage of a wide tail device, U_T [V] → [V]. */
export const tailVoltage = formula(
  {
    symbol: 'V_tail',
    meaning: 'voltage across the tail current source',
    unit: 'V',
    source: 'common practice, no source',
  },
  (V_t0, U_T) => Math.max(3 * U_T, V_t0),
)

/** V_S = V_tail + V_DSsat of the device below. V_tail [V], V_DSsat [V] → [V]. */
export const sourceAbove = formula(
  { symbol: 'V_S', meaning: 'source voltage of the upper pair', unit: 'V', source: LINES },
  (V_tail, V_DSsat) => V_tail + V_DSsat,
)

/** V_in = V_GS + V_S + V_m: the gate of a fully switched device. V_GS [V], V_S [V], V_m [V] → [V]. */
export const switchedInput = formula(
  { symbol: 'V_input', meaning: 'supply that the switched input asks for', unit: 'V', source: LINES },
  (V_GS, V_S, V_m) => V_GS + V_S + V_m,
)

/** V_cross = V_GS(J/2) + V_S + V_sw/2 + V_m. V_GS [V] at half the current, V_S [V], V_sw [V] of the driving stage, V_m [V] → [V]. */
export const crossingInput = formula(
  { symbol: 'V_cross', meaning: 'supply that the crossing asks for', unit: 'V', source: LINES },
  (V_GS, V_S, V_sw, V_m) => V_GS + V_S + V_sw / 2 + V_m,
)

/** V_out = V_S + V_DSsat + V_m + V_sw. V_S [V], V_DSsat [V], V_m [V], V_sw [V] → [V]. */
export const switchedOutput = formula(
  { symbol: 'V_out', meaning: 'supply that the low output asks for', unit: 'V', source: LINES },
  (V_S, V_DSsat, V_m, V_sw) => V_S + V_DSsat + V_m + V_sw,
)

/** V_clock = V_GS + V_tail + V_m + V_DSsat: a clock pair whose high level lies one V_DSsat below the supply. V_GS [V], V_tail [V], V_m [V], V_DSsat [V] → [V]. */
export const clockInput = formula(
  { symbol: 'V_clock', meaning: 'supply that the clock pair asks for', unit: 'V', source: LINES },
  (V_GS, V_tail, V_m, V_DSsat) => V_GS + V_tail + V_m + V_DSsat,
)

/** The larger of two demands. V_1 [V], V_2 [V] → [V]. */
export const largerOfTwo = formula(
  { symbol: 'V_need', meaning: 'lowest supply that satisfies every line', unit: 'V', source: LINES },
  (V_1, V_2) => Math.max(V_1, V_2),
)

/** The largest of three demands. V_1 [V], V_2 [V], V_3 [V] → [V]. */
export const largestOfThree = formula(
  { symbol: 'V_need', meaning: 'lowest supply that satisfies every line', unit: 'V', source: LINES },
  (V_1, V_2, V_3) => Math.max(V_1, V_2, V_3),
)

/** J/2: the current per width of each device at the crossing. J [A/m] → [A/m]. */
export const halfDensity = formula(
  {
    symbol: 'J_half',
    meaning: 'current per width of each device at the crossing',
    unit: 'A/m',
    source: 'definition',
  },
  (J) => J / 2,
)

/** V_swing = A J/g_m: swing that a gain A asks for. A [1], J [A/m] full tail current, g_m [S/m] of one side → [V]. */
export const swingOfGain = formula(
  {
    symbol: 'V_swing',
    meaning: 'swing that the gain asks for',
    unit: 'V',
    source: 'derived: A = g_m R and V_sw = I R',
  },
  (A, J, g_m) => (A * J) / g_m,
)

/** V_swing = 2 A J/g_m: a linear pair, J in each half. A [1], J [A/m], g_m [S/m] → [V]. */
export const swingOfLinearGain = formula(
  {
    symbol: 'V_swing',
    meaning: 'swing that the gain asks for',
    unit: 'V',
    source: 'derived: A = g_m R and V_sw = 2 I R',
  },
  (A, J, g_m) => (2 * A * J) / g_m,
)

/** V_input = V_GS + V_S + V_pk + V_sw/2: a linear pair fed from a like stage. V_GS [V], V_S [V], V_pk [V] peak input, V_sw [V] → [V]. */
export const linearInput = formula(
  { symbol: 'V_input', meaning: 'supply that the linear input asks for', unit: 'V', source: LINES },
  (V_GS, V_S, V_pk, V_sw) => V_GS + V_S + V_pk + V_sw / 2,
)

/** V_out = V_S + V_DSsat + V_sw/2 + V_lin/4: the lowest linear output. V_S [V], V_DSsat [V], V_sw [V], V_lin [V] differential peak to peak → [V]. */
export const linearOutput = formula(
  { symbol: 'V_out', meaning: 'supply that the lowest linear output asks for', unit: 'V', source: LINES },
  (V_S, V_DSsat, V_sw, V_lin) => V_S + V_DSsat + V_sw / 2 + V_lin / 4,
)

/** V_start = max(V_GS, 3 U_T) + V_tail: a cross-coupled pair at start-up, its drain at its gate. V_GS [V], V_tail [V], U_T [V] → [V]. */
export const startUpVoltage = formula(
  { symbol: 'V_start', meaning: 'supply that the pair asks for at start-up', unit: 'V', source: LINES },
  (V_GS, V_tail, U_T) => Math.max(V_GS, 3 * U_T) + V_tail,
)

/** V_start = max(V_GS, 3 U_T) + max(V_SG, 3 U_T) + V_tail: complementary pairs at start-up. V_GS [V], V_SG [V], V_tail [V], U_T [V] → [V]. */
export const complementaryStartUp = formula(
  { symbol: 'V_start', meaning: 'supply that both pairs ask for at start-up', unit: 'V', source: LINES },
  (V_GS, V_SG, V_tail, U_T) => Math.max(V_GS, 3 * U_T) + Math.max(V_SG, 3 * U_T) + V_tail,
)

/** V_need = V_GS + V_S + V_swing + V_m: a source follower. V_GS [V], V_S [V], V_swing [V] full swing, V_m [V] → [V]. */
export const followerInput = formula(
  { symbol: 'V_need', meaning: 'highest input that the follower asks for', unit: 'V', source: LINES },
  (V_GS, V_S, V_swing, V_m) => V_GS + V_S + V_swing + V_m,
)
