"""Single figures over their whole legal range, from libraries or the published equations.

One function a quantity: its arguments are drawn at random, each one time in five at an end of its
range; it returns None where they go together to nothing legal, and they are drawn anew. The library
named beside it does the work; `published` means the equation is written out here. Air is that of
CoolProp, except where a figure checks the integration and not the air.

    values.py --write values.json [--seed 20261201]     all values; prints the seed
    values.py --check values.json --part 6              every sixth value anew, exit 1 on a mismatch
"""

import argparse
import json
import math
import random
import sys
import warnings
from functools import lru_cache
from importlib.metadata import version

import numpy as np
import lmoments3
from chemicals.viscosity import Saybolt_universal_eq
from chemicals.viscosity import viscosity_index as d2270
from CoolProp.CoolProp import PropsSI
from fluids import ATMOSPHERE_1976, one_phase_dP
from fluids.fittings import Hooper2K
from fluids.friction import Churchill_1977
from ht import Nu_horizontal_cylinder_Churchill_Chu, Nu_vertical_plate_Churchill
from ht.conv_external import Nu_horizontal_plate_turbulent_Kreith
from lmoments3 import distr
from scipy import constants, stats
from scipy.integrate import quad, solve_ivp
from scipy.interpolate import CubicSpline
from scipy.optimize import brentq

from reference import air as published_air

ZERO = 273.15
QUANTITIES = {}


def quantity(count, library, /, **ranges):
    """So many values, by that library, of arguments in (low, high), log(low, high) or [choices]."""
    def keep(function):
        QUANTITIES[function.__name__] = (count, library, ranges, function)
        return function
    return keep


def log(low, high):
    return "log", low, high


def drawn(rng, of):
    if callable(of):
        return of(rng)
    if isinstance(of, list):
        return rng.choice(of)
    share = rng.choice([0, 1]) if rng.random() < 0.2 else rng.random()
    if of[0] == "log":
        value = of[1] * (of[2] / of[1]) ** share
    else:
        value = of[0] + share * (of[1] - of[0])
    return float(f"{value:.5g}")


def values_of(name, seed):
    count, library, ranges, function = QUANTITIES[name]
    rng = random.Random(f"{seed} {name}")
    tries = 20000
    while count:
        tries -= 1
        if not tries:
            sys.exit(f"{name}: the ranges hold too few legal values")
        inputs = {key: drawn(rng, of) for key, of in ranges.items()}
        value = function(**inputs)
        if value is not None:
            count -= 1
            yield {"quantity": name, "library": library, "inputs": inputs,
                   "value": float(f"{value:.12g}")}


# Oil ---------------------------------------------------------------------------------------------

OIL = {"kv40": log(5, 700), "kv100": log(2, 60), "density_15": (600, 1500)}


def w(nu):
    """ASTM D341-20: log log Z."""
    return math.log10(math.log10(nu + 0.7 + math.exp(-1.47 - 1.84 * nu - 0.51 * nu * nu)))


def line(first, second):
    """A and B of the D341 line through two points (°C, mm²/s)."""
    (t1, nu1), (t2, nu2) = first, second
    b = (w(nu1) - w(nu2)) / (math.log10(t2 + ZERO) - math.log10(t1 + ZERO))
    return w(nu1) + b * math.log10(t1 + ZERO), b


def on_line(first, second, t):
    """Viscosity by the exact inverse of Z, which the standard only approximates."""
    a, b = line(first, second)
    wanted = a - b * math.log10(t + ZERO)
    if not w(0.21) <= wanted <= w(2e7):
        return None
    return math.exp(brentq(lambda x: w(math.exp(x)) - wanted, math.log(0.2), math.log(2.1e7),
                           xtol=1e-13))


@quantity(50, "published", cold=(-60, 50), cold_nu=log(1, 2e7), warm=(0, 150),
          warm_nu=log(0.21, 1000), at=(-60, 150))
