#!/usr/bin/python3
"""A NumPy peer of one simulated study, written apart from the program.

It takes a resolved scenario (the member `scenario` of `vicinal trial FILE --json`), plays many
studies at once (every array has the studies as its last axis, the fractions compared as the axis
before it) and returns the figures of the trial, each with its Monte Carlo standard error.

    peer.py RESULT.json [--times NOTEBOOK.csv] [--studies N] [--seed N]

The notebook (of `vicinal trial FILE --times NOTEBOOK.csv`) is needed for a shuffled order only: how
the fillings were dealt is the program's luck, so it is read from there; nothing else is.

Inside, everything is SI: s, m, m3, kg, K, kg/mol, m2/s; angles in rad; shares are plain numbers.
Sources of the laws stand with the functions.
"""

import argparse
import collections
import csv
import itertools
import json
import math
import re
import sys
import time
from types import SimpleNamespace

import numpy as np
from scipy.optimize import brentq
from scipy.special import gamma, gammainccinv, lambertw, ndtri, zeta

BLOCK = 8192  # studies played side by side: few enough for the cache


class Impossible(Exception):
    """The plan cannot be carried out; the text says why."""


# ---------------------------------------------------------------------------------------------
# Quantities
# ---------------------------------------------------------------------------------------------

UNITS = {
    "m": 1.0, "cm": 1e-2, "mm": 1e-3, "um": 1e-6,
    "L": 1e-3, "l": 1e-3, "dL": 1e-4, "dl": 1e-4, "mL": 1e-6, "ml": 1e-6, "uL": 1e-9,
    "kg": 1.0, "g": 1e-3, "mg": 1e-6, "mol": 1.0, "kDa": 1.0, "Da": 1e-3,
    "s": 1.0, "ms": 1e-3, "min": 60.0, "minute": 60.0, "h": 3600.0, "hour": 3600.0,
    "K": 1.0, "%": 1e-2, "ppm": 1e-6, "1": 1.0,
    "degree": math.pi / 180, "degrees": math.pi / 180, "rad": 1.0, "radian": 1.0,
}  # fmt: skip


def unit_factor(unit):
    """The SI value of a unit such as 'mm2/s2', 'mm2 s', 'dL/g', '1/K', 'mm2.s-2'."""
    factor = 1.0
    for place, part in enumerate(unit.split("/")):
        for symbol in re.split(r"[ .*·]+", part.strip()):
            name, power = re.fullmatch(r"([A-Za-z%]+|1)\^?(-?\d*)", symbol).groups()
            value = UNITS[name] ** int(power or 1)
            factor = factor * value if place == 0 else factor / value
    return factor


def quantity(value):
    """A plain number, or a text with number and unit ('2.0e-4 dL/g', '25 degC'), in SI."""
    if isinstance(value, (int, float)):
        return float(value)
    number, unit = re.fullmatch(r"\s*([-+]?[\d.]+(?:[eE][-+]?\d+)?)\s*(.*?)\s*", value).groups()
    if unit in ("degC", "celsius", "°C"):
        return float(number) + 273.15
    return float(number) * (unit_factor(unit) if unit else 1.0)


# ---------------------------------------------------------------------------------------------
# The resolved scenario
# ---------------------------------------------------------------------------------------------


def text_quantities(section):
    """A section of the scenario with its quantities in SI and its words as they are."""

    def read(value):
        try:
            return quantity(value)
        except (AttributeError, KeyError, TypeError):
            return value  # a word, a list or an object

    return SimpleNamespace(**{key: read(value) for key, value in section.items()})


def load(resolved):
    """The scenario as nested names in SI, from the resolved scenario as a dictionary.

    Of each list of `plan` the one option is taken, and the entries of `kit` it names stand beside
    it as grade, tube, bath, thermometer and timer. What `polymer` leaves out is the grade's, or
    else that of the material.
    """
    parts = ("question", "polymer", "cleavage", "solutions", "bench", "cost")
    s = SimpleNamespace(**{part: text_quantities(resolved[part]) for part in parts})

    chosen = {}
    for key, options in resolved["plan"].items():
        options = options if isinstance(options, list) else [options]
        if len(options) != 1:
            raise ValueError(f"plan.{key} holds {len(options)} options: a trial has one of each")
        chosen[key] = options[0]
    s.plan = text_quantities(chosen)

    for kind in ("grade", "tube", "bath", "thermometer", "timer"):
        entries = resolved["kit"][kind + "s"]
        entry = next(entry for entry in entries if entry["name"] == chosen[kind])
        setattr(s, kind, text_quantities(entry))

    for key in ("against", "within"):
        if not isinstance(getattr(s.question, key, None), float):
            setattr(s.question, key, None)
    materials = resolved["kit"].get("materials", [])
    material = next((m for m in materials if m["name"] == chosen["material"]), {})
    for key, value in vars(text_quantities(material)).items():
        if not hasattr(s.polymer, key):
            setattr(s.polymer, key, getattr(s.grade, key, value))
    if s.question.against_is == "same-constants":
        s.polymer.eta_u = s.polymer.a_u = 0.0

    plan = s.plan
    plan.levels_of = {"intact": int(plan.levels), "cleaved": same_or(plan.levels_cleaved, plan.levels)}
    plan.fillings_of = {
        "intact": int(plan.fillings),
        "cleaved": same_or(plan.fillings_cleaved, plan.fillings),
    }
    # K is stated for molar masses in g/mol; here [eta] in m3/kg and M in kg/mol
    s.polymer.K *= 1000.0**s.polymer.a
    s.tube.kinetic = kinetic_coefficient(s.tube)
    return s


def same_or(value, other):
    return int(other if value == "same" else value)


# ---------------------------------------------------------------------------------------------
# Water
# ---------------------------------------------------------------------------------------------


def water_viscosity(temperature):
    """Dynamic viscosity of water at 0.1 MPa in Pa s; temperature in K, any shape.

    IAPWS SR6-08(2011), 253.15 to 383.15 K.
    """
    r = temperature / 300.0
    return 1e-6 * (280.68 * r**-1.9 + 511.45 * r**-7.7 + 61.131 * r**-19.6 + 0.45903 * r**-40.0)


def water_density(temperature):
    """Density of air-free water in kg/m3; temperature in K, any shape.

    Tanaka et al., Metrologia 38 (2001) 301, 0 to 40 degC.
    """
    t = temperature - 273.15
    return 999.974950 * (1.0 - (t - 3.983035) ** 2 * (t + 301.797) / (522528.9 * (t + 69.34881)))


def water_kinematic(temperature):
    """Kinematic viscosity of water in m2/s; temperature in K, any shape."""
    return water_viscosity(temperature) / water_density(temperature)


# ---------------------------------------------------------------------------------------------
# Tube
# ---------------------------------------------------------------------------------------------


def kinetic_coefficient(tube):
    """E in m2 s of flared ends, or B in m2 of square-cut ends (ISO 3105; m = 1.1 for B)."""
    if tube.ends == "flared":
        if isinstance(getattr(tube, "E", None), float):
            return tube.E
        volume_mL, length_mm = tube.bulb_volume * 1e6, tube.length * 1e3
        constant_mm2_s2, bore_mm = tube.constant * 1e6, tube.bore * 1e3
        return 1e-6 * 52.5 * volume_mL**1.5 / (length_mm * math.sqrt(constant_mm2_s2 * bore_mm))
    if isinstance(getattr(tube, "B", None), float):
        return tube.B
    return 1.1 * tube.bulb_volume / (8.0 * math.pi * tube.length)


def kinetic_term(tube, coefficient, efflux):
    """What the kinetic energy takes from nu = C t - k(t), in m2/s (ISO 3105)."""
    return coefficient / efflux**2 if tube.ends == "flared" else coefficient / efflux


def efflux_time(tube, constant, coefficient, kinematic):
    """The time in s that solves kinematic = constant t - k(t); arrays of any common shape."""
    if tube.ends == "square":
        root = np.sqrt(kinematic**2 + 4.0 * constant * coefficient)
        return (kinematic + root) / (2.0 * constant)
    t = kinematic / constant
    for _ in range(50):
        square = t * t
        error = constant * t - coefficient / square - kinematic
        t_new = t - error / (constant + 2.0 * coefficient / (square * t))
        if np.max(np.abs(t_new - t)) <= 1e-14 * np.max(np.abs(t)):
            return t_new
        t = t_new
    return t


def head_factor(tube, tilt, excess):
    """The hydrostatic head of one filling over the nominal one.

    tilt in rad, in the plane of the bulbs; excess: the charge above the nominal one in m3, without
    effect in a suspended-level tube.
    """
    factor = np.cos(tilt) + tube.offset / tube.head * np.sin(tilt)
    if tube.type == "constant-volume":
        factor = factor * (1.0 - excess / (math.pi / 4 * tube.reservoir_bore**2 * tube.head))
    return factor


