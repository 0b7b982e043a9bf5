"""The sphere fit in scipy, for comparison of speed: one thread, analytic derivatives, the formulation of shared/shell.

Reads {"sizes": [{"name", "l", "b", "velocity", "sigma", "width"}]} from standard input; prints per size the median
wall time in milliseconds of one fit (linear start values, then reweighted scipy.optimize.least_squares), of 500 refits
of moved marks from the fitted values, of the same 500 at once in numpy alone, and the fitted values.
"""
import json
import os
import sys
import time

os.environ.setdefault("OMP_NUM_THREADS", "1")
os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
import numpy as np
from scipy.optimize import least_squares

DRAWS = 500


def basis(n):
    h = np.hypot(n[0], n[1])
    e = np.array([-n[1] / h, n[0] / h, 0.0])
    return e, np.cross(n, e)


def curve(V, dv, T, v0, w):
    """Radius averaged over the visible part of a channel, its variance, its derivatives; no channel leaves the shell here."""
    ua, ub = (V - dv / 2 - v0) / w, (V + dv / 2 - v0) / w
    ya, yb = np.clip(ua, -1, 1), np.clip(ub, -1, 1)
    pa, pb = np.arcsin(ya), np.arcsin(yb)
    d = np.maximum(pb - pa, 1e-12)
    width = 2 * np.sin(d / 2) * np.cos((pa + pb) / 2)
    M = (d + np.sin(d) * np.cos(pa + pb)) / (2 * width)
    Mb = np.where(ub > 1, 0, (np.cos(pb) - M) / width)
    Ma = np.where(ua < -1, 0, (M - np.cos(pa)) / width)
    var = np.maximum(1 - (ya * ya + ya * yb + yb * yb) / 3 - M * M, 0)
    s = np.sin(T) * M
    j = 1 / np.sqrt(1 - s * s)
    sT = np.sin(T)
    return np.arcsin(s), (sT * j) ** 2 * var, j * np.cos(T) * M, -j * sT * (Ma + Mb) / w, -j * sT * (ua * Ma + ub * Mb)


class Sphere:
    def __init__(self, q, V, dv, sigma, n0):
        e, m = basis(n0)
        self.qn, self.qe, self.qm = q @ n0, q @ e, q @ m
        self.V, self.dv, self.sigma2, self.key = V, dv, sigma ** 2, None

    def evaluate(self, p):
        if self.key is not None and np.array_equal(p, self.key):
            return
        x, y, T, v0, lw = p
        L = np.sqrt(1 + x * x + y * y)
        c = (self.qn + x * self.qe + y * self.qm) / L
        si = np.sqrt(np.maximum(1 - c * c, 1e-18))
        mu, var, dT, dV, dW = curve(self.V, self.dv, T, v0, np.exp(lw))
        J = np.empty((len(c), 5))
        J[:, 0], J[:, 1] = -(self.qe / L - c * x / L ** 2) / si, -(self.qm / L - c * y / L ** 2) / si
        J[:, 2], J[:, 3], J[:, 4] = -dT, -dV, -dW
        self.key, self.r, self.J, self.s2 = p.copy(), np.arctan2(si, c) - mu, J, self.sigma2 + var

    def residuals(self, p):
        self.evaluate(p)
        return self.r / self.s

    def jacobian(self, p):
        self.evaluate(p)
        return self.J / self.s[:, None]

    def fit(self, p, tolerance):
        for _ in range(50):
            self.evaluate(p)
            self.s = np.sqrt(self.s2)
            R = least_squares(self.residuals, p, jac=self.jacobian, method="lm", ftol=1e-10, xtol=1e-10, gtol=1e-10)
            step, p = R.x - p, R.x
            if np.sqrt(step @ (R.jac.T @ (R.jac @ step))) < tolerance:
                break
        return p