def viscosity(cold, cold_nu, warm, warm_nu, at):
    if warm - cold < 10 or cold_nu < 1.2 * warm_nu:
        return None
    return on_line((cold, cold_nu), (warm, warm_nu), at)


@quantity(30, "published", kv40=log(3, 1000), kv100=log(1, 100), nu=log(0.3, 1e6))
def temperature_at(kv40, kv100, nu):
    if kv40 < 1.5 * kv100:
        return None
    a, b = line((40, kv40), (100, kv100))
    t = 10 ** ((a - w(nu)) / b) - ZERO
    return t if -90 <= t <= 200 else None


@quantity(60, "chemicals", kv40=log(3, 20000), kv100=log(2, 500))
def viscosity_index(kv40, kv100):
    index = d2270(kv40 * 1e-6, kv100 * 1e-6, rounding=False)
    return index if kv40 > kv100 and 1 <= index <= 400 else None


@quantity(40, "chemicals", kv40=log(4, 5000), index=(0, 250))
def viscosity_at_100(kv40, index):
    over = lambda y: d2270(kv40 * 1e-6, y * 1e-6, rounding=False) - index
    top = min(kv40, 500)
    return brentq(over, 2, top, xtol=1e-13) if over(2) < 0 < over(top) else None


def saybolt(nu, fahrenheit):
    return Saybolt_universal_eq(nu) * (1 + 0.000061 * (fahrenheit - 100))


@quantity(30, "chemicals, published factor", nu=log(1.8, 1e5), fahrenheit=(0, 250))
def saybolt_seconds(nu, fahrenheit):
    return saybolt(nu, fahrenheit)


@quantity(30, "chemicals, published factor", seconds=log(32.2, 4e5), fahrenheit=(0, 250))
def saybolt_viscosity(seconds, fahrenheit):
    over = lambda nu: saybolt(nu, fahrenheit) - seconds
    return brentq(over, 1.8, 1e6, xtol=1e-13) if over(1.8) < 0 else None


def rho(rho15, t):
    """API MPMS 11.1, lubricating-oil group; also for complex t."""
    x = 0.6278 / rho15 * (t - 15)
    return rho15 * np.exp(-x * (1 + 0.8 * x))


def cp(rho15, t):
    """Cragoe 1929 in his units: Btu/(lb °F), °F."""
    fahrenheit = 1.8 * t + 32
    return (0.388 + 0.00045 * fahrenheit) / math.sqrt(rho15 / 999.016) * 4186.8


def k(rho15, t):
    """Cragoe 1929 in his units: Btu in/(h ft² °F), °F."""
    unit = constants.Btu * constants.inch / (3600 * constants.foot**2) * 1.8
    return 0.813 / (rho15 / 999.016) * (1 - 0.0003 * 1.8 * t) * unit


def beta(rho15, t):
    """Of the density, by a complex step."""
    return -rho(rho15, t + 1e-20j).imag / 1e-20 / rho(rho15, t)


@quantity(25, "published", density_15=(600, 1500), at=(-60, 150))
def density(density_15, at):
    return rho(density_15, at)


@quantity(15, "published", density_15=(600, 1500), at=(-60, 150))
def expansion(density_15, at):
    return beta(density_15, at)


@quantity(25, "published", density_15=(600, 1500), at=(-60, 150))
def specific_heat(density_15, at):
    return cp(density_15, at)


@quantity(25, "published", density_15=(600, 1500), at=(-60, 150))
def conductivity(density_15, at):
    return k(density_15, at)


# Air ---------------------------------------------------------------------------------------------

@lru_cache(maxsize=None)
def air(t):
    """Density, kinematic viscosity, conductivity, Prandtl number at 101.325 kPa."""
    d, mu, cond, pr = (PropsSI(name, "T", t + ZERO, "P", 101325, "Air")
                       for name in ("D", "V", "L", "PRANDTL"))
    return d, mu / d, cond, pr


@quantity(30, "fluids", elevation=(-430, 9000))
def atmosphere(elevation):
    return ATMOSPHERE_1976(elevation).P / 1000


