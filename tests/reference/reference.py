"""The figures of `coldsump assess`, computed a second time from the published equations.

It shares no code and no table with the Rust program and uses general-purpose libraries wherever
they have the equation: chemicals (ASTM D2270 viscosity index), fluids (friction factor of Churchill
1977, 2-K fittings of Hooper 1981, standard atmosphere), ht (natural convection of Churchill and Chu
1975), scipy (roots, quadrature). The rest is written out here: ASTM D341 (log log Z line), Cragoe
1929 (heat capacity, conductivity), ASTM D1250 / API MPMS 11.1 (density), US Standard Atmosphere
1976 (air), Incropera (flat plate in wind). The factors of the likely range, the margins and the
caps are this project's judgement.

    reference.py CASE.toml ...                          one JSON object a case
    reference.py --random 120 --seed 1 --write FILE     random cases with their figures
    reference.py --check FILE --part 10                 recompute stored cases, exit 1 on a mismatch
    reference.py --bench CASE.toml --repeat 5           time, warm, all oils of a case
"""

import argparse
import json
import math
import random
import re
import sys
import time
import tomllib
from importlib.metadata import version

from chemicals.viscosity import viscosity_index as d2270
from fluids import ATMOSPHERE_1976
from fluids.fittings import Hooper2K
from fluids.friction import Churchill_1977
from ht import Nu_horizontal_cylinder_Churchill_Chu, Nu_vertical_plate_Churchill
from scipy.integrate import quad, solve_ivp
from scipy.optimize import brentq

G = 9.80665
SIGMA = 5.670374419e-8
ZERO = 273.15

UNITS = {
    "°C": 1, "K": 1, "mm²/s": 1, "mPa·s": 1, "kg/m³": 1, "kPa": 1, "bar": 100, "rpm": 1,
    "cm³": 1, "L": 1, "m²": 1, "cm²": 1e-4, "W/(m·K)": 1, "W/(m²·K)": 1, "W/K": 1, "h": 1,
    "mm": 1, "m": 1, "m/s": 1, "L/min": 1, "V": 1, "A": 1, "W": 1, "kg": 1,
}


def q(text, unit=None):
    """A quantity in the unit it is written in, or in `unit` for lengths and areas."""
    number, name = re.fullmatch(r"\s*(-?[\d.]+)\s*(\S+)\s*", text).groups()
    return float(number) * UNITS[name]


def get(case, path, default=None):
    for part in path.split("."):
        if not isinstance(case, dict) or part not in case:
            return default
        case = case[part]
    return q(case) if isinstance(case, str) and re.match(r"\s*-?\d", case) and " " in case else case


# Oil ---------------------------------------------------------------------------------------------

def z(nu):
    return nu + 0.7 + math.exp(-1.47 - 1.84 * nu - 0.51 * nu * nu)


def from_z(value):
    x = value - 0.7
    if x > 50:
        return x
    return x - math.exp(-0.7487 - 3.295 * x + 0.6119 * x**2 - 0.3193 * x**3)


def w(nu):
    return math.log10(math.log10(z(nu)))


def index(kv40, kv100):
    if kv100 < 2.0:
        return None
    return d2270(kv40 * 1e-6, kv100 * 1e-6, rounding=False)


def kv100_of(kv40, wanted):
    return brentq(lambda y: index(kv40, y) - wanted, 2.0, min(kv40, 69.9), xtol=1e-12)


DENSITY = {"mineral": 875, "polymer-thickened": 875, "pao": 830, "ester": 920, "natural-ester": 920,
           "glycol": 1000, "other": 875}
FLASH = {
    "mineral": [(15, 140), (22, 165), (32, 175), (46, 185), (68, 195)],
    "polymer-thickened": [(15, 125), (22, 175), (32, 175), (46, 180), (68, 180)],
    "pao": [(15, 125), (22, 175), (32, 175), (46, 180)],
    "ester": [(22, 165), (32, 175), (46, 185)],
    "natural-ester": [(32, 175), (46, 185)],
}
# Class: base, grade, least index, warmest pour point, (temperature, greatest viscosity), flash, density.
CLASSES = {
    "HM 32": ("mineral", 32, 80, -18, (0, 420), 175, 872),
    "HM 46": ("mineral", 46, 80, -15, (0, 780), 185, 877),
    "HV 32": ("polymer-thickened", 32, 140, -30, (-18, 1500), 175, 870),
    "HV 46": ("polymer-thickened", 46, 140, -27, (-12, 1500), 180, 875),
    "HS 22": ("pao", 22, 130, -45, (-24, 1500), 175, 828),
    "HEES 32": ("ester", 32, 140, -18, (0, 420), 175, 920),
}


