"""Operating points of single transistors for tests/outside/fixtures/device-points.json.

Written from the published equations (C. Enz, F. Chicco, A. Pezzotta, "Nanoscale MOSFET modeling", IEEE
Solid-State Circuits Magazine 9(3) and 9(4), 2017), not from the TypeScript. The charge is found by solving
the charge-current equation numerically in 40 digits, the current at a gate voltage by a root search on the
gate-voltage equation: neither uses the closed forms that are under test.

Made with Python 3.11, mpmath 1.3.0. Run: python3 device_points.py > ../fixtures/device-points.json
"""
import json

from mpmath import e, exp, findroot, log, mp, mpf, pi

mp.dps = 40
K_B, Q_E = mpf("1.380649e-23"), mpf("1.602176634e-19")

# Invented transistors, SI.
DEVICES = {
    "long planar": dict(L="180e-9", n="1.35", mu0="0.035", v_sat="1e5", C_ox="8.4e-3", C_ext="5e-10",
                        C_lay="5e-10", R_s="1.9e-4", V_T0="0.45"),
    "short planar": dict(L="30e-9", n="1.3", mu0="0.0225", v_sat="1.2e5", C_ox="0.02", C_ext="3.6e-10",
                         C_lay="3.9e-10", R_s="1.35e-4", V_T0="0.38"),
    "fin": dict(L="18e-9", n="1.08", mu0="0.017", v_sat="1.15e5", C_ox="0.0265", C_ext="6.5e-10",
                C_lay="7e-10", R_s="1.45e-4", V_T0="0.29"),
}
POINTS = [("typical", 300, 1, 0), ("slow", "233.15", "0.9", "0.065"), ("slow", "398.15", "0.9", "0.065"),
          ("fast", "398.15", "1.1", "-0.04")]
DENSITIES = ["0.05", "2", "60", "450"]
GATE_VOLTAGES = ["0.25", "0.5", "0.9"]


def conditions(device, T, c_mu, dV):
    T = mpf(T)
    U_T = K_B * T / Q_E
    mu = device["mu0"] * mpf(c_mu) * (T / 300) ** mpf("-1.3")
    v = device["v_sat"] * (T / 300) ** mpf("-0.5")
    V_T = device["V_T0"] + mpf(dV) - mpf("0.0007") * (T - 300)
    I_spec = 2 * device["n"] * mu * device["C_ox"] * U_T**2
    return U_T, V_T, I_spec, 2 * mu * U_T / (v * device["L"])


def inversion(q, lam):
    """ln IC that carries q_s: q_s^2 + q_s = IC + (lambda IC/2)(1 + lambda IC/2), solved for IC."""
    target = q * q + q
    low = target / (2 + lam + lam * target**mpf("0.5"))
    balance = lambda x: log((exp(x) + lam * exp(x) / 2 * (1 + lam * exp(x) / 2)) / target)
    return findroot(balance, (log(low), log(target)), solver="anderson", tol=mpf("1e-60"))


def charge(IC, lam):
    target = IC + lam * IC / 2 * (1 + lam * IC / 2)
    return exp(findroot(lambda x: exp(2 * x) + exp(x) - target, log(target / (1 + target**mpf("0.5")))))


def gate_voltage(device, U_T, V_T, q, J):
    return V_T + device["n"] * U_T * (2 * q + log(q)) + J * device["R_s"]


def current_at(device, here, V_GS):
    U_T, V_T, I_spec, lam = here
    J_of = lambda x: exp(inversion(exp(x), lam)) * I_spec / device["L"]
    x = findroot(lambda x: gate_voltage(device, U_T, V_T, exp(x), J_of(x)) - V_GS, (mpf(-25), mpf(4)),
                 solver="anderson", tol=mpf("1e-50"), maxsteps=200)
    return J_of(x)


def point(device, here, J):
    U_T, V_T, I_spec, lam = here
    IC = J * device["L"] / I_spec
    q = charge(IC, lam)
    # g_m of the channel from the slope of the current over the gate voltage, no closed form of g_m.
    dV_dq = device["n"] * U_T * (2 + 1 / q)
    dIC_dq = (2 * q + 1) / (1 + lam / 2 + lam**2 * IC / 2)
    g_i = dIC_dq / dV_dq * I_spec / device["L"]
    g_m = 1 / (1 / g_i + device["R_s"])
    c_gs = q * (2 * q + 3) / (3 * (q + 1) ** 2)
    C_ch = device["L"] * device["C_ox"] * (c_gs + (1 - c_gs) * (1 - 1 / device["n"]))
    C_gg = C_ch + device["C_ext"]
    q_d = max(lam * IC / 2, q * e**-4)
    V_DS = max(4 * U_T, U_T * (2 * (q - q_d) + log(q / q_d))) + 2 * J * device["R_s"]
    values = dict(IC=IC, q_s=q, g_m=g_m, C_gg=C_gg, f_T_int=g_m / (2 * pi * C_gg),
                  f_T_eff=g_m / (2 * pi * (C_gg + device["C_lay"])), f_T_ch=g_i / (2 * pi * C_ch),
                  V_DSsat=V_DS, V_GS=gate_voltage(device, U_T, V_T, q, J))
    return {name: float(value) for name, value in values.items()}


rows = []
for name, texts in DEVICES.items():
    device = {key: mpf(text) for key, text in texts.items()}
    for corner, T, c_mu, dV in POINTS:
        here = conditions(device, T, c_mu, dV)
        rows.append({
            "device": name, "corner": corner, "T": float(mpf(T)), "c_mu": float(mpf(c_mu)), "dV_T": float(mpf(dV)),
            "atDensity": [{"J": float(mpf(J)), **point(device, here, mpf(J))} for J in DENSITIES],
            "atGateVoltage": [{"V_GS": float(mpf(V)), "J": float(current_at(device, here, mpf(V)))}
                              for V in GATE_VOLTAGES],
        })
print(json.dumps({
    "made": "tests/outside/makers/device_points.py, Python 3.11, mpmath 1.3.0, 40 digits",
    "evidence": "independent",
    "devices": {name: {key: float(text) for key, text in texts.items()} for name, texts in DEVICES.items()},
    "points": rows,
}, indent=1))
