#!/usr/bin/python3
"""The rows of tests/reference/*.tsv against what computes them: NumPy, SciPy and iapws, never our own code.

A row is `quantity, arguments, value, tolerance, reason, source`, tab-separated; an empty tolerance means half a unit of
the last printed digit. Each quantity has a function here that recomputes it from the arguments, or stands in DATA (given
numbers that the other rows of its file are computed from) or in PRINTED (read in a document or recalled, nothing computes
it). So no row can drift from its library, and none stands without a source. The last line is `N passed, N failed`.
"""
import math
import pathlib
import sys

import iapws
import numpy as np
from iapws._iapws import _Liquid, _Viscosity
from scipy import optimize, special, stats

FOLDER = pathlib.Path(__file__).parent
REASONS = ("TABLE", "ROUND", "SERIES", "STAT", "TEXT")
DATA = {"h3.point", "norris.point", "pmma.point", "styrene.point", "benzene.point", "run"}
PRINTED = {"viscosity.iso3666", "flask.A", "flask.A.u"}
COMPUTE = {}
tables = {}


def computes(*quantities):
    def keep(function):
        for quantity in quantities:
            COMPUTE[quantity] = function
        return function
    return keep


def half_unit(printed):
    mantissa, _, exponent = printed.lower().partition("e")
    return 0.5 * 10.0 ** (int(exponent or 0) - len(mantissa.partition(".")[2]))


class Row:
    def __init__(self, name, number, line):
        self.place = f"{name}:{number}"
        fields = line.rstrip("\n").split("\t")
        if len(fields) != 6:
            raise ValueError(f"{self.place}: {len(fields)} fields")
        self.quantity, arguments, self.value, tolerance, self.reason, self.source = fields
        self.arguments = arguments.split()
        if self.reason != "TEXT":
            self.tolerance = float(tolerance) if tolerance else half_unit(self.value) + 1e-15 * abs(float(self.value))


def points(name, quantity):
    """The data rows of a table as two arrays."""
    rows = [row for row in tables[name] if row.quantity == quantity]
    return np.array([float(row.arguments[0]) for row in rows]), np.array([float(row.value) for row in rows])


# ---- the generator ----

@computes("xsl-rr", "dxsm")
def generator(quantity, state, increment):
    kind = np.random.PCG64 if quantity == "xsl-rr" else np.random.PCG64DXSM
    bits = kind()
    bits.state = {"bit_generator": kind.__name__, "state": {"state": int(state, 16), "inc": int(increment, 16)}, "has_uint32": 0, "uinteger": 0}
    outputs = " ".join(f"{int(bits.random_raw()):016x}" for _ in range(6))
    return f"{outputs} {bits.state['state']['state']:032x}"


@computes("dxsm.double")
def generator_double(quantity, state, increment):
    bits = np.random.PCG64DXSM()
    bits.state = {"bit_generator": "PCG64DXSM", "state": {"state": int(state, 16), "inc": int(increment, 16)}, "has_uint32": 0, "uinteger": 0}
    return " ".join(float.hex(x) for x in np.random.Generator(bits).random(3))


# ---- water ----

def sr6(T):
    x = T / 300.0
    return 280.68 * x**-1.9 + 511.45 * x**-7.7 + 61.131 * x**-19.6 + 0.45903 * x**-40


def density(T):
    t = T - 273.15
    return 999.974950 * (1 - (t - 3.983035) ** 2 * (t + 301.797) / (522528.9 * (t + 69.34881)))


@computes("viscosity.release", "viscosity.iapws")
def viscosity(quantity, T):
    """iapws gives Pa s, though its text says mPa s."""
    return 1e6 * _Liquid(float(T))["mu"]


@computes("viscosity.sr6")
def viscosity_celsius(quantity, t):
    return 1e3 * _Liquid(float(t) + 273.15)["mu"]


@computes("viscosity.full")
def viscosity_full(quantity, t):
    T = float(t) + 273.15
    return 1e3 * _Viscosity(iapws.IAPWS95(T=T, P=0.101325).rho, T)


@computes("viscosity.slope")
def viscosity_slope(quantity, t):
    T, h = float(t) + 273.15, 1e-3
    return math.log(_Liquid(T + h)["mu"] / _Liquid(T - h)["mu"]) / (2 * h)


