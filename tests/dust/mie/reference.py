"""Writes reference.json: scattering by spheres from the textbook formulas in many digits.

Bohren & Huffman (1983): eqs. 4.53 (coefficients of a sphere, with psi and xi and their derivatives), section 8.1 (coated sphere), 4.61,
4.62 and section 4.5 (efficiencies, asymmetry). Riccati-Bessel functions by upward recurrence from their elementary forms, with so many
digits (mpmath) that its instability does not matter: none of the rearrangements of the program under test is used.
Run: /usr/bin/python3 reference.py  (Debian: python3-mpmath; about a minute)
"""
import json
import os

from mpmath import cos, mp, mpc, mpf, nstr, sin

DIGITS = 400


def riccati(z, orders):
    """psi_n, chi_n (chi_n = -z y_n) and their derivatives for n = 0..orders."""
    psi = [sin(z), sin(z) / z - cos(z)]
    chi = [cos(z), cos(z) / z + sin(z)]
    for n in range(1, orders):
        psi.append((2 * n + 1) / z * psi[n] - psi[n - 1])
        chi.append((2 * n + 1) / z * chi[n] - chi[n - 1])
    slope = lambda f: [None] + [f[n - 1] - n / z * f[n] for n in range(1, orders + 1)]
    return psi, chi, slope(psi), slope(chi)


def coefficients(x, m_core, m_coat, x_core):
    orders = int(x + 8 * mp.cbrt(x) + 8)
    psi, chi, dpsi, dchi = riccati(x, orders)
    psi_y, chi_y, dpsi_y, dchi_y = riccati(m_coat * x, orders)
    if x_core:
        psi_c, _, dpsi_c, _ = riccati(m_core * x_core, orders)
        psi_i, chi_i, dpsi_i, dchi_i = riccati(m_coat * x_core, orders)
    a, b = [mpc(0)], [mpc(0)]
    for n in range(1, orders + 1):
        A = B = 0
        if x_core:
            A = (m_coat * psi_i[n] * dpsi_c[n] - m_core * dpsi_i[n] * psi_c[n]) / (
                m_coat * chi_i[n] * dpsi_c[n] - m_core * dchi_i[n] * psi_c[n])
            B = (m_coat * psi_c[n] * dpsi_i[n] - m_core * psi_i[n] * dpsi_c[n]) / (
                m_coat * dchi_i[n] * psi_c[n] - m_core * dpsi_c[n] * chi_i[n])
        xi, dxi = psi[n] - 1j * chi[n], dpsi[n] - 1j * dchi[n]
        fa, dfa = psi_y[n] - A * chi_y[n], dpsi_y[n] - A * dchi_y[n]
        fb, dfb = psi_y[n] - B * chi_y[n], dpsi_y[n] - B * dchi_y[n]
        a.append((psi[n] * dfa - m_coat * dpsi[n] * fa) / (xi * dfa - m_coat * dxi * fa))
        b.append((m_coat * psi[n] * dfb - dpsi[n] * fb) / (m_coat * xi * dfb - dxi * fb))
    return a, b


def sphere(x, m_core, m_coat, x_core):
    a, b = coefficients(x, m_core, m_coat, x_core)
    size = lambda c: c.real**2 + c.imag**2
    orders = range(1, len(a))
    extinction = sum((2 * n + 1) * (a[n] + b[n]).real for n in orders) * 2 / x**2
    scattering = sum((2 * n + 1) * (size(a[n]) + size(b[n])) for n in orders) * 2 / x**2
    back = size(sum((2 * n + 1) * (-1) ** n * (a[n] - b[n]) for n in orders)) / x**2
    cosines = sum((2 * n + 1) / mpf(n * (n + 1)) * (a[n] * b[n].conjugate()).real for n in orders)
    cosines += sum(n * (n + 2) / mpf(n + 1) * (a[n] * a[n + 1].conjugate() + b[n] * b[n + 1].conjugate()).real for n in orders[:-1])
    number = lambda v: float(nstr(v, 17))
    return {
        'extinction': number(extinction),
        'scattering': number(scattering),
        'absorption': number(extinction - scattering),
        'backscattering': number(back),
        'asymmetry': number(cosines * 4 / x**2 / scattering),
    }


def rows():
    for m in [(1.5, 0), (1.5, 1), (1.33, 1e-5), (1.7, 1e-9), (10, 10), (0.1, 5), (1.0001, 1e-7), (0.75, 0)]:
        for x in [1e-6, 1e-3, 0.1, 1, 7.3, 100, 1000]:
            yield x, m, m, 0
    yield 10000, (1.5, 0), (1.5, 0), 0
    for core, coat in [((1.7, 0.03), (1.3, 0)), ((1.3, 0), (1.7, 0)), ((3, 4), (1.33, 1e-8)), ((1.5, 0), (2, 3)), ((1, 0), (1.6, 0.1))]:
        for x in [1e-6, 0.01, 1, 20, 300]:
            for part in [0.01, 0.6, 0.99]:
                yield x, core, coat, part


def exact(pair):
    return mpc(mpf(pair[0]), mpf(pair[1]))


answer = []
for x, core, coat, part in rows():
    x_core = float(part * x)
    mp.dps = DIGITS + (int(2 * x * coat[1]) if part else 0)  # psi and chi become alike in an opaque coat
    values = sphere(mpf(x), exact(core), exact(coat), mpf(x_core))
    answer.append({'x': x, 'xCore': x_core, 'core': core, 'coat': coat, **values})
with open(os.path.join(os.path.dirname(os.path.abspath(__file__)), 'reference.json'), 'w') as file:
    file.write('[\n' + ',\n'.join('  ' + json.dumps(row) for row in answer) + '\n]\n')