@quantity(15, "CoolProp", at=(-90, 200))
def air_density(at):
    return air(at)[0]


@quantity(15, "CoolProp", at=(-90, 200))
def air_viscosity(at):
    return air(at)[1]


@quantity(15, "CoolProp", at=(-90, 200))
def air_conductivity(at):
    return air(at)[2]


@quantity(15, "CoolProp", at=(-90, 200))
def air_prandtl(at):
    return air(at)[3]


# Inlet -------------------------------------------------------------------------------------------

FITTINGS = {
    "elbow-90-standard-threaded": "Elbow, 90°, Standard (R/D = 1), Screwed",
    "elbow-90-standard-flanged": "Elbow, 90°, Standard (R/D = 1), Flanged/welded",
    "elbow-90-long": "Elbow, 90°, Long-radius (R/D = 1.5), All types",
    "elbow-45-standard": "Elbow, 45°, Standard (R/D = 1), All types",
    "elbow-45-long": "Elbow, 45°, Long-radius (R/D 1.5), All types",
    "tee-branch-threaded": "Elbow, Used as, Standard, Screwed",
    "tee-branch-flanged": "Elbow, Elbow, Standard, Flanged/welded",
    "tee-run-threaded": "Tee, Run, Screwed",
    "tee-run-flanged": "Tee, Through, Flanged or welded",
    "gate": "Valve, Gate, Full line size, Beta = 1",
    # Gate, ball and plug share a row in the paper where the bore is full.
    "ball": "Valve, Gate, Full line size, Beta = 1",
    "butterfly": "Valve, Butterfly,",
    "swing-check": "Valve, Check, Swing",
}
LINE = {"bore": log(10, 200), "length": log(0.1, 20), "head": (-3, 3), "fitting": list(FITTINGS),
        "count": [0, 1, 2, 5], "strainer": (0, 10), "bypass": (5, 40), "tank": (30, 200),
        "density": (600, 1500)}


@quantity(40, "fluids", re=log(0.1, 1e7), roughness=log(1e-6, 0.05))
def friction(re, roughness):
    return Churchill_1977(re, roughness)


@quantity(39, "fluids", fitting=list(FITTINGS), bore=log(5, 300), re=log(1, 1e5))
def fitting_loss(fitting, bore, re):
    return Hooper2K(Di=bore / 25.4, Re=re, name=FITTINGS[fitting])


def port(q, nu, bore, length, head, fitting, count, strainer, bypass, tank, density):
    """Absolute pressure at the port, kPa; the strainer's loss in kPa is at 100 L/min, 32 mm²/s and
    860 kg/m³. Roughness 0.01 mm, velocity head twice, bypass held to 1.5 times: the defaults."""
    d = bore / 1000
    v = q / 60000 / (math.pi / 4 * d * d)
    re = v * d / (nu * 1e-6)
    losses = (Churchill_1977(re, 0.01 / bore) * length / d + 160 / re + 0.5 + 2
              + count * Hooper2K(Di=bore / 25.4, Re=re, name=FITTINGS[fitting]))
    mesh = min(strainer * q / 100 * nu / 32 * density / 860, 1.5 * bypass)
    return tank + (density * constants.g * head - density * v * v / 2 * losses) / 1000 - mesh


@quantity(50, "fluids", flow=log(0.5, 2000), nu=log(0.21, 1e5), **LINE)
def inlet_pressure(flow, nu, **of):
    speed = flow / 60000 / (math.pi / 4 * (of["bore"] / 1000) ** 2)
    pressure = port(flow, nu, **of)
    return pressure if speed < 5 and pressure > 1 else None


@quantity(25, "fluids, scipy", flow=log(0.5, 2000), least=(20, 90), **LINE)
def largest_viscosity(flow, least, **of):
    """The first crossing on the way from thin to thick: the hump of the transition counts."""
    over = lambda x: port(flow, math.exp(x), **of) - least
    grid = np.linspace(math.log(0.21), math.log(2e7), 3000)
    if over(grid[0]) < 0:
        return None
    for thin, thick in zip(grid, grid[1:]):
        if over(thick) < 0:
            return math.exp(brentq(over, thin, thick, xtol=1e-13))
    return None


