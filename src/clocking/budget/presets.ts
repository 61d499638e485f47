import type { PresetId } from '../../scenario/keys/clocking.ts'

/** Jitter allowances of open interface standards. To be read in the current edition of the standard. */

/** A stated limit. Jitter in unit intervals unless `unit` says seconds. */
export interface Limit {
  readonly value: number
  readonly unit: 'UI' | 's'
}

export interface Preset {
  readonly title: string
  readonly clause: string
  /** What the values rest on, in words. */
  readonly evidence: string
  /** Values that must be read in the standard before they decide anything. */
  readonly unsure: boolean
  readonly of: 'link' | 'clock'
  /** Where the limits are measured. */
  readonly at: 'transmitter' | 'reference clock'
  /** Error ratio of total, and of random jitter stated peak to peak. */
  readonly error_ratio: number
  /** Random jitter, rms; or peak to peak at the error ratio. */
  readonly random?: Limit
  readonly randomPeak?: Limit
  readonly bounded?: Limit
  readonly total?: Limit
  readonly even_odd?: Limit
  readonly rms?: Limit
  /** Interval that holds all but 10^−n. */
  readonly tail?: Limit & { readonly n: number }
  /** Corner of the tracking through which it is measured [Hz]; null when it scales as f_B/1667. */
  readonly tracking: number | null
}

const MEMORY = 'published standard, quoted from memory'
const SEEN = 'published standard, restated in public text'
const DRAFT = 'draft of the standard, from memory'
const UNSURE = 'UNSURE: published standard, quoted from memory, not confirmed'

const ui = (value: number): Limit => ({ value, unit: 'UI' })
const seconds = (value: number): Limit => ({ value, unit: 's' })

const link = { of: 'link', at: 'transmitter', unsure: false } as const
const pam4 = { ...link, tracking: 4e6, evidence: MEMORY } as const
const tail = (n: number, value: number) => ({ n, ...ui(value) })
const pcie = { ...link, tracking: 10e6, evidence: MEMORY, error_ratio: 1e-12 } as const
const refclk = {
  of: 'clock',
  at: 'reference clock',
  unsure: false,
  evidence: SEEN,
  error_ratio: 1e-12,
} as const

const refclkAt = (rate: string, limit: number): Preset => ({
  ...refclk,
  title: `PCI Express reference clock, ${rate}`,
  clause: 'PCI Express Base Specification 6.0, section 8.6, common clock',
  random: seconds(limit),
  tracking: 10e6,
})

const pcieAt = (rate: string, total: number, bounded: number): Preset => ({
  ...pcie,
  title: `PCI Express transmitter, ${rate}`,
  clause: 'PCI Express Base Specification 5.0/6.0, table 8-7: uncorrelated jitter',
  total: seconds(total),
  bounded: seconds(bounded),
})