# ---------------------------------------------------------------------------------------------
# Chains
#
# A geometric number distribution P(N) = q (1 - q)^(N-1) (most-probable) has the mean 1/q. When
# S(m), the chance that m linkages in a row stay uncut, is a sum of powers, S(m) = sum_i w_i l_i^m,
# the cleaved chains are a mixture of geometric distributions again: a share w_i of the mass has
# the parameter r_i = 1 - (1 - q) l_i. (Insert S into the balance of chains from both ends and from
# the inside; the sum over the lengths before cutting is a geometric series.)
# ---------------------------------------------------------------------------------------------


def geometric_moment(q, a):
    """The mass-weighted mean of x^a over a geometric distribution, sum x^(1+a) q^2 (1-q)^(x-1).

    q of any shape, below 2. Below 1/2 by the series of the polylogarithm at exp(-mu)
    (Wood 1992, University of Kent 15-92, eq. 9.3), above it by the plain sum.
    """
    q = np.asarray(q, dtype=float)
    result = np.full(q.shape, np.nan)
    low = (q > 0.0) & (q < 0.5)
    high = (q >= 0.5) & (q < 1.9)
    for part, function in ((low, moment_by_series), (high, moment_by_sum)):
        if part.all():
            return function(q, a)
        if part.any():
            result[part] = function(q[part], a)
    return result


def moment_by_series(q, a):
    mu = -np.log1p(-q)
    order = 1.0 + a
    terms = 2 + math.ceil(math.log(1e-18) / math.log(np.max(mu) / (2.0 * math.pi)))
    total = np.zeros_like(q)
    for k in range(terms, -1, -1):
        total = zeta_negative(order + k) * (-1) ** k / math.factorial(k) + total * mu
    return (total + gamma(1.0 + order) * mu ** -(1.0 + order)) * q**2 / (1.0 - q)


def moment_by_sum(q, a):
    rest = 1.0 - q
    largest = max(float(np.max(np.abs(rest))), 1e-3)
    terms = 3 + math.ceil((math.log(1e-18) - 30.0 * largest) / math.log(largest))
    total = np.zeros_like(q)
    for x in range(terms, 0, -1):
        total = x ** (1.0 + a) + total * rest
    return total * q**2


def zeta_negative(s):
    """Riemann's zeta at -s for s > 0, by the functional equation."""
    return -2.0 * (2.0 * math.pi) ** -(s + 1.0) * math.sin(math.pi * s / 2) * gamma(s + 1.0) * zeta(s + 1.0)


def uncut_powers(delta, cut, nonspecific, neighbours):
    """Weights and bases of S(m) = sum_i w_i l_i^m, as [(w_1, l_1), ...]; any common shape.

    delta: share of head-to-head linkages; cut: the chance that such a linkage is cut; nonspecific:
    that of any other one. neighbours 'independent': each linkage by itself. 'excluded': a
    stationary two-state Markov chain in which no two head-to-head linkages follow each other.
    """
    cut_any = delta * cut + (1.0 - delta) * nonspecific
    if neighbours == "independent":
        return [(1.0, 1.0 - cut_any)]
    follow = delta / (1.0 - delta)  # head-to-head after another linkage
    trace = (1.0 - follow) * (1.0 - nonspecific)
    minus_det = follow * (1.0 - cut) * (1.0 - nonspecific)
    first = (trace + np.sqrt(trace**2 + 4.0 * minus_det)) / 2.0
    second = -minus_det / first
    weight = (1.0 - cut_any - second) / (first - second)
    return [(weight, first), (1.0 - weight, second)]


class MostProbable:
    """The most-probable (geometric) number distribution of chain lengths."""

    def __init__(self, mean_length):
        self.q = 1.0 / mean_length

    @classmethod
    def of_average(cls, average, length, a):
        """The distribution whose number, weight or viscosity average length is the given one."""
        if average == "number":
            return cls(length)
        if average == "weight":
            return cls((length + 1.0) / 2.0)
        return cls(1.0 / geometric_parameter(np.array([length]), a)[0])

    def viscosity_length(self, a):
        return float(geometric_moment(self.q, a)) ** (1.0 / a)

    def cleaved_mixture(self, delta, cut, nonspecific, neighbours):
        """The cleaved chains as shares of mass and geometric parameters, [(w_1, r_1), ...]."""
        powers = uncut_powers(delta, cut, nonspecific, neighbours)
        return [(weight, 1.0 - (1.0 - self.q) * base) for weight, base in powers]

    def cleaved_length(self, a, *scission):
        """Viscosity-average length after scission; `scission` as in uncut_powers, any shape."""
        mixture = self.cleaved_mixture(*scission)
        return sum(weight * geometric_moment(r, a) for weight, r in mixture) ** (1.0 / a)


class WholeLengths:
    """Any number distribution of chain lengths on the whole numbers, as an array.

    numbers: the number shares of N = 1, 2, ..., shape (longest,), normalised here.

    Of a chain of N units S(N-1) stay whole; S(x-1) - S(x) is the chance that the first cut comes
    after x units, S(x-1) - 2 S(x) + S(x+1) that x units are cut out in between. With S a sum of
    powers l^m each power adds up by itself: its chains of x units are l^(x-1) times
    P(x) + 2 (1-l) Q(x) + (1-l)^2 R(x), where Q(x) is the share of longer chains and R(x) the sum of
    P(N) (N-x-1) over them.
    """

    TABLE = 33  # nodes of the table in the chance of a cut

    def __init__(self, numbers):
        self.share = numbers / np.sum(numbers)
        self.x = np.arange(1.0, self.share.size + 1.0)
        self.mean_length = float(self.share @ self.x)
        longer_or_same = np.cumsum(self.share[::-1])[::-1]
        self.longer = np.append(longer_or_same[1:], 0.0)
        self.inside = np.append(np.cumsum(self.longer[::-1])[::-1][1:], 0.0)

    def viscosity_length(self, a):
        return float(self.share @ self.x ** (1.0 + a) / self.mean_length) ** (1.0 / a)

    def average(self, average, a):
        """The number, weight or viscosity average length."""
        if average == "number":
            return self.mean_length
        return self.viscosity_length(1.0 if average == "weight" else a)

    def sum_of_power(self, base, power):
        """The sum of x^power over the chains that one power of S leaves; base a scalar in 0 to 1.

        Powers below exp(-50) are left out.
        """
        log_base = math.log(max(base, 1e-300))
        count = self.x.size
        if log_base < 0.0:
            count = min(count, 2 + int(-50.0 / log_base))
        x, rest = self.x[:count], 1.0 - base
        chains = self.share[:count] + rest * (2.0 * self.longer[:count] + rest * self.inside[:count])
        return float(np.sum(chains * np.exp((x - 1.0) * log_base) * x**power))

    def sums_of_power(self, base, power):
        """The same for many bases, shape (..): each by itself, or by a table where there are more.

        The table holds the logarithm of the sum as a Chebyshev interpolant in log(p + 1/xn), p = 1 -
        base the chance of a cut. Its relative error is below 1e-7 when p spans all from 1e-5 to a
        fifth, and below 1e-12 when a conversion spans all from a half to one, for dispersities up to
        2 (against the sums, in test_self.py).
        """
        base = np.asarray(base, dtype=float)
        if base.size <= self.TABLE:
            return np.vectorize(lambda one: self.sum_of_power(one, power), otypes=[float])(base)
        place = np.log(1.0 - base + 1.0 / self.mean_length)
        low, high = place.min(), place.max()
        if high - low < 1e-12:
            return np.full(base.shape, self.sum_of_power(base.flat[0], power))
        half, middle = (high - low) / 2.0, (high + low) / 2.0
        nodes = np.cos(math.pi * (np.arange(self.TABLE) + 0.5) / self.TABLE)
        cuts = np.exp(middle + half * nodes) - 1.0 / self.mean_length
        values = [math.log(self.sum_of_power(1.0 - p, power)) for p in cuts]
        table = np.polynomial.chebyshev.chebfit(nodes, values, self.TABLE - 1)
        return np.exp(np.polynomial.chebyshev.chebval((place - middle) / half, table))

    def sums_of_small_power(self, base, power):
        """The same for the second root of the neighbours' rule, at most 1/4 in size: 64 terms."""
        x = self.x[:64]
        by_base = [
            np.polynomial.polynomial.polyval(base, part[:64] * x**power)
            for part in (self.share, 2.0 * self.longer, self.inside)
        ]
        rest = 1.0 - base
        return by_base[0] + rest * (by_base[1] + rest * by_base[2])

    def cleaved_sum(self, power, *scission):
        """The sum of x^power over the chains after scission, for one chain before it; any shape."""
        (weight, base), *second = uncut_powers(*scission)
        total = weight * self.sums_of_power(base, power)
        for weight, base in second:
            total = total + weight * self.sums_of_small_power(base, power)
        return total

    def cleaved_length(self, a, *scission):
        """Viscosity-average length after scission; `scission` as in uncut_powers, any shape."""
        return (self.cleaved_sum(1.0 + a, *scission) / self.mean_length) ** (1.0 / a)