class Oil:
    def __init__(self, data):
        self.name = data.get("name", "")
        named = CLASSES.get(data.get("class"))
        self.only_class = "viscosity" not in data and named is not None
        if self.only_class:
            self.base, grade, vi, self.pour, self.limit, self.flash, self.rho15 = named
            points = {40.0: float(grade), 100.0: kv100_of(grade, vi)}
            self.cloud = None
        else:
            self.base = data["base"]
            self.rho15 = get(data, "density", DENSITY[self.base])
            points = {}
            for table in ("viscosity", "cold_viscosity"):
                for at, text in data.get(table, {}).items():
                    t = q(at)
                    nu = q(text)
                    if "mPa" in text:
                        nu = nu / self.rho(t) * 1000
                    points[t] = nu
            if "viscosity_index" in data and 100.0 not in points:
                points[100.0] = kv100_of(points[40.0], data["viscosity_index"])
            self.pour, self.cloud, self.flash = (
                get(data, "pour_point"), get(data, "cloud_point"), get(data, "flash_point"))
            if self.flash is None and 40.0 in points:
                fits = [f for vg, f in FLASH.get(self.base, []) if 0.9 * vg <= points[40.0]]
                self.flash = fits[-1] if fits else None
        self.points = sorted(points.items())
        self.vi = index(self.nu(40.0), self.nu(100.0))
        self.sg = self.rho15 / 999.016
        self.tc = self.points[0][0]

    def nu(self, t):
        points = self.points
        pair = next(((a, b) for a, b in zip(points, points[1:]) if t <= b[0]), points[-2:])
        (t1, n1), (t2, n2) = pair
        l1, l2, x = (math.log10(v + ZERO) for v in (t1, t2, t))
        share = (x - l1) / (l2 - l1)
        return from_z(10 ** (10 ** (w(n1) + share * (w(n2) - w(n1)))))

    def rho(self, t):
        x = 0.6278 / self.rho15 * (t - 15)
        return self.rho15 * math.exp(-x * (1 + 0.8 * x))

    def beta(self, t):
        a = 0.6278 / self.rho15
        return a * (1 + 1.6 * a * (t - 15))

    def cp(self, t):
        return (1684.8 + 3.3913 * t) / math.sqrt(self.sg)

    def k(self, t):
        return 0.11726 / self.sg * (1 - 0.00054 * t)

    def ramp(self, at140, at180):
        vi = 180 if self.vi is None else self.vi
        return at140 + (at180 - at140) * min(1, max(0, (vi - 140) / 40))

    def ln_a(self, t):
        cloud = self.cloud
        if cloud is None:
            cloud = -12 if self.pour is None else max(-12, self.pour + 10)
        if self.base in ("mineral", "natural-ester"):
            return 0.0013 * (40 - t) + 0.069 * max(0, cloud - t)
        if self.base == "polymer-thickened":
            return 0.0028 * (40 - t) + self.ramp(0.0143, 0.0227) * max(0, -t)
        return {"pao": 0.0013, "ester": 0.0028}.get(self.base, 0.008) * (40 - t)

    def free_high(self, t):
        high = self.nu(t) * 1.03
        if t < self.tc:
            high *= math.exp(self.ln_a(t) - self.ln_a(self.tc))
        if self.only_class:
            high *= 1.1
        if self.pour is None:
            high *= 1.25
        return high

    def high(self, t):
        high = self.free_high(t)
        if self.only_class and t <= 40:
            at, limit = self.limit
            if t >= at:
                top = self.free_high(40.0)
                share = (math.log10(t + ZERO) - math.log10(at + ZERO)) / (
                    math.log10(40 + ZERO) - math.log10(at + ZERO))
                high = min(high, from_z(10 ** 10 ** (w(limit) + share * (w(top) - w(limit)))))
            elif t > at - 5:
                less = min(0.0, math.log(limit / self.free_high(at)))
                high *= math.exp(less * (1 - (at - t) / 5))
        return high

    def low(self, t):
        low = self.nu(t) * 0.97
        rate = {"mineral": 0.0036, "natural-ester": 0.0036, "polymer-thickened": 0.0013,
                "pao": 0.0075}.get(self.base, 0.0064)
        if t < self.tc:
            low *= math.exp(-rate * (self.tc - t))
        if self.only_class:
            low *= 0.9
        if self.base == "polymer-thickened" and t > 40:
            low *= math.exp(math.log(self.ramp(0.87, 0.75)) * (t - 40) / 60)
        return low

    def reach(self, t):
        if self.pour is not None and t < self.tc and t < self.pour + 5:
            return "below-pour"
        if self.pour is not None and t < self.tc and t < self.pour + 15:
            return "near-pour"
        return "between-points" if self.tc <= t <= self.points[-1][0] else "extended"


# Pump --------------------------------------------------------------------------------------------

KINDS = {  # viscosity start, work, min, min short; inlet start, work
    "external-gear": (1600, 400, 10, 8, 60, 80), "vane": (860, 200, 13, 10, 70, 83),
    "axial-piston": (1600, 400, 10, 7, 60, 80), "bent-axis": (1600, 400, 10, 7, 60, 80),
    "radial-piston": (1000, 200, 12, 10, 70, 85), "gerotor": (1000, 300, 12, 8, 60, 80),
    "internal-gear": (1000, 300, 12, 8, 60, 80),
}
FITTINGS = {  # Hooper 1981
    "elbow-90-standard-threaded": (800, 0.40), "elbow-90-standard-flanged": (800, 0.25),
    "elbow-90-long": (800, 0.20), "elbow-45-standard": (500, 0.20), "elbow-45-long": (500, 0.15),
    "tee-branch-threaded": (500, 0.70), "tee-branch-flanged": (800, 0.80),
    "tee-run-threaded": (200, 0.10), "tee-run-flanged": (150, 0.05), "gate": (300, 0.10),
    "ball": (300, 0.10), "butterfly": (800, 0.25), "swing-check": (1500, 1.50), "sweep": (0, 0),
}