@quantity(20, "fluids, scipy", displacement=log(1, 1000), nu=log(1, 1e4), least=(20, 90), **LINE)
def highest_speed(displacement, nu, least, **of):
    over = lambda rpm: port(displacement * rpm / 1000, nu, **of) - least
    return brentq(over, 3, 3000, xtol=1e-10) if over(3) > 0 > over(3000) else None


def laminar(flow, nu, density, bore, length):
    """Loss of a line, Pa, or None where the flow is not laminar."""
    d, q = bore / 1000, flow / 60000
    if q * 4 / (math.pi * d * nu * 1e-6) > 2000:
        return None
    return one_phase_dP(q * density, density, nu * 1e-6 * density, d, L=length)


HOSE = {"nu": log(20, 1e6), "density": (600, 1500), "bore": log(5, 200), "length": log(0.1, 20)}


@quantity(20, "fluids", flow=log(0.1, 500), **HOSE)
def case_drain(flow, **of):
    loss = laminar(flow, **of)
    return loss and loss / 1000


@quantity(20, "fluids", flow=log(0.5, 1000), dp=log(1, 100), **HOSE)
def hose_fill(flow, dp, **of):
    """Laminar flow goes with pressure: the share is dp over the loss at the whole flow."""
    loss = laminar(flow, **of)
    return loss and dp * 1000 / loss


@quantity(15, "scipy", dp=log(1, 100), **HOSE)
def hose_clearing(dp, nu, density, bore, length):
    """The column that is left is drawn out against its own friction; time in units of the first."""
    mu, d = nu * 1e-6 * density, bore / 1000
    scale = 32 * mu * length**2 / (dp * 1000 * d * d)
    end = lambda _, x: 1 - 1e-7 - x[0]
    end.terminal = True
    way = solve_ivp(lambda _, x: [1 / (1 - x[0])], (0, 1), [0], events=end, rtol=1e-10, atol=1e-12)
    return way.t_events[0][0] * scale


@quantity(80, "CoolProp", pressure=log(100, 40000), at=(-60, 120), to=(-60, 120))
def precharge(pressure, at, to):
    density = PropsSI("D", "T", at + ZERO, "P", pressure * 1000 + 101325, "Nitrogen")
    return PropsSI("P", "T", to + ZERO, "D", density, "Nitrogen") / 1000 - 101.325


# Films -------------------------------------------------------------------------------------------

WALL = {"height": log(0.05, 3), "length": log(0.05, 10), "wind": (0, 30), "insulation": [0, 0, 0.5, 2]}


@quantity(25, "ht", ra=log(1e-3, 1e12), pr=log(0.6, 1e7))
def nusselt_plate(ra, pr):
    return Nu_vertical_plate_Churchill(Pr=pr, Gr=ra / pr)


@quantity(25, "ht", ra=log(1e-5, 1e12), pr=log(0.6, 1e7))
def nusselt_rod(ra, pr):
    return Nu_horizontal_cylinder_Churchill_Chu(Pr=pr, Gr=ra / pr)


@quantity(15, "ht, its 0.036 made 0.037", re=log(1e3, 1e8), pr=(0.6, 1))
def nusselt_wind(re, pr):
    """The library's plate is averaged with 0.036; Incropera's with 0.037."""
    return Nu_horizontal_plate_turbulent_Kreith(Re=re, Pr=pr) * 0.037 / 0.036


@quantity(20, "scipy", emissivity=(0.05, 1), surface=(-90, 200), ambient=(-90, 60))
def radiation(emissivity, surface, ambient):
    if abs(surface - ambient) < 1:
        return None
    hot, cold = surface + ZERO, ambient + ZERO
    return emissivity * constants.Stefan_Boltzmann * (hot**4 - cold**4) / (hot - cold)


