#!/usr/bin/env python3
"""Independent numerical reference for plane weld groups.

Mechanics
---------
A rigid part moves by a small motion q = (v_x, v_y, omega) about the centroid c, so the weld at x is displaced by

    u(x) = v + omega * rot90(x - c),

and transmits, per unit length, a force in the direction of u of size

    r = 0.60 F t n * k(theta, |u| / w),      theta = angle(u, weld axis) in 0..90 degrees,

t = leg / sqrt(2), w = leg, n = sides, k the load-deformation law with its directional factor.  The load carried is

    W(q) = ( int r u/|u| ds,  int (x - c) x r u/|u| ds ).

A state at first rupture is a motion with W(q) = lambda L, lambda > 0, and max over the weld of |u| / Delta_u(theta) = 1.
Only the direction of q is unknown; its length follows from the rupture condition.

Route
-----
* Integrals: tanh-sinh (double exponential) rule on cells split at every kink: the foot of the perpendicular from the
  instantaneous centre on a straight run; u_n = 0 and u_t = 0 on an arc; the change of formula of the polynomial law.
  Offsets are measured from the cell end nearest the centre, so the p^0.3 root is resolved without cancellation.
* Search: every direction of motion of an icosphere (40 962 vertices for the stored file) is mapped to its wrench; mesh
  triangles whose image holds, or comes near, the load direction are subdivided further; each hit starts a
  scipy.optimize.root (hybr) solve in motion space with the fine rule.
* Cross-check: `pointwise_wrench` evaluates the definitions above point by point with QUADPACK or with mpmath.

Units of the caller are kept throughout (the stored file: mm, N, MPa).
"""

from __future__ import annotations

import argparse
import math
import os
import sys
import time
import tomllib
from dataclasses import dataclass
from functools import lru_cache

import mpmath
import numpy as np
from scipy.integrate import quad
from scipy.optimize import minimize_scalar, root

SQRT2 = math.sqrt(2.0)
TWO_PI = 2.0 * math.pi

# ----------------------------------------------------------------------------------------------------------------------
# Load-deformation laws (arrays; theta in degrees, e = |u| / w)
# ----------------------------------------------------------------------------------------------------------------------

POLYNOMIAL_SWITCH = 0.0325
POLYNOMIAL_TERMS = ((1.0, -13.29), (2.0, 457.32), (3.0, -3385.9), (4.0, 9054.29), (5.0, -9952.13), (6.0, 3840.71))
BPK_LEG = 0.25


def directional(sine):
    """1 + 0.50 sin^1.5 theta."""
    return 1.0 + 0.5 * sine**1.5


def delta_m(theta):
    """Lesik-Kennedy deformation at maximum strength over the leg: 0.209 (theta + 2)^-0.32."""
    return 0.209 * (theta + 2.0) ** -0.32


class LesikKennedy:
    """f = [p (1.9 - 0.9 p)]^0.3, Delta_u = min(1.087 (theta + 6)^-0.65, 0.17) w."""

    name = "lesik-kennedy"
    ruptures = True
    switch = None

    @staticmethod
    def factor(theta, sine, e):
        p = e / delta_m(theta)
        return directional(sine) * np.maximum(p * (1.9 - 0.9 * p), 0.0) ** 0.3

    @staticmethod
    def limits(theta):
        """Smooth branches of Delta_u / w; the smallest governs."""
        return 1.087 * (theta + 6.0) ** -0.65, np.full_like(theta, 0.17)


class LesikKennedyPolynomial:
    """f = 8.23384 p up to p = 0.0325, then the six-term root polynomial; Delta_u without the cap."""

    name = "lesik-kennedy-polynomial"
    ruptures = True
    switch = POLYNOMIAL_SWITCH

    @staticmethod
    def factor(theta, sine, e):
        p = e / delta_m(theta)
        # Cancellation (terms of 1e4 for a sum near 1) costs about four digits of the sixteen.
        curve = sum(c * p ** (1.0 / n) for n, c in POLYNOMIAL_TERMS)
        return directional(sine) * np.where(p <= POLYNOMIAL_SWITCH, 8.23384 * p, curve)

    @staticmethod
    def limits(theta):
        return (1.087 * (theta + 6.0) ** -0.65,)


class ButlerPalKulak:
    """R = Rult (1 - exp(-mu D))^lambda over R(0, inf) = 10 / 0.92, D = 0.25 |u| / w; its own directional factor."""

    name = "butler-pal-kulak"
    ruptures = True
    switch = None

    @staticmethod
    def factor(theta, sine, e):
        ultimate = (10.0 + theta) / (0.92 + 0.0603 * theta)
        mu = 75.0 * np.exp(0.0114 * theta)
        power = 0.4 * np.exp(0.0146 * theta)
        return ultimate / (10.0 / 0.92) * (-np.expm1(-mu * BPK_LEG * e)) ** power

    @staticmethod
    def limits(theta):
        return (0.225 / BPK_LEG * (theta + 5.0) ** -0.47,)


class RigidPlastic:
    """f = 1, no deformation limit."""

    name = "rigid-plastic"
    ruptures = False
    switch = None

    @staticmethod
    def factor(theta, sine, e):
        return directional(sine)


LAWS = {law.name: law for law in (LesikKennedy, LesikKennedyPolynomial, ButlerPalKulak, RigidPlastic)}

# ----------------------------------------------------------------------------------------------------------------------
# Tanh-sinh rule on (0, 1)
# ----------------------------------------------------------------------------------------------------------------------


@lru_cache(maxsize=None)
def tanh_sinh(step: float, reach: float):
    """Nodes x in (0, 1), measured accurately from 0, and weights: x = 1 / (1 + exp(pi sinh(-tau)))."""
    count = int(reach / step)
    tau = step * np.arange(-count, count + 1)
    s = math.pi * np.sinh(tau)
    x = 1.0 / (1.0 + np.exp(-s))
    weight = step * math.pi * np.cosh(tau) * x / (1.0 + np.exp(s))
    return x, weight


COARSE = (0.25, 2.75)
FINE = (1.0 / 16.0, 3.25)
FINER = (1.0 / 40.0, 3.4)

# ----------------------------------------------------------------------------------------------------------------------
# Geometry
# ----------------------------------------------------------------------------------------------------------------------


