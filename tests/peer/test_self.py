#!/usr/bin/python3
"""Checks of the peer on its own: tabulated values, limits with exact answers, sums by brute force.

Each tolerance has its reason beside it: TABLE (half a unit of the last digit printed), ROUND (a few
eps times the condition), SERIES (a truncation bound), STAT (standard errors, fixed seed).
The last line is `N passed, N failed`; status 1 when any failed.
"""

import copy
import math
import sys
import tempfile
from types import SimpleNamespace

import numpy as np
from scipy.special import gamma

import peer

RESULTS = []


def check(name, value, expected, tolerance):
    """One comparison, |value - expected| <= tolerance."""
    good = abs(value - expected) <= tolerance
    RESULTS.append(good)
    print(f"{'ok  ' if good else 'FAIL'} {name:64} {value:.12g} ({expected:.12g} +- {tolerance:.1g})")


DEFAULTS = {
    "question": {
        "expect": "1.5 %", "against": "1.3 %", "within": "0.15 %", "confidence": "95 %",
        "power": "90 %", "sides": "one", "against_is": "stated",
    },
    "polymer": {
        "material": "pvoh-water-25C", "K": "2.0e-4 dL/g", "a": 0.76, "eta_u": "5 %", "a_u": 0.02,
        "valid_from": "20 kg/mol", "valid_to": "200 kg/mol", "fitted_at": "25 degC",
        "calibrated_by": "viscosity", "repeat_unit": "44.05 g/mol", "ester_unit": "86.09 g/mol",
        "hydrolysis": "98.5 %", "hydrolysis_u": "0.5 %", "specific_volume": "0.765 mL/g",
        "temperature_coefficient": "0 1/K", "law": "martin", "interaction": 0.45,
        "interaction_cleaved": 0.45, "interaction_u": 0.05,
    },
    "cleavage": {
        "neighbours": "excluded", "conversion": "98 %", "conversion_u": "1 %", "nonspecific": "0.005 %",
        "reagent_viscosity": "0.25 %", "reagent_density": "0.20 %", "diluent": "water",
        "reference": "water", "correct_conversion": "yes",
    },
    "solutions": {
        "dry_content_u": "0.5 %", "stock": "separate", "balance_u": "0.3 mg", "glass": "A",
        "stock_volume": "fit", "stock_tolerance": "by-class", "level_volume": "fit",
        "level_tolerance": "by-class", "delivery_tolerance": "0.03 mL", "delivery_u": "0.01 mL",
    },
    "bench": {
        "like": "research", "temperature": "25 degC", "room": "22 degC", "equilibrate": "10 min",
        "lag_time": "1 min", "clean_and_fill": "8 min", "add_and_mix": "3 min", "reset": "60 s",
        "rinse": "3 mL", "carry_over": "0.1 %", "filling_u": "0.05 %", "charge_u": "0.03 mL",
        "tilt_u": "0.5 degree", "kinetic_u": "15 %", "bubble_chance": "1 %", "bubble_delay": "1 %",
        "combine": "mean", "agreement": "0.2 %", "spare_runs": 2, "water_every_day": "yes",
        "working_day": "7 h",
    },
    "kit": {
        "grades": [{
            "name": "middle", "molar_mass": "85 kg/mol", "average": "viscosity",
            "distribution": "most-probable", "price_per_gram": 0,
        }],
        "tubes": [{
            "name": "suspended-0c", "type": "suspended-level", "constant": "0.003 mm2/s2",
            "ends": "flared", "bulb_volume": "5.6 mL", "bore": "0.47 mm", "length": "90 mm",
            "neck_bore": "3 mm", "reservoir_bore": "25 mm", "head": "130 mm", "offset": "0 mm",
            "charge": "15 mL", "capacity": "60 mL", "solution_offset": "0 %",
            "solution_offset_u": "0.02 %", "price": 0,
        }],
        "baths": [{
            "name": "circulator", "fluctuation": "0.02 K", "correlation_time": "5 min",
            "drift_u": "0.01 K/h", "day_u": "0.01 K", "gradient_u": "0.01 K", "price": 0,
        }],
        "thermometers": [{
            "name": "probe", "calibration_u": "0.05 K", "reading_u": "0.01 K", "resolution": "0.01 K",
            "reads": "middle", "price": 0,
        }],
        "timers": [{
            "name": "by-hand", "hand_u": "0.07 s", "resolution": "0.01 s", "meniscus_u": "0.1 mm",
            "price": 0,
        }],
    },
    "plan": {
        "material": ["pvoh-water-25C"], "grade": ["middle"], "tube": ["suspended-0c"],
        "bath": ["circulator"], "thermometer": ["probe"], "temperature_record": ["each-run"],
        "timer": ["by-hand"], "top": [1.8], "top_cleaved": [1.4], "lowest": [0.4], "levels": [4],
        "levels_cleaved": ["same"], "dilution": ["flasks"], "preparations": [1], "fillings": [2],
        "fillings_cleaved": ["same"], "runs": [3], "water_fillings": [2], "water_runs": [3],
        "order": ["sequential"], "extrapolation": ["martin"], "weighting": ["equal"],
        "density": ["partial-volume"], "kinetic_energy": ["corrected"],
        "chain_statistics": ["discrete"],
    },
    "cost": {
        "least": "hours", "currency": "EUR", "hour": 0, "owned": [], "at_most": {},
        "weigh_and_dissolve": "1.5 h", "dilution": "6 min", "cleavage": "1 h",
        "dissolving_wait": "3 h", "cleavage_wait": "12 h",
    },
    "run": {"studies": 20000, "seed": 1},
}  # fmt: skip

ENTRY_OF = {"grade": "grades", "tube": "tubes", "bath": "baths", "thermometer": "thermometers", "timer": "timers"}


def resolved(**changes):
    """The default scenario with changes such as bench__room='25 degC', tube__B='1 mm2'."""
    document = copy.deepcopy(DEFAULTS)
    for path, value in changes.items():
        section, key = path.split("__")
        if section in ENTRY_OF:
            document["kit"][ENTRY_OF[section]][0][key] = value
        else:
            document[section][key] = [value] if section == "plan" else value
    return document


QUIET = {  # every spread, chance and resolution zero; full conversion and hydrolysis; no reagent
    "polymer__eta_u": "0 %", "polymer__a_u": 0, "polymer__hydrolysis": "100 %",
    "polymer__hydrolysis_u": "0 %", "polymer__interaction_u": 0, "cleavage__conversion": "100 %",
    "cleavage__conversion_u": "0 %", "cleavage__nonspecific": "0 %",
    "cleavage__reagent_viscosity": "0 %", "cleavage__reagent_density": "0 %",
    "solutions__dry_content_u": "0 %", "solutions__balance_u": "0 mg",
    "solutions__stock_tolerance": "0 mL", "solutions__level_tolerance": "0 mL",
    "solutions__delivery_tolerance": "0 mL", "solutions__delivery_u": "0 mL",
    "bench__room": "25 degC", "bench__carry_over": "0 %", "bench__filling_u": "0 %",
    "bench__charge_u": "0 mL", "bench__tilt_u": "0 degree", "bench__kinetic_u": "0 %",
    "bench__bubble_chance": "0 %", "bath__fluctuation": "0 K", "bath__drift_u": "0 K/h",
    "bath__day_u": "0 K", "bath__gradient_u": "0 K", "thermometer__calibration_u": "0 K",
    "thermometer__reading_u": "0 K", "thermometer__resolution": "0 K", "timer__hand_u": "0 s",
    "timer__resolution": "0 s", "timer__meniscus_u": "0 mm", "tube__solution_offset_u": "0 %",
    "grade__average": "number", "grade__molar_mass": "44.05 kg/mol",
}  # fmt: skip


def quiet(**changes):
    """The estimate of a study in which nothing is random, apart from the changes."""
    s = peer.load(resolved(**{**QUIET, **changes}))
    return float(peer.simulate(s, [s.question.expect], 1, 1).delta[0, 0])


def check_units():
    for text, value in (
        ("2.0e-4 dL/g", 2e-5), ("25 degC", 298.15), ("0.01 K/h", 0.01 / 3600), ("95 mm2 s", 95e-6),
        ("0.003 mm2/s2", 3e-9), ("0.5 degree", math.pi / 360), ("0.2 mL/g", 2e-4), ("3 ppm", 3e-6),
        ("-0.002 1/K", -0.002), ("1.5 %", 0.015), ("44.05 g/mol", 0.04405), (7, 7.0), ("0.45", 0.45),
    ):  # fmt: skip
        check(f"unit: {text}", peer.quantity(text), value, 1e-14 * abs(value))  # ROUND


