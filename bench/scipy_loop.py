"""
The reference loop (flowsheets/reference-loop.yaml) as a user would write it in Python with numpy and scipy, closed
by every method of scipy.optimize.root that takes no derivatives, and by scipy.optimize.fixed_point.

Reads the problem as JSON from standard input (see scipy-problem.ts: the constants a user would have in his script,
so that both sides solve one and the same problem) and writes JSON to standard output.

Plain, and meant to be fair: numpy arrays for the components, brentq for the extent and for what stays in the gas,
Newton for the cubic, because numpy.roots would take several times as long. What does not change from pass to pass
is worked out once. Temperatures of mixer and compressor, power and duties are left out, because they do not act on
the flows: that favours scipy, as the other side works them out in every pass.
scipy_loop_tuned.py has the same loop tuned by hand.
"""

import json
import math
import sys
import time
import warnings

import numpy as np
import scipy
from scipy.optimize import brentq, fixed_point, root

R = 8.31446261815324
# of Soave-Redlich-Kwong, to the digits that place the critical point at Tc, Pc
OMEGA_A = 1 / (9 * (2 ** (1 / 3) - 1))
OMEGA_B = (2 ** (1 / 3) - 1) / 3
# as narrow as brentq goes: 4 eps
NARROWEST = 4 * np.finfo(float).eps


class Srk:
    """Soave-Redlich-Kwong with volume shift at one temperature and pressure; ln phi of a gas of given fractions."""

    def __init__(self, components, kij, T, P):
        Tc, Pc, omega = (np.array([c[key] for c in components]) for key in ("criticalK", "criticalPa", "acentricFactor"))
        m = 0.48 + 1.574 * omega - 0.176 * omega**2
        alpha = (1 + m * (1 - np.sqrt(T / Tc))) ** 2
        hydrogen = np.array([c["hydrogen"] for c in components])
        alpha[hydrogen] = 1.202 * np.exp(-0.30288 * T / Tc[hydrogen])  # Graboski and Daubert (1979)
        a = OMEGA_A * (R * Tc) ** 2 / Pc * alpha
        # shift of Peneloux and others (1982); none without a Rackett parameter
        rackett = np.array([0.29441 if c["rackettZ"] is None else c["rackettZ"] for c in components])
        shift = np.maximum(0, 0.40768 * (0.29441 - rackett) * R * Tc / Pc)
        # already in the terms of the cubic: A = sum sum y_i y_j A_ij, B = sum y_i B_i
        self.A = np.sqrt(np.outer(a, a)) * (1 - np.array(kij)) * P / (R * T) ** 2
        self.B = OMEGA_B * Tc / Pc * P / T
        self.shift = shift * P / (R * T)

    def ln_phi(self, y):
        rows = self.A @ y
        A, B = float(y @ rows), float(y @ self.B)
        Z = vapour_root(A, B)
        share = self.B / B
        attraction = A / B * math.log(1 + B / Z)
        return share * (Z - 1) - math.log(Z - B) - attraction * (2 * rows / A - share) - self.shift


def vapour_root(A, B):
    """Z^3 - Z^2 + (A - B - B^2) Z - A B = 0, by Newton from above, where it comes down to the largest root."""
    c1, c0 = A - B - B * B, -A * B
    Z = 1 + B
    for _ in range(50):
        step = (((Z - 1) * Z + c1) * Z + c0) / ((3 * Z - 2) * Z + c1)
        Z -= step
        if abs(step) < 1e-14 * Z:
            return Z
    return max(r.real for r in np.roots([1, -1, c1, c0]) if abs(r.imag) < 1e-9)


def ln_equilibrium_constant(components, nu, T):
    """ln K from the nine-coefficient polynomials of NASA (TP-2002-211556)."""
    total = 0.0
    for one, v in zip(components, nu):
        if v == 0:
            continue
        *a, b1, b2 = one["nasa"]
        h = -a[0] / T + a[1] * math.log(T) + b1
        h += sum(a[k] * T ** (k - 1) / (k - 1) for k in range(2, 7))
        s = -a[0] / (2 * T**2) - a[1] / T + a[2] * math.log(T) + b2
        s += sum(a[k] * T ** (k - 2) / (k - 2) for k in range(3, 7))
        total += v * (s - h / T)
    return total