@dataclass
class Run:
    """A straight run (`start`, `end`) or a circular arc (`centre`, `radius`, angles in radians, sweep > 0)."""

    leg: float
    strength: float
    sides: int = 1
    start: tuple | None = None
    end: tuple | None = None
    centre: tuple | None = None
    radius: float = 0.0
    angle: float = 0.0
    sweep: float = 0.0

    @classmethod
    def from_table(cls, table):
        common = dict(leg=table["leg"], strength=table["strength"], sides=table.get("sides", 1))
        if "from" in table:
            return cls(start=tuple(table["from"]), end=tuple(table["to"]), **common)
        angle, sweep = math.radians(table["start_deg"]), math.radians(table["sweep_deg"])
        if sweep < 0.0:
            angle, sweep = angle + sweep, -sweep
        return cls(centre=tuple(table["centre"]), radius=table["radius"], angle=angle, sweep=sweep, **common)

    @property
    def is_arc(self):
        return self.centre is not None

    @property
    def length(self):
        return self.radius * self.sweep if self.is_arc else math.dist(self.start, self.end)

    @property
    def throat(self):
        """Throat counted once per side (the weight of the line properties)."""
        return self.leg / SQRT2 * self.sides

    @property
    def capacity(self):
        """0.60 F t n, force per unit length."""
        return 0.60 * self.strength * self.throat

    def point(self, s, m=math):
        """Position and unit tangent at arc length s; m is math or mpmath."""
        if self.is_arc:
            phi = self.angle + s / self.radius
            c, n = m.cos(phi), m.sin(phi)
            return (self.centre[0] + self.radius * c, self.centre[1] + self.radius * n), (-n, c)
        dx, dy = (m.mpf(b) - m.mpf(a) if m is mpmath else b - a for a, b in zip(self.start, self.end))
        length = m.sqrt(dx * dx + dy * dy)
        t = (dx / length, dy / length)
        return (self.start[0] + s * t[0], self.start[1] + s * t[1]), t

    def moments(self):
        """Integrals of 1, x, y, x^2, y^2, x y over the length about the origin, in closed form."""
        length = self.length
        if not self.is_arc:
            (x0, y0), (x1, y1) = self.start, self.end
            return length * np.array([
                1.0, (x0 + x1) / 2, (y0 + y1) / 2,
                (x0 * x0 + x0 * x1 + x1 * x1) / 3, (y0 * y0 + y0 * y1 + y1 * y1) / 3,
                (2 * x0 * y0 + x0 * y1 + x1 * y0 + 2 * x1 * y1) / 6,
            ])
        a, b, r, (cx, cy) = self.angle, self.angle + self.sweep, self.radius, self.centre
        ic, is_ = math.sin(b) - math.sin(a), math.cos(a) - math.cos(b)
        icc = (b - a) / 2 + (math.sin(2 * b) - math.sin(2 * a)) / 4
        iss = (b - a) / 2 - (math.sin(2 * b) - math.sin(2 * a)) / 4
        ics = (math.sin(b) ** 2 - math.sin(a) ** 2) / 2
        turn = b - a
        return r * np.array([
            turn, cx * turn + r * ic, cy * turn + r * is_,
            cx * cx * turn + 2 * cx * r * ic + r * r * icc,
            cy * cy * turn + 2 * cy * r * is_ + r * r * iss,
            cx * cy * turn + cx * r * is_ + cy * r * ic + r * r * ics,
        ])


@dataclass
class Load:
    at: tuple
    force: tuple
    moment: float

    def about(self, c):
        """Wrench (F_x, F_y, M) about c."""
        (x, y), (fx, fy) = self.at, self.force
        return np.array([fx, fy, self.moment + (x - c[0]) * fy - (y - c[1]) * fx])


# ----------------------------------------------------------------------------------------------------------------------
# Kinematics of one run for many motions at once
# ----------------------------------------------------------------------------------------------------------------------


def point_velocity(motions, x, y):
    """Velocity components at the offset (x, y) from the centroid."""
    return motions[:, 0] - motions[:, 2] * y, motions[:, 1] + motions[:, 2] * x


class LineField:
    """u on a straight run: u_t is constant, u_n(s) = u_n(0) + omega s, zero at the foot of the perpendicular."""

    def __init__(self, run, centroid, motions):
        self.length = run.length
        dx, dy = run.end[0] - run.start[0], run.end[1] - run.start[1]
        self.t = (dx / self.length, dy / self.length)
        self.x0, self.y0 = run.start[0] - centroid[0], run.start[1] - centroid[1]
        vx, vy = point_velocity(motions, self.x0, self.y0)
        self.ut = vx * self.t[0] + vy * self.t[1]
        self.un0 = vy * self.t[0] - vx * self.t[1]
        self.omega = motions[:, 2]
        with np.errstate(divide="ignore", invalid="ignore"):
            foot = np.where(self.omega != 0.0, -self.un0 / self.omega, -1.0)
        self.inside = (foot > 0.0) & (foot < self.length)
        self.foot = np.clip(foot, 0.0, self.length)

    def cells(self):
        """(base, signed extent), each (motions, 2); both cells start at the point nearest the centre."""
        base = np.stack([self.foot, self.foot], axis=1)
        return base, np.stack([-self.foot, self.length - self.foot], axis=1)

    def displacement(self, base, offset):
        """(u_t, u_n) at base + offset; base (motions, cells), offset (motions, cells, nodes)."""
        at_foot = self.inside[:, None] & (base == self.foot[:, None])
        un_base = np.where(at_foot, 0.0, self.un0[:, None] + self.omega[:, None] * base)
        un = un_base[..., None] + self.omega[:, None, None] * offset
        return np.broadcast_to(self.ut[:, None, None], un.shape), un

    def wrench(self, base, offset, ft, fn):
        """Sums over cells and nodes of the weighted forces ft (along t) and fn (along rot90 t)."""
        t, n = self.t, (-self.t[1], self.t[0])
        s = base[..., None] + offset
        sum_t, sum_n = ft.sum(axis=(1, 2)), fn.sum(axis=(1, 2))
        arm_t = self.x0 * t[1] - self.y0 * t[0]
        arm_n = self.x0 * n[1] - self.y0 * n[0]
        moment = arm_t * sum_t + arm_n * sum_n + (s * fn).sum(axis=(1, 2))
        return np.stack([sum_t * t[0] + sum_n * n[0], sum_t * t[1] + sum_n * n[1], moment], axis=1)


class ArcField:
    """u on an arc, in psi = angle from the point nearest the instantaneous centre.

    With a = |velocity of the arc's own centre|:  u_t = sg (|omega| R - a cos psi),  u_n (outward) = -sg a sin psi.
    """

    def __init__(self, run, centroid, motions):
        self.radius, self.sweep = run.radius, run.sweep
        self.x0, self.y0 = run.centre[0] - centroid[0], run.centre[1] - centroid[1]
        vx, vy = point_velocity(motions, self.x0, self.y0)
        self.sign = np.where(motions[:, 2] < 0.0, -1.0, 1.0)
        self.spin = np.abs(motions[:, 2]) * self.radius
        self.a = np.hypot(vx, vy)
        self.phi0 = np.arctan2(vy, vx) + self.sign * (math.pi / 2)
        self.first = np.mod(run.angle - self.phi0 + math.pi, TWO_PI) - math.pi

    def cells(self):
        """Cells between the arc's ends and the zeros of u_n (psi = k pi) and u_t (cos psi = |omega| R / a)."""
        last = self.first + self.sweep
        with np.errstate(divide="ignore", invalid="ignore"):
            ratio = np.where(self.a > self.spin, self.spin / self.a, 1.0)
        star = np.arccos(ratio)
        zero = np.zeros_like(star)
        kinks = [zero - math.pi, zero, zero + math.pi, zero + TWO_PI,
                 -star, star, TWO_PI - star, TWO_PI + star, self.first, last]
        edges = np.sort(np.clip(np.stack(kinks, axis=1), self.first[:, None], last[:, None]), axis=1)
        low, high = edges[:, :-1], edges[:, 1:]
        from_low = np.abs(low - TWO_PI * np.round(low / TWO_PI)) <= np.abs(high - TWO_PI * np.round(high / TWO_PI))
        base = np.where(from_low, low, high)
        return base, np.where(from_low, high - low, low - high)

    def displacement(self, base, offset):
        near = base - TWO_PI * np.round(base / TWO_PI)
        psi = near[..., None] + offset
        a, sg = self.a[:, None, None], self.sign[:, None, None]
        gap = (self.spin - self.a)[:, None, None]
        return sg * (gap + 2.0 * a * np.sin(psi / 2) ** 2), -sg * a * np.sin(psi)

    def wrench(self, base, offset, ft, fn):
        ft, fn = ft * self.radius, fn * self.radius
        phi = self.phi0[:, None, None] + base[..., None] + offset
        c, s = np.cos(phi), np.sin(phi)
        fx, fy = (fn * c - ft * s).sum(axis=(1, 2)), (fn * s + ft * c).sum(axis=(1, 2))
        moment = self.x0 * fy - self.y0 * fx + self.radius * ft.sum(axis=(1, 2))
        return np.stack([fx, fy, moment], axis=1)


