"""
The loop of scipy_loop.py tuned by hand for CPython: plain floats in place of numpy, which costs more than it saves on
five components; Newton inside a bracket, started where the last pass ended, in place of brentq.
"""

import math
from operator import mul

import numpy as np

from scipy_loop import Loop, Srk, vapour_root


class TunedSrk:
    """ln phi in plain floats."""

    def __init__(self, srk: Srk):
        self.A, self.B, self.shift = srk.A.tolist(), srk.B.tolist(), srk.shift.tolist()

    def ln_phi(self, y):
        rows = [sum(map(mul, row, y)) for row in self.A]
        A = sum(map(mul, rows, y))
        B = sum(map(mul, self.B, y))
        Z = vapour_root(A, B)
        log = math.log(1 + B / Z)
        repulsion = math.log(Z - B)
        first, second = (Z - 1) / B + A * log / B**2, 2 * log / B
        return [b * first - repulsion - second * row - c for b, row, c in zip(self.B, rows, self.shift)]


class TunedLoop(Loop):
    """One pass: recycle in, recycle out, flows by component."""

    def __init__(self, problem):
        super().__init__(problem)
        self.feed, self.nu = self.feed.tolist(), self.nu.tolist()
        self.change = sum(self.nu)
        self.hot, self.cold = TunedSrk(self.hot), TunedSrk(self.cold)
        # where the inner searches ended in the last pass, and how fast ln phi changes there
        self.share = 0.5
        self.phi_slope = 0.0
        self.saturated = math.exp(self.ln_liquid)

    def react(self, n):
        """Extent at equilibrium: Newton in the share of the way that can be gone, inside a bracket."""
        nu, total = self.nu, sum(n)
        first = max(-n[i] / v for i, v in enumerate(nu) if v > 0)
        last = min(-n[i] / v for i, v in enumerate(nu) if v < 0)
        low, high = 0.0, 1.0
        share, way = self.share, last - first
        known = None
        for _ in range(100):
            extent = first + share * way
            m = [a + v * extent for a, v in zip(n, nu)]
            gas = total + self.change * extent
            ln_phi = self.hot.ln_phi([a / gas for a in m])
            phi = sum(map(mul, nu, ln_phi))
            affinity = phi - self.ln_K + sum(v * math.log(a / gas) for v, a in zip(nu, m) if v)
            # the part of the composition in closed form, that of ln phi as a secant remembered from step to step
            slope = sum(v * v / a for v, a in zip(nu, m) if v) - self.change**2 / gas
            if known is not None and abs(extent - known[0]) > 1e-7 * way:
                self.phi_slope = (phi - known[1]) / (extent - known[0])
            known = (extent, phi)
            if affinity > 0:
                high = share
            else:
                low = share
            step = affinity / ((slope + self.phi_slope) * way)
            if abs(step) < 1e-14:
                break
            share = share - step if low < share - step < high else (low + high) / 2
        self.share = share
        return [a + v * (first + share * way) for a, v in zip(n, nu)]

    def condense(self, n):
        """Gas over the pure liquid: y phi P = f. By the secant."""
        i = self.product
        others = sum(n) - n[i]
        dry = [0.0 if k == i else a / others for k, a in enumerate(n)]

        def miss(y):
            gas = [(1 - y) * a for a in dry]
            gas[i] = y
            return math.log(y) + self.cold.ln_phi(gas)[i] - self.ln_liquid

        y = self.saturated
        off = miss(y)
        slope = 1 / y
        for _ in range(100):
            step = max(min(-off / slope, 0.5 * y), -0.5 * y)
            y_next = y + step
            if abs(step) < 1e-14:
                break
            off_next = miss(y_next)
            if off_next != off:
                slope = (off_next - off) / step
            y, off = y_next, off_next
        self.saturated = y
        gas = list(n)
        gas[i] = min(n[i], y / (1 - y) * others)
        return gas

    def once(self, recycle):
        """numpy in, numpy out; a negative flow, which these methods do try, counts as a trace."""
        self.passes += 1
        n = [f + max(r, 0.0) for f, r in zip(self.feed, recycle.tolist())]
        gas = self.condense(self.react(n))
        return np.array([self.rest * a for a in gas])