@computes("density")
def density_celsius(quantity, t):
    return density(float(t) + 273.15)


@computes("time.kelvin")
def time_of_a_warmer_bath(quantity, kelvin):
    """Percent that water's time changes when the bath is that much above 25 degC."""
    T = 298.15 + float(kelvin)
    return 100 * (sr6(298.15) / density(298.15) * density(T) / sr6(T) - 1)


# ---- tubes (mm, s, mL) ----

def kinetic(V, L, d, C):
    """From m = 0.037 sqrt(Re); the formula's coefficient is this one, rounded to three digits."""
    return 52.5 * V**1.5 / (L * math.sqrt(C * d))


@computes("kinetic.flared")
def kinetic_flared(quantity, V, L, d, C):
    return kinetic(float(V), float(L), float(d), float(C))


@computes("kinetic.coefficient")
def kinetic_coefficient(quantity):
    """k = m V/(8 pi L t), Re = 4 V/(pi d nu t), nu = C t; V in mm3 is 1000 times V in mL."""
    return 0.037 * 2 / (8 * math.pi**1.5) * 1000**1.5


@computes("kinetic.square")
def kinetic_square(quantity, V, L):
    return 1.1 * 1e3 * float(V) / (8 * math.pi * float(L))


@computes("poiseuille")
def poiseuille(quantity, d, H, V, L):
    d, H, V, L = map(float, (d, H, V, L))
    return math.pi * 9806.65 * d**4 * H / (128 * 1000 * V * L)


@computes("water.time", "water.kinetic")
def water_time(quantity, C, d, V, L):
    C, d, V, L = map(float, (C, d, V, L))
    nu = sr6(298.15) / density(298.15)
    E = kinetic(V, L, d, C)
    t = optimize.brentq(lambda t: C * t - E / t**2 - nu, 0.5 * nu / C, 2 * nu / C, xtol=1e-12)
    return t if quantity == "water.time" else 100 * E / t**2 / nu


@computes("tilt")
def tilt(quantity, degrees, offset):
    angle = math.radians(float(degrees))
    return 100 * (math.cos(angle) + float(offset) * math.sin(angle) - 1)


@computes("tilt.offset")
def tilt_offset(quantity, degrees, offset):
    """What the bulbs' distance alone does."""
    return 100 * float(offset) * math.sin(math.radians(float(degrees)))


# ---- glassware ----

@computes("quam.A2", "quam.A2.u")
def quam(quantity):
    m, P, M, V = 0.3888, 1.0, 204.2212, 18.64
    c = 1000 * m * P / (M * V)
    return c if quantity == "quam.A2" else c * math.hypot(0.00013 / m, 0.00029 / P, 0.0038 / M, 0.013 / V, 0.0005)


# ---- chains ----

def r(a):
    return ((1 + a) * special.gamma(1 + a)) ** (1 / a)


def most_probable(xn):
    x = np.arange(1, int(60 * xn) + 1.0)
    return x, np.exp((x - 1) * math.log1p(-1 / xn)) / xn


def averages(x, n, a):
    """Number, weight and viscosity average."""
    mass = n * x
    return mass.sum() / n.sum(), (mass * x).sum() / mass.sum(), ((mass * x**a).sum() / mass.sum()) ** (1 / a)


def uncut(length, fraction, hh, other, excluded):
    """S(0 ... length): the chance that so many linkages in a row are uncut, linkage by linkage."""
    if not excluded:
        return (1 - fraction * hh - (1 - fraction) * other) ** np.arange(length + 1.0)
    u = fraction / (1 - fraction)
    S, here = [1.0], (fraction, 1 - fraction)
    for _ in range(length):
        h, n = here[0] * (1 - hh), here[1] * (1 - other)
        S.append(h + n)
        here = n * u, h + n * (1 - u)
    return np.array(S)


def cut(xn, fraction, hh=1.0, other=0.0, excluded=False):
    """Chains of x units after cutting, per chain before: N(x) of model.md summed over the starting lengths."""
    x, P = most_probable(xn)
    S = uncut(len(x) + 1, fraction, hh, other, excluded)
    f, g = S[:-1] - S[1:], S[:-2] - 2 * S[1:-1] + S[2:]
    longer = np.append(np.cumsum(P[::-1])[::-1][1:], 0)
    units = np.append(np.cumsum((P * x)[::-1])[::-1][1:], 0)
    return x, P * S[:len(x)] + 2 * f[:len(x)] * longer + g[:len(x)] * (units - (x + 1) * longer)