class ElementField:
    """u at the mid-points of `count` equal elements: one 'cell' whose nodes are the elements."""

    def __init__(self, run, count, centroid, motions):
        s = (np.arange(count) + 0.5) * (run.length / count)
        places = [run.point(value) for value in s]
        self.size = run.length / count
        self.x = np.array([p[0] for p, _ in places]) - centroid[0]
        self.y = np.array([p[1] for p, _ in places]) - centroid[1]
        self.tx, self.ty = (np.array([t[k] for _, t in places]) for k in (0, 1))
        ux = motions[:, :1] - motions[:, 2:] * self.y
        uy = motions[:, 1:2] + motions[:, 2:] * self.x
        self.ut, self.un = ux * self.tx + uy * self.ty, uy * self.tx - ux * self.ty

    def wrench(self, ft, fn):
        fx, fy = ft * self.tx - fn * self.ty, ft * self.ty + fn * self.tx
        columns = [fx.sum(axis=1), fy.sum(axis=1), (self.x * fy - self.y * fx).sum(axis=1)]
        return self.size * np.stack(columns, axis=1)


def polar(ut, un):
    """|u|, theta in degrees, sin theta."""
    size = np.hypot(ut, un)
    sine = np.abs(un) / np.where(size > 0.0, size, 1.0)
    return size, np.degrees(np.arctan2(np.abs(un), np.abs(ut))), sine


def over(numerator, size):
    """numerator / size with 0 where the size is 0 (the centre itself carries nothing)."""
    return np.where(size > 0.0, numerator / np.where(size > 0.0, size, 1.0), 0.0)


# ----------------------------------------------------------------------------------------------------------------------
# The group
# ----------------------------------------------------------------------------------------------------------------------


class Group:
    """A weld group with one law; `elements` selects the mid-point procedure."""

    def __init__(self, runs, law, elements=None):
        self.runs, self.law = runs, law
        sums = [(run.throat, run.moments()) for run in runs]
        area, sx, sy, xx, yy, xy = sum(t * m for t, m in sums)
        self.length = sum(run.length for run in runs)
        self.throat_area = area
        self.centroid = (sx / area, sy / area)
        # Second moments about the centroid, each run shifted first so that nothing large cancels.
        shifted = sum(run.throat * self._shift(run).moments() for run in runs)
        self.i_y, self.i_x, self.i_xy = shifted[3], shifted[4], shifted[5]
        self.j = self.i_x + self.i_y
        self.scale = math.sqrt(self.j / area)
        longest = max(run.length for run in runs)
        self.counts = None
        if elements:
            self.counts = [max(1, math.floor(elements * run.length / longest + 0.5)) for run in runs]

    def _shift(self, run):
        cx, cy = self.centroid

        def moved(p):
            return None if p is None else (p[0] - cx, p[1] - cy)

        return Run(run.leg, run.strength, run.sides, moved(run.start), moved(run.end), moved(run.centre),
                   run.radius, run.angle, run.sweep)

    def physical(self, directions):
        """Unit-sphere directions (v_x, v_y, omega * scale) to motions."""
        return directions / np.array([1.0, 1.0, self.scale])

    def field(self, run, motions):
        return (ArcField if run.is_arc else LineField)(run, self.centroid, motions)

    # -- rupture -------------------------------------------------------------------------------------------------------

    def rupture_ratio(self, motions, zooms):
        """max over the weld of |u| / Delta_u."""
        ratio = np.zeros(len(motions))
        for index, run in enumerate(self.runs):
            if self.counts:
                f = ElementField(run, self.counts[index], self.centroid, motions)
                ratio = np.maximum(ratio, self._ratio(run, f.ut, f.un).max(axis=1))
            elif run.is_arc:
                ratio = np.maximum(ratio, self._arc_ratio(run, motions, zooms))
            else:
                # |u| and theta both grow away from the foot and Delta_u falls with theta: an end governs.
                f = LineField(run, self.centroid, motions)
                for un in (f.un0, f.un0 + f.omega * f.length):
                    ratio = np.maximum(ratio, self._ratio(run, f.ut, un))
        return ratio

    def _ratio(self, run, ut, un, branch=None):
        size, theta, _ = polar(ut, un)
        limits = self.law.limits(theta)
        limit = limits[branch] if branch is not None else np.minimum.reduce(limits)
        return size / (limit * run.leg)

    def _arc_ratio(self, run, motions, zooms):
        """Sampled maximum per smooth cell and per branch of Delta_u, then `zooms` eightfold zooms about it."""
        f = ArcField(run, self.centroid, motions)
        base, extent = f.cells()
        best = np.zeros(len(motions))
        for branch in range(len(self.law.limits(np.zeros(1)))):
            low, high = np.zeros_like(extent), np.ones_like(extent)
            for step in range(zooms + 1):
                grid = np.linspace(0.0, 1.0, 33 if step == 0 else 17)
                x = low[..., None] + (high - low)[..., None] * grid
                value = self._ratio(run, *f.displacement(base, extent[..., None] * x), branch=branch)
                best = np.maximum(best, value.max(axis=(1, 2)))
                width = (high - low) / (len(grid) - 1)
                centre = np.take_along_axis(x, value.argmax(axis=2)[..., None], axis=2)[..., 0]
                low, high = np.maximum(centre - width, 0.0), np.minimum(centre + width, 1.0)
        return best

    # -- wrench --------------------------------------------------------------------------------------------------------

    def wrench(self, motions, rule=FINE):
        """W(q) for each motion (rows), about the centroid."""
        total = np.zeros((len(motions), 3))
        for index, run in enumerate(self.runs):
            if self.counts:
                f = ElementField(run, self.counts[index], self.centroid, motions)
                total += f.wrench(*self._forces(run, f.ut, f.un))
                continue
            f = self.field(run, motions)
            base, extent = f.cells()
            if rule is not COARSE and self.law.switch is not None:
                base, extent = self._split_at_switch(run, f, base, extent)
            x, weight = tanh_sinh(*rule)
            offset = extent[..., None] * x
            ft, fn = self._forces(run, *f.displacement(base, offset))
            scale = np.abs(extent)[..., None] * weight
            total += f.wrench(base, offset, ft * scale, fn * scale)
        return total

    def _forces(self, run, ut, un):
        """Components of the force per unit length along t and n."""
        size, theta, sine = polar(ut, un)
        r = run.capacity * self.law.factor(theta, sine, size / run.leg)
        return r * over(ut, size), r * over(un, size)

    def _split_at_switch(self, run, field, base, extent):
        """Cut each cell where p passes the polynomial law's change of formula (bisection on the cell fraction)."""

        def excess(x):
            size, theta, _ = polar(*field.displacement(base, (extent * x)[..., None]))
            return (size / run.leg / delta_m(theta))[..., 0] - self.law.switch

        low, high = np.zeros_like(extent), np.ones_like(extent)
        start = excess(low)
        crosses = start * excess(high) < 0.0
        for _ in range(60):
            middle = (low + high) / 2
            same = excess(middle) * start > 0.0
            low, high = np.where(same, middle, low), np.where(same, high, middle)
        cut = np.where(crosses, extent * high, extent)
        return (np.concatenate([base, base + cut], axis=1), np.concatenate([cut, extent - cut], axis=1))

    def at_rupture(self, directions, rule=FINE, level=1.0):
        """Motions scaled to max |u| / Delta_u = level, and their wrenches scaled to (F_x, F_y, M / scale)."""
        motions = self.physical(directions)
        if self.law.ruptures:
            motions = motions * (level / self.rupture_ratio(motions, 0 if rule is COARSE else 10))[:, None]
        return motions, self.wrench(motions, rule) / np.array([1.0, 1.0, self.scale])

    def scaled_load(self, load):
        return load.about(self.centroid) / np.array([1.0, 1.0, self.scale])

    # -- elastic vector method -----------------------------------------------------------------------------------------

    def elastic(self, load):
        """Elastic load factor and its peak point.

        Stress per throat area = k u with  F / A = k v  and  (M) = k (J) omega about the centroid, where c is the throat-
        weighted centroid so that translation and rotation uncouple; lambda = min 0.60 F / stress.  On a straight run
        |u| is convex, so an end governs; on an arc the point farthest from the elastic centre or an end.
        """
        fx, fy, m = load.about(self.centroid)
        q = np.array([fx / self.throat_area, fy / self.throat_area, m / self.j])
        best = (math.inf, None)
        for run in self.runs:
            places = [0.0, run.length]
            if run.is_arc:
                f = ArcField(run, self.centroid, q[None, :])
                far = np.mod(f.phi0[0] + math.pi - run.angle, TWO_PI)
                if far < run.sweep:
                    places.append(far * run.radius)
            for s in places:
                p, _ = run.point(s)
                x, y = p[0] - self.centroid[0], p[1] - self.centroid[1]
                stress = math.hypot(q[0] - q[2] * y, q[1] + q[2] * x)
                best = min(best, (0.60 * run.strength / stress if stress > 0.0 else math.inf, p))
        return best