export const PRESET_TABLE: Readonly<Record<PresetId, Preset>> = {
  'ieee-802.3ap-kr': {
    ...link,
    title: '10GBASE-KR transmitter',
    clause: 'IEEE 802.3ap-2007, table 72-6, 72.7.1.8 and 72.7.1.9',
    evidence: MEMORY,
    error_ratio: 1e-12,
    randomPeak: ui(0.15),
    bounded: ui(0.15),
    total: ui(0.28),
    even_odd: ui(0.035),
    tracking: 4e6,
  },
  'ieee-802.3bj-kr4': {
    ...link,
    title: '100GBASE-KR4 transmitter',
    clause: 'IEEE 802.3bj-2014, table 92-6 and table 93-4',
    evidence: SEEN,
    error_ratio: 1e-5,
    bounded: ui(0.1),
    total: ui(0.18),
    even_odd: ui(0.035),
    tracking: 10e6,
  },
  'ieee-802.3bj-kp4': {
    ...pam4,
    title: '100GBASE-KP4 transmitter',
    clause: 'IEEE 802.3bj-2014, table 94-13',
    evidence: SEEN,
    error_ratio: 3e-4,
    random: ui(0.005),
    bounded: ui(0.05),
    even_odd: ui(0.03),
  },
  'ieee-802.3bs-c2c': {
    ...pam4,
    title: '200GAUI-4 and 400GAUI-8 chip to chip',
    clause: 'IEEE 802.3bs-2017, table 120D-1',
    error_ratio: 1e-5,
    rms: ui(0.023),
    tail: tail(4, 0.118),
    even_odd: ui(0.019),
  },
  'ieee-802.3cd-kr': {
    ...pam4,
    title: '50GBASE-KR, 100GBASE-KR2 and 200GBASE-KR4 transmitter',
    clause: 'IEEE 802.3cd-2018, 137.9',
    error_ratio: 1e-4,
    rms: ui(0.023),
    tail: tail(3, 0.106),
    even_odd: ui(0.019),
  },
  'ieee-802.3cd-cr': {
    ...pam4,
    title: '50GBASE-CR, 100GBASE-CR2 and 200GBASE-CR4 transmitter at TP2',
    clause: 'IEEE 802.3cd-2018, table 136-11',
    error_ratio: 1e-4,
    rms: ui(0.023),
    tail: tail(3, 0.115),
    even_odd: ui(0.019),
  },
  'ieee-802.3ck-kr': {
    ...pam4,
    title: '100GBASE-KR1, 200GBASE-KR2 and 400GBASE-KR4 transmitter',
    clause: 'IEEE 802.3ck-2022, table 163-5',
    error_ratio: 1e-4,
    rms: ui(0.023),
    tail: tail(3, 0.106),
    even_odd: ui(0.025),
  },
  'ieee-802.3ck-cr': {
    ...pam4,
    title: '100GBASE-CR1, 200GBASE-CR2 and 400GBASE-CR4 transmitter at TP2',
    clause: 'IEEE 802.3ck-2022, table 162-11',
    error_ratio: 1e-4,
    rms: ui(0.023),
    tail: tail(3, 0.115),
    even_odd: ui(0.025),
  },
  'ieee-802.3ck-c2c': {
    ...pam4,
    title: '100GAUI-1 chip to chip',
    clause: 'IEEE 802.3ck-2022, table 120F-1',
    evidence: UNSURE,
    unsure: true,
    error_ratio: 1e-5,
    rms: ui(0.023),
    tail: tail(4, 0.118),
    even_odd: ui(0.025),
  },
  'ieee-802.3dj-kr': {
    ...pam4,
    title: '200GBASE-KR1 transmitter',
    clause: 'IEEE P802.3dj, clause 178',
    evidence: `UNSURE: ${DRAFT}`,
    unsure: true,
    error_ratio: 2e-4,
    rms: ui(0.023),
    tail: tail(4, 0.118),
    even_odd: ui(0.025),
  },
  'oif-cei-28g-sr': {
    ...link,
    title: 'CEI-28G-SR and CEI-25G-LR transmitter',
    clause: 'OIF-CEI-03.1 and 04.0, clauses 10 and 11',
    evidence: MEMORY,
    error_ratio: 1e-15,
    randomPeak: ui(0.15),
    bounded: ui(0.15),
    total: ui(0.28),
    even_odd: ui(0.035),
    tracking: null,
  },
  'oif-cei-56g-lr': {
    ...pam4,
    title: 'CEI-56G-LR, MR and VSR in PAM-4, transmitter',
    clause: 'OIF-CEI-04.0, clauses 16, 17 and 21',
    evidence: SEEN,
    error_ratio: 1e-4,
    random: ui(0.01),
    bounded: ui(0.05),
    even_odd: ui(0.019),
  },
  'oif-cei-112g-lr': {
    ...pam4,
    title: 'CEI-112G-LR in PAM-4, transmitter',
    clause: 'OIF-CEI-05.0 to 05.2',
    evidence: UNSURE,
    unsure: true,
    error_ratio: 1e-4,
    rms: ui(0.023),
    tail: tail(3, 0.106),
    even_odd: ui(0.025),
  },
  'pcie-8g': pcieAt('8 GT/s', 31.25e-12, 12e-12),
  'pcie-16g': pcieAt('16 GT/s', 12.5e-12, 6.25e-12),
  'pcie-32g': pcieAt('32 GT/s', 6.25e-12, 3.125e-12),
  'pcie-refclk-8g': refclkAt('8 GT/s', 1e-12),
  'pcie-refclk-16g': refclkAt('16 GT/s', 0.5e-12),
  'pcie-refclk-32g': refclkAt('32 GT/s', 0.15e-12),
  'pcie-refclk-64g': refclkAt('64 GT/s', 0.1e-12),
  'jesd204b-11g': {
    ...link,
    title: 'JESD204B, LV-OIF-11G-SR transmitter',
    clause: 'JEDEC JESD204B, table 7',
    evidence: MEMORY,
    error_ratio: 1e-15,
    bounded: ui(0.15),
    total: ui(0.3),
    even_odd: ui(0.05),
    tracking: null,
  },
}