def usual(a, xv_cut, xv):
    return r(a) * (1 / xv_cut - 1 / xv)


@computes("r")
def r_of_a(quantity, a):
    return r(float(a))


@computes("unit.r")
def unit_r(quantity, a):
    return 44.05 * r(float(a))


@computes("geometric.Mn", "geometric.Mw", "geometric.Mv")
def geometric(quantity, xn, p):
    Mn, Mw, Mv = (44.05 * x for x in averages(*cut(float(xn), float(p)), 0.76))
    return {"geometric.Mn": Mn, "geometric.Mw": Mw, "geometric.Mv": Mv}[quantity]


@computes("geometric.usual")
def geometric_usual(quantity, xn, p):
    xn, p = float(xn), float(p)
    return 100 * (usual(0.76, averages(*cut(xn, p), 0.76)[2], averages(*most_probable(xn), 0.76)[2]) / p - 1)


@computes("cut.xv", "cut.half")
def cut_xv(quantity, neighbours, xn, fraction):
    return averages(*cut(float(xn), float(fraction), excluded=neighbours == "excluded"), 0.76)[2]


@computes("cut.usual")
def cut_usual(quantity, neighbours, xn, fraction):
    xv = cut_xv("cut.xv", neighbours, xn, fraction)
    return 100 * (usual(0.76, xv, averages(*most_probable(float(xn)), 0.76)[2]) / float(fraction) - 1)


@computes("cut.mixed")
def cut_mixed(quantity, neighbours, xn, fraction, hh, other):
    """xv' where other linkages break too."""
    return averages(*cut(*map(float, (xn, fraction, hh, other)), excluded=neighbours == "excluded"), 0.76)[2]


@computes("base.Mv", "base.Mv.cut", "base.eta", "base.eta.cut", "base.delta")
def base(quantity):
    xv, after = averages(*most_probable(1000), 0.76)[2], averages(*cut(1000, 0.015), 0.76)[2]
    eta = [2e-4 * (44.05 * x) ** 0.76 for x in (xv, after)]
    return {"base.Mv": 44.05 * xv, "base.Mv.cut": 44.05 * after, "base.eta": eta[0], "base.eta.cut": eta[1],
            "base.delta": usual(0.76, after, xv)}[quantity]


def delta_of(K, a, eta, cleaved):
    return 44.05 * r(a) * ((cleaved / K) ** (-1 / a) - (eta / K) ** (-1 / a))


@computes("pair")
def pair(quantity, K, a):
    return 100 * delta_of(float(K), float(a), base("base.eta"), base("base.eta.cut"))


@computes("sensitivity")
def sensitivity(quantity, what):
    h = 1e-5
    at = [2e-4, 0.76, base("base.eta"), base("base.eta.cut")]
    low, high = list(at), list(at)
    i = {"K": 0, "a": 1, "intact": 2, "cleaved": 3}[what]
    low[i], high[i] = (at[i] - h, at[i] + h) if what == "a" else (at[i] * (1 - h), at[i] * (1 + h))
    return math.log(delta_of(*high) / delta_of(*low)) / (2 * h)


@computes("effect.moisture", "effect.conversion", "effect.nonspecific")
def effect(quantity, amount):
    """Percent of the base case's delta, independent linkages, continuous statistics, nothing corrected."""
    amount, xv = float(amount), averages(*most_probable(1000), 0.76)[2]
    if quantity == "effect.moisture":
        eta = base("base.eta"), base("base.eta.cut")
        return 100 * (delta_of(2e-4, 0.76, *(e * (1 - amount) for e in eta)) / delta_of(2e-4, 0.76, *eta) - 1)
    x, n = cut(1000, 0.015, amount) if quantity == "effect.conversion" else cut(1000, 0.015, 1.0, amount)
    return 100 * (usual(0.76, averages(x, n, 0.76)[2], xv) / base("base.delta") - 1)