class Pump:
    def __init__(self, case):
        self.kind = case["pump"]["kind"]
        typical = KINDS[self.kind]
        keys = ("viscosity_start_max", "viscosity_work_max", "viscosity_min", "viscosity_min_short",
                "inlet_pressure_start_min", "inlet_pressure_work_min")
        (self.start_max, self.work_max, self.thin, self.thin_short, self.p_start, self.p_work) = (
            get(case, "pump." + key, value) for key, value in zip(keys, typical))
        self.work_assumed = "inlet_pressure_work_min" not in case["pump"]
        self.n_start = get(case, "pump.start_speed", 1000)
        self.n_work = get(case, "pump.work_speed", 2000)
        self.displacement = get(case, "pump.displacement")
        self.p_atm = ATMOSPHERE_1976(get(case, "site.elevation", 0)).P / 1000
        self.p_tank = self.p_atm + get(case, "reservoir.gauge_pressure", 0)
        suction = case.get("suction")
        self.known = suction is not None and self.displacement is not None
        if suction is None:
            self.suction = None
            return
        self.suction = suction
        self.bore = get(suction, "bore") / 1000
        self.length = get(suction, "length")
        self.head = get(suction, "oil_above_pump", 0)

    def flow(self, rpm):
        return self.displacement * 1e-6 * rpm / 60

    def inlet(self, flow, nu, rho):
        d = self.bore
        v = flow / (math.pi / 4 * d * d)
        re = v * d / (nu * 1e-6)
        k = Churchill_1977(re, 1e-5 / d) * self.length / d + 160 / re + 0.5
        for name, count in self.suction.get("fittings", {}).items():
            k1, kinf = FITTINGS[name]
            k += count * Hooper2K(d / 0.0254, re, K1=k1, Kinfty=kinf)
        loss = 0.5 * rho * v * v * (k + 2)
        strainer = self.suction.get("strainer")
        if strainer:
            ref = (get(strainer, "at_viscosity") * get(strainer, "at_density", 860)
                   * get(strainer, "at_flow") / 60000)
            dp = get(strainer, "loss") * 1000 * nu * rho * flow / ref
            if "bypass" in strainer:
                dp = min(dp, 1.5 * get(strainer, "bypass") * 1000)
            loss += dp
        return self.p_tank + (rho * G * self.head - loss) / 1000


# Limits ------------------------------------------------------------------------------------------

def lowest(met, bottom, top=80.0):
    """The lowest temperature from which `met` (a margin) stays positive up to `top`."""
    if met(top) < 0:
        return ("unattainable", None)
    t = top
    while t > bottom:
        colder = max(bottom, t - 0.5)
        if met(colder) < 0:
            return ("at", brentq(met, colder, t, xtol=1e-8))
        t = colder
    return ("never-bites", bottom)


def limits(case, oil, pump, soak, edge):
    visc = oil.high if edge == "high" else oil.nu
    standing = oil.base == "natural-ester" and get(case, "duty.standing", 12) > 24
    bottom = -60.0 if oil.pour is None else max(oil.pour + 5, -60.0)
    rows = {}
    if oil.pour is None:
        rows["pour-margin"] = rows["line-flow"] = ("not-checked", None)
    else:
        rows["pour-margin"] = ("at", max(oil.pour + 10, -5) if standing else oil.pour + 10)
        rows["line-flow"] = ("at", max(oil.pour + 3, -10) if standing else oil.pour + 3)
    start_max = pump.start_max
    if not pump.known:
        gear = pump.kind in ("external-gear", "internal-gear", "gerotor")
        start_max = min(start_max, (600 if gear else 860) * (pump.p_atm - pump.p_start) / 41)
    rows["viscosity-start"] = (("unattainable", None) if start_max <= 0 else
                               lowest(lambda t: math.log(start_max / visc(t)), bottom))
    rows["viscosity-work"] = lowest(lambda t: math.log(pump.work_max / visc(t)), bottom)
    speeds = {"inlet-pressure-start": (pump.n_start, pump.p_start, False),
              "inlet-pressure-light": (0.6 * pump.n_work, pump.p_work, pump.work_assumed),
              "inlet-pressure-work": (pump.n_work, pump.p_work, pump.work_assumed)}
    for name, (rpm, least, assumed) in speeds.items():
        if not pump.known:
            rows[name] = ("not-checked", None)
        elif assumed and pump.inlet(pump.flow(rpm), 15.0, oil.rho15) < least:
            # A typical limit that does not fit: the floor asks for oil of 15 mm²/s instead.
            rows[name] = ("not-checked", None)
            rows[name + " floor"] = lowest(lambda t: math.log(15.0 / visc(t)), bottom)
        else:
            rows[name] = lowest(
                lambda t: pump.inlet(pump.flow(rpm), visc(t), oil.rho(t)) - least, bottom)
    if oil.low(120.0) >= pump.thin:
        rows["viscosity-min"] = ("never-bites", 120.0)
    elif oil.low(bottom) < pump.thin:
        rows["viscosity-min"] = ("unattainable", None)
    else:
        rows["viscosity-min"] = ("at", brentq(lambda t: oil.low(t) - pump.thin, bottom, 120, xtol=1e-8))
    return rows


