const LINK = `# A lane to start from: it runs as it is. The setting and every number marked so are invented.
format: 1
title: A lane to start from
question: Does 28 Gb/s PAM-2 or 56 Gb/s PAM-4 fit, and in which process?
revision: A
# date: 2027-01-31            # printed on the memo; leave it out for a blank

block: link                   # link: one lane; clock: a clock generator
data_rate: 28 Gb/s            # b is bits, B would be bytes
modulation: PAM-2             # PAM-2 | PAM-4 | PAM-8
clocking: half-rate           # full-rate | half-rate | quarter-rate | eighth-rate
error_ratio: 1e-12            # of the detector, before error correction

oscillator: {kind: LC, range: [13 GHz, 15 GHz]}    # must hold the lane's clock (invented)
supply: {lift: 60 mV, tolerance: 2 %}               # stacked stages on a regulated supply above core (invented)
headroom: {latch_stack: tail-less}
peaking: {clock: shunt-delay, transmit: shunt-delay, receive: shunt-delay}
transmitter: {swing: 0.6 V}                         # invented
receiver: {dfe_taps: 1, dfe: unrolled}
pads: {cdm_current: 3 A, extension: T-coil}         # your protection requirement (invented)
# An uncertain value: {low: 18 dB, typical: 22 dB, high: 26 dB} or {mean: 22 dB, sigma: 2 dB}
loop: {reference: 156.25 MHz}                       # closed around the oscillator; bandwidth of least jitter (invented)
jitter_budget: {random: 250 fs, total: 0.30 UI}     # or preset: ieee-802.3cd-kr, see the guide (invented)
# Ask for more by writing it: channel, power_budget, fec.

nodes: [P65, P28, F16, F7]    # tapeworthy nodes lists them; a path names a node file of your own
options:                      # each overrides the keys above
  - {id: nrz-28, label: 28 Gb/s PAM-2}
  - {id: pam4-56, label: 56 Gb/s PAM-4, data_rate: 56 Gb/s, modulation: PAM-4, error_ratio: 1e-6}
`

const CLOCK = `# A clock generator to start from: it runs as it is. The setting and every number marked so are invented.
format: 1
title: A clock generator to start from
question: LC or ring, and in which process?
revision: A
# date: 2027-01-31            # printed on the memo; leave it out for a blank

block: clock                  # clock: a clock generator; link: one lane
oscillator: {kind: LC, range: [7.5 GHz, 8.5 GHz]}  # LC | ring | CMOS-ring (invented)
clock: {style: CML}           # CML | CMOS distribution
loop: {reference: 100 MHz, lock_time: 50 µs}       # bandwidth: the best one unless you write it (invented)
jitter_budget: {random: 300 fs}                    # allowed rms (invented)
power_budget: 30 mW                                # invented

nodes: [P65, P28, F16]        # tapeworthy nodes lists them; a path names a node file of your own
options:                      # each overrides the keys above
  - {id: lc, label: LC oscillator}
  - {id: ring, label: Ring of CML stages, oscillator: {kind: ring}}
`

/** Commented starter scenarios for \`tapeworthy start\`. */
export const starters = { link: LINK, clock: CLOCK } as const