def outside(surface, ambient, height, length, wind, emissivity=0.9, air=air):
    _, nu, cond, pr = air((surface + ambient) / 2)
    kelvin = (surface + ambient) / 2 + ZERO
    gr = constants.g / kelvin * abs(surface - ambient) * height**3 / nu**2
    still = Nu_vertical_plate_Churchill(Pr=pr, Gr=gr) * cond / height
    blown = nusselt_wind(wind * length / nu, pr) * cond / length if wind else 0
    hot, cold = surface + ZERO, ambient + ZERO
    grey = emissivity * constants.Stefan_Boltzmann * (hot**2 + cold**2) * (hot + cold)
    return np.cbrt(still**3 + blown**3) + grey


@quantity(30, "ht, CoolProp", surface=(-60, 100), ambient=(-60, 20), height=WALL["height"],
          length=WALL["length"], wind=WALL["wind"], emissivity=(0.05, 1))
def outside_film(surface, ambient, **of):
    return outside(surface, ambient, **of) if abs(surface - ambient) >= 1 else None


def film(nusselt, oil, t, difference, size):
    """Coefficient of still oil, W/(m²·K), properties at t; None where there is no viscosity."""
    kv40, kv100, rho15 = oil
    nu = on_line((40, kv40), (100, kv100), t)
    if nu is None:
        return None
    nu *= 1e-6
    gr = constants.g * beta(rho15, t) * difference * size**3 / nu**2
    pr = nu * rho(rho15, t) * cp(rho15, t) / k(rho15, t)
    return nusselt(Pr=pr, Gr=gr) * k(rho15, t) / size


def plate(oil, t, difference, size):
    return film(Nu_vertical_plate_Churchill, oil, t, difference, size)


@quantity(25, "ht", oil_at=(-60, 100), wall=(-60, 100), height=WALL["height"], **OIL)
def oil_film(oil_at, wall, height, kv40, kv100, density_15):
    if kv40 < 2 * kv100 or oil_at - wall < 0.5:
        return None
    return plate((kv40, kv100, density_15), (oil_at + wall) / 2, oil_at - wall, height)


def films(oil, t, ambient, height, length, wind, insulation, air=air):
    """U with the walls where the heat balance puts them; None where the oil has no viscosity."""
    if plate(oil, t, 1, height) is None or plate(oil, ambient, 1, height) is None:
        return None

    def arriving(surface):
        leaving = (outside(surface, ambient, height, length, wind, air=air) * (surface - ambient)
                   if surface > ambient + 1e-9 else 0.0)
        wall = surface + leaving * insulation
        within = plate(oil, (t + min(wall, t)) / 2, max(t - wall, 0), height) * (t - wall)
        return within - leaving, leaving

    surface = brentq(lambda ts: arriving(ts)[0], ambient + 1.001e-9, t, xtol=1e-10)
    return arriving(surface)[1] / (t - ambient)


@quantity(30, "ht, CoolProp, scipy", oil_at=(-50, 100), ambient=(-60, 20), **WALL, **OIL)
def u_value(oil_at, ambient, kv40, kv100, density_15, **walls):
    if kv40 < 2 * kv100 or oil_at - ambient < 3:
        return None
    return films((kv40, kv100, density_15), oil_at, ambient, **walls)


def skin(at_film, density, oil_at, diameter, kv40, kv100, density_15):
    if kv40 < 2 * kv100:
        return None
    oil, size = (kv40, kv100, density_15), diameter / 1000

    def over(ts):
        t = (ts + oil_at) / 2 if at_film else oil_at
        h = film(Nu_horizontal_cylinder_Churchill_Chu, oil, t, ts - oil_at, size)
        return h * (ts - oil_at) - density * 1e4

    hottest = (400 + oil_at) / 2 if at_film else oil_at
    legal = all(on_line((40, kv40), (100, kv100), t) for t in (oil_at, hottest))
    if not legal or over(400) < 0:
        return None
    return brentq(over, oil_at + 1e-9, 400, xtol=1e-9)