START = ("pour-margin", "viscosity-start", "inlet-pressure-start")
LIGHT = START + ("viscosity-work", "inlet-pressure-light")
WORK = START + ("viscosity-work", "inlet-pressure-work")


def floor(rows, names):
    found = None
    for name in names:
        status, t = rows.get(name + " floor", rows[name])
        if status == "unattainable":
            return None, name
        if t is not None and (found is None or t > found[0]):
            found = (t, name)
    return found if found else (None, None)


# Heat --------------------------------------------------------------------------------------------

def air(t):
    k = t + ZERO
    rho = 101325 / (287.055 * k)
    mu = 1.458e-6 * k**1.5 / (k + 110.4)
    cond = 2.64638e-3 * k**1.5 / (k + 245.4 * 10 ** (-12 / k))
    return rho, mu / rho, cond, mu * 1006 / cond


class Tank:
    def __init__(self, case, oil, ambient):
        self.case, self.oil, self.ta = case, oil, ambient
        self.litres = get(case, "reservoir.oil_volume")
        v = self.litres / 1000
        self.area = get(case, "reservoir.surface", 6.9 * v ** (2 / 3))
        self.steel = get(case, "reservoir.steel_mass", 31 * self.area)
        self.height = get(case, "reservoir.height", 0.7 * v ** (1 / 3))
        self.length = get(case, "reservoir.length", 1.4 * v ** (1 / 3))
        share = {"enclosed": 0.2, "open-frame": 0.5, "exposed": 1.0}
        self.wind = get(case, "site.wind", 2) * share[get(case, "reservoir.exposure", "enclosed")]
        thick = get(case, "reservoir.insulation.thickness", 0) / 1000
        self.ins = thick / get(case, "reservoir.insulation.conductivity", 0.040)
        self.cooldown = case["reservoir"].get("cooldown")
        self.given_u = get(case, "reservoir.u_value")
        if self.cooldown:
            t0, t1, ta, h = (get(self.cooldown, key) for key in ("from", "to", "air", "over"))
            self.cooled = self.c((t0 + t1) / 2) / (h * 3600 / math.log((t0 - ta) / (t1 - ta)))

    def c(self, t, litres=None, steel=None):
        litres = self.litres if litres is None else litres
        steel = self.steel if steel is None else steel
        return litres / 1000 * self.oil.rho15 * self.oil.cp(t) + steel * 440

    def u(self, t):
        if self.cooldown:
            return self.cooled / self.area
        if self.given_u is not None:
            return self.given_u
        oil = self.oil

        def out(ts):
            rho, nu, k, pr = air((ts + self.ta) / 2)
            beta = 1 / ((ts + self.ta) / 2 + ZERO)
            gr = G * beta * abs(ts - self.ta) * self.height**3 / nu**2
            natural = Nu_vertical_plate_Churchill(pr, gr) * k / self.height
            forced = 0.0
            if self.wind > 0:
                re = self.wind * self.length / nu
                forced = 0.037 * re**0.8 * pr ** (1 / 3) * k / self.length
            a, b = ts + ZERO, self.ta + ZERO
            rad = 0.9 * SIGMA * (a * a + b * b) * (a + b)
            return ((natural**3 + forced**3) ** (1 / 3) + rad) * (ts - self.ta)

        def inside(tw):
            m = (t + tw) / 2
            nu = oil.nu(m) * 1e-6
            pr = nu * oil.rho(m) * oil.cp(m) / oil.k(m)
            gr = G * oil.beta(m) * abs(t - tw) * self.height**3 / nu**2
            return Nu_vertical_plate_Churchill(pr, gr) * oil.k(m) / self.height * (t - tw)

        # The wall temperature on the oil side decides; the outside follows through the insulation.
        def balance(tw):
            flux = inside(tw)
            return flux - out(tw - flux * self.ins)

        lo = self.ta
        if self.ins > 0:
            lo = brentq(lambda tw: tw - inside(tw) * self.ins - self.ta, self.ta, t, xtol=1e-10)
        tw = brentq(balance, lo, t, xtol=1e-10)
        return inside(tw) / (t - self.ta)

    def loss(self, t):
        if t <= self.ta + 1e-9:
            return 0.0
        films = not self.cooldown and self.given_u is None
        return (0.9 if films else 1.0) * self.u(round(t, 9)) * self.area * (t - self.ta)

    def time(self, power, start, end, factor=1.0):
        return quad(lambda t: self.c(t) / (power - factor * self.loss(t)), start, end,
                    epsrel=1e-6, limit=200)[0]

    def needed(self, seconds, start, end, factor=1.0):
        worst = factor * self.loss(end)
        bare = quad(self.c, start, end)[0] / seconds
        lo = max(bare, worst * (1 + 1e-9))

        def gap(power):
            return seconds / self.time(power, start, end, factor) - 1

        if worst == 0 or gap(lo) >= 0:
            return lo
        return brentq(gap, lo, bare + worst + 1e-6, rtol=1e-7)