class Loop:
    """One pass: recycle in, recycle out, flows by component."""

    def __init__(self, problem):
        components = problem["components"]
        converter, condenser = problem["converter"], problem["condenser"]
        self.feed = np.array(problem["feed"])
        self.nu = np.array(problem["nu"])
        self.rest = 1 - problem["purgeFraction"]
        self.product = problem["product"]
        self.hot = Srk(components, converter["kij"], converter["temperatureK"], converter["pressurePa"])
        ln_K = ln_equilibrium_constant(components, self.nu, converter["temperatureK"] + converter["approachK"])
        self.ln_K = ln_K - self.nu.sum() * math.log(converter["pressurePa"] / 1e5)
        self.taking_part = self.nu != 0
        self.cold = Srk(components, condenser["kij"], condenser["temperatureK"], condenser["pressurePa"])
        self.ln_liquid = self.liquid(components, condenser)
        self.passes = 0

    def liquid(self, components, condenser):
        """ln(f/P) of the pure liquid: Psat by Antoine, phi(sat), Poynting."""
        T, P = condenser["temperatureK"], condenser["pressurePa"]
        A, B, C = condenser["antoine"]
        psat = 1e5 * 10 ** (A - B / (T + C))
        pure = np.zeros(len(components))
        pure[self.product] = 1
        ln_phi = float(Srk(components, condenser["kij"], T, psat).ln_phi(pure)[self.product])
        return math.log(psat / P) + ln_phi + condenser["liquidVolumeM3PerMol"] * (P - psat) / (R * T)

    def react(self, n):
        """To equilibrium: sum nu ln(y phi) = ln K."""
        nu, taking_part = self.nu, self.taking_part

        def affinity(extent):
            m = n + nu * extent
            y = m / m.sum()
            return nu[taking_part] @ (np.log(y) + self.hot.ln_phi(y))[taking_part] - self.ln_K

        first = np.max(-n[nu > 0] / nu[nu > 0])
        last = np.min(-n[nu < 0] / nu[nu < 0])
        way = last - first
        extent = brentq(affinity, first + 1e-9 * way, last - 1e-9 * way, xtol=1e-14 * way, rtol=NARROWEST)
        return n + nu * extent

    def condense(self, n):
        """What stays in the gas over the pure liquid: y phi P = f."""
        i = self.product
        dry = n.copy()
        dry[i] = 0
        others = dry.sum()
        dry /= others

        def miss(y):
            gas = (1 - y) * dry
            gas[i] = y
            return math.log(y) + self.cold.ln_phi(gas)[i] - self.ln_liquid

        y = brentq(miss, 0.1 * math.exp(self.ln_liquid), 0.5, xtol=1e-16, rtol=NARROWEST)
        gas = n.copy()
        gas[i] = min(n[i], y / (1 - y) * others)
        return gas

    def once(self, recycle):
        """A negative flow, which these methods do try, counts as none."""
        self.passes += 1
        return self.rest * self.condense(self.react(self.feed + np.maximum(recycle, 0)))


def closed_by(method, loop, start, scale, tolerance):
    """The recycle in shares of the feed, so that the tolerances of all methods mean the same."""

    def g(x):
        return loop.once(x * scale) / scale

    def miss(x):
        return g(x) - x

    if method == "fixed_point":
        return fixed_point(g, start, xtol=tolerance, maxiter=2000)
    if method in ("hybr", "lm"):
        found = root(miss, start, method=method, options={"xtol": tolerance})
    elif method == "df-sane":
        found = root(miss, start, method=method, options={"fatol": tolerance, "ftol": 0, "maxfev": 5000})
    else:
        found = root(miss, start, method=method, options={"fatol": tolerance, "maxiter": 5000})
    if not found.success:
        raise ArithmeticError(str(found.message))
    return found.x


def exact(loop, start, scale):
    """The answer to the last digits, what the others are judged by: hybr with the tightest tolerance it takes."""
    near = root(lambda x: loop.once(x * scale) / scale - x, start, options={"xtol": 1e-15}).x
    left = float(np.max(np.abs(loop.once(near * scale) / scale - near)))
    if left > 1e-13:
        raise SystemExit(f"the loop in Python closes to {left:.0e} only")
    return near * scale


def measure(method, Loop, problem, start, scale, want):
    """
    Time with the loosest tolerance that gives the right answer. That favours scipy: a user does not know the answer
    beforehand, and would have to guess the tolerance.
    """
    last = {"evaluations": None, "note": ""}
    for tolerance in (1e-7, 1e-8, 1e-9, 1e-10, 1e-11, 1e-12, 1e-13):
        loop = Loop(problem)
        try:
            answer = closed_by(method, loop, start, scale, tolerance) * scale
        except Exception as trouble:  # scipy raises many kinds; each means that there is no answer
            # what does not close to one tolerance does not close to a tighter one
            last = {"evaluations": loop.passes, "note": " ".join(str(trouble).split())[:80] or type(trouble).__name__}
            break
        off = float(np.max(np.abs(answer / want - 1)))
        if off <= problem["tolerance"]:
            ms = quickest_ms(lambda: closed_by(method, Loop(problem), start, scale, tolerance), problem["rounds"])
            found = {"tolerance": tolerance, "ms": ms, "answer": answer.tolist()}
            return {"converged": True, "evaluations": loop.passes, "note": "", **found}
        last = {"evaluations": loop.passes, "note": f"stops {off:.0e} off the answer"}
    return {"converged": False, "ms": None, "answer": None, "tolerance": None, **last}


def quickest_ms(run, rounds):
    """Quickest of several after a warm one, as on the other side: whatever else the machine does only slows down."""
    run()
    times = []
    while len(times) < 3 or (len(times) < rounds and sum(times) < 2):
        began = time.perf_counter()
        run()
        times.append(time.perf_counter() - began)
    return 1e3 * min(times)


METHODS = (
    "hybr lm broyden1 broyden2 anderson krylov df-sane diagbroyden excitingmixing linearmixing fixed_point".split()
)


def main():
    problem = json.load(sys.stdin)
    warnings.simplefilter("ignore")
    made = Loop
    if problem["tuned"]:
        from scipy_loop_tuned import TunedLoop as made
    feed = np.array(problem["feed"])
    scale = np.full(len(feed), feed.sum())
    starts = {"feed": feed / scale, "empty": np.zeros(len(feed))}
    loop = made(problem)
    want = exact(loop, starts["feed"], scale)
    results = [
        {"method": method, "start": name, **measure(method, made, problem, start, scale, want)}
        for method in problem.get("methods") or METHODS
        for name, start in starts.items()
    ]
    # moved by 0.1 % from pass to pass, as closing moves it
    pass_ms = quickest_ms(lambda: loop.once(want * (1 + 1e-3 * (loop.passes % 2))), 10 * problem["rounds"])
    versions = {"python": sys.version.split()[0], "numpy": np.__version__, "scipy": scipy.__version__}
    json.dump({"versions": versions, "answer": want.tolist(), "pass_ms": pass_ms, "results": results}, sys.stdout)


if __name__ == "__main__":
    main()
