import { formula } from '../../derivation/formula.ts'

const DIRAC = 'INCITS MJSQ, TR-35-2004: dual-Dirac model'
const PAM4 = 'IEEE 802.3bs-2017, 120D.3.1.8.1; 802.3cd-2018, 136.9.3.3'

/** TJ = DJ + 2 Q σ. DJ [s] peak to peak, Q [1] one-sided at the error target, sigma [s] → [s]. */
export const totalJitter = formula(
  { symbol: 'TJ', meaning: 'total jitter at the error target, peak to peak', unit: 's', source: DIRAC },
  (DJ, Q, sigma) => DJ + 2 * Q * sigma,
)

/** J_rms = √((DJ/2)² + σ²). DJ [s] peak to peak, sigma [s] → [s]. */
export const rmsJitter = formula(
  { symbol: 'J_rms', meaning: 'jitter, rms, bounded part included', unit: 's', source: PAM4 },
  (DJ, sigma) => Math.sqrt((DJ / 2) ** 2 + sigma ** 2),
)

/** J_n = DJ + 2 Q_n σ. DJ [s], Q_n [1] of half of 10^−n, sigma [s] → [s]. */
export const tailJitter = formula(
  {
    symbol: 'J_nu',
    meaning: 'interval that holds all but 10^−n of the jitter',
    unit: 's',
    source: PAM4,
  },
  (DJ, Q_n, sigma) => DJ + 2 * Q_n * sigma,
)

/** A_DD from J_n and J_rms: (J_n/2 + Q_n √((Q_n² + 1) J_rms² − (J_n/2)²))/(Q_n² + 1). J_nu [s], Q_n [1], J_rms [s] → [s]. */
export const dualDiracAmplitude = formula(
  {
    symbol: 'A_DD',
    meaning: 'half the distance of the two Diracs with these J_n and J_rms',
    unit: 's',
    source: PAM4,
  },
  (J_nu, Q_n, J_rms) =>
    (J_nu / 2 + Q_n * Math.sqrt(Math.max(0 * J_rms ** 2, (Q_n ** 2 + 1) * J_rms ** 2 - (J_nu / 2) ** 2))) /
    (Q_n ** 2 + 1),
)

/** σ_RJ from J_n and J_rms: (Q_n J_n/2 − √((Q_n² + 1) J_rms² − (J_n/2)²))/(Q_n² + 1). J_nu [s], Q_n [1], J_rms [s] → [s]. */
export const dualDiracRandom = formula(
  {
    symbol: 'sigma_RJ',
    meaning: 'random jitter with these J_n and J_rms, rms',
    unit: 's',
    source: PAM4,
  },
  (J_nu, Q_n, J_rms) =>
    ((Q_n * J_nu) / 2 - Math.sqrt(Math.max(0 * J_rms ** 2, (Q_n ** 2 + 1) * J_rms ** 2 - (J_nu / 2) ** 2))) /
    (Q_n ** 2 + 1),
)

/** Limit = L UI. L [UI], UI [s] → [s]. */
export const allowedTime = formula(
  { symbol: 'J_lim', meaning: 'allowance in time', unit: 's', source: 'definition' },
  (L, UI) => L * UI,
)

/** RJ = J_pp UI/(2 Q): Gaussian jitter stated peak to peak. J_pp [UI], UI [s], Q [1] → [s]. */
export const allowedRms = formula(
  { symbol: 'J_lim', meaning: 'allowance of random jitter in time, rms', unit: 's', source: DIRAC },
  (J_pp, UI, Q) => (J_pp * UI) / (2 * Q),
)