def solve_xn(xv):
    return optimize.brentq(lambda xn: averages(*most_probable(xn), 0.76)[2] - xv, 0.4 * xv, xv, xtol=1e-9)


def discrete(xv, xv_cut, excluded=True, chance=1.0):
    xn = solve_xn(xv)
    return optimize.brentq(lambda d: averages(*cut(xn, d, chance, 0.0, excluded), 0.76)[2] - xv_cut, 1e-4, 0.1, xtol=1e-14)


@computes("effect.acetate", "effect.acetate.unit")
def acetate(quantity, h):
    """Percent of delta when the reduction knows of no acetate, or of its mass only; discrete, neighbours excluded."""
    h = float(h)
    unit = h * 44.05 + (1 - h) * 86.09
    assumed = 44.05 if quantity == "effect.acetate" else unit
    after = unit * averages(*cut(solve_xn(85000 / unit), 0.015, h * h, 0.0, True), 0.76)[2]
    return 100 * (discrete(85000 / assumed, after / assumed) / 0.015 - 1)


# ---- chains of other starts, cut at independent linkages ----

def start(name, xn):
    """A number distribution on whole lengths whose number average is xn."""
    if name == "geometric":
        return most_probable(xn)
    if name == "one-length":
        x = np.arange(1, xn + 1.0)
        return x, np.where(x == xn, 1.0, 0.0)
    x = np.arange(1, 40 * xn + 1.0)  # Schulz-Zimm, Mw/Mn 1.5: k = 2

    def at(theta):
        n = x * np.exp(-2 * x / theta)
        return n / n.sum()
    return x, at(optimize.brentq(lambda theta: (x * at(theta)).sum() - xn, 0.9 * xn, 1.1 * xn, xtol=1e-10))


def cut_start(name, xn, p):
    x, P = start(name, xn)
    longer = np.cumsum(P[::-1])[::-1] - P
    beyond = np.cumsum(longer[::-1])[::-1] - longer
    return x, (1 - p) ** (x - 1) * (P + 2 * p * longer + p * p * beyond)


@computes("scission.Mn", "scission.Mw", "scission.Mv", "scission.usual")
def scission(quantity, name, xn, p):
    xn, p = int(xn), float(p)
    Mn, Mw, Mv = (44.05 * x for x in averages(*cut_start(name, xn, p), 0.76))
    if quantity == "scission.usual":
        return 100 * (usual(0.76, Mv / 44.05, averages(*start(name, xn), 0.76)[2]) / p - 1)
    return {"scission.Mn": Mn, "scission.Mw": Mw, "scission.Mv": Mv}[quantity]


@computes("schulz-zimm.r")
def schulz_zimm_r(quantity, k, a):
    k, a = float(k), float(a)
    return (special.gamma(k + 1 + a) / special.gamma(k + 1)) ** (1 / a) / k


# ---- bath and liquid ----

@computes("bath.mean", "bath.middle", "bath.ends", "bath.liquid", "bath.middle.liquid")
def bath(quantity, T, tau, lag):
    """Standard deviation of a functional of the path in units of the bath's, by a double integral over its covariance.

    x has the covariance exp(-|s|/tau); the liquid l is x smoothed by exp(-s/lag)/lag, so that its mean is x weighted over
    the past, too: every functional is a weight on x, given here on a grid in the middle of equal cells.
    """
    T, tau, lag = map(float, (T, tau, lag))
    cells, past = 6000, 40 * lag  # cells of the run; as fine before it
    h = T / cells
    s = (np.arange(int(past / h) + cells) + 0.5) * h - int(past / h) * h
    inside = s > 0
    mean = np.where(inside, h / T, 0.0)
    # mean of l over the run: a pulse of x at s is answered by (1/lag) exp(-(t - s)/lag) at t
    liquid = h / T * np.where(inside, -np.expm1(-(T - s) / lag), np.exp(s / lag) * -np.expm1(-T / lag))
    points_of = {"bath.middle": [(0.5 * T, 1.0)], "bath.middle.liquid": [(0.5 * T, 1.0)], "bath.ends": [(0.0, 0.5), (T, 0.5)]}
    weight = {"bath.mean": mean, "bath.middle": -mean, "bath.ends": -mean, "bath.liquid": liquid - mean,
              "bath.middle.liquid": -liquid}[quantity]
    spikes = points_of.get(quantity, [])
    # sum_ij w_i w_j exp(-|s_i - s_j|/tau) by a forward recursion
    decay, carried, variance = math.exp(-h / tau), 0.0, 0.0
    for w in weight:
        carried *= decay
        variance += w * w + 2 * w * carried
        carried += w
    for at, share in spikes:
        variance += 2 * share * np.sum(weight * np.exp(-abs(s - at) / tau))
        variance += sum(share * other * math.exp(-abs(at - place) / tau) for place, other in spikes)
    return math.sqrt(variance)