def check_water_and_tube():
    for T, value, digit in ((298.15, 889.996774, 5e-7), (288.15, 1137.548, 5e-4), (313.15, 652.733, 5e-4)):
        check(f"water: viscosity at {T} K", peer.water_viscosity(T) * 1e6, value, digit)  # TABLE
    for t, value in ((10, 999.702702), (20, 998.206746), (25, 997.047022), (40, 992.215209)):
        check(f"water: density at {t} degC", peer.water_density(t + 273.15), value, 5e-7)  # TABLE

    tubes = (  # constant, bore, bulb, length, time of water, kinetic share in %
        (0.001, 0.36, 5.6, 90, 893.1, 0.06), (0.003, 0.47, 5.6, 90, 298.3, 0.26),
        (0.005, 0.53, 5.6, 90, 179.5, 0.52), (0.01, 0.63, 5.6, 90, 90.5, 1.33),
        (0.002, 0.30, 1.6, 73, 446.5, 0.03), (0.004, 0.44, 3.1, 73, 223.6, 0.21),
        (0.008, 0.54, 3.1, 73, 112.2, 0.53), (0.015, 0.63, 3.1, 73, 60.25, 1.25),
    )  # fmt: skip
    nu = peer.water_kinematic(298.15)
    for constant, bore, bulb, length, seconds, share in tubes:
        tube = SimpleNamespace(
            ends="flared", constant=constant * 1e-6, bore=bore * 1e-3, bulb_volume=bulb * 1e-6, length=length * 1e-3
        )
        E = peer.kinetic_coefficient(tube)
        t = float(peer.efflux_time(tube, tube.constant, E, np.array(nu)))
        check(f"tube {constant}: time of water", t, seconds, 0.05)  # TABLE
        check(f"tube {constant}: kinetic term in %", 100 * peer.kinetic_term(tube, E, t) / nu, share, 0.005)  # TABLE
        residual = tube.constant * t - peer.kinetic_term(tube, E, t) - nu
        check(f"tube {constant}: forward problem solved", residual / nu, 0.0, 1e-15)  # ROUND
    tube = SimpleNamespace(ends="flared", constant=1e-8, bore=0.63e-3, bulb_volume=5.6e-6, length=0.09)
    check("tube: E in mm2 s", peer.kinetic_coefficient(tube) * 1e6, 97.4, 0.05)  # TABLE
    tube.ends = "square"
    check("tube: B in mm2", peer.kinetic_coefficient(tube) * 1e6, 1.1 * 5600 / (8 * math.pi * 90), 1e-12)  # ROUND
    t = peer.efflux_time(tube, 1e-8, 2.7e-6, nu)
    check("tube: square ends solved", (1e-8 * t - 2.7e-6 / t - nu) / nu, 0.0, 1e-15)  # ROUND

    level = SimpleNamespace(type="suspended-level", offset=0.0, head=0.13, reservoir_bore=0.025)
    for degrees, percent, digit in ((1, -0.0152, 5e-5), (2, -0.061, 5e-4), (5, -0.381, 5e-4)):
        factor = peer.head_factor(level, math.radians(degrees), 1e-6)
        check(f"tube: tilt of {degrees} degrees in %", 100 * (factor - 1), percent, digit)  # TABLE
    level.offset = 0.026
    slope = peer.head_factor(level, math.radians(1), 0.0) - math.cos(math.radians(1))
    check("tube: offset/head 0.2, per degree in %", 100 * slope, 0.35, 0.005)  # TABLE


def cleaved_moments(numbers, delta, cut, nonspecific, neighbours, powers):
    """Sums over the cleaved chains, length by length, from 2 x 2 matrices along the chain.

    numbers: the number shares of N = 1, 2, ... before.
    """
    longest = numbers.size + 1
    follow = delta if neighbours == "independent" else delta / (1.0 - delta)
    after = delta if neighbours == "independent" else 0.0
    move = np.array([[1.0 - follow, follow], [1.0 - after, after]])
    chance = np.array([nonspecific, cut])
    share = np.array([1.0 - delta, delta])
    S, f, g = np.empty(longest), np.empty(longest + 1), np.empty(longest + 1)
    S[0] = 1.0
    ahead_f, ahead_g = share, (share * chance) @ move  # of the next linkage, all before it uncut
    for x in range(1, longest):
        f[x], g[x] = ahead_f @ chance, ahead_g @ chance
        S[x] = (ahead_f * (1.0 - chance)).sum()
        ahead_f, ahead_g = (ahead_f * (1.0 - chance)) @ move, (ahead_g * (1.0 - chance)) @ move
    x = np.arange(1, longest)
    at_least = np.append(np.cumsum(numbers[::-1])[::-1], [0.0, 0.0])  # share of N >= 1, 2, ...
    longer = at_least[1 : longest]
    # the sum of P(N) (N - x - 1) over N > x
    units_left = np.append(np.cumsum((numbers * x)[::-1])[::-1], 0.0)[1:longest]
    inside = units_left - longer * (x + 1.0)
    chains = numbers * S[x - 1] + 2.0 * f[x] * longer + g[x] * inside
    return [float(np.sum(chains * x**power)) for power in powers]


def check_scission():
    a, unit = 0.76, 44.05
    rows = (  # xn, p, Mn', Mw', Mv', usual reduction/p - 1 in %
        (500, 0.005, 6301.860, 12559.670, 11863.081, 0.250),
        (500, 0.020, 2005.920, 3967.790, 3747.770, 1.008),
        (1000, 0.010, 4008.189, 7972.329, 7530.179, 0.502),
        (2000, 0.015, 2843.311, 5642.573, 5329.649, 0.755),
    )
    for xn, p, Mn, Mw, Mv, excess in rows:
        chains = peer.MostProbable(xn)
        scission = (p, 1.0, 0.0, "independent")
        mixture = chains.cleaved_mixture(*scission)
        name = f"scission {xn}, {p}: "
        check(name + "Mn'", unit / sum(w * r for w, r in mixture), Mn, 5e-4)  # TABLE
        check(name + "Mw'", unit * chains.cleaved_length(1.0, *scission), Mw, 5e-4)  # TABLE
        cleaved = unit * chains.cleaved_length(a, *scission)
        check(name + "Mv'", cleaved, Mv, 5e-4)  # TABLE
        usual = peer.continuous_fraction(unit * chains.viscosity_length(a), cleaved, unit, a)
        check(name + "usual reduction in %", 100 * (usual / p - 1), excess, 5e-4)  # TABLE

    chains = peer.MostProbable(1000)
    check("base case: Mv", unit * chains.viscosity_length(a), 83172.0596475, 5e-8)  # TABLE
    for neighbours, length in (("excluded", 115.60510521868), ("independent", 117.23410670694)):
        found = chains.cleaved_length(a, 0.015, 1.0, 0.0, neighbours)
        check(f"base case: xv' {neighbours}", found, length, 1e-10)  # TABLE, ROUND
        number = 1 / sum(w * r for w, r in chains.cleaved_mixture(0.015, 1.0, 0.0, neighbours))
        check(f"base case: 1/xn' {neighbours}", 1 / number, 0.001 + 0.015 * 0.999, 1e-14)  # ROUND

    for delta, cut, nonspecific, neighbours in (
        (0.015, 0.95, 5e-5, "excluded"), (0.15, 0.6, 1e-3, "excluded"), (0.02, 0.95, 2e-4, "independent"),
    ):  # fmt: skip
        chains = peer.MostProbable(300)
        scission = (delta, cut, nonspecific, neighbours)
        geometric = (1 - 1 / 300) ** np.arange(45 * 300) / 300
        mass, moment = cleaved_moments(geometric, *scission, (1.0, 1.0 + a))
        name = f"sums {delta}, {cut}, {nonspecific}, {neighbours}: "
        check(name + "mass", mass / 300, 1.0, 1e-11)  # SERIES
        check(name + "xv'", chains.cleaved_length(a, *scission), (moment / mass) ** (1 / a), 1e-9)  # SERIES

    for average, power in (("number", None), ("weight", 1.0), ("viscosity", a)):
        chains = peer.MostProbable.of_average(average, 777.0, a)
        found = 1 / chains.q if power is None else chains.viscosity_length(power)
        check(f"chains: {average} average met", found, 777.0, 1e-8)  # ROUND
    low, high = peer.geometric_moment(np.array([0.5 - 1e-12, 0.5 + 1e-12]), a)
    check("chains: series meets sum at 1/2", low / high, 1.0, 1e-10)  # SERIES

    fractions = np.array([-0.0008, -0.0002, 0.0, 0.0003, 0.004, 0.015, 0.1, 0.3, 0.49])
    for cut, neighbours in ((1.0, "excluded"), (0.95, "excluded"), (0.76, "excluded"), (0.9, "independent")):
        chains = peer.MostProbable(1000)
        intact = np.full(fractions.size, chains.viscosity_length(a))
        cleaved = chains.cleaved_length(a, fractions, cut, 0.0, neighbours)
        found = peer.discrete_fraction(intact, cleaved, a, cut, neighbours)
        worst = np.max(np.abs(found - fractions))
        check(f"discrete: inverse for cut {cut}, {neighbours}", worst, 0.0, 1e-11)  # ROUND
        none = peer.discrete_fraction(intact, np.full(9, 1.2), a, cut, neighbours)
        check(f"discrete: no answer for cut {cut}, {neighbours}", np.isnan(none).sum(), 9, 0)


