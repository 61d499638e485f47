import { describe, expect, it } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { deviceAt, typicalPoint } from '../../src/device/conditions.ts'
import { fixedBiasAt, inverterAt, inverterSelfGain } from '../../src/device/fixed-bias.ts'
import { complementarySpeed } from '../../src/device/speed.ts'
import { gateVoltageAt } from '../../src/device/voltage.ts'
import { nodeOf } from '../blocks/bench.ts'

const node = nodeOf(28)
const at = typicalPoint(300)
const [nmos, pmos] = [deviceAt(node.nmos, at, PLAIN), deviceAt(node.pmos, at, PLAIN)]

describe('devices at a given gate voltage', () => {
  it('law: the current per width found takes the gate voltage given', () => {
    for (const V of [0.2, 0.4, 0.65, 0.9]) {
      expect(gateVoltageAt(nmos, fixedBiasAt(nmos, V, PLAIN).J, 0, PLAIN)).toBeCloseTo(V, 9)
    }
  })

  it('law: with the same device on both sides an inverter is as fast as that device', () => {
    const twin = inverterAt(nmos, nmos, 0.475, PLAIN)
    expect(twin.r_w).toBeCloseTo(1, 12)
    expect(twin.f_T / twin.n.f_T_int).toBeCloseTo(1, 12)
  })

  it('law: a slower pMOS widens until currents agree and slows the pair', () => {
    const { n, p, r_w, f_T } = inverterAt(nmos, pmos, 0.475, PLAIN)
    expect(r_w * p.J).toBeCloseTo(n.J, 9)
    expect(f_T).toBeLessThan(n.f_T_int)
    expect(f_T).toBeGreaterThan(p.f_T_int)
    expect(f_T).toBeLessThan(complementarySpeed(nmos, pmos, n.J, p.J, false, PLAIN))
  })

  it('independent: self-gain as transconductances over conductances', () => {
    const [g_n, g_p, I, V_A] = [1e-3, 1e-3, 1e-4, 2]
    expect(inverterSelfGain.run(g_n, 1, g_p, I, V_A, 1, V_A, 1)).toBeCloseTo((g_n + g_p) / ((2 * I) / V_A), 9)
  })
})