def skin(oil, diameter, density, t, at_film):
    def gap(ts):
        m = (ts + t) / 2 if at_film else t
        nu = oil.nu(m) * 1e-6
        pr = nu * oil.rho(m) * oil.cp(m) / oil.k(m)
        gr = G * oil.beta(m) * (ts - t) * diameter**3 / nu**2
        h = Nu_horizontal_cylinder_Churchill_Chu(pr, gr) * oil.k(m) / diameter
        return h * (ts - t) - density * 1e4

    if gap(1500.0) < 0:
        return None
    return brentq(gap, t + 1e-9, 1500.0, xtol=1e-6)


def greatest_density(oil, diameter, cap, hot, cold, flash):
    def ok(density):
        film = skin(oil, diameter, density, hot, True)
        if film is None or film > 120:
            return False
        if flash is None:
            return True
        bulk = skin(oil, diameter, density, cold, False)
        return bulk is not None and max(film, bulk) <= flash - 30

    if ok(cap):
        return cap
    if not ok(1e-6):
        return 0.0
    lo, hi = 1e-6, cap
    while hi - lo > 1e-7:
        mid = (lo + hi) / 2
        lo, hi = (mid, hi) if ok(mid) else (lo, mid)
    return lo


# A case ------------------------------------------------------------------------------------------

def hours_between(a, b):
    minutes = [int(x[:2]) * 60 + int(x[3:]) for x in (a, b)]
    return ((minutes[1] - minutes[0]) % 1440 or 1440) / 60