def schulz_zimm_numbers(scale, k):
    """Number shares N^(k-1) exp(-k N/scale), not normalised.

    Schulz, Z. phys. Chem. B43 (1939) 25; Zimm, J. Chem. Phys. 16 (1948) 1099. The sums reach so far
    that less than 1e-17 of the sum of N^2 is left out.
    """
    longest = math.ceil(scale / k * gammainccinv(k + 2.0, 1e-17)) + 2
    N = np.arange(1.0, longest + 1.0)
    log_share = (k - 1.0) * np.log(N / scale) - k * N / scale
    return np.exp(log_share - log_share.max())


def log_normal_numbers(scale, variance):
    """Number shares with ln N normal about ln(scale), exp(-(ln N/scale)^2/(2 variance))/N.

    Not normalised; as far as 8.6 standard deviations of the distribution weighted with N^2. (A
    factor N more or less only moves the scale: it is the same family by number and by mass.)
    """
    longest = math.ceil(scale * math.exp(2.0 * variance + 8.6 * math.sqrt(variance))) + 2
    N = np.arange(1.0, longest + 1.0)
    return np.exp(-np.log(N / scale) ** 2 / (2.0 * variance)) / N


def chains_of(grade, length, a):
    """The chain-length distribution of a grade whose stated average is `length` units.

    Schulz-Zimm and log-normal: the densities at whole numbers, their scale solved so that the sums
    give the average. Uniform: one length, the nearest whole one.
    """
    if grade.distribution == "most-probable":
        return MostProbable.of_average(grade.average, length, a)
    if grade.distribution == "uniform":
        return WholeLengths(np.arange(1, round(length) + 1) == round(length))
    if grade.distribution == "schulz-zimm":
        numbers, shape = schulz_zimm_numbers, 1.0 / (grade.dispersity - 1.0)
    else:
        numbers, shape = log_normal_numbers, math.log(grade.dispersity)

    def chains(log_scale):
        return WholeLengths(numbers(math.exp(log_scale), shape))

    def excess(log_scale):
        return math.log(chains(log_scale).average(grade.average, a) / length)

    around = math.log(length)
    width = math.log(grade.dispersity) + 0.5
    log_scale = brentq(excess, around - 2.0 * width, around + width, xtol=1e-14, rtol=1e-14)
    return WholeLengths(chains(log_scale).share)


def secant(function, target, start):
    """x with function(x) = target, element by element, for a smooth, nearly linear function."""
    x0, x1 = start, start * 1.001 + 1e-7
    f0 = function(x0) - target
    for _ in range(60):
        f1 = function(x1) - target
        with np.errstate(divide="ignore", invalid="ignore"):
            step = np.where(f1 == f0, 0.0, f1 * (x1 - x0) / (f1 - f0))
        x0, f0, x1 = x1, f1, x1 - step
        moving = np.abs(step) > 1e-14 + 1e-12 * np.abs(x1)
        if not np.any(moving):
            break
    return x1


def geometric_parameter(length, a):
    """The parameter q whose viscosity-average length is `length` (shape (..)); nan below 1."""
    length = np.where(length >= 1.0, length, np.nan)
    spread = gamma(2.0 + a) ** (1.0 / a)  # of long chains: length = spread / q
    guess = np.minimum(1.0, spread / (length + spread - 1.0))
    return secant(lambda q: geometric_moment(np.minimum(q, 1.0), a) ** (-1.0 / a), 1.0 / length, guess)


# ---------------------------------------------------------------------------------------------
# Solution
# ---------------------------------------------------------------------------------------------


def specific_viscosity(law, y, k):
    """eta_sp of a solution with the coil volume y = [eta] c and the interaction constant k.

    Martin 1942: y exp(k y). Huggins, J. Am. Chem. Soc. 64 (1942) 2716: y + k y^2.
    """
    return y * np.exp(k * y) if law == "martin" else y * (1.0 + k * y)


def coil_volume(law, specific, k):
    """The inverse of specific_viscosity for scalars."""
    if k == 0.0:
        return specific
    if law == "martin":
        return float(lambertw(k * specific).real) / k
    return (math.sqrt(1.0 + 4.0 * k * specific) - 1.0) / (2.0 * k)


# ---------------------------------------------------------------------------------------------
# Bath and liquid
#
# The bath's fluctuation x is an Ornstein-Uhlenbeck process; its integral and the liquid's answer
# l (lag dl/dt = x - l) are linear in it. A deflection dx at age u ago is seen today as
# exp(-u/tau) in x, as its integral over the step in the integral, and as `liquid_kernel` in l.
# The joint covariance of a step is the integral of the products of these answers over u
# (Gillespie, Phys. Rev. E 54 (1996) 2084, without the liquid), by Gauss-Legendre quadrature.
# ---------------------------------------------------------------------------------------------

GAUSS_NODES, GAUSS_WEIGHTS = np.polynomial.legendre.leggauss(20)


def graded_quadrature(start, end):
    """Nodes and weights on [start, end], panels halving toward `start`: for sharp decays there."""
    edges = start + (end - start) * np.concatenate([[0.0], 0.5 ** np.arange(40, -1, -1)])
    half = np.diff(edges)[:, None] / 2
    middle = (edges[:-1] + edges[1:])[:, None] / 2
    return (middle + half * GAUSS_NODES).ravel(), (half * GAUSS_WEIGHTS).ravel()


def liquid_kernel(age, tau, lag):
    """The liquid's answer, after `age`, to a bath that starts at 1 and decays with tau."""
    gap = np.abs(age * (1.0 / lag - 1.0 / tau))
    ratio = np.where(gap > 0.0, -np.expm1(-gap) / np.where(gap > 0.0, gap, 1.0), 1.0)
    return age / lag * np.exp(-age / max(tau, lag)) * ratio


class BathStep:
    """What a step of `seconds` does to (x, l), with joint Gaussian noise.

    rows: which of 'middle' (x in the middle), 'end' (x at the end), 'mean' (of x over the step) and
    'liquid' (l at the end) are wanted. `answer[row]`: the factor of x at the start; `decay`: the
    liquid's own memory; `noise @ normals` gives the random parts, shape (rows, studies).
    """

    def __init__(self, seconds, bath, lag, rows):
        tau = max(bath.correlation_time, 1e-6)
        lag = max(lag, 1e-6)
        self.seconds, self.lag, self.rows = seconds, lag, rows
        self.decay = math.exp(-seconds / lag)

        def kernels(age):
            passed = np.maximum(age - seconds / 2, 0.0)
            values = {
                "middle": np.where(age >= seconds / 2, np.exp(-passed / tau), 0.0),
                "end": np.exp(-age / tau),
                "mean": tau * -np.expm1(-age / tau) / seconds,
                "liquid": liquid_kernel(age, tau, lag),
            }
            return np.array([values[row] for row in rows])

        self.answer = dict(zip(rows, kernels(np.array([seconds]))[:, 0]))
        self.covariance = np.zeros((len(rows), len(rows)))
        for start, end in ((0.0, seconds / 2), (seconds / 2, seconds)):
            nodes, weights = graded_quadrature(start, end)
            k = kernels(nodes)
            self.covariance += 2.0 * bath.fluctuation**2 / tau * (k * weights) @ k.T
        values, vectors = np.linalg.eigh(self.covariance)
        self.noise = vectors * np.sqrt(np.maximum(values, 0.0))

    def draw(self, rng, x, studies):
        """The rows after the step, each of the shape of x: {row: values}."""
        noise = self.noise @ rng.standard_normal((len(self.rows), studies))
        return {row: self.answer[row] * x + noise[i] for i, row in enumerate(self.rows)}


# ---------------------------------------------------------------------------------------------
# The plan: concentrations, flasks, timetable
# ---------------------------------------------------------------------------------------------

FLASK_TOLERANCE_A_mL = {  # ISO 1042, class A; class B twice that
    10: 0.025, 25: 0.04, 50: 0.06, 100: 0.10, 200: 0.15, 250: 0.15, 500: 0.25, 1000: 0.40,
}  # fmt: skip


