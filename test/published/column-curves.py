"""Recomputes the column curves of the method sheets by another route than the sheets take, with 50 digits.

Run from anywhere: python3 column-curves.py > column-curves.json  (needs mpmath; the tests only read the JSON)

EN 1993-1-1 6.3.1.2: the reduction factor is the smaller root of the Ayrton-Perry quadratic
    (1 - chi)(1 - lambda^2 chi) = eta chi,   eta = alpha (lambda - 0.2),
which the standard's Phi form solves; here the roots are found numerically.
AISC 360-22 E3: the nominal stress by the slenderness parameter lambda_c = (L_c/r)/pi sqrt(F_y/E) of the older editions,
    F_n = 0.658^(lambda_c^2) F_y up to lambda_c = 1.5, else 0.877/lambda_c^2 F_y.
"""

import json
from mpmath import mp, mpf, polyroots, pi, sqrt

mp.dps = 50
ALPHA = {"a0": mpf("0.13"), "a": mpf("0.21"), "b": mpf("0.34"), "c": mpf("0.49"), "d": mpf("0.76")}


def chi(slenderness, curve):
    if slenderness <= mpf("0.2"):
        return mpf(1)
    eta = ALPHA[curve] * (slenderness - mpf("0.2"))
    return min(root.real for root in polyroots([slenderness**2, -(1 + eta + slenderness**2), 1], extraprec=200))


def nominal_stress(slenderness, F_y, E=mpf(29000)):
    lambda_c = slenderness / pi * sqrt(F_y / E)
    if lambda_c <= mpf("1.5"):
        return mpf("0.658") ** (lambda_c**2) * F_y
    return mpf("0.877") / lambda_c**2 * F_y


digits = lambda value: float(mp.nstr(value, 15))
print(
    json.dumps(
        {
            "source": "column-curves.py, mpmath with 50 digits",
            "chi": [
                {"lambda_bar": l, "curve": curve, "chi": digits(chi(mpf(l), curve))}
                for l in ["0.1", "0.2", "0.21", "0.5", "0.8", "1.0", "1.3", "1.7", "2.0", "3.0"]
                for curve in ALPHA
            ],
            "nominal_stress": [
                {"slenderness": s, "F_y": F_y, "F_n": digits(nominal_stress(mpf(s), mpf(F_y)))}
                for F_y in ["36", "50", "65"]
                for s in ["1", "20", "60", "95", "113", "114", "135", "200"]
            ],
        },
        indent=1,
    )
)