def assess(case, data):
    oil, pump = Oil(data), Pump(case)
    sky = 2.0 if get(case, "site.clear_sky", False) else 0.0
    minimum = get(case, "site.minimum_temperature")
    soak = minimum - sky
    ambient = get(case, "site.heating_temperature", minimum) - sky
    rows = limits(case, oil, pump, soak, "high")
    expected = limits(case, oil, pump, soak, "expected")
    start, by = floor(rows, START)
    work = floor(rows, WORK)[0]
    below = oil.reach(soak) == "below-pour"
    hot = get(case, "duty.oil_temperature_max", 55)
    result = {
        "name": oil.name, "viscosity_index": oil.vi, "soak_c": soak,
        "viscosity_at_soak": {
            "low_mm2_s": None if below else oil.low(soak),
            "expected_mm2_s": None if below else oil.nu(soak),
            "high_mm2_s": None if below else oil.high(soak), "reach": oil.reach(soak)},
        "limits": [{"limit": k, "status": v[0], "temperature_c": v[1]} for k, v in rows.items() if " " not in k],
        "start_floor_c": start, "start_floor_set_by": by,
        "start_floor_expected_c": floor(expected, START)[0],
        "light_floor_c": floor(rows, LIGHT)[0], "work_floor_c": work,
        "work_floor_expected_c": floor(expected, WORK)[0],
        "hot_ceiling_c": rows["viscosity-min"][1], "viscosity_at_max_low_mm2_s": oil.low(hot),
    }
    tank = Tank(case, oil, ambient)
    tank_soak = ambient
    duty = case["duty"]
    if duty.get("credit_parked_heat") and get(case, "duty.standing", 12) <= 24:
        factor = 1.0 if tank.cooldown else 1.4
        span = hours_between(duty["parked_at"], duty.get("shift_start", "06:00")) * 3600
        path = solve_ivp(lambda _, y: [-factor * tank.loss(y[0]) / tank.c(y[0])], (0, span),
                         [get(duty, "parked_oil")], rtol=1e-7, atol=1e-6)
        tank_soak = max(ambient, float(path.y[0][-1]))
    result["tank_soak_c"] = tank_soak

    circuit_l = get(case, "circuit.oil_volume", 1.5 * tank.litres)
    circuit_kg = get(case, "circuit.steel_mass", max(circuit_l, tank.steel))
    rest15 = tank.c(15.0, circuit_l - tank.litres, circuit_kg - tank.steel)
    heating, target = {}, None
    element = case.get("element", {})
    place = element.get("place", "below-suction")
    pad = element.get("kind", "immersion") == "pad"
    if start is None:
        heating["status"] = "cannot-reach"
    elif start + 3 <= tank_soak:
        heating["status"] = "not-needed"
    else:
        back = 0.2 * rest15 / tank.c(15.0) * (start - soak)
        target = start + 3 + (0 if place == "circulated" else 3) + max(0.0, back)
        line = rows["line-flow"][1]
        cannot = ((line is not None and soak < line) or place == "above-suction"
                  or target > min(60, hot))
        heating["mean_target_c"] = target
        heating["thermostat_c"] = math.ceil((target + 8) / 5) * 5
        if target <= 60:
            share = 0.75 if pad else 1.0
            seconds = get(duty, "time_to_warm") * 3600
            heating["needed_w"] = tank.needed(seconds, tank_soak, target) / share
            heating["needed_high_w"] = tank.needed(seconds, tank_soak, target, 1.4) / share
            heating["hold_w"] = tank.loss(target) / share
            heating["u_value_w_m2_k"] = tank.u(round(target, 9))
            if target - 3 > ambient:
                heating["gate_valid_s"] = quad(lambda t: tank.c(t) / tank.loss(t),
                                               target - 3, target)[0]
        if not pad:
            high = None if below else oil.high(soak)
            cap = (2.3 if place == "circulated" else 0.7 if high is None or high > 5000
                   else 1.2 if high >= 500 else 1.55)
            diameter = get(element, "diameter", 10) / 1000
            density = greatest_density(oil, diameter, cap, heating["thermostat_c"], soak, oil.flash)
            solid = oil.pour is not None and soak <= oil.pour
            heating["watt_density_max_w_cm2"] = None if solid else density
            if density > 0 and not solid:
                heating["skin_film_at_max_c"] = skin(oil, diameter, density,
                                                     heating["thermostat_c"], True)
                heating["skin_bulk_at_max_c"] = skin(oil, diameter, density, soak, False)
            cannot = cannot or density <= 0
        heating["status"] = "cannot-reach" if cannot else "sized"
    result["heating"] = heating

    turn = {}
    mu = None if below else oil.high(soak) * 1e-6 * oil.rho(soak)
    drain = case.get("case_drain")
    if drain and mu is not None:
        turn["case_drain_kpa"] = (128 * mu * get(drain, "length") * get(drain, "flow") / 60000
                                  / (math.pi * (get(drain, "bore") / 1000) ** 4) / 1000)
    if pump.suction is not None:
        dp = (pump.p_atm - pump.p_start) * 1000 + oil.rho(soak) * G * pump.head
        if mu is not None and dp > 0:
            turn["hose_clearing_s"] = 16 * mu * pump.length**2 / (dp * pump.bore**2)
    if pump.known:
        if mu is not None and dp > 0:
            v = pump.flow(pump.n_start) / (math.pi / 4 * pump.bore**2)
            turn["hose_fill"] = dp * pump.bore**2 / (32 * mu * pump.length * v)
        if start is not None:
            gate = start + 3
            at = lambda rpm: pump.inlet(pump.flow(rpm), oil.high(gate), oil.rho(gate))
            turn["vacuum_at_gate_kpa"] = pump.p_atm - at(pump.n_start)
            if at(pump.n_work) >= pump.p_start:
                turn["speed_max_rpm"] = pump.n_work
            elif at(1e-3 * pump.n_work) >= pump.p_start:
                turn["speed_max_rpm"] = brentq(lambda n: at(n) - pump.p_start,
                                               1e-3 * pump.n_work, pump.n_work)
    result["first_turn"] = turn

    neutral = case["pump"].get("neutral")
    pressure = get(case, "pump.charge_pressure" if neutral == "closed-loop"
                   else "circuit.standby_pressure")
    circulation = {}
    if neutral and pressure is not None and pump.displacement is not None:
        heat = (0.05 if neutral == "load-sensing" else 1.0) * pump.flow(pump.n_start) * pressure * 1e3
        loss = get(case, "circuit.heat_loss")
        if loss is None and start is not None:
            at = max(start, ambient + 10)
            loss = 3 * tank.loss(at) / (at - ambient)
        if loss is not None:
            steady = ambient + heat / loss
            circulation["steady_c"] = steady
            warm = target if heating["status"] == "sized" else tank_soak
            mixed = (tank.c(15.0) * warm + rest15 * soak) / (tank.c(15.0) + rest15)
            if work is not None:
                if mixed >= work:
                    circulation["time_s"] = 0.0
                elif steady > work and heat > loss * (mixed - ambient):
                    circulation["time_s"] = quad(
                        lambda t: tank.c(t, circuit_l, circuit_kg) / (heat - loss * (t - ambient)),
                        mixed, work, limit=200)[0]
    result["circulation"] = circulation
    return result


def assess_all(text):
    case = tomllib.loads(text)
    return [assess(case, data) for data in case["oil"]]


# Random cases ------------------------------------------------------------------------------------