def choose_flask(asked, tolerance, glass, needed):
    """(volume, standard uncertainty) in m3 of a flask that holds `needed`.

    asked: a volume or 'fit'; tolerance: half-width in m3 or 'by-class'. Triangular distribution.
    """
    if asked == "fit":
        sizes = [size * 1e-6 for size in FLASK_TOLERANCE_A_mL]
        asked = next((size for size in sizes if size >= needed * (1 - 1e-12)), None)
        if asked is None:
            raise Impossible(f"no flask holds {needed * 1e6:g} mL")
    if asked < needed * (1 - 1e-12):
        raise Impossible(f"{asked * 1e6:g} mL asked for, {needed * 1e6:g} mL needed")
    if tolerance == "by-class":
        tolerance = FLASK_TOLERANCE_A_mL[round(asked * 1e6)] * 1e-6 * (1 if glass == "A" else 2)
    return asked, tolerance / math.sqrt(6)


def make_plan(s, order=None):
    """Everything that is settled before the first run, from the expected fraction.

    order: what `read_order` gives; how the fillings of a shuffled order were dealt is taken from it.
    Returns names: molar masses in kg/mol, intrinsic viscosities in m3/kg and concentrations in
    kg/m3 by series, stocks, flasks, timetable, working hours outside the bench, grams of polymer
    (hours, grams and days are totals over preparations and polymers).
    """
    p = SimpleNamespace()
    polymer, cleavage = s.polymer, s.cleavage
    p.unit_mass = mean_unit(polymer, polymer.hydrolysis)
    p.chains = chains_of(s.grade, s.grade.molar_mass / p.unit_mass, polymer.a)
    p.cut = cleavage.conversion * polymer.hydrolysis**2
    scission = (s.question.expect, p.cut, cleavage.nonspecific, cleavage.neighbours)
    p.molar_mass = {
        "intact": p.unit_mass * p.chains.viscosity_length(polymer.a),
        "cleaved": p.unit_mass * float(p.chains.cleaved_length(polymer.a, *scission)),
    }
    p.intrinsic = {series: polymer.K * M**polymer.a for series, M in p.molar_mass.items()}

    p.interaction = {"intact": polymer.interaction, "cleaved": polymer.interaction_cleaved}
    top = {"intact": s.plan.top, "cleaved": s.plan.top_cleaved}
    p.conc = {}
    for series in ("intact", "cleaved"):
        y = coil_volume(polymer.law, top[series] - 1.0, p.interaction[series])
        levels = s.plan.levels_of[series]
        if levels == 1:
            steps = np.ones(1)
        else:
            steps = s.plan.lowest + (1 - s.plan.lowest) * np.arange(levels) / (levels - 1)
        p.conc[series] = y / p.intrinsic[series] * steps
    p.repeats = int(s.plan.preparations) * (2 if s.question.against_is == "measured" else 1)
    p.in_tube = s.plan.dilution == "in-tube"
    (plan_tube if p.in_tube else plan_flasks)(s, p)
    plan_reagent(s, p)
    deals = order or [None] * int(s.plan.preparations)
    if len(deals) != s.plan.preparations:
        raise ValueError(f"the notebook has {len(deals)} preparations, the plan {s.plan.preparations:g}")
    if s.plan.order == "shuffled" and order is None:
        raise ValueError("a shuffled order needs the notebook that shows how it was dealt")
    p.timetables = [plan_days(s, p, deal) for deal in deals]
    p.days = sum(len(days) for days in p.timetables) * (p.repeats // int(s.plan.preparations))
    return p


def mean_unit(polymer, hydrolysis):
    """Mean molar mass of a unit of partly hydrolysed chains in kg/mol."""
    return hydrolysis * polymer.repeat_unit + (1.0 - hydrolysis) * polymer.ester_unit


def plan_flasks(s, p):
    """Stocks, flasks, deliveries, grams and the hours of preparation."""
    shared = s.solutions.stock == "shared"
    c_top = {series: conc[-1] for series, conc in p.conc.items()}
    if shared:
        c_top = dict.fromkeys(c_top, max(c_top.values()))
    p.stock_conc = c_top
    p.diluted = {
        series: np.abs(conc - c_top[series]) > 1e-9 * c_top[series] for series, conc in p.conc.items()
    }
    for_level = {series: n * (s.tube.charge + s.bench.rinse) for series, n in s.plan.fillings_of.items()}
    solutions = s.solutions
    # one size of flask for all levels that are diluted; none where a series is its stock alone
    holds = [for_level[series] for series in p.conc if p.diluted[series].any()]
    p.level_volume, p.level_flask_u = (0.0, 0.0)
    if holds:
        p.level_volume, p.level_flask_u = choose_flask(
            solutions.level_volume, solutions.level_tolerance, solutions.glass, max(holds)
        )
    p.delivered = {series: p.level_volume * conc / c_top[series] for series, conc in p.conc.items()}
    needed = {
        series: float(np.sum(np.where(p.diluted[series], p.delivered[series], for_level[series])))
        for series in p.conc
    }
    if shared:
        needed = dict.fromkeys(needed, sum(needed.values()))
    made = sum(int(diluted.sum()) for diluted in p.diluted.values())
    plan_stocks(s, p, needed, ["intact"] if shared else ["intact", "cleaved"], made)


def plan_tube(s, p):
    """Dilution in the tube: what it holds at each level in m3, stocks, grams, hours of preparation."""
    if s.tube.type != "suspended-level":
        raise Impossible("only a suspended-level tube can hold more than its charge")
    if s.solutions.stock == "shared":
        raise Impossible("each series needs its own stock")
    p.stock_conc = {series: conc[-1] for series, conc in p.conc.items()}
    p.in_tube_volume = {series: s.tube.charge * conc[-1] / conc for series, conc in p.conc.items()}
    most = max(float(volume.max()) for volume in p.in_tube_volume.values())
    if most > s.tube.capacity * (1 + 1e-12):
        raise Impossible(f"{most * 1e6:g} mL in a tube that holds {s.tube.capacity * 1e6:g} mL")
    p.diluted = {series: np.zeros(conc.size, dtype=bool) for series, conc in p.conc.items()}
    p.level_volume, p.level_flask_u = 0.0, 0.0
    needed = {series: n * (s.tube.charge + s.bench.rinse) for series, n in s.plan.fillings_of.items()}
    plan_stocks(s, p, needed, ["intact", "cleaved"], 0)


def plan_stocks(s, p, needed, stocks, diluted):
    """Flasks of the stocks that hold `needed` m3, and what all preparations take together.

    stocks: the series whose stock is weighed; diluted: the levels made in a flask.
    """
    p.stock_volume, p.stock_flask_u = {}, {}
    for series in p.conc:
        p.stock_volume[series], p.stock_flask_u[series] = choose_flask(
            s.solutions.stock_volume, s.solutions.stock_tolerance, s.solutions.glass, needed[series]
        )
    cost = s.cost
    p.grams = 1000.0 * p.repeats * sum(p.stock_conc[series] * p.stock_volume[series] for series in stocks)
    hours = (cost.weigh_and_dissolve * len(stocks) + cost.dilution * diluted + cost.cleavage) / 3600.0
    p.preparation_hours = p.repeats * hours


def plan_reagent(s, p):
    """Strength of the spent reagent in each liquid, over that of the cleaved stock."""
    conc = p.conc["cleaved"]
    with_blank = s.cleavage.diluent == "blank"
    p.reagent = {
        "water": np.zeros(1),
        "blank": np.ones(1),
        "intact": np.zeros_like(p.conc["intact"]),
        "cleaved": np.ones_like(conc) if with_blank else conc / p.stock_conc["cleaved"],
    }


def solution_density(s, conc, reagent, temperature):
    """Density in kg/m3 of a solution of `conc` kg/m3; the partial volume as at the set temperature."""
    water = water_density(temperature) * (1.0 + s.cleavage.reagent_density * reagent)
    return water + conc * (1.0 - s.polymer.specific_volume * water_density(s.bench.temperature))


def nominal_time(s, p, kind, level):
    """The time in s a run should take: nominal constants, set temperature, nothing wrong."""
    T = s.bench.temperature
    conc = p.conc[kind][level] if kind in p.conc else 0.0
    reagent = p.reagent[kind][level]
    viscosity = water_viscosity(T) * (1.0 + s.cleavage.reagent_viscosity * reagent)
    if kind in p.conc:
        y = p.intrinsic[kind] * conc
        viscosity *= 1.0 + specific_viscosity(s.polymer.law, y, p.interaction[kind])
    density = solution_density(s, conc, reagent, T)
    return float(efflux_time(s.tube, s.tube.constant, s.tube.kinetic, viscosity / density))


def filling(s, p, kind, levels, runs):
    """One filling: kind, its portions (level, runs, run_seconds, added in m3) and its seconds.

    A filling has one portion; a loading that is diluted in the tube has one for each level.
    """
    bench = s.bench
    portions, held, seconds = [], None, bench.clean_and_fill
    for level in levels:
        volume = p.in_tube_volume[kind][level] if len(levels) > 1 else s.tube.charge
        added = 0.0 if held is None else volume - held
        portion = SimpleNamespace(
            level=level, runs=int(runs), run_seconds=nominal_time(s, p, kind, level), added=added, before=held
        )
        seconds += 0.0 if held is None else bench.add_and_mix
        seconds += bench.equilibrate + portion.runs * (portion.run_seconds + bench.reset)
        portions.append(portion)
        held = volume
    return SimpleNamespace(kind=kind, portions=portions, seconds=seconds)


def work_in_order(s, p):
    """The fillings of both series as (series, levels) in the sequential order."""
    work = []
    for series, conc in p.conc.items():
        levels, times = range(conc.size), s.plan.fillings_of[series]
        if p.in_tube:
            work += [(series, tuple(reversed(levels)))] * times
        else:
            work += [(series, (level,)) for level in levels for _ in range(times)]
    return work


def dealt_work(s, p, notebook):
    """The fillings as (series, levels) in the order of one preparation's notebook (see read_order)."""
    rows = [row for row in notebook if row[1] in p.conc]
    loading = (lambda row: (row[0], row[1], row[3])) if p.in_tube else (lambda row: row)
    groups = [list(group) for _, group in itertools.groupby(rows, loading)]
    work = [(group[0][1], tuple(row[2] for row in group)) for group in groups]
    if collections.Counter(work) != collections.Counter(work_in_order(s, p)):
        raise ValueError("the notebook does not hold the plan's fillings")
    return work


def plan_days(s, p, notebook=None):
    """The timetable of one preparation: for each day its fillings in order, spare runs apart."""
    shuffled, bracketed = s.plan.order == "shuffled", s.plan.order == "bracketed"
    daily = s.bench.water_every_day == "yes"
    work = dealt_work(s, p, notebook) if shuffled else work_in_order(s, p)
    work = [filling(s, p, series, levels, s.plan.runs) for series, levels in work]
    water, blank = (
        [filling(s, p, kind, (0,), s.plan.water_runs) for _ in range(int(s.plan.water_fillings))]
        for kind in ("water", "blank")
    )
    if bracketed and (len(water) < 2 or not daily):
        raise Impossible("a bracket needs two fillings of water, every day")
    at_end = len(water) // 2 if bracketed else 0

    def seconds(fillings):
        return sum(f.seconds for f in fillings)

    blank_due = s.cleavage.reference == "blank"
    days = []
    while work:
        opened = not days or daily
        day, closing = (water[at_end:], water[:at_end]) if opened else ([], [])
        day, taken = list(day), 0
        if daily:
            blank_due = s.cleavage.reference == "blank"
        while work:
            step = (blank if blank_due and work[0].kind == "cleaved" else []) + [work[0]]
            if seconds(day + step + closing) > s.bench.working_day + 1e-6:
                break
            if len(step) > 1:
                blank_due = False
            day += step
            work.pop(0)
            taken += 1
        if not taken:
            raise Impossible("the working day does not hold its water, its blank and one filling")
        days.append(day + closing)
    return days


def read_order(path):
    """The order of the bench in a notebook, as a list of preparations.

    Each is a list of (day, solution, level, filling), one for each filling of the tube and level, in
    order; day and level from 0, those of water and blank at level 0.
    """
    with open(path, encoding="utf-8") as stream:
        rows = list(csv.DictReader(line for line in stream if not line.startswith("#")))
    by_preparation = {}
    for row in rows:
        if row["solution"].endswith("-stock"):
            continue
        level = int(row["level"]) - 1 if row["solution"] in ("intact", "cleaved") else 0
        entry = (int(row["day"]), row["solution"], level, int(row["filling"]))
        entries = by_preparation.setdefault(row.get("preparation", "1"), [])
        if not entries or entries[-1] != entry:
            entries.append(entry)
    order = []
    for entries in by_preparation.values():
        days = sorted({day for day, *_ in entries})
        order.append([(days.index(day), *rest) for day, *rest in entries])
    return order


def timetable_rows(p):
    """The peer's own timetable as read_order gives it, without the number of the filling."""
    return [
        [
            (day, f.kind, portion.level)
            for day, fillings in enumerate(days)
            for f in fillings
            for portion in f.portions
        ]
        for days in p.timetables
    ]


# ---------------------------------------------------------------------------------------------
# The bench: n studies at once
#
# Shapes: (n,) for a draw, (F, n) where the fraction (expected, against) matters. Both fractions
# are played with the same draws; a spare run is drawn for every study that makes it under either.
# ---------------------------------------------------------------------------------------------


def reflected(rng, nominal, u, n):
    """Nominal plus a normal deviate, reflected at 1; shape (n,)."""
    value = nominal + u * rng.standard_normal(n)
    return np.where(value > 1.0, 2.0 - value, value)


def draw_study(s, p, n, rng):
    """What is drawn once for a study, whatever is done with it; arrays of shape (n,)."""
    normal = rng.standard_normal
    polymer = s.polymer
    d = SimpleNamespace(n=n)
    d.calibration = s.thermometer.calibration_u * normal(n)
    d.kinetic = s.tube.kinetic * (1.0 + s.bench.kinetic_u * normal(n))
    d.offset = s.tube.solution_offset + s.tube.solution_offset_u * normal(n)
    d.interaction = {series: k + polymer.interaction_u * normal(n) for series, k in p.interaction.items()}
    d.z_eta, d.z_a = normal(n), normal(n)
    d.hydrolysis = reflected(rng, polymer.hydrolysis, polymer.hydrolysis_u, n)
    d.pipette = s.solutions.delivery_tolerance / math.sqrt(6) * normal(n)  # m3 in each delivery
    return d


def draw_preparation(s, p, study, dry, fractions, rng):
    """The study with what one preparation adds to it: the chains, the stocks, the levels in flasks.

    dry: the polymer's dry content over the one assumed, (n,). Adds intrinsic viscosities in m3/kg,
    concentrations of the stocks and of the levels in kg/m3, (n,) or (F, n).
    """
    d = SimpleNamespace(**vars(study))
    n, normal = d.n, rng.standard_normal
    polymer, solutions, a = s.polymer, s.solutions, s.polymer.a
    conversion = reflected(rng, s.cleavage.conversion, s.cleavage.conversion_u, n)
    cut = conversion * d.hydrolysis**2
    lengths = np.array([
        p.chains.cleaved_length(a, delta, cut, s.cleavage.nonspecific, s.cleavage.neighbours)
        for delta in fractions
    ])
    molar_mass = {
        "intact": np.full((1, n), p.molar_mass["intact"]),
        "cleaved": mean_unit(polymer, d.hydrolysis) * lengths,
    }
    middle = math.sqrt(polymer.valid_from * polymer.valid_to)
    d.intrinsic = {}
    for series, M in molar_mass.items():
        pair = np.exp(d.z_eta * polymer.eta_u + d.z_a * polymer.a_u * np.log(M / middle))
        d.intrinsic[series] = polymer.K * M**a * pair

    stock_deviate = {"intact": normal(n)}
    stock_deviate["cleaved"] = stock_deviate["intact"] if solutions.stock == "shared" else normal(n)
    d.strength, d.conc = {}, {}
    for series, conc in p.conc.items():
        mass = p.stock_conc[series] * p.stock_volume[series]
        u_stock = math.hypot(solutions.balance_u / mass, p.stock_flask_u[series] / p.stock_volume[series])
        d.strength[series] = (1.0 + dry) * (1.0 + u_stock * stock_deviate[series])  # true over nominal
        d.conc[series] = []
        for level, nominal in enumerate(conc):
            dilution = 0.0
            if p.diluted[series][level]:
                delivered = d.pipette + solutions.delivery_u * normal(n)
                dilution = delivered / p.delivered[series][level]
                dilution = dilution + p.level_flask_u / p.level_volume * normal(n)
            d.conc[series].append(nominal * d.strength[series] * (1.0 + dilution))
    return d


def pour(s, p, d, f, before, rng):
    """The liquid of one filling and what is wrong with it.

    before: the filling before it that day, None for the first one.
    Returns names with arrays of shape (n,) or (F, n): coil volume y and concentration in kg/m3 in
    the tube and, without what was carried over, as made; the interaction constant k, the reagent.
    """
    level = f.portions[0].level
    q = SimpleNamespace(made_y=0.0, made_conc=0.0, k=0.0, reagent=p.reagent[f.kind][level])
    if f.kind in p.conc:
        q.made_conc = d.conc[f.kind][level]
        q.made_y = d.intrinsic[f.kind] * q.made_conc
        q.k = d.interaction[f.kind]
    elif before is not None:
        q.k = before.k  # that of what the water receives
    q.y, q.conc = q.made_y, q.made_conc
    if before is not None:
        share = s.bench.carry_over
        q.y = (1.0 - share) * q.y + share * before.made_y
        q.conc = (1.0 - share) * q.conc + share * before.made_conc
    q.specific = specific_viscosity(s.polymer.law, q.y, q.k)

    tilt = s.bench.tilt_u * rng.standard_normal(d.n)
    excess = s.bench.charge_u * rng.standard_normal(d.n) if s.tube.type == "constant-volume" else 0.0
    q.constant = s.tube.constant * head_factor(s.tube, tilt, excess)
    q.kinetic = d.kinetic
    q.lengthened = 1.0 + s.bench.filling_u * rng.standard_normal(d.n)
    if f.kind in p.conc:
        q.lengthened = q.lengthened * (1.0 + d.offset)
    if len(f.portions) > 1:
        q.volume = delivered(s, d, s.tube.charge, rng)
    return q


def delivered(s, d, volume, rng):
    """The true volume in m3 of one delivery by the study's pipette, (n,)."""
    return volume + d.pipette + s.solutions.delivery_u * rng.standard_normal(d.n)


def dilute_in_tube(s, p, d, b, q, f, portion, rng):
    """Solvent at room temperature comes into the tube and is mixed with what is there."""
    held = q.volume
    q.volume = held + delivered(s, d, portion.added, rng)
    left = held / q.volume
    q.made_y, q.made_conc = q.made_y * left, q.made_conc * left
    q.y, q.conc = q.y * left, q.conc * left
    q.specific = specific_viscosity(s.polymer.law, q.y, q.k)
    q.reagent = p.reagent[f.kind][portion.level]
    b.liquid = mixed_temperature(portion, b.liquid, s.bench.room)


def mixed_temperature(portion, liquid, room):
    """Temperature after the addition, by the volumes as planned; the unit of the arguments."""
    return (portion.before * liquid + portion.added * room) / (portion.before + portion.added)


def picked(names, index):
    """The studies `index` of every array among the names (studies last); the rest as it is."""
    return SimpleNamespace(**{
        key: value[..., index] if isinstance(value, np.ndarray) else value
        for key, value in vars(names).items()
    })


def true_time(s, q, temperature):
    """The efflux time in s of the filling q at the liquid's mean temperature over the run."""
    specific = q.specific
    if s.polymer.temperature_coefficient != 0.0:
        drift = np.exp(s.polymer.temperature_coefficient * (temperature - s.bench.temperature))
        specific = specific_viscosity(s.polymer.law, q.y * drift, q.k)
    excess = 1.0 + s.cleavage.reagent_viscosity * q.reagent
    viscosity = water_viscosity(temperature) * excess * (1.0 + specific)
    density = solution_density(s, q.conc, q.reagent, temperature)
    return efflux_time(s.tube, q.constant, q.kinetic, viscosity / density) * q.lengthened


def timed(s, rng, efflux):
    """The time that is read in s: bubbles, marks, hand, resolution. efflux: (F, n) in s."""
    n = efflux.shape[-1]
    if s.bench.bubble_chance > 0.0:
        hit = np.flatnonzero(rng.random(n) < s.bench.bubble_chance)
        efflux[:, hit] *= 1.0 + s.bench.bubble_delay * rng.standard_exponential(hit.size)
    swept = math.pi / 4 * s.tube.neck_bore**2 * s.timer.meniscus_u / s.tube.bulb_volume
    read = efflux * (1.0 + math.sqrt(2) * swept * rng.standard_normal(n))
    read = read + math.sqrt(2) * s.timer.hand_u * rng.standard_normal(n)
    return rounded(read, s.timer.resolution)


def rounded(value, resolution):
    return np.rint(value / resolution) * resolution if resolution > 0.0 else value


def advance(b, step, rng):
    """Bath and liquid go on for one step; returns the rows of the bath's fluctuation.

    The liquid's answer to a constant and a drift is exact too: it follows the drifting bath
    `rate * lag` behind, and forgets where it started with exp(-seconds/lag).
    """
    rows = step.draw(rng, b.x, b.n)
    behind = b.base + b.gradient + b.rate * (b.clock - step.lag)
    b.liquid = behind + b.rate * step.seconds + (b.liquid - behind) * step.decay + rows["liquid"]
    b.x = rows["end"]
    b.clock = b.clock + step.seconds
    return rows


def run(s, b, q, step, reset, rng):
    """One run and its reset; the bath b moves on. Returns the time for the notebook, (F, n) in s.

    The time is brought to the set temperature where the temperature of each run is recorded.
    """
    x, liquid, middle = b.x, b.liquid, b.clock + step.seconds / 2
    rows = advance(b, step, rng)
    mean_around = b.base + b.gradient + b.rate * middle + rows["mean"]
    mean_liquid = mean_around - step.lag * (b.liquid - liquid) / step.seconds
    read = timed(s, rng, true_time(s, q, mean_liquid))

    if s.plan.temperature_record == "each-run":
        seen = {"mean": rows["mean"], "middle": rows.get("middle"), "ends": (x + b.x) / 2}
        shown = b.base + b.calibration + b.rate * middle + seen[s.thermometer.reads]
        shown = shown + s.thermometer.reading_u * rng.standard_normal(b.n)
        shown = rounded(shown - 273.15, s.thermometer.resolution) + 273.15
        read = read * (water_kinematic(s.bench.temperature) / water_kinematic(shown))
    if reset is not None:
        advance(b, reset, rng)
    return read


def best(times, count):
    """Of the times (made, ...; inf where not made) the `count` closest ones, the fastest at a tie."""
    order = np.sort(times, axis=0)
    last = order[count - 1 :]
    with np.errstate(invalid="ignore"):
        spread = np.where(np.isfinite(last), last - order[: len(last)], np.inf)
    first = np.argmax(spread <= spread.min(axis=0) + 1e-9, axis=0)
    index = first + np.arange(count).reshape((count,) + (1,) * first.ndim)
    return np.take_along_axis(order, index, axis=0)


def disagree(kept, agreement):
    return kept.max(axis=0) - kept.min(axis=0) > agreement * kept.mean(axis=0)


BATH_STATE = ("x", "liquid", "clock")


def all_runs(s, b, q, f, steps, rng):
    """All runs of one portion f. Returns the kept ones (runs, F, n) in s; counts the spare runs in b."""
    kept = np.empty((f.runs,) + b.clock.shape)
    for i in range(f.runs):
        kept[i] = run(s, b, q, steps[f.run_seconds], steps.get("reset"), rng)
    spares = int(s.bench.spare_runs)
    if f.runs == 1 or spares == 0:
        return kept

    need = disagree(kept, s.bench.agreement)
    some = np.flatnonzero(need.any(axis=0))
    made = np.full((f.runs + spares, b.clock.shape[0], some.size), np.inf)
    made[: f.runs] = kept[..., some]
    need = need[:, some]
    for spare in range(f.runs, f.runs + spares):
        now = np.flatnonzero(need.any(axis=0))
        if now.size == 0:
            break
        studies = some[now]
        part = picked(b, studies)
        part.n = studies.size
        read = run(s, part, picked(q, studies), steps[f.run_seconds], steps.get("reset"), rng)
        does = need[:, now]
        made[spare][:, now] = np.where(does, read, np.inf)
        for name in BATH_STATE:
            whole = getattr(b, name)
            whole[:, studies] = np.where(does, getattr(part, name), whole[:, studies])
        b.spare_runs[:, studies] += does
        need[:, now] = does & disagree(best(made[..., now], f.runs), s.bench.agreement)
    if some.size:
        kept[..., some] = best(made, f.runs)
    return kept


def bath_steps(s, p):
    """The steps of bath and liquid that occur: by name, and by run time in s."""
    rows = ["end", "mean", "liquid"]
    if s.plan.temperature_record == "each-run" and s.thermometer.reads == "middle":
        rows.append("middle")
    lag = s.bench.lag_time
    waits = ("clean_and_fill", "equilibrate", "reset", "add_and_mix")
    steps = {
        name: BathStep(getattr(s.bench, name), s.bath, lag, ["end", "liquid"])
        for name in waits
        if getattr(s.bench, name) > 0.0
    }
    fillings = (f for days in p.timetables for day in days for f in day)
    for seconds in {portion.run_seconds for f in fillings for portion in f.portions}:
        steps[seconds] = BathStep(seconds, s.bath, lag, rows)
    return steps


def wait(b, steps, name, rng):
    if name in steps:
        advance(b, steps[name], rng)


def play(s, p, steps, d, days, fractions, rng):
    """One preparation d of n studies at the fractions (F of them) with the same draws.

    days: its timetable. Returns the notebook [(day, kind, level, kept times (runs, F, n) in s), ...],
    the spare runs and the clock in s of each study, both (F, n).
    """
    n = d.n
    shape = (len(fractions), n)
    b = SimpleNamespace(n=n, calibration=d.calibration, spare_runs=np.zeros(shape, dtype=int))
    worked = np.zeros(shape)
    notebook = []
    for day, fillings in enumerate(days):
        b.rate = s.bath.drift_u * rng.standard_normal(n)
        b.base = s.bench.temperature - d.calibration + s.bath.day_u * rng.standard_normal(n)
        b.x = np.broadcast_to(s.bath.fluctuation * rng.standard_normal(n), shape).copy()
        b.clock = np.zeros(shape)
        b.liquid = np.full(shape, s.bench.room)
        b.gradient = np.zeros(n)
        before = None
        for f in fillings:
            wait(b, steps, "clean_and_fill", rng)
            b.liquid = np.full(shape, s.bench.room)
            b.gradient = s.bath.gradient_u * rng.standard_normal(n)
            q = pour(s, p, d, f, before, rng)
            for portion in f.portions:
                if portion.before is not None:
                    wait(b, steps, "add_and_mix", rng)
                    dilute_in_tube(s, p, d, b, q, f, portion, rng)
                wait(b, steps, "equilibrate", rng)
                kept = all_runs(s, b, q, portion, steps, rng)
                notebook.append((day, f.kind, portion.level, kept))
            before = q
        worked += b.clock
    return notebook, b.spare_runs, worked


# ---------------------------------------------------------------------------------------------
# The reduction: from the notebook and nominal values alone
# ---------------------------------------------------------------------------------------------


def reduce_notebook(s, p, notebook):
    """(delta, [eta] by series in m3/kg, M by series in kg/mol), each (F, n); nan: no answer."""
    combine = np.median if s.bench.combine == "median" else np.mean
    filling_times = [(day, kind, level, combine(kept, axis=0)) for day, kind, level, kept in notebook]
    coefficient = s.tube.kinetic if s.plan.kinetic_energy == "corrected" else 0.0
    T = s.bench.temperature

    mean_of = {"water": {}, "blank": {}}
    for kind, by_day in mean_of.items():
        for day in {day for day, found, *_ in filling_times if found == kind}:
            times = [t for its_day, found, _, t in filling_times if (its_day, found) == (day, kind)]
            by_day[day] = sum(times) / len(times)

    def of_day(by_day, day):
        """That of the day; where it is measured once in the preparation, that of its day."""
        return by_day[day] if s.bench.water_every_day == "yes" else next(iter(by_day.values()))

    constant = {
        day: (water_kinematic(T) + kinetic_term(s.tube, coefficient, t)) / t
        for day, t in mean_of["water"].items()
    }
    relative = {series: [[] for _ in conc] for series, conc in p.conc.items()}
    for day, kind, level, t in filling_times:
        if kind not in p.conc:
            continue
        C = of_day(constant, day)
        kinematic = C * t - kinetic_term(s.tube, coefficient, t)
        reference = water_kinematic(T)
        if kind == "cleaved" and s.cleavage.reference == "blank":
            blank = of_day(mean_of["blank"], day)
            reference = C * blank - kinetic_term(s.tube, coefficient, blank)
        density = 1.0
        if s.plan.density == "partial-volume":
            rho = water_density(T)
            density += p.conc[kind][level] * (1.0 - s.polymer.specific_volume * rho) / rho
        relative[kind][level].append(kinematic * density / reference)

    intrinsic, molar_mass = {}, {}
    with np.errstate(invalid="ignore", divide="ignore"):
        for series, levels in relative.items():
            means = np.array([sum(fillings) / len(fillings) for fillings in levels])
            value = extrapolate(p.conc[series], means, s.plan.extrapolation, s.plan.weighting)
            intrinsic[series] = np.where(value > 0.0, value, np.nan)
            molar_mass[series] = (intrinsic[series] / s.polymer.K) ** (1.0 / s.polymer.a)
        delta = head_to_head(s, p, molar_mass["intact"], molar_mass["cleaved"])
    return np.where(np.isfinite(delta), delta, np.nan), intrinsic, molar_mass


def intercept_weights(c, squared):
    """Row vector r with r @ y the intercept of a straight line through (c, y), weights 1 or c^2."""
    root = c if squared else np.ones_like(c)
    design = np.stack([np.ones_like(c), c], axis=1) * root[:, None]
    return np.linalg.pinv(design)[0] * root


def extrapolate(c, relative, line, weighting):
    """Intrinsic viscosity in 1/unit of c, from relative viscosities (levels, ...).

    Huggins 1942 (eta_sp/c), Kraemer 1938 (ln eta_r/c), Martin 1942 (ln(eta_sp/c)), Huggins and
    Kraemer with one intercept, Solomon and Ciuta 1962 (each level by itself).
    """
    if line != "single-point" and len(c) < 2:
        raise Impossible("a line needs two levels")
    column = c.reshape((-1,) + (1,) * (relative.ndim - 1))
    reduced = (relative - 1.0) / column
    inherent = np.log(relative) / column
    if line == "single-point":
        return np.mean(np.sqrt(2.0 * (reduced - inherent) / column), axis=0)
    squared = weighting == "c-squared"
    if line == "common-intercept":
        root = np.tile(c if squared else np.ones_like(c), 2)
        zero = np.zeros_like(c)
        design = np.array([np.ones(2 * len(c)), np.append(c, zero), np.append(zero, c)]).T
        row = np.linalg.pinv(design * root[:, None])[0] * root
        return np.tensordot(row, np.concatenate([reduced, inherent]), axes=1)
    row = intercept_weights(c, squared)
    if line == "huggins":
        return np.tensordot(row, reduced, axes=1)
    if line == "kraemer":
        return np.tensordot(row, inherent, axes=1)
    return np.exp(np.tensordot(row, np.log(reduced), axes=1))


def head_to_head(s, p, intact, cleaved):
    """The head-to-head fraction from viscosity-average molar masses in kg/mol, any shape."""
    cut = p.cut if s.cleavage.correct_conversion == "yes" else 1.0
    if s.plan.chain_statistics == "continuous":
        return continuous_fraction(intact, cleaved, p.unit_mass, s.polymer.a) / cut
    lengths = intact / p.unit_mass, cleaved / p.unit_mass
    return discrete_fraction(*lengths, s.polymer.a, cut, s.cleavage.neighbours)


def continuous_fraction(intact, cleaved, unit_mass, a):
    """Cuts per linkage of long most-probable chains (Flory and Leutner, J. Polym. Sci. 3 (1948) 880)."""
    r = ((1.0 + a) * gamma(1.0 + a)) ** (1.0 / a)
    return unit_mass * r * (1.0 / cleaved - 1.0 / intact)


def discrete_fraction(intact, cleaved, a, cut, neighbours):
    """The fraction whose exact scission of a most-probable chain gives the cleaved length.

    intact, cleaved: viscosity-average lengths, any shape; cut: the chance that a head-to-head
    linkage is cut. Negative when the cleaved chains are longer; nan where no fraction up to one
    half will do.
    """
    q = geometric_parameter(intact, a)
    q_cleaved = geometric_parameter(cleaved, a)
    delta = (q_cleaved - q) / ((1.0 - q) * cut)
    if neighbours == "excluded":
        chains = MostProbable(1.0 / q)

        def inverse_length(delta):
            return 1.0 / chains.cleaved_length(a, delta, cut, 0.0, neighbours)

        largest = 0.5 * (1.0 - 1e-9)
        target = np.where(inverse_length(np.full_like(q, largest)) >= 1.0 / cleaved, 1.0 / cleaved, np.nan)
        delta = secant(inverse_length, target, np.minimum(delta, 0.49))
    return np.where(delta <= 0.5, delta, np.nan)


# ---------------------------------------------------------------------------------------------
# Many studies, and what they say
# ---------------------------------------------------------------------------------------------


def one_polymer(s, p, steps, study, fractions, rng):
    """All preparations of one polymer with the fractions (F of them) it may hold.

    Returns names with arrays of shape (F, n): the mean delta over the preparations (nan when one of
    them gives no answer), the means of [eta] and M by series, spare runs and clock in s in all.
    """
    dry = s.solutions.dry_content_u * rng.standard_normal(study.n)
    found = []
    for days in p.timetables:
        d = draw_preparation(s, p, study, dry, fractions, rng)
        notebook, spare_runs, worked = play(s, p, steps, d, days, fractions, rng)
        found.append(reduce_notebook(s, p, notebook) + (spare_runs, worked))
    delta, intrinsic, molar_mass, spare_runs, worked = zip(*found)

    def mean(values):
        return sum(values) / len(values)

    return SimpleNamespace(
        delta=mean(delta),
        intrinsic={series: mean([one[series] for one in intrinsic]) for series in p.conc},
        molar_mass={series: mean([one[series] for one in molar_mass]) for series in p.conc},
        spare_runs=sum(spare_runs),
        clock=sum(worked),
    )


def simulate(s, fractions, studies, seed, order=None):
    """Play `studies` studies at each of the fractions with the same luck.

    Returns names with arrays of shape (F, studies): delta (nan: no answer), intrinsic and
    molar_mass by series in m3/kg and kg/mol, spare_runs (number), clock in h; and `plan`.
    With a second polymer measured alongside delta is the difference of the two, the second one
    always at `against`; [eta] and M are the first one's.
    """
    p = make_plan(s, order)
    steps = bath_steps(s, p)
    blocks = []
    for number, start in enumerate(range(0, studies, BLOCK)):
        n = min(BLOCK, studies - start)
        rng = np.random.default_rng([seed, number])
        study = draw_study(s, p, n, rng)
        block = one_polymer(s, p, steps, study, fractions, rng)
        if s.question.against_is == "measured":
            other = one_polymer(s, p, steps, study, [s.question.against], rng)
            block.delta = block.delta - other.delta
            block.spare_runs = block.spare_runs + other.spare_runs
            block.clock = block.clock + other.clock
        blocks.append(block)

    def joined(get):
        return np.concatenate([get(block) for block in blocks], axis=1)

    return SimpleNamespace(
        plan=p,
        delta=joined(lambda b: b.delta),
        intrinsic={name: joined(lambda b, name=name: b.intrinsic[name]) for name in p.conc},
        molar_mass={name: joined(lambda b, name=name: b.molar_mass[name]) for name in p.conc},
        spare_runs=joined(lambda b: b.spare_runs),
        clock=joined(lambda b: b.clock / 3600.0),
    )


def mean_and_error(values):
    values = values[np.isfinite(values)]
    return float(values.mean()), float(values.std(ddof=1) / math.sqrt(values.size))


def sd_and_error(values):
    """Standard deviation and its standard error by the fourth moment (no normality assumed)."""
    values = values[np.isfinite(values)]
    sd = float(values.std(ddof=1))
    if sd == 0.0:
        return 0.0, 0.0
    fourth = float(np.mean((values - values.mean()) ** 4))
    return sd, math.sqrt(max(fourth - sd**4, 0.0) / values.size) / (2.0 * sd)


def share_and_error(hits):
    """A share and its standard error, taken half a count inside so that it is never zero."""
    n = hits.size
    inside = (hits.sum() + 0.5) / (n + 1.0)
    return float(hits.mean()), math.sqrt(inside * (1.0 - inside) / n)


def density_at(values, point):
    """Density of the sample at a point: the share within a window of half a standard deviation."""
    values = values[np.isfinite(values)]
    low, high = np.quantile(values, [0.25, 0.75])
    half = 0.25 * max((high - low) / 1.349, 1e-300)
    return float(np.mean(np.abs(values - point) <= half)) / (2.0 * half)


def figures(s, sim):
    """The figures of a trial as {name: (value, standard error)} from the simulated studies.

    sim: from `simulate` at (expect,) or (expect, against).
    """
    question = s.question
    delta = sim.delta[0]
    hours = sim.clock[0] + sim.plan.preparation_hours
    out = {
        "mean": mean_and_error(delta),
        "sd": sd_and_error(delta),
        "no_answer": share_and_error(~np.isfinite(delta)),
        "spare_runs": mean_and_error(sim.spare_runs[0].astype(float)),
        "bench_hours": mean_and_error(sim.clock[0]),
        "hours": mean_and_error(hours),
        "money": mean_and_error(s.cost.hour * hours + prices(s, sim.plan)),
    }
    for name, by_series in (("intrinsic_viscosity", sim.intrinsic), ("molar_mass", sim.molar_mass)):
        for series, values in by_series.items():
            out[f"{name}.{series}.mean"] = mean_and_error(values[0])
            out[f"{name}.{series}.sd"] = sd_and_error(values[0])
    if question.within is not None:
        out["within"] = share_and_error(np.abs(delta - truth(question)) <= question.within)
    if question.against is not None:
        out.update(power_figures(question, delta, sim.delta[1]))
    return out


def truth(question):
    """What the estimate should be: the fraction, or the difference of two polymers."""
    return question.expect - (question.against if question.against_is == "measured" else 0.0)


def prices(s, p):
    """What polymer and equipment cost, in the currency; equipment once, unless it is owned."""
    entries = (s.tube, s.bath, s.thermometer, s.timer)
    bought = [entry.price for entry in entries if entry.name not in s.cost.owned]
    return p.grams * s.grade.price_per_gram + sum(bought)


def power_figures(question, expected, other):
    """Critical value, power and plain false alarm of the estimates under both fractions, (n,)."""
    n = expected.size
    level = question.confidence if question.sides == "one" else 1.0 - (1.0 - question.confidence) / 2.0
    sign = 1.0 if question.expect > question.against else -1.0
    against = 0.0 if question.against_is == "measured" else question.against
    expected, other, against = sign * expected, sign * other, sign * against

    counted = np.where(np.isfinite(other), other, -np.inf)
    critical = float(np.quantile(counted, level))
    beyond, beyond_both = expected > critical, (expected > critical) & (counted > critical)
    power, joint = float(beyond.mean()), float(beyond_both.mean())

    at_other = density_at(other, critical)
    ratio = density_at(expected, critical) / at_other
    inside = (beyond.sum() + 0.5) / (n + 1.0)
    variance = (
        inside * (1.0 - inside)
        + ratio**2 * level * (1.0 - level)
        - 2.0 * ratio * (joint - (1.0 - level) * power)
    )
    sd = float(np.nanstd(other, ddof=1))
    return {
        "critical": (sign * critical, math.sqrt(level * (1.0 - level) / n) / at_other),
        "power": (power, math.sqrt(max(variance, 0.0) / n)),
        "plain_false_alarm": share_and_error(other > against + float(ndtri(level)) * sd),
    }


def nominal_figures(s, p):
    """What needs no simulation, named as in the program's outcome."""
    out = {"truth": truth(s.question), "days": p.days, "polymer_g": p.grams}
    for series in ("intact", "cleaved"):
        out[f"intrinsic_viscosity.{series}.true"] = p.intrinsic[series]
        out[f"molar_mass.{series}.true"] = p.molar_mass[series]
        for level, conc in enumerate(p.conc[series]):
            out[f"concentrations.{series}.{level}"] = float(conc)
        out[f"flasks_mL.{series}_stock"] = p.stock_volume[series] * 1e6
    out["flasks_mL.level"] = p.level_volume * 1e6
    return out


def trial(resolved, studies, seed, order=None):
    """(figures, nominal figures, timetable) of a resolved scenario; order: see make_plan."""
    s = load(resolved)
    fractions = [s.question.expect] + ([s.question.against] if s.question.against is not None else [])
    sim = simulate(s, fractions, studies, seed, order)
    return figures(s, sim), nominal_figures(s, sim.plan), timetable_rows(sim.plan)


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("result", help="the JSON of a trial, or '-' for standard input")
    parser.add_argument("--times", help="the notebook of the same trial: how a shuffled order was dealt")
    parser.add_argument("--studies", type=int, default=20000)
    parser.add_argument("--seed", type=int, default=1)
    options = parser.parse_args()
    with sys.stdin if options.result == "-" else open(options.result, encoding="utf-8") as stream:
        document = json.load(stream)
    began = time.perf_counter()
    order = read_order(options.times) if options.times else None
    stochastic, nominal, _ = trial(document.get("scenario", document), options.studies, options.seed, order)
    spent = time.perf_counter() - began
    for name, (value, error) in stochastic.items():
        print(f"{name:32} {value:14.8g} +- {error:.2g}")
    for name, value in nominal.items():
        print(f"{name:32} {value:14.8g}")
    print(f"{options.studies} studies in {spent:.3f} s, {spent / options.studies * 1e6:.1f} us each")


if __name__ == "__main__":
    main()