# ----------------------------------------------------------------------------------------------------------------------
# Search for all states
# ----------------------------------------------------------------------------------------------------------------------


FINEST_DEPTH = 13  # icosphere depth reached by local refinement: edges of about 1.4e-4


@lru_cache(maxsize=None)
def icosphere(depth):
    """Vertices and triangles of an icosahedron subdivided `depth` times: 10 * 4^depth + 2 directions."""
    g = (1.0 + math.sqrt(5.0)) / 2.0
    vertices = np.array([(-1, g, 0), (1, g, 0), (-1, -g, 0), (1, -g, 0), (0, -1, g), (0, 1, g), (0, -1, -g), (0, 1, -g),
                         (g, 0, -1), (g, 0, 1), (-g, 0, -1), (-g, 0, 1)])
    faces = np.array([(0, 11, 5), (0, 5, 1), (0, 1, 7), (0, 7, 10), (0, 10, 11), (1, 5, 9), (5, 11, 4), (11, 10, 2),
                      (10, 7, 6), (7, 1, 8), (3, 9, 4), (3, 4, 2), (3, 2, 6), (3, 6, 8), (3, 8, 9), (4, 9, 5),
                      (2, 4, 11), (6, 2, 10), (8, 6, 7), (9, 8, 1)])
    # A fixed odd rotation, so that no vertex or edge sits on a joint's symmetry axis.
    a, b = 0.737, 0.411
    turn = np.array([[math.cos(a), -math.sin(a), 0], [math.sin(a), math.cos(a), 0], [0, 0, 1]]) @ np.array(
        [[1, 0, 0], [0, math.cos(b), -math.sin(b)], [0, math.sin(b), math.cos(b)]])
    vertices = unit(vertices @ turn.T)
    for _ in range(depth):
        vertices, faces = subdivide(vertices, faces)
    return vertices, faces


def unit(rows):
    return rows / np.linalg.norm(rows, axis=-1, keepdims=True)


def subdivide(vertices, faces):
    """Each triangle into four, edge mid-points pushed to the sphere."""
    edges = np.sort(np.concatenate([faces[:, [0, 1]], faces[:, [1, 2]], faces[:, [2, 0]]]), axis=1)
    unique, inverse = np.unique(edges, axis=0, return_inverse=True)
    ab, bc, ca = (len(vertices) + inverse.reshape(3, -1))
    a, b, c = faces.T
    middle = unit(vertices[unique].sum(axis=1))
    faces = np.concatenate([np.stack(t, axis=1) for t in ((a, ab, ca), (ab, b, bc), (ca, bc, c), (ab, bc, ca))])
    return np.concatenate([vertices, middle]), faces


def map_directions(group, directions, level=1.0, chunk=2048):
    """Unit wrench directions of many motions with the coarse rule."""
    parts = [group.at_rupture(directions[i:i + chunk], COARSE, level)[1] for i in range(0, len(directions), chunk)]
    return unit(np.concatenate(parts))


def holds(images, target):
    """Whether the cone of each image triangle holds the target, with a small margin."""
    det = np.linalg.det(images)
    safe = np.where(np.abs(det) > 1e-300, det, 1e-300)
    coordinates = np.stack([np.linalg.det(np.where((np.arange(3) == k)[None, :, None], target, images))
                            for k in range(3)], axis=1) / safe[:, None]
    return (coordinates > -0.05 * np.abs(coordinates).max(axis=1, keepdims=True)).all(axis=1)


def candidates(group, target, depth, refinements, level=1.0, reach=2.5):
    """Directions near which W(q) may be parallel to the target: mesh triangles that hold or nearly hold it, refined."""
    vertices, faces = icosphere(depth)
    images = map_directions(group, vertices, level)
    starts = []
    for step in range(refinements + 1):
        w = images[faces]
        edge = np.linalg.norm(w - np.roll(w, 1, axis=1), axis=2).max(axis=1)
        distance = np.linalg.norm(w - target, axis=2).min(axis=1)
        inside = holds(w, target) & (distance < 1.0)
        if step % 4 == 0 or step == refinements:
            starts.append(unit(vertices[faces[inside]].mean(axis=1)))
        if step == refinements:
            # The triangle nearest the target is a start as well, whether or not it holds it.
            starts.append(unit(vertices[faces[distance.argsort()[:4]]].mean(axis=1)))
            break
        near = np.flatnonzero(inside | (distance < reach * edge))
        if len(near) > 4000:
            near = near[np.argsort((distance / edge)[near])[:4000]]
        used, compact = np.unique(faces[near], return_inverse=True)
        old = images[used]
        vertices, faces = subdivide(vertices[used], compact.reshape(-1, 3))
        images = np.concatenate([old, map_directions(group, vertices[len(used):], level)])
    return np.concatenate(starts)


def tangent_basis(d):
    """Two unit vectors normal to d and to each other."""
    axis = np.eye(3)[np.abs(d).argmin()]
    e1 = unit(np.cross(d, axis))
    return np.stack([e1, np.cross(d, e1)])