def grade_of(distribution, dispersity=None, average="number"):
    return SimpleNamespace(distribution=distribution, dispersity=dispersity, average=average)


GRADES = (  # with the average that is stated
    grade_of("schulz-zimm", 1.5), grade_of("schulz-zimm", 1.1, "weight"), grade_of("schulz-zimm", 3.0, "viscosity"),
    grade_of("log-normal", 1.5), grade_of("log-normal", 1.2, "weight"), grade_of("log-normal", 2.0, "viscosity"),
    grade_of("uniform"),
)  # fmt: skip
RULES = ((0.015, 0.95, 5e-5, "excluded"), (0.15, 0.6, 1e-3, "excluded"), (0.02, 0.95, 2e-4, "independent"))


def check_chains():
    a, unit = 0.76, 44.05
    rows = (  # distribution, xn, p, Mn', Mw', Mv', usual reduction/p - 1 in %
        (grade_of("schulz-zimm", 1.5), 500, 0.010, 3676.962, 7162.948, 6779.751, -3.444),
        (grade_of("schulz-zimm", 1.5), 1000, 0.015, 2755.709, 5448.868, 5148.662, -0.980),
        (grade_of("uniform"), 1000, 0.015, 2755.708, 5443.601, 5144.641, -4.762),
        (grade_of("uniform"), 2000, 0.005, 8012.733, 15822.838, 14965.405, -7.683),
    )
    for grade, xn, p, Mn, Mw, Mv, excess in rows:
        chains = peer.chains_of(grade, xn, a)
        scission = (p, 1.0, 0.0, "independent")
        name = f"scission of {grade.distribution} {xn}, {p}: "
        found = unit * chains.mean_length / chains.cleaved_sum(0.0, *scission)
        # the table took xn itself as the parameter of Schulz-Zimm: 2e-8 of Mn' (computed) beside the digits
        check(name + "Mn'", found, Mn, 5e-4 + 2.2e-8 * Mn)  # TABLE
        check(name + "Mw'", unit * chains.cleaved_length(1.0, *scission), Mw, 5e-4)  # TABLE
        cleaved = unit * float(chains.cleaved_length(a, *scission))
        check(name + "Mv'", cleaved, Mv, 5e-4)  # TABLE
        usual = peer.continuous_fraction(unit * chains.viscosity_length(a), cleaved, unit, a)
        check(name + "usual reduction in %", 100 * (usual / p - 1), excess, 5e-4)  # TABLE

    long = peer.chains_of(grade_of("schulz-zimm", 1.5), 20000, a)
    check("chains: r of Schulz-Zimm, k = 2", long.viscosity_length(a) / long.mean_length, 1.443013, 5e-7)  # TABLE
    for k in (2.0, 8.0):  # long chains: the ratio of gamma functions
        long = peer.chains_of(grade_of("schulz-zimm", 1 + 1 / k), 20000, a)
        exact = (gamma(k + 1 + a) / gamma(k + 1)) ** (1 / a) / k
        found = long.viscosity_length(a) / long.mean_length
        check(f"chains: r of Schulz-Zimm, k = {k}", found, exact, 1e-7)  # SERIES
        found = long.viscosity_length(1) / long.mean_length
        check(f"chains: dispersity of Schulz-Zimm, k = {k}", found, 1 + 1 / k, 1e-7)  # SERIES
    long = peer.chains_of(grade_of("log-normal", 1.8), 500, a)
    for power in (a, 1.0):
        exact = 1.8 ** ((1 + power) / 2)
        found = long.viscosity_length(power) / long.mean_length
        check(f"chains: r({power}) of log-normal, ln D the variance", found, exact, 1e-7)  # SERIES
    single = peer.chains_of(grade_of("schulz-zimm", 2.0), 700, a)
    most = peer.MostProbable(700)
    found, exact = single.viscosity_length(a), most.viscosity_length(a)
    check("chains: Schulz-Zimm of 2 is most-probable", found, exact, 1e-9)  # ROUND
    for neighbours in ("excluded", "independent"):
        rule = (0.015, 0.95, 5e-5, neighbours)
        found = float(single.cleaved_length(a, *rule))
        check(f"chains: and so when cut, {neighbours}", found, float(most.cleaved_length(a, *rule)), 1e-9)  # ROUND
    for length, whole in ((1930.4, 1930), (1930.6, 1931)):
        found = peer.chains_of(grade_of("uniform"), length, a).mean_length
        check(f"chains: one length, the nearest to {length}", found, whole, 0)

    rng = np.random.default_rng(12)
    for grade in GRADES:
        name = f"{grade.distribution} {grade.dispersity or ''} by {grade.average}: "
        chains = peer.chains_of(grade, 300, a)
        check(name + "average met", chains.average(grade.average, a), 300, 1e-9)  # ROUND
        whole, chains = chains, peer.WholeLengths(chains.share[:6000])  # the longest left out: sums in Python
        mean = chains.mean_length
        for rule in RULES:
            number, mass, moment, second = cleaved_moments(chains.share, *rule, (0.0, 1.0, 1 + a, 2.0))
            delta, cut, nonspecific, neighbours = rule
            p = delta * cut + (1 - delta) * nonspecific
            here = f"{name}{delta}, {neighbours}, "
            check(here + "mass", mass / mean, 1.0, 1e-10)  # SERIES
            check(here + "number", chains.cleaved_sum(0.0, *rule) / number, 1.0, 1e-11)  # ROUND
            check(here + "xv'", chains.cleaved_length(a, *rule) / (moment / mass) ** (1 / a), 1.0, 1e-10)  # ROUND
            check(here + "1/xn'", number / mass, 1 / mean + p * (1 - 1 / mean), 1e-12)  # ROUND
            if neighbours == "independent":
                s = 1 - p
                G = float(chains.share @ s**chains.x)
                exact = (1 + s) / (1 - s) - 2 * s * (1 - G) / (mean * (1 - s) ** 2)
                check(here + "xw', closed form", chains.cleaved_length(1.0, *rule) / exact, 1.0, 1e-11)  # ROUND
                check(here + "xw', sums", second / mass / exact, 1.0, 1e-10)  # SERIES
            walked, error = walk(chains, rule, a, rng)
            check(here + "xv'^a, chains cut one by one", walked / (moment / mean), 1.0, 4.5 * error)  # STAT

        # the table over the chance of a cut against the sums, over more than a study can meet
        chains = whole
        cuts = rng.random(60) ** 3 * 0.2 + 1e-5
        table = chains.sums_of_power(1 - cuts, 1 + a)
        direct = np.array([chains.sum_of_power(1 - p, 1 + a) for p in cuts])
        check(name + "table, 1e-5 to a fifth", np.max(np.abs(table / direct - 1)), 0.0, 1e-7)  # SERIES
        cut = 0.5 + 0.5 * rng.random(40)
        table = chains.cleaved_length(a, 0.015, cut, 5e-5, "excluded")
        direct = np.array([float(chains.cleaved_length(a, 0.015, one, 5e-5, "excluded")) for one in cut])
        check(name + "table in xv' of a study", np.max(np.abs(table / direct - 1)), 0.0, 1e-12)  # SERIES


def walk(chains, rule, a, rng):
    """The sum of x^(1+a) per unit after cutting 20,000 drawn chains, linkage by linkage.

    Returns it and its relative standard error (over the chains; ratio of sums).
    """
    delta, cut, nonspecific, neighbours = rule
    lengths = rng.choice(chains.x.size, 20000, p=chains.share) + 1
    linkages = int(lengths.sum())
    draw = rng.random(linkages)
    if neighbours == "independent":
        head = draw < delta
    else:  # the gaps between two head-to-head linkages are geometric, at least one other linkage between
        gaps = rng.geometric(delta / (1 - delta), int(linkages * delta * 1.5) + 1000) + 1
        start = 0 if rng.random() < delta else int(rng.geometric(delta / (1 - delta)))
        places = start + np.concatenate([[0], np.cumsum(gaps)])
        head = np.zeros(linkages, dtype=bool)
        head[places[places < linkages]] = True
    is_cut = rng.random(linkages) < np.where(head, cut, nonspecific)
    ends = np.cumsum(lengths)
    is_cut[ends - 1] = True  # the place after the last unit of a chain, where no linkage is
    cuts = np.flatnonzero(is_cut) + 1
    pieces = np.diff(np.concatenate([[0], cuts]))
    owner = np.searchsorted(ends, cuts)
    per_chain = np.bincount(owner, pieces ** (1.0 + a), minlength=lengths.size)
    ratio = per_chain.sum() / lengths.sum()
    residual = per_chain - ratio * lengths
    return ratio, float(residual.std() / math.sqrt(lengths.size) / lengths.mean() / ratio)