def batched(Q, V, dv, sigma, n0, p, tolerance):
    """The refits of Sphere.fit, all at once: reweighted, damped Gauss-Newton with a leading axis for the data sets."""
    e, m = basis(n0)
    qn, qe, qm = Q @ n0, Q @ e, Q @ m
    p = np.repeat(p[None], len(Q), 0)
    damping, done = np.full(len(Q), 1e-4), np.zeros(len(Q), bool)

    def evaluate(p, live):
        x, y, T, v0, lw = (p[:, i : i + 1] for i in range(5))
        a, b, d = qn[live], qe[live], qm[live]
        L = np.sqrt(1 + x * x + y * y)
        c = (a + x * b + y * d) / L
        si = np.sqrt(np.maximum(1 - c * c, 1e-18))
        mu, var, dT, dV, dW = curve(V, dv, T, v0, np.exp(lw))
        J = np.stack([-(b / L - c * x / L ** 2) / si, -(d / L - c * y / L ** 2) / si, -dT, -dV, -dW], -1)
        return np.arctan2(si, c) - mu, J, sigma ** 2 + var

    r, J, s2 = evaluate(p, slice(None))
    for _ in range(50):
        live = np.flatnonzero(~done)
        if len(live) == 0:
            break
        w = 1 / s2[live]
        JW = J[live] * w[..., None]
        A = JW.transpose(0, 2, 1) @ J[live]
        g = (JW.transpose(0, 2, 1) @ r[live][..., None])[..., 0]
        D = 1 / np.sqrt(np.einsum("bii->bi", A))
        M = A * D[:, :, None] * D[:, None, :] + damping[live, None, None] * np.eye(5)
        step = -D * np.linalg.solve(M, (D * g)[..., None])[..., 0]
        trial = p[live] + step
        rn, Jn, sn = evaluate(trial, live)
        ok = (rn * rn * w).sum(1) <= (r[live] ** 2 * w).sum(1) * (1 + 1e-9) + 1e-12
        damping[live] = np.where(ok, damping[live] * 0.15, damping[live] * 6)
        better = live[ok]
        p[better], r[better], J[better], s2[better] = trial[ok], rn[ok], Jn[ok], sn[ok]
        done[live[ok & (-(g * step).sum(1) < tolerance ** 2)]] = True
    return p


def start(q, V):
    n = q.mean(0)
    n /= np.linalg.norm(n)
    half = np.ptp(V) / 2
    z = (V - V.mean()) / half
    for _ in range(4):
        e, m = basis(n)
        x, y = q @ e, q @ m
        s = np.linalg.lstsq(np.stack([2 * x, 2 * y, np.ones_like(x), z, z * z], 1), x * x + y * y, rcond=None)[0]
        n = n + s[0] * e + s[1] * m
        n /= np.linalg.norm(n)
    a, b, c = s[2:]
    S = a - b * b / (4 * c)
    return n, np.array([0, 0, np.arcsin(np.sqrt(S)), V.mean() - half * b / (2 * c), np.log(half * np.sqrt(-S / c))])


def measure(size, repeats):
    l, b, V, sigma = (np.array(size[k], float) for k in ("l", "b", "velocity", "sigma"))
    l, b, sigma = np.radians(l), np.radians(b), np.radians(sigma)
    q = np.stack([np.cos(b) * np.cos(l), np.cos(b) * np.sin(l), np.sin(b)], 1)
    fits, boots, batches = [], [], []
    for _ in range(repeats):
        t = time.perf_counter()
        n, p0 = start(q, V)
        S = Sphere(q, V, size["width"], sigma, n)
        p = S.fit(p0, 1e-6)
        fits.append(1e3 * (time.perf_counter() - t))
    rng = np.random.default_rng(1)
    S.evaluate(p)
    e, m = basis(n)
    c = n + p[0] * e + p[1] * m
    c /= np.linalg.norm(c)
    out = q - (q @ c)[:, None] * c
    out /= np.linalg.norm(out, axis=1)[:, None]
    radius = np.arccos(q @ c) - S.r
    for _ in range(3):
        th = radius + np.sqrt(S.s2) * rng.standard_normal((DRAWS, len(V)))
        Q = np.cos(th)[..., None] * c + np.sin(th)[..., None] * out
        t = time.perf_counter()
        for i in range(DRAWS):
            one = Sphere(Q[i], V, size["width"], sigma, n).fit(p, 1e-3)
        boots.append(1e3 * (time.perf_counter() - t))
        t = time.perf_counter()
        many = batched(Q, V, size["width"], sigma, n, p, 1e-3)
        batches.append(1e3 * (time.perf_counter() - t))
        assert abs(many[-1, 4] - one[4]) < 0.02 * many[:, 4].std(), "the two ways disagree"
    return {"name": size["name"], "fitMs": float(np.median(fits)), "bootstrapMs": float(np.median(boots)),
            "batchedMs": float(np.median(batches)), "theta": float(np.degrees(p[2])), "vExp": float(np.exp(p[4]))}


if __name__ == "__main__":
    json.dump([measure(s, 40) for s in json.load(sys.stdin)["sizes"]], sys.stdout)
