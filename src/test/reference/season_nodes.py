"""Error of Gauss-Legendre rules for the removals of a season, by the liveliness m of core.inference.statespace.Quadrature.

    m = r max(1, b^n) + nF + |(r/n)(1 - b^n) - F|

Run:  apt-get install python3-numpy;  python3 src/test/reference/season_nodes.py
Prints, for each number of points, the worst error of ln(integral of b dt) over 400,000 random cases with m up to a bound
(n 0.01-4, r 0.02-6, F 0.001-3, b 0.018-1.8), against 40 points.
"""
import numpy as np


def log_state(x, r, n, f, t):
    z = (r - n * f) * t
    phi = np.where(abs(z) < 1e-8, 1 + z / 2, np.expm1(z) / np.where(z == 0, 1, z))
    return x + (z - np.log1p(r * t * phi * np.exp(n * x))) / n


def mean(points, case):
    nodes, weights = np.polynomial.legendre.leggauss(points)
    return sum(w / 2 * np.exp(log_state(*case, (1 + t) / 2) - case[0]) for t, w in zip(nodes, weights))


def main():
    rng = np.random.default_rng(1)
    size = 400_000
    n = np.exp(rng.uniform(np.log(0.01), np.log(4), size))
    r = np.exp(rng.uniform(np.log(0.02), np.log(6), size))
    f = np.exp(rng.uniform(np.log(0.001), np.log(3), size))
    case = rng.uniform(-4, 0.6, size), r, n, f
    grown = np.exp(n * case[0])
    m = r * np.maximum(1, grown) + n * f + abs(r / n * (1 - grown) - f)
    reference = mean(40, case)
    for points in (3, 4, 5, 6, 8):
        error = abs(np.log(mean(points, case) / reference))
        print(points, *(f"m <= {bound}: {error[m <= bound].max():.0e} " for bound in (0.6, 1.4, 2.5, 4, 7, 10, 20)))


if __name__ == "__main__":
    main()