def check_bath():
    rows = (  # T, tau, lag; in standard deviations: mean, middle - mean, ends - mean, liquid - mean, middle - liquid
        (300, 120, 60, 0.7115, 0.6039, 0.5594, 0.2120, 0.6548),
        (300, 300, 60, 0.8578, 0.4023, 0.3943, 0.1901, 0.4617),
        (300, 60, 60, 0.5662, 0.7656, 0.6531, 0.1959, 0.7937),
        (200, 30, 60, 0.5050, 0.8225, 0.6753, 0.2362, 0.8621),
    )
    for seconds, tau, lag, *expected in rows:
        bath = SimpleNamespace(fluctuation=1.0, correlation_time=tau)
        step = peer.BathStep(seconds, bath, lag, ["middle", "end", "mean", "liquid"])
        # (x, l) at the start, stationary: var l = cov(x, l) = tau/(tau + lag)
        common = tau / (tau + lag)
        start = np.array([[1.0, common], [common, common]])
        carry = np.array([[step.answer[row], 0.0] for row in step.rows])
        carry[3, 1] = step.decay
        # the variables x0, l0, middle, end, mean, liquid
        link = np.vstack([np.eye(2), carry])
        whole = link @ start @ link.T
        whole[2:, 2:] += step.covariance
        x0, l0, middle, end, mean, last = np.eye(6)
        liquid = mean - lag * (last - l0) / seconds
        name = f"bath {seconds}, {tau}, {lag}: "
        for what, row, value in zip(
            ("mean", "middle - mean", "ends - mean", "liquid - mean", "middle - liquid"),
            (mean, middle - mean, (x0 + end) / 2 - mean, liquid - mean, middle - liquid),
            expected,
        ):
            check(name + what, math.sqrt(row @ whole @ row), value, 5e-5)  # TABLE
        check(name + "stays stationary, bath", end @ whole @ end, 1.0, 1e-12)  # ROUND
        check(name + "stays stationary, liquid", last @ whole @ last, common, 1e-12)  # ROUND
        check(name + "stays stationary, both", end @ whole @ last, common, 1e-12)  # ROUND
        exact = math.sqrt(2 * (seconds / tau - 1 + math.exp(-seconds / tau))) / (seconds / tau)
        check(name + "mean, closed form", math.sqrt(mean @ whole @ mean), exact, 1e-12)  # ROUND
        again = peer.BathStep(seconds, bath, lag * (1 + 1e-9), step.rows)
        smooth = np.max(np.abs(again.covariance - step.covariance))
        check(name + "smooth in the lag", smooth, 0.0, 1e-8)
        check(name + "noise", np.max(np.abs(step.noise @ step.noise.T - step.covariance)), 0.0, 1e-14)  # ROUND

    # constant and drift: the exact answer against many small steps of the differential equation
    still = SimpleNamespace(fluctuation=0.0, correlation_time=300.0)
    step = peer.BathStep(300.0, still, 60.0, ["end", "liquid"])
    b = SimpleNamespace(
        n=1, base=298.15, gradient=0.02, rate=2e-4, x=np.zeros((1, 1)), clock=np.full((1, 1), 500.0), liquid=295.15
    )
    peer.advance(b, step, np.random.default_rng(1))
    slow = 295.15
    for i in range(30000):  # midpoint rule, 0.01 s
        target = 298.15 + 0.02 + 2e-4 * (500.0 + 0.01 * (i + 0.5))
        slow += 0.01 / 60.0 * (target - slow) * (1 - 0.01 / 120.0)
    check("liquid: constant and drift", float(b.liquid[0, 0]), slow, 1e-6)  # SERIES


def check_lines():
    X = np.arange(1, 6) / 5
    for law, k, top, huggins, kraemer in (
        ("martin", 0.35, 0.5, -0.46, -0.25), ("martin", 0.50, 0.5, -0.98, 0.21),
        ("martin", 0.50, 0.8, -2.68, 0.44), ("huggins", 0.50, 0.5, None, 0.71),
        ("huggins", 0.50, 0.8, None, 1.34),
    ):  # fmt: skip
        relative = 1.0 + peer.specific_viscosity(law, top * X, k)
        for line, value in (("huggins", huggins), ("kraemer", kraemer)):
            if value is not None:
                bias = 100 * (peer.extrapolate(top * X, relative, line, "equal") - 1)
                check(f"line: {line} in a {law} world, {k}, {top}, in %", bias, value, 0.005)  # TABLE
        check(f"line: {law} in its own world", peer.extrapolate(top * X, relative, law, "equal"), 1, 1e-13)  # ROUND
        check(f"line: {law} weighted", peer.extrapolate(top * X, relative, law, "c-squared"), 1, 1e-13)  # ROUND
        y = peer.coil_volume(law, relative[-1] - 1.0, k)
        check(f"line: {law} inverted", y, top, 1e-14)  # ROUND

    pmma = np.array([0.19, 0.38, 0.50, 0.61]), np.array([1.27, 1.60, 1.82, 2.05])
    polystyrene = np.array([0.54, 1.08, 1.62, 2.16]), np.array([101.2, 144.3, 194.6, 257.0]) / 65.8
    for name, (c, relative), values in (
        ("poly(methyl methacrylate)", pmma, (1.29482, 1.30135, 1.29809, 1.31311)),
        ("polystyrene", polystyrene, (0.875971, 0.845353, 0.860662, 0.902796)),
    ):
        for line, value in zip(("huggins", "kraemer", "common-intercept", "martin"), values):
            digit = 5e-6 if value > 1 else 5e-7  # TABLE
            check(f"line: {name}, {line}", peer.extrapolate(c, relative, line, "equal"), value, digit)
    c = np.array([5.35, 21.4])
    relative = 1.0 + c * np.array([0.04657, 0.05737])
    for line, value in (("huggins", 0.042970), ("kraemer", 0.042966)):
        found = peer.extrapolate(c, relative, line, "equal")
        check(f"line: polystyrene/benzene, {line}", found, value, 5e-7)  # TABLE
    # c^2 weights against a fit of the equations multiplied by c
    huggins = peer.extrapolate(*polystyrene, "huggins", "c-squared")
    c, relative = polystyrene
    slope_first = np.linalg.lstsq(np.stack([c, c**2], axis=1), relative - 1.0, rcond=None)[0]
    check("line: c-squared is a fit of eta_sp itself", huggins, slope_first[0], 1e-13)  # ROUND
    single = peer.extrapolate(np.array([0.1]), np.array([1.0 + 0.1 + 0.01 / 3]), "single-point", "equal")
    check("line: single-point, k = 1/3, to third order", single, 1.0, 1e-3)


def check_runs():
    inf = math.inf
    times = np.array([[100.0, 100.4, 100.1, 100.2, inf], [100.2, 100.0, 100.6, 100.4, inf]]).T[:, None, :]
    kept = peer.best(times, 3)
    check("best runs: closest three", kept[:, 0, 0].sum(), 300.3, 1e-9)
    check("best runs: fastest at a tie", kept[:, 0, 1].sum(), 300.6, 1e-9)
    check("rounding to 0.2", peer.rounded(100.31, 0.2), 100.4, 1e-12)
    check("rounding to nothing", peer.rounded(100.31, 0.0), 100.31, 0)


def check_plan():
    p = peer.make_plan(peer.load(resolved()))
    check("plan: level flask", p.level_volume * 1e6, 50, 1e-9)  # 2 fillings of 18 mL
    # the stock: (0.4 + 0.6 + 0.8) 50 mL and 36 mL
    check("plan: stock flask", p.stock_volume["intact"] * 1e6, 200, 1e-9)
    check("plan: days", p.days, 3, 0)
    days = p.timetables[0]
    kinds = [f.kind for f in days[0]]
    check("plan: water opens the day", kinds.index("intact"), 2, 0)
    check("plan: every filling once", sum(f.kind != "water" for day in days for f in day), 16, 0)
    hours = [sum(f.seconds for f in day) / 3600 for day in days]
    first = days[0][0]
    check("plan: seconds of a filling", first.seconds, 1080 + 3 * (first.portions[0].run_seconds + 60), 1e-9)
    check("plan: longest day", float(max(hours) <= 7.0), 1, 0)
    check("plan: hours of preparation", p.preparation_hours, 3.0 + 6 * 0.1 + 1.0, 1e-12)
    top = peer.specific_viscosity("martin", p.conc["intact"][-1] * p.intrinsic["intact"], 0.45)
    check("plan: relative viscosity of the top", 1 + top, 1.8, 1e-12)  # ROUND
    shared = peer.make_plan(peer.load(resolved(solutions__stock="shared")))
    check("plan: a shared stock makes seven levels", shared.preparation_hours, 1.5 + 0.7 + 1.0, 1e-12)


def first_intrinsic(**changes):
    """[eta]' of a quiet study over the nominal one, with the plan and the scenario."""
    s = peer.load(resolved(**{**QUIET, **changes}))
    sim = peer.simulate(s, [s.question.expect], 1, 1)
    return float(sim.intrinsic["cleaved"][0, 0]) / sim.plan.intrinsic["cleaved"], sim.plan, s