ROD = {"density": log(0.05, 5), "oil_at": (-50, 100), "diameter": log(4, 50), **OIL}


@quantity(25, "ht, scipy", **ROD)
def skin_film(**of):
    return skin(True, **of)


@quantity(25, "ht, scipy", **ROD)
def skin_bulk(**of):
    return skin(False, **of)


# Warm-up -----------------------------------------------------------------------------------------

TANK = {"litres": log(5, 5000), "steel": log(1, 2000), "surface": log(0.2, 30), "ambient": (-60, 10),
        **WALL, **OIL}


class Tank:
    """Heat capacity and loss, the films fitted closely over the range asked for. Published air, so
    that only the integration is judged."""

    def __init__(self, top, litres, steel, surface, ambient, kv40, kv100, density_15, **walls):
        self.kg, self.steel, self.rho15, self.ambient = litres / 1000 * density_15, steel, density_15, ambient
        oil = (kv40, kv100, density_15)
        self.legal = (kv40 > 2 * kv100 and top > ambient + 1
                      and films(oil, top, ambient, **walls, air=published_air) is not None)
        if self.legal:
            s = np.linspace(0.05, 1, 60)
            nodes = ambient + (top - ambient) * s**3
            loss = [0.9 * surface * films(oil, t, ambient, **walls, air=published_air) * (t - ambient)
                    for t in nodes]
            self.ua = CubicSpline(s, np.array(loss) / (nodes - ambient))
            self.span = top - ambient

    def loss(self, t):
        over = max(t - self.ambient, 0.0)
        return float(self.ua(np.cbrt(over / self.span))) * over

    def c(self, t):
        return self.kg * cp(self.rho15, t) + self.steel * 440

    def reach(self, power, start, end, longest=3e7):
        """Seconds until `end`, by the differential equation; None if later than `longest`."""
        there = lambda _, y: y[0] - end
        there.terminal = True
        way = solve_ivp(lambda _, y: [(power - self.loss(y[0])) / self.c(y[0])], (0, longest), [start],
                        events=there, rtol=1e-9, atol=1e-9)
        return float(way.t_events[0][0]) if len(way.t_events[0]) else None


@quantity(25, "ht, scipy", power=log(50, 30000), start=(-60, 20), rise=log(1, 100), **TANK)
def warm_up(power, start, rise, **of):
    if start < of["ambient"] or start + rise > 100:
        return None
    tank = Tank(start + rise, **of)
    if not tank.legal or power < 1.02 * tank.loss(start + rise):
        return None
    return tank.reach(power, start, start + rise)


@quantity(25, "ht, scipy", hours=log(0.5, 48), start=(-60, 20), rise=log(1, 100), **TANK)
def needed_power(hours, start, rise, **of):
    end = start + rise
    if start < of["ambient"] or end > 100:
        return None
    tank = Tank(end, **of)
    if not tank.legal:
        return None
    time = lambda power: quad(lambda t: tank.c(t) / (power - tank.loss(t)), start, end, limit=400)[0]
    bare, most = tank.c((start + end) / 2) * rise / (hours * 3600), tank.loss(end)
    low = max(bare, 1.01 * most)
    if time(low) < hours * 3600:
        return None
    return brentq(lambda power: time(power) / 3600 - hours, low, bare + 1.01 * most + 1, xtol=1e-9)


@quantity(20, "ht, scipy", power=log(20, 30000), **TANK)
def steady(power, **of):
    tank = Tank(100, **of)
    if not tank.legal or tank.loss(100) < power or tank.loss(of["ambient"] + 1) > power:
        return None
    return brentq(lambda t: tank.loss(t) - power, of["ambient"], 100, xtol=1e-10)