@computes("bath.average")
def bath_average(quantity, T, tau):
    x = float(T) / float(tau)
    return math.sqrt(2 * (x + math.expm1(-x))) / x


# ---- straight lines ----

def fit(x, y):
    """Intercept, slope, their standard errors, correlation, residual standard deviation."""
    A = np.vander(x - x.mean(), 2, increasing=True)
    middle, slope = np.linalg.lstsq(A, y, rcond=None)[0]
    s = math.sqrt(((y - A @ [middle, slope]) ** 2).sum() / (len(x) - 2))
    sxx, mean = ((x - x.mean()) ** 2).sum(), x.mean()
    return (middle - slope * mean, slope, s * math.sqrt(1 / len(x) + mean**2 / sxx), s / math.sqrt(sxx),
            -mean / math.sqrt(sxx / len(x) + mean**2), s)


PARTS = ("intercept", "slope", "intercept.u", "slope.u", "correlation", "s")


@computes(*(f"h3.{part}" for part in PARTS))
def gum_h3(quantity):
    x, y = points("line", "h3.point")
    return fit(x - 20, y)[PARTS.index(quantity[3:])]


@computes("h3.at30", "h3.at30.u", "h3.at30.forgotten")
def gum_h3_at_30(quantity):
    x, y = points("line", "h3.point")
    b, m, ub, um, correlation, _ = fit(x - 20, y)
    forgotten = math.hypot(ub, 10 * um)
    return {"h3.at30": b + 10 * m, "h3.at30.forgotten": forgotten,
            "h3.at30.u": math.sqrt(forgotten**2 + 20 * correlation * ub * um)}[quantity]


@computes(*(f"norris.{part}" for part in PARTS))
def norris(quantity):
    return fit(*points("line", "norris.point"))[PARTS.index(quantity[7:])]


# ---- reductions ----

def lines(c, relative, weight):
    """[eta] by each extrapolation, and the constants of Huggins and Kraemer."""
    reduced, inherent = (relative - 1) / c, np.log(relative) / c
    root = np.sqrt(weight)

    def line(y):
        return np.linalg.lstsq(np.stack([root, root * c], 1), root * y, rcond=None)[0]
    huggins, kraemer, martin = line(reduced), line(inherent), line(np.log(reduced))
    zero = np.zeros_like(c)
    both = np.concatenate([np.stack([root, root * c, zero], 1), np.stack([root, zero, root * c], 1)])
    common = np.linalg.lstsq(both, np.concatenate([root * reduced, root * inherent]), rcond=None)[0]
    return {"huggins": huggins[0], "huggins.k": huggins[1] / huggins[0]**2, "kraemer": kraemer[0],
            "kraemer.k": kraemer[1] / kraemer[0]**2, "martin": math.exp(martin[0]), "common-intercept": common[0],
            "single-point": np.mean(np.sqrt(2 * (relative - 1 - np.log(relative))) / c)}


NAMES = ("huggins", "huggins.k", "kraemer", "kraemer.k", "martin", "common-intercept", "single-point")


@computes(*(f"{which}.{name}{weight}" for which in ("pmma", "styrene", "benzene") for name in NAMES for weight in ("", ".c2")))
def worked(quantity):
    which, _, name = quantity.partition(".")
    c, y = points("reduction", f"{which}.point")
    relative = {"pmma": y, "benzene": 1 + c * y, "styrene": y / 65.8}[which]
    squared = name.endswith(".c2")
    return lines(c, relative, c**2 if squared else np.ones_like(c))[name[:-3] if squared else name]


@computes("sperling")
def sperling(quantity, t0, t, c, K, a):
    """c in g per 100 mL, K in mL/g."""
    return (((float(t) / float(t0) - 1) / (float(c) / 100)) / float(K)) ** (1 / float(a))