def letters(days):
    """A timetable as text: w water, b blank, i and c with the level from 1; a space between days."""
    def of(f):
        levels = "".join(str(portion.level + 1) for portion in f.portions)
        return f.kind[0] + (levels if f.kind in ("intact", "cleaved") else "")

    return " ".join("".join(of(f) for f in day) for day in days)


def check_days():
    """Timetables laid out by hand; one filling takes 20 min and its runs, each about 300 to 560 s."""
    even = {  # all efflux times within 2 %: a filling of one run is 18 min + 5 min + 1 min
        "plan__top": 1.02, "plan__top_cleaved": 1.01, "plan__levels": 2, "plan__runs": 1, "plan__water_runs": 1,
        "plan__fillings": 2, "plan__water_fillings": 2,
    }  # fmt: skip

    def laid_out(fillings, deal=None, **changes):
        """A working day of so many fillings of 24 min, as letters."""
        day = f"{24.2 * fillings:.0f} min"
        try:
            p = peer.make_plan(peer.load(resolved(**{**even, "bench__working_day": day, **changes})), deal)
        except peer.Impossible:
            return "impossible"
        return letters(p.timetables[0])

    blank = {"cleavage__reference": "blank"}
    bracketed = {"plan__order": "bracketed"}
    once = {"bench__water_every_day": "no"}
    for name, found, expected in (
        ("plain", laid_out(6), "wwi1i1i2i2 wwc1c1c2c2"),
        ("blank before the first cleaved one of a day", laid_out(7, **blank), "wwi1i1i2i2 wwbbc1c1c2 wwbbc2"),
        ("blank in the middle of a day", laid_out(9, **blank), "wwi1i1i2i2bbc1 wwbbc1c2c2"),
        ("blank and its filling do not fit any more", laid_out(8, **blank), "wwi1i1i2i2 wwbbc1c1c2c2"),
        ("blank once", laid_out(7, **blank, **once), "wwi1i1i2i2 bbc1c1c2c2"),
        ("blank once, in the middle", laid_out(9, **blank, **once), "wwi1i1i2i2bbc1 c1c2c2"),
        ("a day too short for the blank", laid_out(4, **blank), "impossible"),
        ("a day too short for a filling", laid_out(2), "impossible"),
        ("bracketed", laid_out(6, **bracketed), "wi1i1i2i2w wc1c1c2c2w"),
        (
            "three fillings of water bracketed", laid_out(6, **bracketed, plan__water_fillings=3),
            "wwi1i1i2w wwi2c1c1w wwc2c2w",
        ),
        ("bracketed with the blank", laid_out(9, **bracketed, **blank), "wi1i1i2i2bbc1w wbbc1c2c2w"),
        ("one water cannot bracket", laid_out(6, **bracketed, plan__water_fillings=1), "impossible"),
        ("water once cannot bracket", laid_out(6, **bracketed, **once), "impossible"),
        ("loading by loading", laid_out(12, plan__dilution="in-tube"), "wwi21i21c21c21"),
        ("a loading is not split", laid_out(5, plan__dilution="in-tube", plan__water_fillings=1), "wi21i21 wc21c21"),
    ):  # fmt: skip
        check(f"days: {name}: {found}", float(found == expected), 1, 0)

    heading = "preparation,day,started,solution,level,concentration [g/dL],filling,run,time [s],"
    heading += "temperature [degC],note"
    dealt = "w i2 c1 c2 i1 c1 | w i2 c2 i1"  # two days of each preparation, as the notebook would show them
    rows = ["# a comment", heading]
    for preparation in "12":
        seen = {}
        for day, fillings in enumerate(dealt.split(" | ")):
            for kind in fillings.split():
                solution = {"w": "water", "b": "blank", "i": "intact", "c": "cleaved"}[kind[0]]
                seen[kind] = seen.get(kind, 0) + 1
                for run in "12":
                    start = f"{preparation},{day + 1 if preparation == '1' else day + 3},0:10,{solution},{kind[1:]}"
                    rows.append(f"{start},,{1 if kind == 'w' else seen[kind]},{run},300.1,25.00,")
    with tempfile.NamedTemporaryFile("w", suffix=".csv") as stream:
        stream.write("\n".join(rows) + "\n")
        stream.flush()
        order = peer.read_order(stream.name)
    check("order: preparations", len(order), 2, 0)
    check("order: both alike", float(order[0] == order[1]), 1, 0)
    check("order: fillings", len(order[0]), 10, 0)
    shuffled = {"plan__order": "shuffled", "plan__preparations": 2, "plan__water_fillings": 1}
    found = laid_out(6, order, **shuffled)
    check(f"order: dealt as in the notebook: {found}", float(found == "wi2c1c2i1c1 wi2c2i1"), 1, 0)
    found = laid_out(6, order, **shuffled, **blank)
    check(f"order: and the blanks put in: {found}", float(found == "wi2bc1c2i1 wbc1i2c2i1"), 1, 0)
    s = peer.load(resolved(**{**even, **shuffled, "plan__fillings_cleaved": 3}))
    try:
        peer.make_plan(s, order)
        refused = 0
    except ValueError:
        refused = 1
    check("order: a notebook of other fillings is refused", refused, 1, 0)


def check_blank():
    """Spent reagent, with and without the blank, against the law of the solution by hand."""
    e, g, v, T = 0.05, 0.03, 0.765e-3, 298.15
    rho = float(peer.water_density(T))
    reagent = {"cleavage__reagent_viscosity": "5 %", "cleavage__reagent_density": "3 %"}
    for diluent in ("water", "blank"):
        for reference in ("water", "blank"):
            for once in ({}, {"bench__water_every_day": "no"}):
                scheme = {**reagent, **once, "cleavage__diluent": diluent, "cleavage__reference": reference}
                found, p, s = first_intrinsic(**scheme)
                c = p.conc["cleaved"]
                y = c * p.intrinsic["cleaved"]
                w = np.ones(4) if diluent == "blank" else c / c[-1]
                viscosity = (1 + e * w) * (1 + y * np.exp(0.45 * y))
                density = (1 + g * w) + c * (1 - v * rho) / rho
                relative = viscosity / density * (1 + c * (1 - v * rho) / rho)
                if reference == "blank":
                    relative = relative / ((1 + e) / (1 + g))
                exact = peer.extrapolate(c, relative, "martin", "equal") / p.intrinsic["cleaved"]
                name = f"blank: diluent {diluent}, reference {reference}, {'once' if once else 'every day'}"
                check(name, found, exact, 1e-11)  # ROUND
    even = {"cleavage__reagent_viscosity": "5 %", "cleavage__diluent": "blank", "cleavage__reference": "blank"}
    check("blank: cancels the viscosity of the reagent", quiet(**even), 0.015, 1e-12)  # ROUND
    # small excess, water as diluent: it goes straight into [eta]' as (e - g)/c_stock
    tiny = {"cleavage__reagent_viscosity": "0.002 %", "cleavage__reagent_density": "0.001 %"}
    found, p, _ = first_intrinsic(**tiny, plan__lowest=0.02, plan__extrapolation="huggins", polymer__law="huggins")
    exact = 1e-5 / p.conc["cleaved"][-1] / p.intrinsic["cleaved"]
    check("blank: reagent in proportion to c, share of [eta]'", found - 1, exact, 0.01 * exact)  # SERIES

    # what is carried over: into the blank, into the last water of a bracketed day
    r = 0.04
    carried = {
        "bench__carry_over": "4 %", "plan__levels": 1, "plan__fillings": 1, "plan__extrapolation": "single-point",
        "polymer__interaction": 0.6, "polymer__interaction_cleaved": 0.2,
    }  # fmt: skip
    for kind, changes in (
        ("blank", {**reagent, "cleavage__reference": "blank", "plan__water_fillings": 1}),
        ("water", {"plan__order": "bracketed"}),
    ):
        s = peer.load(resolved(**{**QUIET, **carried, **changes}))
        p, notebook = quiet_notebook(s)
        before = "intact" if kind == "blank" else "cleaved"
        place = [row[1] for row in notebook].index("blank") if kind == "blank" else len(notebook) - 1
        k = {"intact": 0.6, "cleaved": 0.2}[before]
        c = p.conc[before][0]
        y = r * c * p.intrinsic[before]
        excess = (1 + e, 1 + g) if kind == "blank" else (1, 1)
        viscosity = peer.water_viscosity(T) * excess[0] * (1 + y * math.exp(k * y))
        density = rho * excess[1] + r * c * (1 - v * rho)
        t = float(peer.efflux_time(s.tube, s.tube.constant, s.tube.kinetic, np.array(viscosity / density)))
        check(f"carry-over: {kind} after {before}", float(notebook[place][3][0, 0, 0]), t, 1e-9)  # ROUND
        check(f"carry-over: {kind} stands where it should", float(notebook[place][1] == kind), 1, 0)
    p, notebook = quiet_notebook(peer.load(resolved(**{**QUIET, **carried, "plan__order": "bracketed"})))
    t0, last = (float(notebook[place][3][0, 0, 0]) for place in (0, -1))
    s = peer.load(resolved(**{**QUIET, **carried, "plan__order": "bracketed"}))
    t0, t = (t0 + last) / 2, float(notebook[1][3][0, 0, 0])
    C = (peer.water_kinematic(T) + s.tube.kinetic / t0**2) / t0
    relative = (C * t - s.tube.kinetic / t**2) / peer.water_kinematic(T)
    relative *= 1 + p.conc["intact"][0] * (1 - v * rho) / rho
    exact = math.sqrt(2 * (relative - 1 - math.log(relative))) / p.conc["intact"][0]
    found = float(peer.reduce_notebook(s, p, notebook)[1]["intact"][0, 0])
    check("bracketed: t_0 is the mean of both ends of the day", found / exact, 1, 1e-12)  # ROUND