@quantity(20, "ht, scipy", start=(-20, 100), share=(0.05, 0.95), **TANK)
def cooling_time(start, share, **of):
    tank = Tank(start, **of)
    if not tank.legal or start - of["ambient"] < 5:
        return None
    return tank.reach(0, start, of["ambient"] + share * (start - of["ambient"]))


def night(rng):
    mean, swing, shift = rng.uniform(-50, 0), rng.uniform(0, 12), rng.uniform(0, 24)
    return [round(mean + swing * math.cos((hour - shift) * math.pi / 12) + rng.gauss(0, 0.5), 1)
            for hour in range(25)]


@quantity(15, "scipy", parked=(10, 90), hours=(1, 24), ua=log(0.5, 200), litres=log(5, 5000),
          density_15=(600, 1500), night=night)
def parked(parked, hours, ua, litres, density_15, night):
    kg = litres / 1000 * density_15
    over = lambda s, y: max(y[0] - np.interp(s / 3600, range(25), night), 0)
    fall = lambda s, y: [-ua * over(s, y) / (kg * cp(density_15, y[0]))]
    way = solve_ivp(fall, (0, hours * 3600), [parked], rtol=1e-9, atol=1e-9, max_step=600)
    return float(way.y[0][-1])


@quantity(15, "scipy", capacity=log(1e4, 1e7), start=(0, 90), share=(0.05, 0.95), ambient=(-60, -1),
          over=log(600, 2e5))
def cooldown(capacity, start, share, ambient, over):
    """UA whose differential equation passes both readings."""
    end = share * (start - ambient)
    fall = lambda ua: solve_ivp(lambda _, y: -ua * y / capacity, (0, over), [start - ambient],
                                rtol=1e-11, atol=1e-11).y[0][-1] - end
    return brentq(fall, 0, 10 * capacity / over, xtol=1e-9)


@quantity(10, "numpy", hours=log(0.1, 200))
def daily_wave(hours):
    """Amplitude of the first-order response to a wave of 24 h."""
    return abs(1 / (1 + 2j * np.pi / 24 * hours))


@quantity(15, "scipy", power=log(50, 50000), loss=log(1, 2000), ambient=(-60, 10), start=(-60, 40),
          rise=log(1, 80), litres=log(5, 5000), density_15=(600, 1500))
def circulation(power, loss, ambient, start, rise, litres, density_15):
    end, kg = start + rise, litres / 1000 * density_15
    if start < ambient or power < 1.02 * loss * (end - ambient):
        return None
    there = lambda _, y: y[0] - end
    there.terminal = True
    way = solve_ivp(lambda _, y: [(power - loss * (y[0] - ambient)) / (kg * cp(density_15, y[0]))],
                    (0, 1e8), [start], events=there, rtol=1e-10, atol=1e-10)
    return float(way.t_events[0][0])


# Extremes ----------------------------------------------------------------------------------------

def minima(rng):
    """Winter minima of 10 to 60 years of a generalised extreme value distribution."""
    middle, scale, shape = rng.uniform(-50, -2), rng.uniform(1, 7), rng.uniform(-0.15, 0.45)
    return [round(middle - scale * (1 - (-math.log(rng.random())) ** shape) / shape, 1)
            for _ in range(rng.randint(10, 60))]


RECORD = {"minima": minima}
ONCE = {**RECORD, "once_in": log(1.5, 200)}


def coldness(minima):
    return -np.array(minima)


def ratios(minima):
    return lmoments3.lmom_ratios(coldness(minima), nmom=3)


@quantity(15, "lmoments3", **RECORD)
def l_scale(minima):
    return float(ratios(minima)[1])


@quantity(15, "lmoments3", **RECORD)
def l_skewness(minima):
    return float(ratios(minima)[2])


@quantity(30, "lmoments3", **ONCE)
def gev_level(minima, once_in):
    return -float(distr.gev(**distr.gev.lmom_fit(coldness(minima))).ppf(1 - 1 / once_in))


@quantity(25, "lmoments3", **ONCE)
def gumbel_l_level(minima, once_in):
    return -float(distr.gum(**distr.gum.lmom_fit(coldness(minima))).ppf(1 - 1 / once_in))


