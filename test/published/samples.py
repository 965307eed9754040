"""Recomputes the main results of the sample sheets from their inputs, in SI, by routes of its own.

Run from anywhere: python3 samples.py > samples.json  (needs mpmath; the tests only read the JSON)

The strut curve is the smaller root of the Ayrton-Perry quadratic; the column on a rotational spring is the root of its
characteristic equation, c(sin u - u cos u) + u^2 sin u = 0 with c = k L/EI and u = L sqrt(P/EI) (S. P. Timoshenko,
J. M. Gere, Theory of Elastic Stability, 2nd ed., Art. 2.3); the mast's critical factors are the roots of its 2 x 2
determinant and its leaning state is found from the equilibrium of moments about each hinge, not from an energy.
"""

import json
from mpmath import mp, mpf, cos, sin, sqrt, pi, findroot, polyroots, radians

mp.dps = 40
KSI = mpf("4.4482216152605e3") / mpf("0.0254") ** 2
KIP, IN, FT = mpf("4448.2216152605"), mpf("0.0254"), mpf("0.3048")
gamma_G, gamma_Q, phi_0 = mpf("1.35"), mpf("1.5"), mpf(1) / 200


def resistance(A, f_y, N_cr, alpha):
    slenderness = sqrt(A * f_y / N_cr)
    eta = mpf(alpha) * (slenderness - mpf("0.2"))
    roots = polyroots([slenderness**2, -(1 + eta + slenderness**2), 1], extraprec=200)
    return min(root.real for root in roots) * A * f_y


def shore():
    E, f_y, A, I, L, D = mpf("210e9"), mpf("355e6"), mpf("26.4e-4"), mpf("589e-8"), mpf("4.6"), mpf("0.1397")
    slope = radians(38)
    N_Ed = (gamma_G * 118000 + gamma_Q * 52000) / cos(slope)
    M_Ed = gamma_G * 78500 * A * cos(slope) * L**2 / 8 + N_Ed * mpf("0.005")
    N_b_Rd = resistance(A, f_y, pi**2 * E * I / L**2, "0.21")
    n = N_Ed / N_b_Rd
    bending = (1 + mpf("0.8") * n) * M_Ed / (2 * I / D * f_y)
    return {"N_Ed": N_Ed, "shore.N_b_Rd": N_b_Rd, "utilisation": n + bending, "V_wall": N_Ed * sin(slope)}


def prop():
    E, f_y, A, L = mpf("210e9"), mpf("355e6"), mpf("54.3e-4"), mpf("5.2")
    I_z, I_y, k = mpf("889e-8"), mpf("2492e-8"), mpf("1.6e6")
    c = k * L / (E * I_z)
    u = findroot(lambda u: c * (sin(u) - u * cos(u)) + u**2 * sin(u), (pi + mpf("0.1"), mpf("4.49")), solver="anderson")
    N_cr_z = u**2 * E * I_z / L**2
    return {
        "N_Ed": gamma_G * 268000 + gamma_Q * 120000,
        "N_cr_z": N_cr_z,
        "L_cr_z": pi * L / u,
        "minor.N_b_Rd": resistance(A, f_y, N_cr_z, "0.49"),
        "major.N_b_Rd": resistance(A, f_y, pi**2 * E * I_y / L**2, "0.34"),
        "free_foot.N_b_Rd": resistance(A, f_y, pi**2 * E * I_z / L**2, "0.49"),
    }


def gantry():
    E, F_y, A = 29000 * KSI, 50 * KSI, mpf("17.9") * IN**2

    def strength(length):
        lambda_c = length / (mpf("2.45") * IN) / pi * sqrt(F_y / E)
        F_n = mpf("0.658") ** (lambda_c**2) * F_y if lambda_c <= 1.5 else mpf("0.877") / lambda_c**2 * F_y
        return mpf("0.9") * F_n * A

    P_u1 = (mpf("1.2") * 150 + mpf("1.6") * 195) * KIP
    return {
        "P_u1": P_u1,
        "stage1.P_c": strength(14 * FT),
        "P_u2": (mpf("1.2") * 150 + mpf("1.6") * 95) * KIP,
        "stage2.P_c": strength(20 * FT),
        "beta_br": 8 * P_u1 / (14 * FT) / mpf("0.75"),
    }


def mast():
    EI, L_1, L_2 = mpf("210e9") * mpf("257e-8"), mpf("3.2"), mpf("2.6")
    c_1 = 1 / (1 / mpf(42000) + L_1 / (2 * EI))
    c_2 = 1 / (1 / mpf(18000) + (L_1 + L_2) / (2 * EI))
    P, W_1, W_2, F = gamma_G * 720, gamma_G * 340, gamma_G * 210, gamma_Q * 85
    a, b = (P + W_2 + W_1 / 2) * L_1, (P + W_2 / 2) * L_2
    factors = sorted(root.real for root in polyroots([a * b, -(a * c_2 + b * (c_1 + c_2)), c_1 * c_2], extraprec=200))

    def moments(x, y):
        # about the upper hinge, of what stands above it; about the foot, of everything
        upper = (P + W_2 / 2) * L_2 * sin(y) + F * L_2 * cos(y)
        foot = upper + (P + W_2 + W_1 / 2) * L_1 * sin(x) + F * L_1 * cos(x)
        return foot - c_1 * (x - phi_0), upper - c_2 * (y - x)

    x, y = findroot(moments, (mpf("0.03"), mpf("0.06")))
    return {
        "alpha_cr": factors[0],
        "alpha_cr2": factors[1],
        "theta_1": x,
        "theta_2": y,
        "M_1": c_1 * (x - phi_0),
        "M_2": c_2 * (y - x),
        "x_tip": L_1 * sin(x) + L_2 * sin(y),
    }


results = {"raking-shore": shore(), "prop-column": prop(), "steel-column-us": gantry(), "folding-mast": mast()}
values = {sheet: {name: float(mp.nstr(value, 15)) for name, value in named.items()} for sheet, named in results.items()}
print(json.dumps({"source": "samples.py, mpmath with 40 digits; SI", "values": values}, indent=1))