def quiet_notebook(s, n=1, seed=1):
    """(plan, notebook of the first preparation) of n studies at the expected fraction."""
    p = peer.make_plan(s)
    rng = np.random.default_rng(seed)
    study = peer.draw_study(s, p, n, rng)
    d = peer.draw_preparation(s, p, study, np.zeros(n), [s.question.expect], rng)
    notebook, *_ = peer.play(s, p, peer.bath_steps(s, p), d, p.timetables[0], [s.question.expect], rng)
    return p, notebook


def check_in_tube():
    tube = {"plan__dilution": "in-tube", "plan__fillings": 1, "plan__levels": 3, "plan__lowest": 0.4}
    p = peer.make_plan(peer.load(resolved(**tube)))
    for level, volume in enumerate((37.5, 15 / 0.7, 15.0)):
        found = p.in_tube_volume["intact"][level] * 1e6
        check(f"in the tube: volume at level {level + 1}", found, volume, 1e-9)  # ROUND
    loading = p.timetables[0][0][2]
    check("in the tube: from concentrated to dilute", float([q.level for q in loading.portions] == [2, 1, 0]), 1, 0)
    added = [q.added * 1e6 for q in loading.portions]
    for value, expected in zip(added, (0, 15 / 0.7 - 15, 37.5 - 15 / 0.7)):
        check("in the tube: added", value, expected, 1e-9)  # ROUND
    runs = sum(3 * (q.run_seconds + 60) for q in loading.portions)
    check("in the tube: seconds of a loading", loading.seconds, 480 + 3 * 600 + 2 * 180 + runs, 1e-9)  # ROUND
    check("in the tube: no level flask", p.level_volume, 0, 0)
    check("in the tube: stock", p.stock_volume["intact"] * 1e6, 25, 1e-9)  # 18 mL
    check("in the tube: hours of preparation", p.preparation_hours, 4.0, 1e-12)
    for name, changes in (
        ("over the capacity", {"tube__capacity": "37 mL"}),
        ("shared stock", {"solutions__stock": "shared"}),
        ("constant volume", {"tube__type": "constant-volume"}),
        ("stock too small", {"solutions__stock_volume": "17 mL", "solutions__stock_tolerance": "0.1 mL"}),
    ):
        try:
            peer.make_plan(peer.load(resolved(**tube, **changes)))
            refused = 0
        except peer.Impossible:
            refused = 1
        check(f"in the tube: {name} is impossible", refused, 1, 0)
    for neighbours in ("independent", "excluded"):
        for option in ({}, {"plan__levels_cleaved": 5}, {"plan__fillings": 3}, {"cleavage__diluent": "blank"}):
            found = quiet(**{**tube, "cleavage__neighbours": neighbours, **option})
            check(f"study: in the tube, {neighbours}, {option}", found, 0.015, 1e-12)  # ROUND

    # true volumes and what is carried over: by hand, from the same pipette and the same deliveries
    s = peer.load(resolved(**{
        **QUIET, **tube, "solutions__delivery_tolerance": "0.5 mL", "solutions__delivery_u": "0.3 mL",
        "bench__carry_over": "10 %", "cleavage__reagent_viscosity": "5 %", "polymer__interaction_cleaved": 0.3,
    }))  # fmt: skip
    p = peer.make_plan(s)
    rng = np.random.default_rng(8)
    n = 4
    study = peer.draw_study(s, p, n, rng)
    d = peer.draw_preparation(s, p, study, np.zeros(n), [0.015], rng)
    dealt = []
    honest = peer.delivered

    def recording(*arguments):
        dealt.append(honest(*arguments))
        return dealt[-1]

    peer.delivered = recording
    notebook, *_ = peer.play(s, p, peer.bath_steps(s, p), d, p.timetables[0], [0.015], rng)
    peer.delivered = honest
    worst_time = 0.0
    before = (0.0, 0.0)  # water before the first loading
    for series, k, volumes in (("intact", 0.45, dealt[:3]), ("cleaved", 0.3, dealt[3:])):
        y = p.intrinsic[series] * p.conc[series][-1] * np.ones(n)
        conc = p.conc[series][-1] * np.ones(n)
        in_tube_y, in_tube_c = 0.9 * y + 0.1 * before[0], 0.9 * conc + 0.1 * before[1]
        total = 0.0
        rows = [row for row in notebook if row[1] == series]
        for row, volume in zip(rows, volumes):
            total = total + volume
            left = volumes[0] / total
            w = p.conc[series][row[2]] / p.conc[series][-1] if series == "cleaved" else 0.0
            viscosity = peer.water_viscosity(298.15) * (1 + 0.05 * w)
            viscosity = viscosity * (1 + in_tube_y * left * np.exp(k * in_tube_y * left))
            density = peer.solution_density(s, in_tube_c * left, 0.0, 298.15)
            t = peer.efflux_time(s.tube, s.tube.constant, s.tube.kinetic, viscosity / density)
            worst_time = max(worst_time, float(np.max(np.abs(row[3][0, 0] / t - 1))))
        before = y * left, conc * left
    check("in the tube: times by the true volumes, carry-over diluted", worst_time, 0, 1e-12)  # ROUND
    check("in the tube: three deliveries for each loading", len(dealt), 6, 0)
    check("in the tube: the charges scatter", float(np.std(dealt[0]) > 1e-7), 1, 0)
    rng = np.random.default_rng(9)
    study = peer.draw_study(s, p, 40000, rng)
    first, second = (honest(s, study, 15e-6, rng) for _ in range(2))
    exact = math.hypot(0.5e-6 / math.sqrt(6), 0.3e-6)
    check("in the tube: scatter of a delivery", first.std() / exact, 1, 4.5 / math.sqrt(80000))  # STAT
    common = np.mean((first - 15e-6) * (second - 15e-6)) / (0.5e-6**2 / 6)
    error = math.sqrt(1 + (exact**2 / (0.5e-6**2 / 6)) ** 2) / 200  # of a product of correlated normals
    check("in the tube: what two deliveries share is the pipette", common, 1, 4.5 * error)  # STAT

    # the liquid's temperature through a loading, from the equation alone
    s = peer.load(resolved(**{
        **QUIET, **tube, "bench__room": "15 degC", "bench__lag_time": "6 min", "bench__equilibrate": "4 min",
        "plan__temperature_record": "none", "plan__runs": 2, "bench__spare_runs": 0,
    }))  # fmt: skip
    p, notebook = quiet_notebook(s)
    lag, T, room = 360.0, 298.15, 288.15
    worst = 0.0
    for series, k in (("intact", 0.45), ("cleaved", 0.45)):
        rows = [row for row in notebook if row[1] == series]
        liquid, held = room, 0.0
        for row in rows:
            level = row[2]
            volume = 15.0 * p.conc[series][-1] / p.conc[series][level]
            if held:
                liquid = T + (liquid - T) * math.exp(-180 / lag)
                liquid = (held * liquid + (volume - held) * room) / volume
            held = volume
            liquid = T + (liquid - T) * math.exp(-240 / lag)
            conc = p.conc[series][level]
            seconds = peer.nominal_time(s, p, series, level)
            y = conc * p.intrinsic[series]
            kept = sorted(row[3][:, 0, 0])
            expected = []
            for _ in range(2):
                after = T + (liquid - T) * math.exp(-seconds / lag)
                mean = T + (liquid - after) * lag / seconds  # of an exponential
                viscosity = peer.water_viscosity(mean) * (1 + y * math.exp(k * y))
                nu = viscosity / peer.solution_density(s, conc, 0.0, mean)
                expected.append(float(peer.efflux_time(s.tube, s.tube.constant, s.tube.kinetic, np.array(nu))))
                liquid = T + (after - T) * math.exp(-60 / lag)
            worst = max(worst, *(abs(one / other - 1) for one, other in zip(kept, sorted(expected))))
    check("in the tube: times of a liquid that is mixed with a cold one", worst, 0, 1e-12)  # ROUND
    portion = SimpleNamespace(before=15.0, added=5.0)
    check("in the tube: mixing temperature", peer.mixed_temperature(portion, 25.0, 17.0), 23.0, 1e-13)  # ROUND