@dataclass
class State:
    """An equilibrium state: direction on the unit sphere of (v_x, v_y, omega * scale), motion, load factor.

    `orientation` is +1 where the map from directions of motion to directions of wrench keeps its sense, -1 where it is
    folded over.  The map has degree one, so over all states of a load the orientations add up to 1.
    """

    direction: np.ndarray
    motion: np.ndarray
    load_factor: float
    residual: float
    error: float
    orientation: int

    def centre(self, group):
        """Instantaneous centre, or None for a translation."""
        vx, vy, spin = self.direction
        if abs(spin) < 1e-9:
            return None
        omega = spin / group.scale
        return (group.centroid[0] - vy / omega, group.centroid[1] + vx / omega)


def polish(group, load, start, level=1.0):
    """Solve W(q) parallel to L from one start; None unless it converges to a positive load factor.

    `error` is the relative error of lambda to first order: residual and rule error through the inverse Jacobian.
    """
    target = unit(load)
    across = tangent_basis(target)
    centre = start

    def direction(ab, d, basis):
        return unit(d + ab @ basis)

    def residual(ab, d, basis):
        _, w = group.at_rupture(direction(ab, d, basis)[None, :], FINE, level)
        return across @ w[0] / np.linalg.norm(w[0])

    best, last = math.inf, math.inf
    for _ in range(6):
        basis = tangent_basis(centre)
        size = np.linalg.norm(residual(np.zeros(2), centre, basis))
        if size < best:
            best, kept = size, centre
        if size < 2e-15 or size >= last * 0.5 and size < 1e-13:
            break
        last = size
        solution = root(residual, np.zeros(2), args=(centre, basis), method="hybr", options={"xtol": 1e-15})
        if np.linalg.norm(solution.x) > 3.0:
            return None
        centre = direction(solution.x, centre, basis)
    if best > 1e-11:
        return None
    basis = tangent_basis(kept)
    motion, w = group.at_rupture(kept[None, :], FINER, level)
    lam = float(w[0] @ load / (load @ load))
    if lam <= 0.0:
        return None
    final = across @ w[0] / np.linalg.norm(w[0])
    return State(kept, motion[0], lam, float(np.linalg.norm(final)), *sensitivity(group, load, kept, final, level))


def sensitivity(group, load, d, residual, level=1.0):
    """First-order change of ln lambda for the Newton step that removes the residual; sign of the map's Jacobian."""
    target, across, basis = unit(load), tangent_basis(unit(load)), tangent_basis(d)
    h = 1e-6
    columns, slopes = [], []
    for b in basis:
        pair = [group.at_rupture(unit(d + sign * h * b)[None, :], FINE, level)[1][0] for sign in (1.0, -1.0)]
        columns.append((across @ unit(pair[0]) - across @ unit(pair[1])) / (2 * h))
        slopes.append((math.log(pair[0] @ target) - math.log(pair[1] @ target)) / (2 * h))
    jacobian = np.array(columns).T
    step = np.linalg.lstsq(jacobian, residual, rcond=None)[0]
    return float(np.abs(slopes) @ np.abs(step)), int(np.sign(np.linalg.det(jacobian)))


def states(group, load, depth=6, level=1.0):
    """All equilibrium states, sorted by load factor (level = max |u| / Delta_u asked for, 1 at rupture).

    A search whose orientations do not add up to 1 has missed a state and is repeated with a finer mesh.
    """
    for finer in range(3):
        found = search(group, load, depth + finer, FINEST_DEPTH - depth + finer, level)
        if sum(s.orientation for s in found) == 1:
            break
    return sorted(found, key=lambda s: (round(s.load_factor, 9), s.direction[2]))


def search(group, load, depth, refinements, level):
    """The distinct states reached from every candidate direction of one mesh."""
    scaled = group.scaled_load(load)
    starts = candidates(group, unit(scaled), depth, refinements, level)
    # Symmetric answers sit on kinks where a solver only creeps: try the plain motions as they are.
    starts = np.concatenate([starts, [unit(scaled)], [np.array([0.0, 0.0, math.copysign(1.0, scaled[2])])]])
    found, tried = [], []
    for start in starts:
        if any(start @ other > 1.0 - 1e-9 for other in tried):
            continue
        tried.append(start)
        state = polish(group, scaled, start, level)
        if state is None or any(np.linalg.norm(state.direction - other.direction) < 1e-6 for other in found):
            continue
        found.append(state)
    return found


# ----------------------------------------------------------------------------------------------------------------------
# Path from zero load
# ----------------------------------------------------------------------------------------------------------------------


def peak_on_path(group, load, ruptures, start_level=1e-3, depth=5):
    """Largest load factor on the path W(q) = lambda L from zero load to first rupture, and the state it ends in.

    Pseudo-arclength continuation in y = (q / q_ref, lambda / lambda_ref); its start is the state at
    max |u| / Delta_u = start_level, where W is all but homogeneous in |q|.
    """
    scaled = group.scaled_load(load)
    initial = states(group, load, depth=depth, level=start_level)
    if len(initial) != 1:
        raise RuntimeError(f"{len(initial)} states at small load")
    weights = np.array([1.0, 1.0, group.scale])
    q_ref = np.linalg.norm(ruptures[0].motion * weights)
    lam_ref = ruptures[0].load_factor

    def motion(y):
        return y[:3] * q_ref / weights

    def gap(y):
        w = group.wrench(motion(y)[None, :])[0] / weights
        return (w - y[3] * lam_ref * scaled) / (lam_ref * np.linalg.norm(scaled))

    def jacobian(y):
        size = 1e-7 * np.linalg.norm(y[:3])
        steps = np.diag([size, size, size, 1e-7])
        return np.stack([(gap(y + h) - gap(y - h)) / (2 * h.max()) for h in steps], axis=1)

    def tangent(y, along):
        t = np.linalg.svd(jacobian(y))[2][3]
        return t if t @ along > 0.0 else -t

    def correct(guess, t):
        """Newton back to the path in the plane through guess normal to t."""
        y = guess
        for _ in range(25):
            g = gap(y)
            step = np.linalg.solve(np.vstack([jacobian(y), t]), -np.append(g, t @ (y - guess)))
            y = y + step
            if np.linalg.norm(step) < 1e-13:
                break
        return y if np.linalg.norm(gap(y)) < 1e-11 else None

    y = np.append(initial[0].motion * weights / q_ref, initial[0].load_factor / lam_ref)
    t = tangent(y, np.append(y[:3], 1.0))
    step, peak = 1e-3, y[3]
    for _ in range(5000):
        nxt = correct(y + step * t, t)
        t_next = None if nxt is None else tangent(nxt, t)
        if t_next is None or t_next @ t < math.cos(0.06):
            step /= 2.0
            if step < 1e-9:
                raise RuntimeError("path step vanished")
            continue
        ratio = group.rupture_ratio(motion(nxt)[None, :], 10)[0]
        if t[3] > 0.0 >= t_next[3]:
            origin, along, reach = y, t, step
            top = minimize_scalar(lambda h: -correct(origin + h * along, along)[3], bounds=(0.0, reach),
                                  method="bounded", options={"xatol": 1e-9 * reach})
            crest = correct(origin + top.x * along, along)
            if group.rupture_ratio(motion(crest)[None, :], 10)[0] <= 1.0:
                peak = max(peak, crest[3])
        if ratio >= 1.0:
            end = polish(group, scaled, unit(nxt[:3]))
            return max(peak * lam_ref, end.load_factor), end
        y, t = nxt, t_next
        peak = max(peak, y[3])
        step = min(step * 1.3, 0.05)
    raise RuntimeError("path did not reach rupture")


