"""Error of Gauss-Legendre rules for the removals of a season (ConstantMortality), by m = r max(1, b0^n) + n F.

Run:  apt-get install python3-numpy;  python3 src/test/reference/quadrature_nodes.py
Prints, for each m up to 15 (the last row also holds everything above), the worst relative error of each number of
points over 60,000 random cases with n <= 4, b0 <= 2, r <= 1.5, F <= 3 and one year, against 200 points.
"""
import numpy as np


def state(r, n, f, b0, t):
    a = r - n * f
    gain = t if a == 0 else -np.expm1(-a * t) / a
    return (b0 ** (-n) * np.exp(-a * t) + r * gain) ** (-1 / n)


def mean(rule, case):
    nodes, weights = rule
    return (weights * state(*case, (1 + nodes) / 2)).sum() / 2


def draw(rng):
    n = rng.choice([0.05, 0.188, 0.5, 0.75, 1.5, 2, 3, 4])
    r = rng.choice([rng.uniform(0.02, 1.5), 1.5])
    f = rng.choice([rng.uniform(0, 3), 3 * rng.uniform() ** 4, 3])
    b0 = rng.choice([2, rng.uniform(0, 2), 1.0, 10 ** rng.uniform(-6, 0)])
    return r, n, f, b0


def main():
    rng = np.random.default_rng(1)
    reference = np.polynomial.legendre.leggauss(200)
    rules = {points: np.polynomial.legendre.leggauss(points) for points in (5, 8, 10, 12, 16, 20)}
    worst = {}
    for _ in range(60_000):
        r, n, f, b0 = case = draw(rng)
        true = mean(reference, case)
        row = min(int(np.ceil(2 * (r * max(1, b0 ** n) + n * f))), 30)
        for points, rule in rules.items():
            error = abs(mean(rule, case) / true - 1)
            worst[row, points] = max(worst.get((row, points), 0), error)
    for row in sorted({row for row, _ in worst}):
        print(f"m {row / 2:4.1f}  " + "  ".join(f"{p}: {worst[row, p]:.0e}" for p in rules))


if __name__ == "__main__":
    main()