def check_repeats():
    """Preparations and polymers alongside; 4.5 standard errors (STAT)."""

    def spread(**changes):
        s = peer.load(resolved(**{**QUIET, "plan__levels": 2, "plan__fillings": 1, "plan__runs": 1, **changes}))
        fractions = [s.question.expect, s.question.against]
        sim = peer.simulate(s, fractions, 20000, 3)
        return peer.sd_and_error(sim.delta[0]) + (sim, s)

    def compare(name, one, other, factor):
        check(name, one[0] / other[0], factor, 4.5 * factor * math.hypot(one[1] / one[0], other[1] / other[0]))

    root3 = math.sqrt(3)
    for name, changes, factor in (
        ("cleavage", {"cleavage__conversion": "90 %", "cleavage__conversion_u": "3 %"}, 1 / root3),
        ("weighing", {"solutions__balance_u": "10 mg"}, 1 / root3),
        ("delivery", {"solutions__delivery_u": "0.2 mL"}, 1 / root3),
        ("filling", {"bench__filling_u": "0.1 %"}, 1 / root3),
        ("day of the bath", {"bath__drift_u": "0.2 K/h", "plan__temperature_record": "none"}, 1 / root3),
        ("dry content", {"solutions__dry_content_u": "1 %"}, 1),
        ("pipette", {"solutions__delivery_tolerance": "0.5 mL"}, 1),
        ("pair", {"polymer__eta_u": "3 %", "polymer__a_u": 0.01}, 1),
        ("hydrolysis", {"polymer__hydrolysis": "95 %", "polymer__hydrolysis_u": "1 %"}, 1),
        ("interaction", {"polymer__interaction_u": 0.05}, 1),
        ("solution offset", {"tube__solution_offset_u": "0.1 %"}, 1),
    ):  # fmt: skip
        one, three = spread(**changes), spread(**changes, plan__preparations=3)
        compare(f"preparations: {name}", three, one, factor)
    check("preparations: days", three[2].plan.days, 3 * one[2].plan.days, 0)
    check("preparations: grams", three[2].plan.grams, 3 * one[2].plan.grams, 1e-12)
    check("preparations: hours", three[2].plan.preparation_hours, 3 * one[2].plan.preparation_hours, 1e-12)
    check("preparations: clock", three[2].clock.mean(), 3 * one[2].clock.mean(), 1e-9)
    check("preparations: quiet", quiet(plan__preparations=3), 0.015, 1e-12)  # ROUND

    # one preparation without an answer takes the answer of the study
    answers = iter([np.array([[0.01, np.nan, 0.02]]), np.array([[0.03, 0.02, 0.04]])])
    s = peer.load(resolved(plan__preparations=2))
    p = peer.make_plan(s)
    honest = peer.reduce_notebook, peer.play
    series = {"intact": np.ones((1, 3)), "cleaved": np.ones((1, 3))}
    peer.reduce_notebook = lambda *_: (next(answers), series, series)
    peer.play = lambda *_: (None, np.full((1, 3), 2), np.full((1, 3), 5.0))
    rng = np.random.default_rng(1)
    found = peer.one_polymer(s, p, {}, peer.draw_study(s, p, 3, rng), [0.015], rng)
    peer.reduce_notebook, peer.play = honest
    check("preparations: the mean", found.delta[0, 0], 0.02, 1e-15)
    check("preparations: no answer of one is none", float(np.isnan(found.delta[0, 1])), 1, 0)
    check("preparations: spare runs add up", found.spare_runs[0, 0], 4, 0)

    alongside = {"question__against_is": "measured"}
    found = spread(**alongside)
    check("alongside: quiet difference", found[2].delta[0, 0], 0.002, 1e-12)  # ROUND
    check("alongside: quiet difference of equal ones", found[2].delta[1, 0], 0.0, 1e-12)  # ROUND
    figures = peer.figures(found[3], found[2])
    check("alongside: critical value", figures["critical"][0], 0.0, 1e-12)
    check("alongside: truth", peer.nominal_figures(found[3], found[2].plan)["truth"], 0.002, 1e-15)
    usual = {"plan__chain_statistics": "continuous", "cleavage__neighbours": "independent"}
    for name, changes in (
        ("dry content", {"solutions__dry_content_u": "1 %"}),
        ("cleavage", {"cleavage__conversion": "90 %", "cleavage__conversion_u": "2 %"}),
        ("weighing", {"solutions__balance_u": "10 mg"}),
        ("filling", {"bench__filling_u": "0.1 %"}),
    ):
        # two of one fraction, independent: sqrt(2) of one alone
        two, one = spread(**usual, **changes, **alongside), spread(**usual, **changes)
        null, single = peer.sd_and_error(two[2].delta[1]), peer.sd_and_error(one[2].delta[1])
        compare(f"alongside: {name} of each", null, single, math.sqrt(2))
    for name, changes in (
        ("eta_u", {"polymer__eta_u": "3 %"}),
        ("a_u", {"polymer__a_u": 0.01}),
        ("pipette", {"solutions__delivery_tolerance": "0.5 mL"}),
        ("hydrolysis", {"polymer__hydrolysis": "95 %", "polymer__hydrolysis_u": "1 %"}),
        ("interaction", {"polymer__interaction_u": 0.05}),
        ("kinetic", {"bench__kinetic_u": "30 %"}),
    ):
        two = spread(**usual, **changes, **alongside)
        check(f"alongside: {name} shared", float(np.max(np.abs(two[2].delta[1]))), 0, 1e-12)  # ROUND
    # a shared error in proportion: the difference takes the share (1.5 - 1.3)/1.5 of it
    two, one = spread(**usual, polymer__eta_u="1 %", **alongside), spread(**usual, polymer__eta_u="1 %")
    check("alongside: eta_u in proportion", two[0] / one[0], 0.2 / 1.5, 1e-3)  # SERIES
    s = peer.load(resolved(
        **alongside, cost__hour=20, cost__owned=["circulator"], grade__price_per_gram=3, tube__price=100,
        bath__price=1000,
    ))  # fmt: skip
    p = peer.make_plan(s)
    once = peer.make_plan(peer.load(resolved()))
    check("alongside: days", p.days, 2 * once.days, 0)
    check("alongside: grams", p.grams, 2 * once.grams, 1e-12)
    check("alongside: equipment once, what is owned not at all", peer.prices(s, p), 100 + 3 * p.grams, 1e-9)
    # the difference's own null: share beyond z standard deviations about 0, on the side of expect
    question = SimpleNamespace(expect=0.012, against=0.014, confidence=0.95, sides="one", against_is="measured")
    luck = np.random.default_rng(4).standard_normal(100000) * 1e-3
    figures = peer.power_figures(question, luck - 0.002, luck)
    check("alongside: plain false alarm about 0", figures["plain_false_alarm"][0], 0.05, 0.003)  # STAT
    check("alongside: critical value below 0", figures["critical"][0], -1.6449e-3, 2e-5)  # STAT
    check("alongside: power", figures["power"][0], 0.6388, 0.012)  # STAT

    other = {"plan__material": "other", "polymer__K": "6.66e-4 dL/g"}
    document = resolved(**other)
    entry = {"name": "other", "K": "1 dL/g", "a": 0.64, "hydrolysis": "90 %", "hydrolysis_u": "1 %"}
    document["kit"]["materials"] = [entry]
    for key in ("a", "hydrolysis", "hydrolysis_u"):
        del document["polymer"][key]
    document["kit"]["grades"][0]["hydrolysis"] = "95 %"
    s = peer.load(document)
    check("material: a value given in polymer wins", s.polymer.K, 6.66e-5 * 1000**0.64, 1e-15)
    check("material: the entry's value", s.polymer.a, 0.64, 0)
    check("material: the grade's hydrolysis wins over the material's", s.polymer.hydrolysis, 0.95, 1e-15)
    check("material: the entry's where the grade has none", s.polymer.hydrolysis_u, 0.01, 1e-15)