@computes("bias")
def bias(quantity, world, k, X, line):
    k, y = float(k), float(X) * np.arange(1, 6) / 5
    specific = y * np.exp(k * y) if world == "martin" else y + k * y * y
    return 100 * (lines(y, 1 + specific, np.ones(5))[line] - 1)


def series(top, k=0.45, lowest=0.2, levels=5):
    """Coil volumes of a series of the base case in a Martin world."""
    y = optimize.brentq(lambda y: y * math.exp(k * y) - (top - 1), 0, 3, xtol=1e-15)
    return y * (lowest + (1 - lowest) * np.arange(levels) / (levels - 1))


def martin_of(eta, top, change):
    """[eta] found by martin when `change(c, relative)` is what is measured."""
    y = series(top)
    c = y / eta
    return lines(c, change(c, 1 + y * np.exp(0.45 * y)), np.ones_like(y))["martin"]


@computes("effect.offset", "effect.density", "effect.density.eta")
def series_effect(quantity, amount):
    """Percent of delta (dL/g of [eta]') when the times of the solutions are off, or density is neglected (amount: v, mL/g)."""
    amount, rho0 = float(amount), density(298.15) / 1000
    if quantity == "effect.offset":
        def change(c, relative):
            return relative * (1 + amount / 100)
    else:
        def change(c, relative):
            return relative / (1 + c / 100 * (1 - amount * rho0) / rho0)
    true = base("base.eta"), base("base.eta.cut")
    found = [martin_of(eta, top, change) for eta, top in zip(true, (1.8, 1.4))]
    if quantity == "effect.density.eta":
        return true[1] - found[1]
    return 100 * (delta_of(2e-4, 0.76, *found) / delta_of(2e-4, 0.76, *true) - 1)


# ---- error bars of an intercept ----

def weighted(A, y, weight):
    """Coefficients, standard errors and degrees of freedom of weighted least squares, the variance from the residuals."""
    normal = np.linalg.inv(A.T @ (weight[:, None] * A))
    b = normal @ (A.T @ (weight * y))
    freedom = len(y) - A.shape[1]
    return b, np.sqrt((weight * (y - A @ b) ** 2).sum() / freedom * np.diag(normal)), freedom


def error_bar(c, relative, extrapolation, weight):
    reduced, A = (relative - 1) / c, np.stack([np.ones_like(c), c], 1)
    if extrapolation == "huggins":
        _, u, freedom = weighted(A, reduced, weight)
        return u[0], freedom
    inherent = np.log(relative) / c
    if extrapolation == "single-point":
        value = np.sqrt(2 * (relative - 1 - np.log(relative))) / c
        return value.std(ddof=1) / math.sqrt(len(c)), len(c) - 1
    if extrapolation == "common-intercept":
        zero, one = np.zeros_like(c), np.ones_like(c)
        A = np.concatenate([np.stack([one, c, zero], 1), np.stack([one, zero, c], 1)])
        _, u, freedom = weighted(A, np.concatenate([reduced, inherent]), np.concatenate([weight, weight]))
        return u[0], freedom
    b, u, freedom = weighted(A, inherent if extrapolation == "kraemer" else np.log(reduced), weight)
    return (math.exp(b[0]) * u[0] if extrapolation == "martin" else u[0]), freedom


@computes("claim.u", "claim.freedom")
def claim(quantity, which, extrapolation, weighting):
    if which == "h3":
        t, b = points("line", "h3.point")
        c, relative = t - 20, 1 + (t - 20) * b
    else:
        c, relative = points("reduction", f"{which}.point")
    weight = c**2 if weighting == "c-squared" else np.ones_like(c)
    return error_bar(c, relative, extrapolation, weight)[quantity == "claim.freedom"]


@computes("claim.half")
def claim_half(quantity, u, freedom):
    """Half-width of the 95 % interval: t u."""
    return stats.t.ppf(0.975, float(freedom)) * float(u)


# ---- a whole notebook ----

NOTEBOOK = {"C": 0.003, "T": 298.15, "K": 2e-4, "a": 0.76, "v": 0.765, "agreement": 0.002, "h": 0.985, "X": 0.98,
            "intact": (0.2, 0.4, 0.6), "cleaved": (0.8, 1.6, 2.4), "runs": 3}