def gumbel(mean, deviation):
    """Of -T, with the mean and standard deviation of T."""
    scale = deviation / stats.gumbel_r.std()
    return stats.gumbel_r(-mean - scale * stats.gumbel_r.mean(), scale)


@quantity(30, "scipy", **ONCE)
def level(minima, once_in):
    return -float(gumbel(np.mean(minima), np.std(minima, ddof=1)).ppf(1 - 1 / once_in))


@quantity(15, "scipy", mean=(-60, 0), deviation=(0.5, 10), at=(-60, 0))
def chance(mean, deviation, at):
    return float(gumbel(mean, deviation).sf(-at))


@quantity(10, "scipy", once_in=log(1.5, 500), winters=[1, 5, 10, 30, 100])
def risk(once_in, winters):
    return float(stats.binom.sf(0, winters, 1 / once_in))


@quantity(15, "scipy", **RECORD)
def trend(minima):
    return 10 * float(stats.linregress(range(len(minima)), minima).slope)


def levels(rng):
    """Return levels as a table may give them, of once in 2 to 100 winters."""
    mean, step = rng.uniform(-50, -5), rng.uniform(0.7, 4)
    return [[n, round(mean - step * math.log(n) + rng.uniform(-0.2, 0.2), 1)]
            for n in rng.sample([2, 5, 10, 20, 50, 100], rng.randint(2, 6))]


@quantity(10, "scipy", levels=levels)
def mean_of_levels(levels):
    """Where the line through them meets a frequency factor of zero."""
    once_in, at = np.array(levels).T
    factors = (stats.gumbel_r.ppf(1 - 1 / once_in) - stats.gumbel_r.mean()) / stats.gumbel_r.std()
    line = stats.linregress(factors, at)
    return float(line.intercept) if line.slope < 0 else None


@quantity(15, "numpy", share=(0, 1), readings=lambda rng: [
    round(rng.gauss(-15, 12), 2) for _ in range(rng.randint(3, 60))])
def percentile(share, readings):
    return float(np.percentile(readings, 100 * share))


# Program -----------------------------------------------------------------------------------------

PACKAGES = ("chemicals", "CoolProp", "fluids", "ht", "lmoments3", "numpy", "scipy")


def write(path, seed):
    values = [value for name in QUANTITIES for value in values_of(name, seed)]
    head = json.dumps({"seed": seed, "versions": {name: version(name) for name in PACKAGES}})[1:-1]
    lines = ",\n".join(json.dumps(value, ensure_ascii=False) for value in values)
    with open(path, "w", encoding="utf-8") as file:
        file.write(f'{{{head}, "values": [\n{lines}\n]}}\n')
    print(f"seed {seed}: {len(values)} values of {len(QUANTITIES)} quantities")


def check(path, part):
    stored = json.load(open(path, encoding="utf-8"))
    wrong, chosen = 0, stored["values"][::part]
    for value in chosen:
        fresh = QUANTITIES[value["quantity"]][3](**value["inputs"])
        if fresh is None or not math.isclose(fresh, value["value"], rel_tol=1e-6, abs_tol=1e-9):
            wrong += 1
            print(f"{value}: now {fresh}")
    print(f'seed {stored["seed"]}: {len(chosen)} of {len(stored["values"])} values anew, {wrong} differ')
    return wrong == 0


def main():
    parser = argparse.ArgumentParser(description=__doc__,
                                     formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("--write")
    parser.add_argument("--seed", type=int, default=20261201)
    parser.add_argument("--check")
    parser.add_argument("--part", type=int, default=6)
    args = parser.parse_args()
    warnings.simplefilter("ignore")
    if args.check:
        sys.exit(0 if check(args.check, args.part) else 1)
    if not args.write:
        parser.error("give --write FILE or --check FILE")
    write(args.write, args.seed)


if __name__ == "__main__":
    main()