def check_end_to_end():
    """With every spread zero only the chain statistics are left."""
    for neighbours, excess in (("independent", 0.7545), ("excluded", 2.268)):
        rule = {"cleavage__neighbours": neighbours}
        digit = 5e-5 if neighbours == "independent" else 5e-4  # TABLE
        for law in ("martin", "huggins"):
            world = {**rule, "polymer__law": law, "plan__extrapolation": law}
            for kind in ({}, {"tube__ends": "square"}, {"tube__type": "constant-volume"}):
                name = f"study: {neighbours}, {law}, {kind or 'flared'}: "
                check(name + "discrete", quiet(**world, **kind), 0.015, 1e-12)  # ROUND
                usual = quiet(**world, **kind, plan__chain_statistics="continuous")
                check(name + "continuous in %", 100 * (usual / 0.015 - 1), excess, digit)
        for option in (
            {"plan__temperature_record": "none"}, {"bench__combine": "median"}, {"solutions__stock": "shared"},
            {"plan__weighting": "c-squared"}, {"bench__water_every_day": "no"}, {"plan__levels_cleaved": 3},
            {"thermometer__reads": "ends"}, {"bench__lag_time": "5 min"}, {"question__expect": "5 %"},
        ):  # fmt: skip
            expected = 0.05 if "question__expect" in option else 0.015
            check(f"study: {neighbours}, {option}", quiet(**rule, **option), expected, 1e-12)  # ROUND
        partly = {"polymer__hydrolysis": "97 %", "cleavage__conversion": "95 %"}
        check(f"study: {neighbours}, nominal X h^2 allowed for", quiet(**rule, **partly), 0.015, 1e-12)  # ROUND

    independent = {"cleavage__neighbours": "independent", "plan__chain_statistics": "continuous"}
    base = quiet(**independent)

    def shift(**changes):
        return 100 * (quiet(**independent, **changes) / base - 1)

    uncorrected = {"cleavage__correct_conversion": "no"}
    for X, value in (("99 %", -1.01), ("95 %", -5.04), ("90 %", -10.07)):
        check(f"bias: conversion {X}", shift(**uncorrected, cleavage__conversion=X), value, 0.005)  # TABLE
    check("bias: nonspecific cuts", shift(cleavage__nonspecific="0.02 %"), 1.323, 5e-3)
    acetate = (
        ("99.5 %", -1.00, 0.005), ("98.5 %", -2.98, 0.005), ("97 %", -5.91, 0.005), ("88 %", -22.6, 0.05),
    )  # fmt: skip
    for h, value, digit in acetate:
        grade = {"grade__average": "viscosity", "grade__molar_mass": "85 kg/mol"}
        found = quiet(**uncorrected, **grade, polymer__hydrolysis=h)
        check(f"bias: residual acetate {h}", 100 * (found / 0.015 - 1), value, digit)  # TABLE
    five = {**independent, "plan__levels": 5, "plan__lowest": 0.2}
    for o, value in (("-0.07 %", 1.5), ("-0.15 %", 3.2)):
        offset = quiet(**five, tube__solution_offset=o) / quiet(**five) - 1
        check(f"bias: solution offset {o}", 100 * offset, value, 0.05)  # TABLE
    low_density = quiet(plan__density="neglected") / 0.015 - 1
    check("bias: density neglected, about +2.5 %", 100 * low_density, 2.5, 0.2)


def check_noise():
    """Single sources of noise against their exact effect; 4.5 standard errors: 7e-6 each (STAT)."""

    def spread(**changes):
        s = peer.load(resolved(**{**QUIET, **changes}))
        sim = peer.simulate(s, [s.question.expect], 20000, 3)
        return peer.sd_and_error(np.log(sim.intrinsic["intact"][0])) + (s, sim)

    sd, error, *_ = spread(polymer__eta_u="5 %")
    check("noise: eta_u in [eta]", sd, 0.05, 4.5 * error)
    sd, error, s, sim = spread(polymer__a_u=0.02)
    expected = 0.02 * math.log(sim.plan.molar_mass["intact"] / math.sqrt(20 * 200))
    check("noise: a_u in [eta]", sd, expected, 4.5 * error)
    sd, error, *_ = spread(solutions__dry_content_u="0.5 %")
    # one share scales all levels: [eta] goes with it, less the martin line's nominal c
    check("noise: dry content", sd, 0.005, 4.5 * error + 1e-5)
    sd, error, *_ = spread(polymer__eta_u="5 %", question__against_is="same-constants")
    check("noise: eta_u left out of same constants", sd, 0.0, 1e-12)

    # What scatters one filling of two levels and one of water. First order: each time enters eta_sp;
    # 2 % are left for the curvature and the kinetic energy.
    small = {
        "plan__fillings": 1, "plan__levels": 2, "plan__water_fillings": 1, "plan__runs": 2,
        "plan__water_runs": 2, "bench__spare_runs": 0,
    }  # fmt: skip
    p = peer.make_plan(peer.load(resolved(**{**QUIET, **small})))
    c = p.conc["intact"]
    relative = 1 + peer.specific_viscosity("martin", c * p.intrinsic["intact"], 0.45)
    row = peer.intercept_weights(c, False) / (relative - 1) * relative
    portions = [(f.kind, portion) for f in p.timetables[0][0] for portion in f.portions]
    seconds = {(kind, portion.level): portion.run_seconds for kind, portion in portions}
    nu = peer.water_kinematic
    per_kelvin = abs(nu(298.16) - nu(298.14)) / 0.02 / nu(298.15)

    def expected(u):
        """u: the relative scatter of a filling's time as a function of the run's time."""
        levels = np.array([u(seconds["intact", level]) for level in (0, 1)])
        return math.sqrt(np.sum((row * levels) ** 2) + (np.sum(row) * u(seconds["water", 0])) ** 2)

    def of_bath(T):
        x = T / 10.0
        pair = 2 * (x - 1 + math.exp(-x)) / x**2  # mean of one run; two runs far apart
        return 0.05 * per_kelvin * math.sqrt(pair / 2)

    root2 = math.sqrt(2)
    for name, changes, u in (
        ("filling scatter", {"bench__filling_u": "0.2 %"}, lambda T: 0.002),
        ("gradient", {"bath__gradient_u": "0.05 K"}, lambda T: 0.05 * per_kelvin),
        ("thermometer reading", {"thermometer__reading_u": "0.05 K"}, lambda T: 0.05 * per_kelvin / root2),
        ("hand timing", {"timer__hand_u": "0.2 s"}, lambda T: 0.2 / T),
        ("marks", {"timer__meniscus_u": "0.5 mm"}, lambda T: 0.25 * math.pi * 9 * 0.5 / 5600),
        (
            "fluctuation, fast bath",
            {"bath__fluctuation": "0.05 K", "bath__correlation_time": "10 s", "bench__lag_time": "0 s",
             "plan__temperature_record": "none"},
            of_bath,
        ),
    ):  # fmt: skip
        sd, error, *_ = spread(**small, **changes)
        exact = expected(u)
        check(f"noise: {name} in [eta]", sd, exact, 0.02 * exact + 4.5 * error)
    sd, *_ = spread(**small, thermometer__calibration_u="0.1 K")
    check("noise: calibration of the thermometer all but cancels", sd, 0.0, 1e-4)

    s = peer.load(resolved(**{**QUIET, "bench__bubble_chance": "20 %", "bench__bubble_delay": "5 %"}))
    read = peer.timed(s, np.random.default_rng(6), np.full((1, 100000), 300.0))
    check("noise: mean of bubbles", read.mean() / 300, 1.01, 4.5 * 0.05 * math.sqrt(0.36 / 1e5))


def check_judgement():
    """Two normal samples with the same luck: power, critical value and their errors."""
    rng = np.random.default_rng(5)
    question = SimpleNamespace(expect=0.015, against=0.013, confidence=0.95, sides="one", against_is="stated")
    n, sd, shift = 4000, 0.002 / 2.926, 0.002
    found = []
    for _ in range(300):
        luck = 0.013 + sd * rng.standard_normal(n)
        found.append(peer.power_figures(question, luck + shift, luck))
    exact = 0.89973
    for name, value in (("power", exact), ("critical", 0.013 + 1.6448536 * sd)):
        values = np.array([f[name][0] for f in found])
        claimed = math.sqrt(np.mean([f[name][1] ** 2 for f in found]))
        check(f"judgement: {name}", values.mean(), value, 4.5 * values.std() / 300**0.5 + 2e-5)  # STAT
        check(f"judgement: claimed error of {name}", claimed / values.std(), 1.0, 4.5 / 600**0.5 + 0.03)  # STAT
    naive = math.sqrt(exact * (1 - exact) / n)
    ratio = np.sqrt(np.mean([f["power"][1] ** 2 for f in found])) / naive
    check("judgement: error of power over the naive one", ratio, 1.529, 0.05)
    alarm = np.mean([f["plain_false_alarm"][0] for f in found])
    check("judgement: plain false alarm", alarm, 0.05, 4.5 * math.sqrt(0.0475 / n / 300) + 5e-4)  # STAT
    mirrored = SimpleNamespace(expect=-0.015, against=-0.013, confidence=0.95, sides="one", against_is="stated")
    other = peer.power_figures(mirrored, -(luck + shift), -luck)
    check("judgement: mirrored power", other["power"][0], found[-1]["power"][0], 0)
    check("judgement: mirrored critical value", other["critical"][0], -found[-1]["critical"][0], 1e-15)
    gone = np.where(np.arange(n) < 40, np.nan, luck + shift)
    lost = peer.power_figures(question, gone, luck)["power"][0]
    check("judgement: no answer is no success", lost, found[-1]["power"][0] - 0.01 * 0.9, 0.004)


def main():
    for part in (
        check_units, check_water_and_tube, check_scission, check_chains, check_bath, check_lines, check_runs,
        check_plan, check_days, check_blank, check_in_tube, check_repeats, check_end_to_end, check_noise,
        check_judgement,
    ):  # fmt: skip
        part()
    failed = RESULTS.count(False)
    print(f"{RESULTS.count(True)} passed, {failed} failed")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