def best(times, n):
    times = sorted(times)
    spans = [round(times[i + n - 1] - times[i], 9) for i in range(len(times) - n + 1)]
    i = spans.index(min(spans))
    return times[i:i + n]


@computes("delta", "eta.intact", "eta.cleaved")
def notebook(quantity, extrapolation, weighting, density_word, kinetic_word, statistics, combine):
    n, rho_w = NOTEBOOK, density(NOTEBOOK["T"]) / 1000
    nu = sr6(n["T"]) / density(n["T"])
    E = kinetic(5.6, 90, 0.47, n["C"]) if kinetic_word == "corrected" else 0.0
    kept = {}
    for row in tables["notebook"]:
        if row.quantity == "run":
            solution, day, level, filling, temperature = row.arguments
            T = float(temperature) + 273.15
            at_set = float(row.value) * nu / (sr6(T) / density(T))
            kept.setdefault((solution, int(day), int(level), int(filling)), []).append(at_set)
    middle = np.mean if combine == "mean" else np.median
    kept = {key: middle(best(times, n["runs"])) for key, times in kept.items()}
    water = {day: np.mean([t for key, t in kept.items() if key[0] == "water" and key[1] == day]) for day in (0, 1)}
    found = {}
    for solution in ("intact", "cleaved"):
        conc, relative = np.array(n[solution]), []
        for level, c in enumerate(conc):
            fillings = []
            for (what, day, at, _), t in kept.items():
                if what == solution and at == level:
                    t0 = water[day]
                    C = (nu + E / t0**2) / t0
                    ratio = 1 + c / 100 * (1 - n["v"] * rho_w) / rho_w if density_word == "partial-volume" else 1.0
                    fillings.append((C * t - E / t**2) * ratio / (C * t0 - E / t0**2))
            relative.append(np.mean(fillings))
        found[solution] = lines(conc, np.array(relative), conc**2 if weighting == "c-squared" else np.ones_like(conc))[extrapolation]
    if quantity != "delta":
        return found[quantity[4:]]
    unit, chance = n["h"] * 44.05 + (1 - n["h"]) * 86.09, n["X"] * n["h"] ** 2
    xv, xv_cut = ((found[s] / n["K"]) ** (1 / n["a"]) / unit for s in ("intact", "cleaved"))
    return usual(n["a"], xv_cut, xv) / chance if statistics == "continuous" else discrete(xv, xv_cut, True, chance)


# ---- all rows ----

def verdict(row):
    """What is wrong with a row, or nothing."""
    if row.reason not in REASONS:
        return f"'{row.reason}' is no reason"
    if len(row.source.split()) < 2 and row.source not in ("computed", "definition"):
        return "no source"
    if row.quantity in DATA or row.quantity in PRINTED:
        return None
    if row.quantity not in COMPUTE:
        return "nothing computes it"
    try:
        got = COMPUTE[row.quantity](row.quantity, *row.arguments)
    except (ValueError, TypeError, KeyError, StopIteration) as error:
        return f"cannot be computed: {error}"
    if row.reason == "TEXT":
        return None if got == row.value else f"is {got}"
    return None if abs(got - float(row.value)) <= row.tolerance else f"is {got:.15g}, not {row.value} +- {row.tolerance:.2g}"


def main():
    passed, failed, seen = 0, 0, set()
    for path in sorted(FOLDER.glob("*.tsv")):
        lines_of = path.read_text(encoding="ascii").splitlines()
        tables[path.stem] = [Row(path.name, i + 1, line) for i, line in enumerate(lines_of) if not line.startswith("#")]
    for table in tables.values():
        for row in table:
            seen.add(row.quantity)
            wrong = verdict(row)
            passed, failed = passed + (wrong is None), failed + (wrong is not None)
            if wrong:
                print(f"{row.place}: {row.quantity} {' '.join(row.arguments)}: {wrong}")
    for quantity in sorted((DATA | PRINTED) - seen):
        failed += 1
        print(f"{quantity} stands in no table")
    print(f"{passed} passed, {failed} failed")
    return 1 if failed or not passed else 0


if __name__ == "__main__":
    sys.exit(main())
