import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { speedAt } from '../device/speed.ts'
import { sourceFollower } from '../device/stacks/follower.ts'
import { tailVoltage } from '../device/stacks/lines.ts'
import type { Bench, StackSupply } from './bench.ts'
import { constant } from './decision.ts'
import { layoutShare } from './load.ts'
import { SWITCH_SHARE, singleEndedSwing } from './sampling-switch.ts'
import type { Stacked } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'

/** The source follower that carries a held sample to the sub-converters of its rank. */

const FOLLOWER_GAIN = {
  symbol: 'A_f',
  meaning: 'gain of a source follower',
  unit: '1',
  source: 'common practice, no source',
  value: 0.85,
}

/** φ = (C_rank/C_s)(m + c_lay + (1 − m)(1 − A_f))/χ: the follower's own input takes the share χ of C_s. C_rank [F], C_s [F], m [1], c_lay [1], A_f [1], chi [1] → [1]. */
export const followerFanOut = formula(
  {
    symbol: 'phi',
    meaning: 'load of the buffer in its own gate capacitances',
    unit: '1',
    source:
      'derived: gate–source capacitance is bootstrapped by the gain, the rest loads the sampling capacitor',
  },
  (C_rank, C_s, m, c_lay, A_f, chi) => ((C_rank / C_s) * (m + c_lay + (1 - m) * (1 - A_f))) / chi,
)

/** f_T ≥ 1.5 f_N(φ + d + w). f_N [Hz], phi [1], d [1], w [1] → [Hz]. */
export const followerDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed that the buffer needs',
    unit: 'Hz',
    source: 'derived: pole g_m/(2πC) at 1.5 times the Nyquist frequency',
  },
  (f_N, phi, d, w) => 1.5 * f_N * (phi + d + w),
)

const NO_PEAKING = { symbol: 'beta', meaning: 'a follower has no peaking', unit: '1', source: 'definition' }

/** The buffer behind a sampling capacitor C_s [F] that drives C_rank [F]. */
export function holdBuffer(
  { settings, node, rates, t }: Bench,
  { device, V, V_high }: Exclude<StackSupply, { missing: string }>,
  C_rank: number,
  C_s: number,
): Stacked {
  const f_N = rates.f_N!
  const V_tail = t.calc(tailVoltage, settings.headroom.tail, device.U_T)
  const stage = sourceFollower({
    device,
    V_tail,
    V_swing: t.calc(singleEndedSwing, settings.receiver.converter.full_scale),
    V_m: settings.headroom.reserve,
  })
  const [A_f, chi] = [constant(FOLLOWER_GAIN, t), constant(SWITCH_SHARE, t)]
  const { m, d, w } = node.shares
  const demand = (J: number, trace: Trace): number => {
    const c_lay = trace.calc(layoutShare, device.of.C_lay, speedAt(device, J, trace).C_gg)
    return trace.calc(followerDemand, f_N, trace.calc(followerFanOut, C_rank, C_s, m, c_lay, A_f, chi), d, w)
  }
  const k = settings.demand.multiples.track_and_hold
  const rule = { key: 'track_and_hold', f_op: f_N, of: 'f_N', k, beta: t.leaf(NO_PEAKING, 1) }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high }
}