# ----------------------------------------------------------------------------------------------------------------------
# Second route: the definitions point by point, QUADPACK or mpmath
# ----------------------------------------------------------------------------------------------------------------------


def scalar_factor(name, theta, sine, e, m):
    """The law's k(theta, e) for one point; m is math or mpmath."""
    if name == "rigid-plastic":
        return 1 + sine ** 1.5 / 2
    if name == "butler-pal-kulak":
        top = (10 + theta) / (m_num(m, "0.92") + m_num(m, "0.0603") * theta)
        mu = 75 * m.exp(m_num(m, "0.0114") * theta)
        power = m_num(m, "0.4") * m.exp(m_num(m, "0.0146") * theta)
        return top * m_num(m, "0.092") * (-m.expm1(-mu * e / 4)) ** power
    p = e / (m_num(m, "0.209") * (theta + 2) ** m_num(m, "-0.32"))
    if name == "lesik-kennedy":
        f = (p * (m_num(m, "1.9") - m_num(m, "0.9") * p)) ** m_num(m, "0.3")
    elif p <= m_num(m, "0.0325"):
        f = m_num(m, "8.23384") * p
    else:
        one = m_num(m, "1")
        f = sum(m_num(m, repr(c)) * p ** (one / int(n)) for n, c in POLYNOMIAL_TERMS)
    return (1 + sine ** m_num(m, "1.5") / 2) * f


def m_num(m, text):
    return mpmath.mpf(text) if m is mpmath else float(text)


def pointwise_wrench(group, motion, m=math):
    """W(q) from the definitions, run by run, with QUADPACK (m = math) or mpmath.quad (m = mpmath)."""
    number = mpmath.mpf if m is mpmath else float
    vx, vy, omega = (number(float(v)) for v in motion)
    cx, cy = (number(c) for c in group.centroid)
    total = [number(0)] * 3
    for index, run in enumerate(group.runs):
        capacity = number(6) / 10 * number(run.strength) * number(run.leg) / m.sqrt(number(2)) * run.sides

        def local(s):
            (x, y), t = run.point(s, m)
            x, y = x - cx, y - cy
            u = (vx - omega * y, vy + omega * x)
            along, across = u[0] * t[0] + u[1] * t[1], u[1] * t[0] - u[0] * t[1]
            return x, y, u, along, across, m.sqrt(u[0] ** 2 + u[1] ** 2)

        def force(s):
            x, y, u, along, across, size = local(s)
            if size == 0:
                return number(0), number(0), number(0)
            theta = m.atan2(abs(across), abs(along)) * 180 / m.pi
            r = capacity * scalar_factor(group.law.name, theta, abs(across) / size, size / number(run.leg), m)
            fx, fy = r * u[0] / size, r * u[1] / size
            return fx, fy, x * fy - y * fx

        def marks(s):
            _, _, _, along, across, size = local(s)
            theta = m.atan2(abs(across), abs(along)) * 180 / m.pi
            p = size / number(run.leg) / (m_num(m, "0.209") * (theta + 2) ** m_num(m, "-0.32"))
            return along, across, p - m_num(m, "0.0325")

        if group.counts:
            count = group.counts[index]
            size = number(run.length) / count
            pieces = [force(size * (2 * k + 1) / 2) for k in range(count)]
            total = [a + size * sum(b) for a, b in zip(total, zip(*pieces))]
            continue
        edges = breaks(run, marks, local, number, m, group.law.switch is not None)
        for low, high in zip(edges, edges[1:]):
            if m is mpmath:
                cache = {}

                def cached(s, k, cache=cache):
                    if s not in cache:
                        cache[s] = force(s)
                    return cache[s][k]

                parts = [mpmath.quad(lambda s, k=k: cached(s, k), [low, high]) for k in range(3)]
            else:
                parts = [quad(lambda s, k=k: force(s)[k], low, high, epsabs=0.0, epsrel=2e-13, limit=200,
                              full_output=True)[0]
                         for k in range(3)]  # full_output only silences round-off notices
            total = [a + b for a, b in zip(total, parts)]
    return total


def breaks(run, marks, local, number, m, with_switch):
    """Sign changes of u_t, u_n (and of p - 0.0325) by scan and bisection, plus a ladder toward the nearest point."""
    length = number(run.length)
    scan = [length * k / 400 for k in range(401)]
    nearest = min(scan, key=lambda s: local(s)[5])
    window = length / 400
    low, high = max(nearest - window, number(0)), min(nearest + window, length)
    for _ in range(200):
        a, b = low + (high - low) / 3, high - (high - low) / 3
        low, high = (low, b) if local(a)[5] < local(b)[5] else (a, high)
    nearest = (low + high) / 2
    scan = sorted(set(scan + [nearest] + [s for k in range(1, 9) for d in (-1, 1)
                                          for s in [nearest + d * window * number(10) ** -k] if 0 < s < length]))
    edges = {number(0), length}
    for k in range(3 if with_switch else 2):
        for a, b in zip(scan, scan[1:]):
            fa = marks(a)[k]
            if fa * marks(b)[k] < 0:
                lo, hi = a, b
                for _ in range(130 if m is mpmath else 60):
                    mid = (lo + hi) / 2
                    lo, hi = (mid, hi) if marks(mid)[k] * fa > 0 else (lo, mid)
                edges.add((lo + hi) / 2)
    gap = min(local(nearest)[5] / max(abs(local(length)[5]), abs(local(number(0))[5])), number(1)) * length
    for factor in (0, 1, 8, 64):
        for d in (-1, 1):
            s = nearest + d * factor * gap
            if 0 < s < length and min(abs(s - e) for e in edges) > length * number(10) ** -14:
                edges.add(s)
    return sorted(edges)


def pointwise_residual(group, load, state, m=math):
    """(|W - lambda L| / |lambda L| in the scaled wrench norm) at a found state by the second route."""
    w = pointwise_wrench(group, state.motion, m)
    weights = [1.0, 1.0, group.scale]
    target = group.scaled_load(load)
    lam = state.load_factor
    gap = [a / b - lam * c for a, b, c in zip(w, weights, target)]
    return float(m.sqrt(sum(g * g for g in gap))) / (lam * float(np.linalg.norm(target)))


# ----------------------------------------------------------------------------------------------------------------------
# Hold-out file
# ----------------------------------------------------------------------------------------------------------------------