def random_case(rng, number):
    r = rng.uniform
    pick = rng.choice
    minimum = round(r(-50, -8), 1)
    out = ["format = 1", f'title = "random {number}"', "", "[site]",
           f'minimum_temperature = "{minimum} °C"']
    if rng.random() < 0.5:
        out.append(f'heating_temperature = "{round(minimum + r(0, 8), 1)} °C"')
    if rng.random() < 0.7:
        out.append(f'wind = "{round(r(0, 12), 1)} m/s"')
    if rng.random() < 0.6:
        out.append(f'elevation = "{round(r(0, 4000))} m"')
    if rng.random() < 0.2:
        out.append("clear_sky = true")
    kind = pick(list(KINDS))
    neutral = pick(["open-centre", "load-sensing", "closed-loop", None])
    start = round(r(600, 1200))
    out += ["", "[pump]", f'kind = "{kind}"', f'start_speed = "{start} rpm"',
            f'work_speed = "{round(start * r(1.2, 2.5))} rpm"']
    cm3 = round(10 ** r(1.0, 2.4), 1)
    if rng.random() < 0.85:
        out.append(f'displacement = "{cm3} cm³"')
    if neutral:
        out.append(f'neutral = "{neutral}"')
        if neutral == "closed-loop" and rng.random() < 0.8:
            out.append(f'charge_pressure = "{round(r(15, 30))} bar"')
    if rng.random() < 0.5:
        out += [f'viscosity_start_max = "{round(r(700, 2500))} mm²/s"',
                f'viscosity_work_max = "{round(r(100, 600))} mm²/s"']
    if rng.random() < 0.3:
        out += ['viscosity_min = "11 mm²/s"', 'viscosity_min_short = "8 mm²/s"']
    if rng.random() < 0.5:
        out += [f'inlet_pressure_start_min = "{round(r(45, 65), 1)} kPa"',
                f'inlet_pressure_work_min = "{round(r(70, 85), 1)} kPa"']
    if rng.random() < 0.8:
        # About 0.6 m/s in the hose at start.
        bore = math.sqrt(cm3 * 1e-6 * start / 60 / r(0.25, 0.9) / (math.pi / 4)) * 1000
        out += ["", "[suction]", f'bore = "{round(bore, 1)} mm"', f'length = "{round(r(0.4, 3), 2)} m"',
                f'oil_above_pump = "{round(r(-0.4, 1.0), 2)} m"']
        names = rng.sample(list(FITTINGS), rng.randint(0, 3))
        if names:
            inner = ", ".join(f'"{name}" = {rng.randint(1, 3)}' for name in names)
            out.append(f"fittings = {{ {inner} }}")
        if rng.random() < 0.5:
            text = (f'strainer = {{ loss = "{round(r(1, 4), 1)} kPa", '
                    f'at_flow = "{round(cm3 * start / 1000 * r(1.5, 3), 1)} L/min", at_viscosity = "32 mm²/s"')
            if rng.random() < 0.3:
                text += ', at_density = "870 kg/m³"'
            if rng.random() < 0.6:
                text += f', bypass = "{round(r(10, 30))} kPa"'
            out.append(text + " }")
    if rng.random() < 0.3:
        out += ["", "[case_drain]", 'bore = "16 mm"', f'length = "{round(r(1, 4), 1)} m"',
                f'flow = "{round(r(1, 6), 1)} L/min"']
    litres = round(10 ** r(1.5, 3.1))
    out += ["", "[reservoir]", f'oil_volume = "{litres} L"']
    if rng.random() < 0.4:
        v = litres / 1000
        out += [f'surface = "{round(6.9 * v ** (2 / 3) * r(0.9, 1.3), 3)} m²"',
                f'height = "{round(0.7 * v ** (1 / 3), 3)} m"',
                f'length = "{round(1.4 * v ** (1 / 3) * r(0.7, 1.3), 3)} m"']
    if rng.random() < 0.5:
        out.append(f'exposure = "{pick(["enclosed", "open-frame", "exposed"])}"')
    way = rng.random()
    if way < 0.3:
        out.append(f'insulation = {{ thickness = "{round(r(10, 60))} mm" }}')
    elif way < 0.4:
        out.append(f'u_value = "{round(r(1, 15), 1)} W/(m²·K)"')
    elif way < 0.5:
        out.append('cooldown = { from = "20 °C", to = "-2 °C", air = "-21 °C", over = "9 h" }')
    if rng.random() < 0.1:
        out.append('gauge_pressure = "20 kPa"')
    out += ["", "[circuit]", f'standby_pressure = "{round(r(10, 40))} bar"']
    if rng.random() < 0.5:
        out += [f'oil_volume = "{round(litres * r(1.1, 2.2))} L"',
                f'steel_mass = "{round(litres * r(1.0, 3.0) + 60)} kg"']
    if rng.random() < 0.3:
        out.append(f'heat_loss = "{round(r(10, 120))} W/K"')
    out += ["", "[duty]", f'time_to_warm = "{round(r(1, 12), 1)} h"']
    if rng.random() < 0.3:
        out.append(f'oil_temperature_max = "{round(r(45, 80))} °C"')
    if rng.random() < 0.15:
        out += ["credit_parked_heat = true", 'parked_at = "18:00"', 'shift_start = "05:00"',
                f'parked_oil = "{round(r(20, 55))} °C"']
    if rng.random() < 0.4:
        out.append(f'standing = "{pick([12, 60, 120])} h"')
    if rng.random() < 0.5:
        out += ["", "[element]"]
        out.append(f'kind = "{pick(["immersion", "immersion", "pad"])}"')
        out.append(f'place = "{pick(["below-suction", "circulated", "circulated", "above-suction"])}"')
        if rng.random() < 0.5:
            out.append(f'diameter = "{pick([8, 10, 12, 16])} mm"')
    for n in range(rng.randint(1, 2)):
        out += ["", "[[oil]]", f'name = "oil {n + 1}"']
        if rng.random() < 0.15:
            out.append(f'class = "{pick(list(CLASSES))}"')
            continue
        base = pick(list(DENSITY))
        kv40 = round(10 ** r(1.0, 1.85), 2)
        if base in ("glycol", "other"):
            kv40 = round(min(kv40, 40.0), 2)
        vi = round(r(80, 190))
        kv100 = round(kv100_of(kv40, vi), 3)
        pour = round(r(minimum - 30, minimum + 12) / 3) * 3
        out += [f'base = "{base}"', f'density = "{DENSITY[base] + rng.randint(-15, 15)} kg/m³"']
        if rng.random() < 0.25:
            out += [f'viscosity = {{ "40 °C" = "{kv40} mm²/s" }}', f"viscosity_index = {vi}"]
        else:
            out.append(f'viscosity = {{ "40 °C" = "{kv40} mm²/s", "100 °C" = "{kv100} mm²/s" }}')
        if rng.random() < 0.25:
            probe = Oil({"base": base, "viscosity": {"40 °C": f"{kv40} mm²/s", "100 °C": f"{kv100} mm²/s"}})
            at = max(pour + 3, round(r(-30, -5)))
            nu = probe.nu(at) * r(0.7, 1.6)
            if rng.random() < 0.5:
                out.append(f'cold_viscosity = {{ "{at} °C" = "{round(nu)} mm²/s" }}')
            else:
                out.append(f'cold_viscosity = {{ "{at} °C" = "{round(nu * probe.rho(at) / 1000)} mPa·s" }}')
        if rng.random() < 0.92:
            out.append(f'pour_point = "{pour} °C"')
            if rng.random() < 0.2:
                out.append(f'cloud_point = "{pour + rng.randint(0, 15)} °C"')
        if rng.random() < 0.5:
            out.append(f'flash_point = "{rng.randint(140, 240)} °C"')
    return "\n".join(out) + "\n"


