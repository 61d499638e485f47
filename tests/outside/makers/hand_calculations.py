"""Worked hand calculations of one current-mode clock buffer and one LC oscillator, 28 nm class, typical, 27 degC.

Written from the published formulas alone, with the values of the node class typed in by hand; nothing of the
planner is read. Made with Python 3.11, SciPy 1.17.1 (brentq for the two unknowns). Run:

    python3 tests/outside/makers/hand_calculations.py > tests/outside/fixtures/hand-calculations.json
"""
import json
from math import exp, log, pi, sqrt

from scipy.optimize import brentq

k_B, q_e = 1.380649e-23, 1.602176634e-19
T = 300.15
# 28 nm class, typed from its node file
L, n, mu0, v_sat = 30e-9, 1.3, 225e-4, 1.18e5
C_ox, C_ext, C_lay, R_s = 20e-3, 0.36e-9, 0.39e-9, 135e-6
V_T0, J_max, V = 0.38, 550.0, 0.95
m, d, w = 0.28, 0.60, 0.35

U_T = k_B * T / q_e
mu = mu0 * (T / 300) ** -1.3
v_T = v_sat * (T / 300) ** -0.5
V_T = V_T0 - 0.7e-3 * (T - 300)
I_spec = 2 * n * mu * C_ox * U_T**2
lam = 2 * mu * U_T / (v_T * L)


def charge(J):
    IC = J * L / I_spec
    return IC, (sqrt(4 * IC + (1 + lam * IC) ** 2) - 1) / 2


def gm(J):
    IC, q = charge(J)
    efficiency = (sqrt((1 + lam * IC) ** 2 + 4 * IC) - 1) / (IC * (lam * (1 + lam * IC) + 2))
    g = efficiency * J / (n * U_T)
    return g / (1 + g * R_s)


def cgg(J):
    _, q = charge(J)
    c_gs = (q / 3) * (2 * q + 3) / (q + 1) ** 2
    return L * C_ox * (c_gs + (1 - c_gs) * (n - 1) / n) + C_ext


def vgs(J, V_S):
    _, q = charge(J)
    return V_T + (n - 1) * V_S + n * U_T * (2 * q + log(q)) + J * R_s


def vdssat(J, c):
    IC, q = charge(J)
    q_d = max(lam * IC / 2, exp(-4) * q)
    return max(c * U_T, U_T * (2 * (q - q_d) + log(q / q_d))) + 2 * J * R_s


# --- clock buffer: 14 GHz, swing 0.30 V, gain 1.4, fan-out 1, dc-coupled, no peaking
f_ck, V_sw, A, phi, V_m = 14e9, 0.30, 1.4, 1.0, 0.05
V_tail = max(3 * U_T, 0.12)


def buffer_need(J):
    return max(
        vgs(J, V_tail) + V_tail + V_m,
        vgs(J / 2, V_tail) + V_tail + V_sw / 2 + V_m,
        V_tail + vdssat(J, 3) + V_m + V_sw,
    )


def buffer_spare(J):
    return min(V - buffer_need(J), V_sw - A * J / gm(J / 2))


J = brentq(buffer_spare, 1e-2, J_max, xtol=1e-12, rtol=1e-14)
half = J / 2
IC_half, q_half = charge(half)
f_T = gm(half) / (2 * pi * cgg(half))
c_lay = C_lay / cgg(half)
load = phi * (1 + A * m + c_lay) + d + w
demand = 1.2 * f_ck * A * load / sqrt(A**2 - 1)


def speed_spare(x):
    j = x / 2
    own = C_lay / cgg(j)
    return gm(j) / (2 * pi * cgg(j)) - 1.2 * f_ck * A * (phi * (1 + A * m + own) + d + w) / sqrt(A**2 - 1)


J_req = brentq(speed_spare, 1e-2, J, xtol=1e-12, rtol=1e-14)
buffer = {
    "U_T": U_T, "I_spec": I_spec, "lambda": lam, "V_T": V_T, "V_tail": V_tail,
    "J": J, "IC": IC_half, "q_s": q_half, "g_m": gm(half), "C_gg": cgg(half), "f_T_int": f_T,
    "c_lay": c_lay, "l": load, "f_T_req": demand, "margin": f_T / demand,
    "J_req": J_req, "V_need": buffer_need(J_req), "headroom_margin": V / buffer_need(J_req),
}

# --- LC oscillator: 13 to 15 GHz, one core, nMOS pair on a tail, 10 ohm reactance, S = 2.5, reserve 5 % at each end
f_min, f_max, X_L, S, g = 13e9, 15e9, 10.0, 2.5, 0.05
Q_L, Q_b, s_0 = 17.0, 20.0, 0.10 + 0.10
x = f_max / f_min
K = (x * (1 + g) ** 2) ** 2
L_d = X_L / (2 * pi * f_max)
C_t = 1 / ((2 * pi * f_max) ** 2 * L_d)
# switch of the bank: gate at the core supply; drain capacitance at J_max
q_sw = brentq(lambda q: 2 * q + log(q) - (V - V_T) / (n * U_T), 1e-9, 1e3, xtol=1e-15, rtol=1e-14)
R_on = L * U_T / (I_spec * q_sw) + 2 * R_s
C_off = d * (cgg(J_max) + C_lay)
f_sw = 1 / (2 * pi * R_on * C_off)
rho = 1 + 2 * f_sw / (Q_b * f_max)
s_f_max = (rho - K) / (rho - 1)
s_dev = s_f_max - s_0
Q_lo = 1 / (x / Q_L + (1 - s_f_max / x**2) / (Q_b * x))
g_start = 2 * S / (Q_lo * 2 * pi * f_min * L_d)
kappa = (1 - m) / 2 + 2 * m + (d - m) / 2
f_T_osc = kappa * g_start / (2 * pi * s_dev * C_t)
J_osc = min(J_max, brentq(lambda j: V - vgs(j, V_tail) - V_tail, 1e-2, 1e5, xtol=1e-12, rtol=1e-14))
f_T_eff = gm(J_osc) / (2 * pi * (cgg(J_osc) + C_lay))
oscillator = {
    "x": x, "K": K, "L_d": L_d, "C_t": C_t, "q": q_sw, "R_on": R_on, "f_sw": f_sw, "rho": rho,
    "s_f_max": s_f_max, "s_dev_max": s_dev, "Q_lo": Q_lo, "g_m_start": g_start, "kappa": kappa,
    "f_T_req": f_T_osc, "J": J_osc, "f_T_eff": f_T_eff, "margin": f_T_eff / f_T_osc,
}

print(json.dumps({"buffer": buffer, "oscillator": oscillator}, indent=2))