class CaseTools:
    """What `cases.build` asks for to place a load inside a fold or under a chosen centre."""

    @staticmethod
    def group(runs, law):
        return Group([Run.from_table(r) for r in runs], LAWS[law])

    def fold_triangles(self, runs, law):
        """The group, and the mid motions of mesh triangles that the map to wrenches turns over, deepest first."""
        group = self.group(runs, law)
        vertices, faces = icosphere(5)
        turned = np.linalg.det(map_directions(group, vertices)[faces]) * np.linalg.det(vertices[faces])
        inverted = np.flatnonzero(turned < 0.0)
        return group, unit(vertices[faces[inverted[np.argsort(turned[inverted])]]].mean(axis=1))

    def folded(self, draw, law, least=40):
        """The first draw with at least `least` mesh triangles turned over."""
        while True:
            runs = draw()
            if len(self.fold_triangles(runs, law)[1]) >= least:
                return runs

    def fold_load(self, runs, law, share):
        """The load at the given share (0 deepest, toward 1 shallowest) of the turned triangles."""
        group, middles = self.fold_triangles(runs, law)
        return self.stated(group, group.at_rupture(middles[int(share * len(middles))][None, :])[0])

    def centre_load(self, runs, law, centre):
        group = self.group(runs, law)
        x, y = centre[0] - group.centroid[0], centre[1] - group.centroid[1]
        motion = np.array([[y, -x, 1.0]])
        return self.stated(group, motion / group.rupture_ratio(motion, 10))

    @staticmethod
    def stated(group, motion):
        """The wrench of a motion as a force of 1000 N at the origin with a moment, rounded for the file."""
        fx, fy, m = group.wrench(motion)[0]
        m += group.centroid[0] * fy - group.centroid[1] * fx
        size = math.hypot(fx, fy) / 1000.0
        return {"at": [0.0, 0.0], "force": [round(float(fx) / size, 6), round(float(fy) / size, 6)],
                "moment": round(float(m) / size, 6)}


HEADER = """\
# Hold-out weld groups: plane joints with all their equilibrium states at first rupture.
#
# Units: mm, N, N mm, MPa.  Made by tests/reference/reference.py --write (cases.py holds the joints; numpy PCG64, seed
# {seed}); every coordinate and load is stated here exactly.  Only that script's own mathematics stands behind the
# numbers: tanh-sinh integration split at every kink, a mesh of {mesh} directions of motion refined about the load
# direction, scipy.optimize.root in motion space, completeness by the degree of the map (the orientations of all states
# add up to 1); no other program and no published table went in.
#
# length: metal counted once per run.  throat_area, centroid, i_x, i_y, i_xy, j: weighted by leg / sqrt(2) * sides; i_xy
# is the integral of weight * x * y about the centroid.  elastic_load_factor: direction-blind 0.60 F leg / sqrt(2) * sides.
# state.load_factor multiplies the stated load, nominal strength, no resistance factor.  States are sorted by load factor
# (ties by the sense of rotation); symmetric joints hold mirror twins with equal load factors, each listed.  No centre: pure
# translation (|omega| * radius of gyration < 1e-9 |v|).  peak_load_factor: largest on the path from zero load to first
# rupture; path_load_factor: the state that path ends in.
#
# Accuracy: load factors 1e-11 relative or better (the comment of each case gives the residual |W - lambda L| / |lambda L|
# by two routes: tanh-sinh, then pointwise QUADPACK or, where named, mpmath at 30 digits; then how far a plain sampling of
# |u| / Delta_u on the weld misses 1).  Centres 1e-8 of the joint's size, less when far away (a centre at R sizes has lost
# a factor R of its relative digits).  Peaks 1e-9.
"""


def number(value):
    """12 significant digits, always a float in TOML."""
    text = f"{float(value):.12g}"
    return text if any(c in text for c in ".en") else text + ".0"


def pair(values):
    return "[" + ", ".join(number(v) for v in values) + "]"


def exact(value):
    if isinstance(value, list):
        return "[" + ", ".join(exact(v) for v in value) + "]"
    if isinstance(value, float):
        return repr(float(value))  # numpy's own repr names its type
    return f'"{value}"' if isinstance(value, str) else str(value)


def setup(table, runs):
    group = Group([Run.from_table(r) for r in runs], LAWS[table["law"]], table.get("elements"))
    return group, Load(tuple(table["at"]), tuple(table["force"]), table["moment"])


def compute(table, depth):
    """Group, load and states of a case."""
    group, load = setup(table, table.get("runs") or table["run"])
    return group, load, states(group, load, depth=depth)


def second_rupture(group, found):
    """Largest |max |u| / Delta_u - 1| over the states, the maximum sampled at 8001 points a run (kinks cost 1e-4)."""
    if not group.law.ruptures:
        return 0.0
    worst = 0.0
    for state in found:
        largest = 0.0
        for index, run in enumerate(group.runs):
            count = group.counts[index] if group.counts else 8000
            places = [(k + 0.5) / count if group.counts else k / count for k in range(count + (not group.counts))]
            for share in places:
                (x, y), t = run.point(share * run.length)
                vx, vy, omega = state.motion
                ux, uy = vx - omega * (y - group.centroid[1]), vy + omega * (x - group.centroid[0])
                theta = math.degrees(math.atan2(abs(uy * t[0] - ux * t[1]), abs(ux * t[0] + uy * t[1])))
                limit = run.leg * min(float(b) for b in group.law.limits(np.float64(theta)))
                largest = max(largest, math.hypot(ux, uy) / limit)
        worst = max(worst, abs(largest - 1.0))
    return worst


def second_route(group, load, found, use_mpmath):
    """Largest residual over the states by QUADPACK or mpmath (the element mode: by plain sums)."""
    m = mpmath if use_mpmath else math
    return max(pointwise_residual(group, load, state, m) for state in found)


MPMATH_CASES = {"two-lines-10deg-e0.5", "c-shape-1", "ring-1", "arc-and-lines-slot", "random-3", "random-fold-2",
                "arc-fold", "centre-near-line-1e-3", "centre-near-arc-outside", "poly-c-shape", "poly-ring",
                "bpk-arc-and-lines", "plastic-ring"}


def render(table, depth):
    """TOML text of one case, and a line for the log."""
    clock = time.time()
    group, load, found = compute(table, depth)
    signs = [s.orientation for s in found]
    if sum(signs) != 1:
        print(f"  note: {table['name']}: orientations {signs}")
    ours = max(s.residual for s in found)
    error = max(s.error for s in found)
    theirs = second_route(group, load, found, table["name"] in MPMATH_CASES)
    route = "mpmath" if table["name"] in MPMATH_CASES else "plain sums" if group.counts else "QUADPACK"
    note = f"residual {ours:.0e} tanh-sinh, {theirs:.0e} {route}; rupture {second_rupture(group, found):.0e}"
    lines = ["", "[[case]]", f"# {note}; load factor error {error:.0e}"]
    for key in ("name", "law", "elements", "at", "force", "moment"):
        if key in table:
            lines.append(f"{key} = {exact(table[key])}")
    lines += [f"length = {number(group.length)}", f"throat_area = {number(group.throat_area)}",
              f"centroid = {pair(group.centroid)}", f"i_x = {number(group.i_x)}", f"i_y = {number(group.i_y)}",
              f"i_xy = {number(group.i_xy if abs(group.i_xy) > 1e-12 * group.j else 0.0)}", f"j = {number(group.j)}",
              f"elastic_load_factor = {number(group.elastic(load)[0])}"]
    if table["want_peak"]:
        peak, end = peak_on_path(group, load, found)
        lines += [f"peak_load_factor = {number(peak)}", f"path_load_factor = {number(end.load_factor)}"]
        note += f"; peak/path end {peak / end.load_factor:.6f}"
    for run in table["runs"]:
        lines.append("[[case.run]]")
        lines += [f"{key} = {exact(value)}" for key, value in run.items()]
    for state in found:
        lines += ["[[case.state]]", f"load_factor = {number(state.load_factor)}"]
        centre = state.centre(group)
        if centre is not None:
            lines.append(f"centre = {pair(centre)}")
    factors = " ".join(f"{s.load_factor:.8g}" for s in found)
    log = f"{table['name']:30s} {time.time() - clock:5.1f} s  {note}; error {error:.0e}; {factors}"
    return "\n".join(lines) + "\n", log