def figures(value):
    if isinstance(value, float):
        return float(f"{value:.9g}")
    if isinstance(value, dict):
        return {k: figures(v) for k, v in value.items()}
    return [figures(v) for v in value] if isinstance(value, list) else value


def versions():
    return {name: version(name) for name in ("chemicals", "fluids", "ht", "numpy", "scipy")}


def check(path, part):
    stored = json.load(open(path, encoding="utf-8"))
    cases = stored["cases"]
    count = len(cases) if part == "all" else min(int(part), len(cases))
    passed = failed = 0
    for n in range(count):
        case = cases[n * len(cases) // count]
        fresh = figures(assess_all(case["toml"]))
        bad = [path for path, a, b in leaves("", case["oils"], fresh) if not close(path, a, b)]
        failed += bool(bad)
        passed += not bad
        if bad:
            print(f'{case["name"]}: {", ".join(bad)}')
    print(f"{passed} passed, {failed} failed")
    return failed == 0


def write(path, stored):
    """One case a line, so that a change shows where it is."""
    cases = stored.pop("cases")
    head = json.dumps(stored)[1:-1]
    lines = ",\n".join(json.dumps(case, ensure_ascii=False) for case in cases)
    with open(path, "w", encoding="utf-8") as file:
        file.write(f'{{{head}, "cases": [\n{lines}\n]}}\n')


def leaves(path, a, b):
    if isinstance(a, dict) and isinstance(b, dict):
        for key in a.keys() | b.keys():
            yield from leaves(f"{path}/{key}", a.get(key), b.get(key))
    elif isinstance(a, list) and isinstance(b, list) and len(a) == len(b):
        for n, (x, y) in enumerate(zip(a, b)):
            yield from leaves(f"{path}/{n}", x, y)
    else:
        yield path, a, b


def close(path, a, b):
    if not isinstance(a, float) or not isinstance(b, (int, float)):
        return a == b
    if path.endswith("_c"):
        return abs(a - b) <= 0.05
    return abs(a - b) <= 0.005 * abs(a) + 1e-9


def main():
    parser = argparse.ArgumentParser(description=__doc__,
                                     formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("cases", nargs="*")
    parser.add_argument("--random", type=int)
    parser.add_argument("--seed", type=int, default=20261201)
    parser.add_argument("--write")
    parser.add_argument("--check")
    parser.add_argument("--part", default="10")
    parser.add_argument("--bench")
    parser.add_argument("--repeat", type=int, default=3)
    args = parser.parse_args()
    if args.check:
        sys.exit(0 if check(args.check, args.part) else 1)
    if args.bench:
        text = open(args.bench, encoding="utf-8").read()
        seconds = []
        assess_all(text)
        for _ in range(args.repeat):
            start = time.perf_counter()
            oils = assess_all(text)
            seconds.append(time.perf_counter() - start)
        print(json.dumps({"seconds": seconds,
                          "needed_w": [oil["heating"].get("needed_w") for oil in oils]}))
        return
    if args.random:
        rng = random.Random(args.seed)
        cases = []
        for number in range(1, args.random + 1):
            text = random_case(rng, number)
            cases.append({"name": f"random {number}", "toml": text, "oils": figures(assess_all(text))})
        stored = {"versions": versions(), "seed": args.seed, "cases": cases}
        write(args.write, stored)
        return
    stored = []
    for path in args.cases:
        text = open(path, encoding="utf-8").read()
        stored.append({"name": path, "toml": text, "oils": figures(assess_all(text))})
    if args.write:
        write(args.write, {"versions": versions(), "cases": stored})
    else:
        for case in stored:
            print(json.dumps(case, ensure_ascii=False))


if __name__ == "__main__":
    main()
