"""Recomputes reference values for test/stability by routes that share nothing with the program.

Columns: the differential equation EI v'''' + P v'' = 0 on v = A + Bx + C cos kx + D sin kx with the four boundary
conditions; the determinant is scanned for sign changes and halved to 25 digits with mpmath. The mode is its null vector.
Chains: generalised eigenproblems with scipy. Writes stability-recomputed.json beside this file.
Run: python3 test/published/recompute-stability.py
"""
import json, os, random
from mpmath import mp, mpf, matrix, det, cos, sin
import numpy as np, scipy.linalg

mp.dps = 60

def rows(k, end, x, sign):
    """Boundary rows of one end for (A, B, C, D); sign = -1 at the base, +1 at the top (outward normal)."""
    c, s = cos(k * x), sin(k * x)
    v = [1, x, c, s]
    v1 = [0, 1, -k * s, k * c]
    v2 = [0, 0, -k**2 * c, -k**2 * s]
    v3 = [0, 0, k**3 * s, -k**3 * c]
    rot, tra = end
    moment = v1 if rot == 'fixed' else [sign * m + (0 if rot == 'free' else rot) * t for m, t in zip(v2, v1)]
    # transverse force at the end: V = -(v''' + k^2 v'), balanced by the spring
    force = v if tra == 'fixed' else [-sign * (q + k**2 * t) + (0 if tra == 'free' else tra) * w for q, t, w in zip(v3, v1, v)]
    return [moment, force]

def determinant(k, base, top):
    m = matrix(rows(k, base, mpf(0), -1) + rows(k, top, mpf(1), 1))
    for i in range(4):
        scale = max(abs(m[i, j]) for j in range(4))
        for j in range(4):
            m[i, j] /= scale
    return det(m) / k**2

def halved(f, a, b):
    below = f(a)
    while b - a > mpf(10) ** -25 * b:
        middle = (a + b) / 2
        if below * f(middle) > 0: a = middle
        else: b = middle
    return (a + b) / 2

def loads(base, top, n):
    found, before = [], None
    grid = [mpf(10) ** e for e in np.linspace(-7, -1, 241)] + [mpf(x) for x in np.arange(0.11, 40, 0.02)]
    for a, b in zip(grid, grid[1:]):
        fa, fb = determinant(a, base, top), determinant(b, base, top)
        if fa * fb < 0:
            found.append(halved(lambda k: determinant(k, base, top), a, b) ** 2)
        if len(found) >= n:
            return found
    return found

def spring(low, high):
    r = random.random()
    if r < 0.2: return 'fixed'
    if r < 0.4: return 'free'
    return mpf('%.6e' % 10 ** random.uniform(low, high))

def held(base, top):
    on = lambda r: r != 'free'
    sway = on(base[1]) or on(top[1])
    lean = on(base[0]) or on(top[0]) or (on(base[1]) and on(top[1]))
    return sway and lean

def mode(load, base, top):
    """Deflections at the quarter points, the largest of the five being 1."""
    k = mp.sqrt(load)
    m = matrix(rows(k, base, mpf(0), -1) + rows(k, top, mpf(1), 1))
    columns = [max(abs(m[i, j]) for i in range(4)) for j in range(4)]
    for j in range(4):
        for i in range(4): m[i, j] /= columns[j]
    for i in range(4):
        scale = max(abs(m[i, j]) for j in range(4))
        for j in range(4): m[i, j] /= scale
    _, _, V = mp.svd_r(m)
    c = [V[3, j] / columns[j] for j in range(4)]
    v = [c[0] + c[1] * x + c[2] * cos(k * x) + c[3] * sin(k * x) for x in (mpf(0), mpf(1) / 4, mpf(1) / 2, mpf(3) / 4, mpf(1))]
    top_value = max(v, key=abs)
    return [float(mp.nstr(x / top_value, 17)) for x in v]

text = lambda r: r if isinstance(r, str) else mp.nstr(r, 12)

def sample(seed, count, low, high, modes, shapes):
    random.seed(seed)
    cases = []
    while len(cases) < count:
        base, top = (spring(low, high), spring(low, high)), (spring(low, high), spring(low, high))
        if not held(base, top): continue
        for n, load in enumerate(loads(base, top, modes)[:modes], 1):
            one = dict(base_rotation=text(base[0]), base_translation=text(base[1]), top_rotation=text(top[0]), top_translation=text(top[1]), n=n, load=float(mp.nstr(load, 17)))
            if shapes: one['mode'] = mode(load, base, top)
            cases.append(one)
    return cases

springs = sample(7, 160, -4, 6, 4, False)
extremes = sample(11, 80, -8, 12, 3, True)
high = [dict(ends=name, n=n, load=float(mp.nstr(loads(*ends, n)[n - 1], 17))) for name, ends in
        dict(fixed_fixed=(('fixed', 'fixed'), ('fixed', 'fixed')), fixed_pinned=(('fixed', 'fixed'), ('free', 'fixed'))).items() for n in (4, 7, 11)]

chains = []
rng = np.random.default_rng(3)
for n in range(2, 7):
    for _ in range(6):
        a = rng.uniform(0.3, 2, n); k = 10 ** rng.uniform(-1, 3, n)
        K = np.zeros((n, n))
        for i in range(n):
            b = np.zeros(n); b[i] = 1
            if i: b[i - 1] = -1
            K += k[i] * np.outer(b, b)
        values = scipy.linalg.eigh(K, np.diag(a), eigvals_only=True)
        chains.append(dict(lengths=[float('%.12g' % x) for x in a], springs=[float('%.12g' % x) for x in k], loads=[float('%.14g' % x) for x in values]))

matrices = []
for n in (2, 5, 9):
    A = rng.normal(size=(n, n)); A = A + A.T
    D = np.diag(10.0 ** rng.uniform(-4, 4, n))
    for M in (A, D @ A @ D):
        matrices.append(dict(matrix=[[float(x) for x in r] for r in M], values=[float(x) for x in scipy.linalg.eigvalsh(M)]))

here = os.path.dirname(os.path.abspath(__file__))
json.dump(dict(made_by='python3 test/published/recompute-stability.py (mpmath, scipy)', springs=springs, extremes=extremes, high=high, chains=chains, matrices=matrices), open(os.path.join(here, 'stability-recomputed.json'), 'w'), indent=1)
print(len(springs), len(extremes), len(high), len(chains), len(matrices))