def write(path, depth=6):
    import cases

    mpmath.mp.dps = 30
    part = path + ".part"
    with open(part, "w", encoding="ascii") as out:
        out.write(HEADER.format(seed=cases.SEED, mesh=10 * 4**depth + 2))
        for table in cases.build(CaseTools()):
            text, log = render(table, depth)
            out.write(text)
            out.flush()
            print(log, flush=True)
    os.replace(part, path)


def differs(new, old, tolerance=1e-8, floor=0.0):
    return abs(new - old) > tolerance * max(abs(old), floor)


def from_stored(group, load, stored):
    """States solved afresh from the stored centres."""
    found = []
    for entry in stored:
        x, y = entry["centre"][0] - group.centroid[0], entry["centre"][1] - group.centroid[1]
        start = unit(np.array([y, -x, group.scale]))
        scaled = group.scaled_load(load)
        forward = group.at_rupture(start[None, :])[1][0] @ scaled > 0.0
        found.append(polish(group, scaled, start if forward else -start))
    return [state for state in found if state is not None]


def check_case(table, search_all):
    """Differences between a stored case and a fresh calculation, as messages."""
    if search_all or any("centre" not in entry for entry in table["state"]):
        group, load, found = compute(table, 5)
    else:
        group, load = setup(table, table["run"])
        found = from_stored(group, load, table["state"])
    size = group.scale
    scalars = [("length", group.length, 0.0), ("throat_area", group.throat_area, 0.0), ("i_x", group.i_x, group.j),
               ("i_y", group.i_y, group.j), ("i_xy", group.i_xy, group.j), ("j", group.j, 0.0),
               ("elastic_load_factor", group.elastic(load)[0], 0.0)]
    wrong = [f"{key}: {value!r}, stored {table[key]!r}" for key, value, floor in scalars
             if differs(value, table[key], floor=floor)]
    if any(differs(a, b, floor=size) for a, b in zip(group.centroid, table["centroid"])):
        wrong.append(f"centroid: {group.centroid}, stored {table['centroid']}")
    stored = table["state"]
    if len(found) != len(stored):
        return wrong + [f"{len(found)} states, stored {len(stored)}"]
    for new, old in zip(found, stored):
        if differs(new.load_factor, old["load_factor"]):
            wrong.append(f"load_factor: {new.load_factor!r}, stored {old['load_factor']!r}")
        centre = new.centre(group)
        if (centre is None) != ("centre" not in old):
            wrong.append(f"centre: {centre}, stored {old.get('centre')}")
        elif centre is not None:
            reach = size + math.dist(centre, group.centroid)
            # A far centre is the inverse of a small turn: its own relative digits shrink with its distance.
            if math.dist(centre, old["centre"]) > 1e-8 * reach * max(1.0, reach / size):
                wrong.append(f"centre: {centre}, stored {old['centre']}")
    return wrong


def check(path):
    """Recompute every case: a full search for every third one, the rest from the stored centres, every fifth peak."""
    with open(path, "rb") as source:
        tables = tomllib.load(source)["case"]
    failures, peaks = 0, 0
    for index, table in enumerate(tables):
        wrong = check_case(table, search_all=index % 3 == 0)
        if "peak_load_factor" in table:
            peaks += 1
            if peaks % 5 == 1:
                group, load, found = compute(table, 5)
                peak, _ = peak_on_path(group, load, found)
                if differs(peak, table["peak_load_factor"]):
                    wrong.append(f"peak_load_factor: {peak!r}, stored {table['peak_load_factor']!r}")
        for message in wrong:
            print(f"{table['name']}: {message}")
        failures += bool(wrong)
    print(f"{len(tables)} cases, {failures} differ")
    return 1 if failures else 0


# ----------------------------------------------------------------------------------------------------------------------
# Self-test
# ----------------------------------------------------------------------------------------------------------------------

TABLE_TWO_LINES = {0.1: 3.72512, 0.2: 3.51301, 0.3: 3.09159, 0.5: 2.29413, 1: 1.27636, 2: 0.654699, 3: 0.438379}
TABLE_C = {(0.5, 0.875, 0.0): 1.87186, (0.5, 0.875, 75.0): 3.44784, (1.0, 1.0, 0.0): 3.00483}
TWO_LINE_STATES = {0.0: (210.21, 248.65), 0.5: (212.61, 247.95, 248.92), 2.0: (220.96, 240.49, 248.60), 5.0: (246.94,)}


def same_digits(value, printed, digits):
    return abs(value - printed) <= 0.5000001 * 10.0 ** (math.floor(math.log10(abs(printed))) + 1 - digits)


def selftest():
    """Published reference points (coefficient C = lambda / (16 w l), E70, inches and kips) and the two-line example."""
    mpmath.mp.dps = 30
    l, leg = 10.0, 1.0 / 16.0

    def run(a, b):
        return Run(leg, 70.0, 1, a, b)

    for a, printed in TABLE_TWO_LINES.items():
        group = Group([run((0, 0), (0, l))] * 2, LesikKennedy)
        found = states(group, Load((a * l, l / 2), (0.0, 1.0), 0.0), depth=5)
        assert len(found) == 1 and same_digits(found[0].load_factor / l, printed, 6), (a, found)
    for (k, a, degrees), printed in TABLE_C.items():
        group = Group([run((k * l, 0), (0, 0)), run((0, 0), (0, l)), run((0, l), (k * l, l))], LesikKennedy)
        turn = math.radians(degrees)
        load = Load((group.centroid[0] + a * l, group.centroid[1]), (math.sin(turn), math.cos(turn)), 0.0)
        found = states(group, load, depth=5)
        assert len(found) == 1 and same_digits(found[0].load_factor / l, printed, 6), (k, a, degrees, found)
        assert pointwise_residual(group, load, found[0]) < 1e-11
        assert pointwise_residual(group, load, found[0], mpmath) < 1e-11
    turn = math.radians(10.0)
    for e, printed in TWO_LINE_STATES.items():
        group = Group([Run(6.0, 490.0, 1, (x, -50.0), (x, 50.0)) for x in (-75.0, 75.0)], LesikKennedy)
        load = Load((0.0, 0.0), (1000 * math.sin(turn), 1000 * math.cos(turn)), 1000 * e)
        found = states(group, load)
        distinct = sorted({round(s.load_factor, 6) for s in found})
        assert len(distinct) == len(printed) and all(map(lambda v, p: same_digits(v, p, 5), distinct, printed)), distinct
        assert len(found) % 2 == 1
    print("self-test passed")


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--write", metavar="FILE", help="compute every case of cases.py and store it")
    parser.add_argument("--check", metavar="FILE", help="recompute a stored file, exit 1 on a difference above 1e-8")
    parser.add_argument("--selftest", action="store_true", help="published reference points and the two-line example")
    options = parser.parse_args()
    if options.selftest:
        selftest()
    if options.write:
        write(options.write)
    return check(options.check) if options.check else 0


if __name__ == "__main__":
    sys.exit(main())
