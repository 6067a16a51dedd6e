"""Reference values for the flows of org.merewarden.core.dynamics, at 60 digits.

Run:  apt-get install python3-mpmath;  python3 src/test/reference/dynamics_flows.py src/test/resources/reference
Writes flow_constant_mortality.csv and flow_constant_removals.csv. Inputs are doubles, printed exactly.

Mortality: the Bernoulli substitution y = b^-n, y' = r - a y, a = r - nF (u = ln b for n = 0), and removals by
numerical quadrature of F B. Removals: Riccati by complex arithmetic, x = (x0 + D q)/(1 + x0 q), q = tanh(s th)/s,
s = sqrt(D) real or imaginary; time to extinction by the inverse of q at b = 0. Neither uses the rearrangements that
the Java code needs for 16 digits.
"""
import random
import sys
from mpmath import mp, mpf, mpc

mp.dps = 60


def state(r, n, f, b0, t):
    if n == 0:
        return mp.exp((mp.log(b0) + f / r) * mp.exp(-r * t) - f / r)
    # b^-n of a tiny n differs from 1 only in its last 300 digits
    with mp.workdps(700 if n < 1e-20 else mp.dps):
        a = r - n * f
        y0 = b0 ** (-n)
        y = y0 + r * t if a == 0 else r / a + (y0 - r / a) * mp.exp(-a * t)
        return y ** (-1 / n)


def mortality_rows():
    rng = random.Random(20261201)
    shapes = [0.0, 1e-300, 1e-9, 1e-4, 0.188115, 0.5, 1.0, 2.0, 4.0]
    for _ in range(300):
        r = rng.choice([0.05, 0.4, 1.5])
        n = rng.choice(shapes)
        f = rng.choice([0.0, 0.01, 0.3, 1.0, 3.0, r / n if 0.01 <= n else 0.5, r * (1 + 1e-13) / n if 0.01 <= n else 0.7])
        b0 = rng.choice([1e-12, 1e-3, 0.05, 0.5, 0.999999999, 1.0, 1.7, 20.0])
        t = rng.choice([1e-6, 0.25, 1.0, 1.0, 1.0, 40.0])
        yield r, n, f, b0, t


def write_mortality(path):
    with open(path, "w") as out:
        out.write("r,shape,mortality,state,years,state_after,removals_over_capacity\n")
        for row in mortality_rows():
            r, n, f, b0, t = map(mpf, row)
            after = state(r, n, f, b0, t)
            caught = ""
            # the range for which the quadrature's error is stated
            if b0 <= 2 and r * t <= 1.5 and f * t <= 3:
                with mp.workdps(30):
                    cuts = [t * mpf(i) / 8 for i in range(9)]
                    caught = mp.nstr(f * mp.quad(lambda s: state(r, n, f, b0, s), cuts), 20)
            out.write(",".join([repr(v) for v in row] + [mp.nstr(after, 20), caught]) + "\n")


def discriminant(r, k, h):
    """1/4 - H/(rK); a double H meant to be MSY misses it by rounding, so that little counts as zero."""
    d = mpf(1) / 4 - h / (r * k)
    return mpf(0) if abs(d) < 1e-16 else d


def removals_state(r, k, h, b0, t):
    d = discriminant(r, k, h)
    x0 = b0 / k - mpf(1) / 2
    if d == 0:
        q = r * t
    else:
        s = mp.sqrt(mpc(d))
        q = (mp.tanh(s * r * t) / s).real
    return mpf(1) / 2 + (x0 + d * q) / (1 + x0 * q)


def extinction(r, k, h, b0):
    d = discriminant(r, k, h)
    x0 = b0 / k - mpf(1) / 2
    if d >= 0 and x0 >= -mp.sqrt(d):
        return mp.inf
    # q grows with t until b = 0 at q = -(x0 + 1/2)/(D + x0/2), or past the pole of the tangent
    q = -(x0 + mpf(1) / 2) / (d + x0 / 2)
    if d == 0:
        return q / r
    s = mp.sqrt(mpc(d))
    angle = mp.atanh(mpc(q) * s) / s
    t = angle.real / r
    return t if t > 0 else t + mp.pi / (mp.sqrt(-d) * r)


def write_removals(path):
    rng = random.Random(20261202)
    with open(path, "w") as out:
        out.write("r,capacity,removals,biomass,years,biomass_after,extinction_years\n")
        for _ in range(200):
            r, k = rng.choice([(0.4, 1000.0), (1.5, 0.02), (0.05, 3.0e7)])
            top = r * k / 4
            share = rng.choice([0.0, 1e-9, 0.3, 0.75, 0.999, 1 - 1e-6, 1 - 1e-11, 1.0, 1 + 1e-11, 1 + 1e-6, 1.01, 3.0])
            h = share * top
            b0 = k * rng.choice([1e-9, 0.01, 0.2, 0.45, 0.5, 0.6, 1.0, 5.0])
            t = rng.choice([0.01, 0.5, 4.0, 30.0, 200.0]) / r / 2
            args = list(map(mpf, (r, k, h, b0)))
            end = extinction(*args)
            after = mpf(0) if mpf(t) >= end else removals_state(*args, mpf(t)) * mpf(k)
            gone = "Infinity" if end == mp.inf else mp.nstr(end, 20)
            out.write(",".join([repr(v) for v in (r, k, h, b0, t)] + [mp.nstr(after, 20), gone]) + "\n")


if __name__ == "__main__":
    write_mortality(sys.argv[1] + "/flow_constant_mortality.csv")
    write_removals(sys.argv[1] + "/flow_constant_removals.csv")
