#!/usr/bin/env python3
"""The demonstration region. Everything in it is INVENTED: waters, districts, cooperatives, fish, money.

Run from the project's root with Python 3.10 or later, standard library only:

    python3 src/test/reference/demo_region.py             writes db-seed/ and the truth, prints a table of the cases
    python3 src/test/reference/demo_region.py --out DIR   the same under DIR, to compare with what is committed:
                                                          diff -r DIR/db-seed db-seed, and so on; no difference

The seed is fixed: a second run writes the same bytes.

Each stock is simulated from known parameters; they go to src/test/resources/reference/demo_truth.csv, its true
states to demo_truth_states.csv, its survey and effort series to demo_truth_series.csv. Within a season biomass B
under a constant harvest rate F follows

    dB/dt = (r/n) B (1 - (B/K)^n) - F B         (Pella & Tomlinson 1969; n = 1 is Graham-Schaefer)

in closed form (a Bernoulli equation; written here on its own, not taken from the program under test). Between
seasons ln B gets a normal process error. FMSY is drawn about 0.87 M (Zhou et al. 2012) with M from maximum age
(Then et al. 2015), the yield of a lake about the mean of two lake formulas (Ryder 1965; Schlesinger & Regier 1982),
so that the usual priors are fair. Life-history values and conversion factors are plausible magnitudes from memory.

A story needs its ending: of up to 2,000 simulated courses per stock the first is kept whose biomass at the start of
2026 falls into the wanted range and whose index tells the story. So the region is NOT a calibration sample.
"""
import argparse
import csv
import datetime as dt
import json
import math
import random
from dataclasses import dataclass, field
from pathlib import Path

SEED = "merewarden demonstration region 1"
LAST, NOW = 2025, 2026  # last closed season; the season in progress
LAST_DAY = dt.date(2026, 11, 22)  # of the log
SILENT, SILENT_FROM = "quilder-hands", dt.date(2026, 8, 1)

COLUMNS = {
    "water-bodies": "code name district kind area_ha mean_depth_m max_depth_m elevation_m latitude longitude "
    "dissolved_solids_mg_l conductivity_us_cm mean_air_temperature_c note",
    "stocks": "water_body species population local_name recruitment productivity max_age_years growth_k_per_year "
    "growth_linf_cm mean_weight_kg share_of_lake_yield price_per_kg effort_cost note",
    "cooperatives": "code name note",
    "rights": "cooperative water_body species population share_percent",
    "catches": "water_body species population year sector catch_t cv reported_fraction source",
    "effort": "water_body species population year series effort unit source",
    "surveys": "water_body species population year series time_of_year kind value cv nets design unit source",
    "events": "key water_body species population year date kind low likely high stage number mean_weight_g survival "
    "delay_years recruit_weight_kg source",
    "areas": "water_body year area_ha",
    "priors": "water_body species population parameter series median log_sd reason",
    "limits": "water_body species population season issued_on kind amount unit set_aside_t valid_from valid_to "
    "measures legal_basis reason",
    "conversions": "species population presentation valid_from factor",
    "landings": "key date slip water_body species population cooperative sector gear nets nights weight_kg "
    "presentation number fate place note",
}
KEYS = {
    "water-bodies": "code", "stocks": "water_body species population", "cooperatives": "code",
    "rights": "cooperative water_body species population", "catches": "water_body species population year sector",
    "effort": "water_body species population year series",
    "surveys": "water_body species population year series time_of_year", "events": "key", "areas": "water_body year",
    "priors": "water_body species population parameter series",
    "limits": "water_body species population season issued_on",
    "conversions": "species population presentation valid_from", "landings": "key",
}
REQUIRED = {
    "water-bodies": "name area_ha", "cooperatives": "name", "rights": "share_percent", "catches": "catch_t",
    "effort": "effort", "surveys": "kind value", "events": "water_body year kind", "areas": "area_ha",
    "priors": "median log_sd", "conversions": "factor", "landings": "date water_body species weight_kg",
}
TEXTS = set(
    "code name district kind note water_body species population local_name recruitment productivity cooperative sector "
    "source series unit design key stage parameter reason measures legal_basis presentation slip gear fate place".split())
WHOLE = {"year", "season", "number"}
DATES = {"date", "issued_on", "valid_from", "valid_to"}

# ---------------------------------------------------------------------------------------------- the invented region

COOPERATIVES = [
    ("nimber-netters", "Nimber Netters", "Invented. Home waters in Nimberside"),
    ("ostren-boats", "Ostren Boat Share", "Invented. Home waters in Ostrenfold"),
    ("vessin-lines", "Vessin Lines and Nets", "Invented. Home waters in Vessinmark"),
    ("quilder-hands", "Quilder Lake Hands", "Invented. Home waters in Quilderay"),
]
HOME = {"Nimberside": "nimber-netters", "Ostrenfold": "ostren-boats", "Vessinmark": "vessin-lines",
        "Quilderay": "quilder-hands"}


@dataclass
class Lake:
    name: str
    district: str
    area: float  # ha
    depth: float  # mean, m
    deepest: float  # m
    elevation: float  # m
    solids: float  # mg/L
    air: float  # mean annual air temperature, degrees C
    kind: str = "lake"
    known: bool = True  # whether its chemistry has been measured
    shares: dict = field(default_factory=dict)  # cooperative -> percent; empty: all to the home cooperative
    note: str = ""

    @property
    def code(self):
        return self.name.lower().replace(" ", "-")

    @property
    def rights(self):
        return self.shares or {HOME[self.district]: 100}


LAKES = [
    Lake("Skelder Water", "Nimberside", 4200, 9.5, 31, 140, 120, 6.2,
         shares={"nimber-netters": 60, "ostren-boats": 25}),
    Lake("Ummer Mere", "Nimberside", 640, 3.4, 8, 62, 190, 7.1),
    Lake("Orlow Tarn", "Nimberside", 85, 6.2, 17, 410, 42, 4.4, note="Hill water, ice until May"),
    Lake("Brindock Mere", "Nimberside", 310, 3.9, 11, 75, 160, 6.8, known=False),
    Lake("Drunnock Lake", "Nimberside", 1150, 5.6, 19, 118, 145, 6.4),
    Lake("Lurrow Tarn", "Nimberside", 130, 5.0, 14, 290, 60, 5.0),
    Lake("Yaffin Lake", "Ostrenfold", 25000, 7.8, 24, 44, 110, 6.0,
         shares={"ostren-boats": 55, "nimber-netters": 20, "quilder-hands": 15},
         note="Shared with a neighbouring (invented) authority"),
    Lake("Volmish Reservoir", "Ostrenfold", 2800, 8.4, 36, 205, 130, 5.8, kind="reservoir",
         note="Drawn down in dry years; see areas"),
    Lake("Mizzow Lake", "Ostrenfold", 1900, 4.8, 13, 51, 150, 6.6),
    Lake("Wexnal Mere", "Ostrenfold", 780, 3.6, 9, 38, 205, 7.2),
    Lake("Sindrel Water", "Ostrenfold", 5600, 6.7, 22, 66, 140, 6.5,
         shares={"ostren-boats": 75, "vessin-lines": 25}),
    Lake("Quopple Mere", "Ostrenfold", 220, 3.1, 6, 33, 170, 7.3),
    Lake("Pellowin Lake", "Vessinmark", 9800, 11.2, 47, 172, 95, 5.1,
         shares={"vessin-lines": 70, "quilder-hands": 30}),
    Lake("Izzle Water", "Vessinmark", 1450, 10.4, 38, 260, 80, 4.8),
    Lake("Thavick Water", "Vessinmark", 2300, 14.5, 61, 315, 66, 4.2),
    Lake("Keddrun Reservoir", "Vessinmark", 1700, 7.1, 27, 190, 105, 5.4, kind="reservoir", known=False),
    Lake("Rauvin Lake", "Vessinmark", 3300, 5.9, 18, 128, 125, 5.9),
    Lake("Obbery Tarn", "Vessinmark", 160, 7.4, 21, 355, 50, 4.5, known=False),
    Lake("Hesquil Lagoon", "Quilderay", 3900, 3.8, 7, 2, 230, 7.9, kind="lagoon",
         shares={"quilder-hands": 80}),
    Lake("Zellock Lake", "Quilderay", 6900, 6.0, 15, 21, 150, 7.0),
    Lake("Bothrick Lake", "Quilderay", 2050, 4.6, 12, 57, 165, 7.0,
         shares={"quilder-hands": 50, "ostren-boats": 50}),
    Lake("Nettigan Water", "Quilderay", 1300, 4.4, 14, 48, 175, 7.1, known=False),
    Lake("Ilveray Water", "Quilderay", 12500, 13.6, 52, 85, 90, 5.7,
         shares={"quilder-hands": 65, "vessin-lines": 35}),
    Lake("Gruskel Lake", "Quilderay", 540, 9.0, 26, 230, 85, 5.2),
]
LAKE = {lake.code: lake for lake in LAKES}


@dataclass
class Species:
    name: str
    age: int  # maximum age
    growth: float
    linf: float  # cm
    weight: float  # mean, kg
    index: float  # kg per net-night at half the carrying capacity
    price: float
    productivity: str
    spawns: str  # the season in which the fishery rests
    gear: str = "gill net"


SPECIES = {
    "FPE": Species("perch", 15, 0.15, 38, 0.25, 2.5, 4.2, "moderate", "spring"),
    "FPI": Species("pike", 17, 0.20, 100, 1.6, 0.8, 3.1, "moderate", "spring"),
    "FPP": Species("zander", 17, 0.18, 85, 1.1, 1.2, 7.8, "moderate", "spring"),
    "PLN": Species("whitefish", 16, 0.25, 48, 0.5, 1.5, 5.5, "moderate", "autumn"),
    "FVE": Species("vendace", 9, 0.50, 22, 0.06, 2.0, 2.9, "fast", "autumn"),
    "FBU": Species("burbot", 18, 0.18, 75, 0.9, 0.3, 3.4, "moderate", "winter", "fyke net"),
    "FBM": Species("bream", 22, 0.10, 55, 0.9, 4.0, 0.9, "slow", "spring", "seine"),
    "FRO": Species("roach", 17, 0.14, 32, 0.15, 5.0, 0.7, "moderate", "spring", "trap net"),
    "TRS": Species("trout", 13, 0.22, 60, 0.6, 0.4, 8.5, "moderate", "autumn"),
    "ACH": Species("char", 24, 0.18, 50, 0.35, 0.9, 9.2, "slow", "autumn"),
    "SME": Species("smelt", 7, 0.40, 20, 0.012, 1.0, 1.2, "fast", "spring", "trap net"),
    "FTE": Species("tench", 18, 0.13, 50, 0.8, 1.0, 2.6, "moderate", "spring", "fyke net"),
    "FCC": Species("crucian carp", 12, 0.20, 35, 0.4, 1.0, 1.4, "moderate", "spring", "fyke net"),
}

# harvest rate as a multiple of FMSY at fractions of the time from the first season to the last
EASY = [(0, 0.35), (0.4, 0.90), (0.7, 0.65), (1, 0.40)]
REBUILT = [(0, 0.70), (0.35, 1.50), (0.6, 1.00), (1, 0.45)]
FOLD = [(0, 0.40), (0.3, 1.80), (0.45, 1.60), (0.6, 0.50), (0.75, 0.70), (1, 1.00)]  # down, up, down: it teaches
ABOVE = [(0, 0.40), (0.3, 1.70), (0.45, 1.50), (0.6, 0.50), (0.8, 1.10), (1, 1.35)]
SLIDE = [(0, 0.55), (0.5, 1.10), (1, 1.65)]
CRASH = [(0, 0.50), (0.55, 0.90), (0.75, 1.60), (1, 2.30)]
DEPLETED = [(0, 0.70), (0.4, 1.40), (1, 2.00)]
LIGHT = [(0, 0.20), (1, 0.35)]


@dataclass
class Stock:
    lake: str
    species: str
    evidence: str  # rich, gappy, catch-only, lake-only
    start: int  # first season
    share: float  # of the lake's yield
    path: list
    band: tuple  # wanted B/BMSY at the start of 2026
    limit: float = 0  # of 2026, as a multiple of MSY; 0: none (or closed)
    case: str = "comfortable"
    uptake: float = 0.75  # of the amount to be logged by LAST_DAY
    n: float = 1
    process_sd: float = 0.08
    index_sd: float = 0.2
    index_scale: float = 1
    missing: float = 0  # share of index years missing
    reported: float = 1  # reported fraction of the commercial catch
    others: dict = field(default_factory=dict)  # other sector -> its share of the removals
    second_series: bool = False
    mark_years: tuple = ()  # mark-recapture
    catch_gaps: tuple = ()
    first_b: float = 0  # B/K at the start; 0: drawn about 0.8
    life_history: bool = True
    mixed: bool = False  # recruitment helped by stocking
    closed: tuple = ()
    effort_limit: bool = False

    @property
    def id(self):
        return self.lake, self.species

    @property
    def commercial_share(self):
        return 1 - sum(self.others.values())


ANGLERS = {"angling": 0.08}
MANY = {"subsistence": 0.06, "angling": 0.08}
STOCKS = [
    Stock("skelder-water", "FPE", "rich", 1991, 0.30, REBUILT, (1.2, 1.5), 0.60, uptake=0.78, others=MANY,
          reported=0.9, mark_years=(2008, 2019)),
    Stock("skelder-water", "PLN", "rich", 1998, 0.30, FOLD, (0.95, 1.15), 0.86, "near the fold", 0.96, others=ANGLERS,
          index_sd=0.15, second_series=True, mark_years=(2018,)),
    Stock("skelder-water", "FPI", "gappy", 1996, 0.16, EASY, (1.2, 1.6), 0.50, uptake=0.70, missing=0.45,
          others={"angling": 0.2}),
    Stock("ummer-mere", "FBM", "rich", 1995, 0.45, EASY, (1.2, 1.6), 0.55, uptake=0.66, reported=0.85),
    Stock("ummer-mere", "FPI", "catch-only", 2002, 0.20, EASY, (1.2, 1.6), 0.45, uptake=0.80, others={"angling": 0.15}),
    Stock("orlow-tarn", "ACH", "gappy", 1999, 0.60, REBUILT, (1.1, 1.5), 0.50, uptake=0.72, missing=0.5,
          index_scale=0.09, index_sd=0.35),
    Stock("brindock-mere", "FTE", "catch-only", 2005, 0.35, EASY, (1.2, 1.6), 0.45, uptake=0.60),
    Stock("drunnock-lake", "FPE", "rich", 1994, 0.45, EASY, (1.2, 1.6), 0.55, uptake=0.74, others=MANY),
    Stock("lurrow-tarn", "FPE", "lake-only", 2005, 0.50, LIGHT, (1.3, 1.95), case="lake only"),
    Stock("yaffin-lake", "FPP", "rich", 1991, 0.28, FOLD, (0.95, 1.2), 0.86, "near the fold", 0.95, reported=0.9,
          others={"subsistence": 0.04, "angling": 0.08, "other party": 0.1}, mark_years=(2014,)),
    Stock("yaffin-lake", "FVE", "rich", 1993, 0.25, EASY, (1.2, 1.6), 0.60, uptake=0.82, n=0.5, process_sd=0.14,
          others={"other party": 0.12}),
    Stock("volmish-reservoir", "FPP", "rich", 2000, 0.35, EASY, (1.15, 1.6), 0.58, uptake=0.76, others=ANGLERS),
    Stock("mizzow-lake", "FPI", "gappy", 1997, 0.30, FOLD, (0.95, 1.15), 0.88, "near the fold", 0.93, missing=0.35,
          others={"angling": 0.12}, index_sd=0.15, mark_years=(2016,)),
    Stock("wexnal-mere", "FBM", "gappy", 2003, 0.40, EASY, (1.2, 1.6), 0.50, uptake=0.64, missing=0.6),
    Stock("sindrel-water", "FPP", "gappy", 1996, 0.30, ABOVE, (0.75, 0.95), 1.15, "limit above MSY", 0.93, missing=0.3,
          others=ANGLERS, reported=0.85, index_sd=0.15, mark_years=(2012,)),
    Stock("sindrel-water", "FPE", "catch-only", 2001, 0.25, EASY, (1.2, 1.6), 0, uptake=0.80, others=ANGLERS),
    Stock("quopple-mere", "FCC", "lake-only", 2005, 0.40, LIGHT, (1.3, 1.95), case="lake only"),
    Stock("pellowin-lake", "PLN", "rich", 1992, 0.40, CRASH, (0.24, 0.36), 0.75, "below tipping biomass", 0.5,
          others={"unlawful": 0.08, "angling": 0.03}, reported=0.9, index_sd=0.18),
    Stock("pellowin-lake", "FBU", "gappy", 2000, 0.15, EASY, (1.2, 1.6), 0.48, uptake=0.70, missing=0.5),
    Stock("izzle-water", "TRS", "rich", 1999, 0.45, EASY, (1.2, 1.7), 0.55, uptake=0.70, mixed=True,
          others={"angling": 0.25}),
    Stock("thavick-water", "ACH", "rich", 1993, 0.60, DEPLETED, (0.7, 1.05), case="closed, recovering", process_sd=0.06,
          index_sd=0.18, others=MANY, closed=(2021, 2022, 2023, 2024, 2025)),
    Stock("keddrun-reservoir", "FPE", "catch-only", 1998, 0.50, EASY, (1.2, 1.6), 0.45, uptake=1.12),
    Stock("rauvin-lake", "FPI", "rich", 1995, 0.28, SLIDE, (0.55, 0.68), 0.95, "just under tipping biomass", 0.84,
          others={"angling": 0.1}, index_sd=0.18),
    Stock("obbery-tarn", "TRS", "catch-only", 2008, 0.60, EASY, (1.2, 1.6), 0.40, uptake=0.85, others={"angling": 0.3}),
    Stock("hesquil-lagoon", "FRO", "gappy", 2001, 0.40, EASY, (1.2, 1.6), 0.52, uptake=0.72, missing=0.4,
          others={"subsistence": 0.1}, catch_gaps=(2007, 2008)),
    Stock("zellock-lake", "SME", "catch-only", 2004, 0.20, EASY, (1.1, 1.6), 0, uptake=0.80, process_sd=0.15,
          life_history=False),
    Stock("bothrick-lake", "FPE", "rich", 2002, 0.40, EASY, (1.2, 1.6), 0.60, uptake=0.74, others=ANGLERS,
          effort_limit=True),
    Stock("nettigan-water", "FPP", "gappy", 1998, 0.40, FOLD, (0.95, 1.2), 0.88, "near the fold", 0.92, missing=0.35,
          mixed=True, first_b=0.45, others={"angling": 0.1}, index_sd=0.15, mark_years=(2015,)),
    Stock("ilveray-water", "FVE", "gappy", 1994, 0.30, FOLD, (0.95, 1.2), 0.83, "near the fold", 0.90, missing=0.45, index_sd=0.15,
          process_sd=0.12, life_history=False, reported=0.9),
    Stock("gruskel-lake", "FBU", "lake-only", 2005, 0.25, LIGHT, (1.3, 1.95), case="lake only"),
]

# fish kill: lake, year, date, (low, likely, high), what truly died
KILL = ("drunnock-lake", 2013, "2013-02-18", (0.2, 0.35, 0.5), 0.38)
# stocking: lake, species, years, number, grams, survival, delay, kg at recruitment
STOCKING = [("izzle-water", "TRS", range(2008, 2023, 2), 9000, 15, 0.12, 2, 0.3),
            ("nettigan-water", "FPP", range(2010, 2025, 2), 30000, 4, 0.04, 3, 0.6)]
CONVERSIONS = [
    ("PLN", "gutted", "2000-01-01", 1.18), ("PLN", "gutted", "2025-01-01", 1.15), ("PLN", "fillet", "2000-01-01", 2.1),
    ("FPP", "gutted", "2000-01-01", 1.12), ("FPP", "fillet", "2000-01-01", 2.4),
    ("FPE", "headed and gutted", "2000-01-01", 1.55), ("FPE", "fillet", "2000-01-01", 2.7),
    ("FPI", "gutted", "2000-01-01", 1.14), ("FPI", "headed and gutted", "2000-01-01", 1.4),
    ("TRS", "gutted", "2000-01-01", 1.16), ("ACH", "gutted", "2000-01-01", 1.15),
    ("FBU", "headed and gutted", "2000-01-01", 1.6),
]
# presentation (with a conversion) and how often it is landed so
LANDED_AS = {"PLN": ("gutted", 0.4), "FPP": ("gutted", 0.35), "FPE": ("fillet", 0.06), "TRS": ("gutted", 0.5),
             "FPI": ("headed and gutted", 0.15), "ACH": ("gutted", 0.5), "FBU": ("headed and gutted", 0.2)}

# ---------------------------------------------------------------------------------------------- dynamics


def fraction_at(tau, b0, r, n, f):
    """B/K after tau years of constant F from B/K = b0."""
    a = r - n * f
    grown = tau if abs(a) < 1e-12 else -math.expm1(-a * tau) / a
    return (math.exp(-n * math.log(b0) - a * tau) + r * grown) ** (-1 / n)


def removals(b0, r, n, k, f):
    """Tonnes removed in a season: F times the integral of B; closed for n = 1, Simpson's rule otherwise."""
    if f == 0:
        return 0.0
    if n == 1:
        a = r - f
        grown = 1.0 if abs(a) < 1e-12 else math.expm1(a) / a
        return f * k / r * math.log1p(r * b0 * grown)
    panels = 200
    total = sum((1 if i in (0, panels) else 4 if i % 2 else 2) * fraction_at(i / panels, b0, r, n, f)
                for i in range(panels + 1))
    return f * k * total / (3 * panels)


def rate_for(catch, b0, r, n, k):
    """The F that removes the given catch, by bisection."""
    low, high = 0.0, 5.0
    for _ in range(200):
        middle = (low + high) / 2
        low, high = (middle, high) if removals(b0, r, n, k, middle) < catch else (low, middle)
    return high if catch > 0 else 0.0


def tipping_fraction(h_over_msy):
    """Lower equilibrium B/BMSY under a constant catch, n = 1; None where the catch exceeds MSY."""
    return None if h_over_msy > 1 else 1 - math.sqrt(1 - h_over_msy)


def interpolate(path, at):
    for (x0, y0), (x1, y1) in zip(path, path[1:]):
        if at <= x1:
            return y0 + (y1 - y0) * (at - x0) / (x1 - x0)
    return path[-1][1]


def lake_yield(lake):
    """Geometric mean of Ryder 1965 and Schlesinger & Regier 1982, kg/ha/yr."""
    mei = lake.solids / lake.depth
    return math.sqrt(1.2376 * math.sqrt(mei) * 10 ** (0.05 * lake.air + 0.28 * math.log10(mei) + 0.236))


# ---------------------------------------------------------------------------------------------- simulation


def rng(*parts):
    return random.Random("|".join([SEED, *map(str, parts)]))


def areas_of(lake):
    """Area by year of the reservoir: full in wet years, drawn down in dry ones."""
    if lake.code != "volmish-reservoir":
        return {}
    draw, level, result = rng("areas"), 1.0, {}
    for year in range(2000, NOW + 1):
        level = min(1.05, max(0.6, 0.95 + 0.65 * (level - 0.95) + draw.gauss(0, 0.11)))
        result[year] = round(lake.area * level, -1)
    return result


def stocked(stock):
    """True tonnes recruiting from stocking, by year of recruitment."""
    result, draw = {}, rng("stocking", *stock.id)
    for lake, species, years, number, _, survival, delay, weight in STOCKING:
        if (lake, species) == stock.id:
            for year in years:
                alive = survival * math.exp(draw.gauss(0, 0.3))
                result[year + delay] = number * alive * weight / 1000
    return result


@dataclass
class Truth:
    stock: Stock
    r: float
    k: float
    msy: float
    fmsy: float
    years: list = field(default_factory=list)
    biomass: dict = field(default_factory=dict)  # t at the start of the season, before stocking and kill; and 2026
    after: dict = field(default_factory=dict)  # t after them
    capacity: dict = field(default_factory=dict)
    rate: dict = field(default_factory=dict)
    catch: dict = field(default_factory=dict)
    surveys: list = field(default_factory=list)  # rows
    effort: list = field(default_factory=list)  # rows
    series: list = field(default_factory=list)  # name, catchability, sd

    @property
    def bmsy(self):
        return self.msy / self.fmsy

    @property
    def standing_biomass(self):
        return self.biomass[NOW] / self.bmsy

    def fraction(self, year, tau):
        return fraction_at(tau, self.after[year] / self.capacity[year], self.r, self.stock.n, self.rate[year])


def parameters(stock):
    lake, species, draw = LAKE[stock.lake], SPECIES[stock.species], rng("parameters", *stock.id)
    per_hectare = lake_yield(lake) * stock.share * math.exp(draw.gauss(0, 0.25))
    msy = per_hectare * lake.area / 1000
    fmsy = 0.87 * 4.899 * species.age ** -0.916 * math.exp(draw.gauss(0, 0.2))
    n = stock.n
    return Truth(stock, fmsy * (1 + n), msy / fmsy * (1 + n) ** (1 / n), msy, fmsy)


def simulate(stock, attempt):
    t, draw = parameters(stock), rng("course", attempt, *stock.id)
    areas, recruits = areas_of(LAKE[stock.lake]), stocked(stock)
    open_years = [y for y in range(stock.start, LAST + 1) if y not in stock.closed]
    t.years = list(range(stock.start, LAST + 1))
    t.capacity = {y: t.k * areas.get(y, LAKE[stock.lake].area) / LAKE[stock.lake].area for y in t.years + [NOW]}
    biomass = t.capacity[stock.start] * (stock.first_b or min(1.1, 0.8 * math.exp(draw.gauss(0, 0.2))))
    for year in t.years:
        k = t.capacity[year]
        t.biomass[year] = biomass
        dead = KILL[4] if (stock.lake, year) == KILL[:2] else 0
        t.after[year] = (biomass + recruits.get(year, 0)) * (1 - dead)
        b0 = t.after[year] / k
        if year in stock.closed:
            t.rate[year] = rate_for(0.01 * t.msy, b0, t.r, stock.n, k)
        else:
            at = (year - stock.start) / max(1, open_years[-1] - stock.start)
            t.rate[year] = t.fmsy * interpolate(stock.path, at) * math.exp(draw.gauss(0, 0.2))
        t.catch[year] = removals(b0, t.r, stock.n, k, t.rate[year])
        biomass = k * t.fraction(year, 1) * math.exp(draw.gauss(0, stock.process_sd))
    t.biomass[NOW] = biomass
    return t


def course(stock):
    for attempt in range(2000):
        t = simulate(stock, attempt)
        if stock.band[0] <= t.standing_biomass <= stock.band[1]:
            observe(t)
            if tells_its_story(t):
                return t
    raise SystemExit(f"no course of {stock.id} ends in {stock.band}")


def tells_its_story(t):
    index = {row["year"]: float(row["value"]) for row in t.surveys if row["kind"] == "index"}
    mean = lambda years: sum(index[y] for y in years) / len(years)
    if t.stock.case == "below tipping biomass":
        return mean((2024, 2025)) < 0.3 * mean(range(2012, 2017))
    if t.stock.lake == KILL[0]:
        return index[KILL[1]] < 0.7 * mean((KILL[1] - 2, KILL[1] - 1))
    if t.stock.closed:
        return mean((2024, 2025)) > 2.2 * mean((2019, 2020, 2021))
    return True


# ---------------------------------------------------------------------------------------------- observation


def sig(x, digits):
    """The number rounded to significant digits, as plain text."""
    if x == 0:
        return "0"
    places = digits - 1 - math.floor(math.log10(abs(x)))
    text = f"{round(x, places):.{max(0, places)}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def row_of(stock, **columns):
    return {"water_body": stock.lake, "species": stock.species, "population": "", **columns}


def index_series(t, name, years, design, tau, cv, nets, draw, scale=1.0):
    stock, species = t.stock, SPECIES[t.stock.species]
    q = species.index * stock.index_scale * scale / (0.5 * t.k)
    t.series.append((name, "index", q, stock.index_sd))
    for year in years:
        effort = max(4, nets + draw.choice((-4, 0, 0, 0, 4)))
        noise = draw.gauss(0, math.hypot(stock.index_sd, cv))
        value = q * t.capacity[year] * t.fraction(year, tau) * math.exp(noise)
        if value < species.weight / effort:  # not one fish in all the nets
            value = 0
        t.surveys.append(row_of(
            stock, year=year, series=name, time_of_year=tau, kind="index", value=sig(value, 3),
            cv=cv if cv and value else "", nets=effort, design=design, unit="kg per net-night",
            source=f"autumn survey {year}"))


def observe(t):
    stock, draw = t.stock, rng("observation", *t.stock.id)
    if stock.evidence in ("catch-only", "lake-only"):
        return
    first = max(stock.start, stock.start + (0 if stock.evidence == "rich" else draw.randint(0, 3)))
    years = list(range(first, LAST + 1))
    if stock.missing:
        kept = round(len(years) * (1 - stock.missing))
        years = sorted(draw.sample(years, kept))
    tau, cv = draw.choice((0.5, 0.6, 0.65)), draw.choice((0.1, 0.12, 0.15, 0.15))
    design = "multi-mesh bottom gill nets, 12 panels 5 to 55 mm, one night"
    nets = 48 if LAKE[stock.lake].area > 3000 else 24 if LAKE[stock.lake].area > 400 else 12
    if stock.second_series:
        old = [y for y in years if y <= 2011]
        index_series(t, "old-nets", old, "single-mesh bottom gill nets, 45 mm, one night", tau, 0, nets, draw, 0.6)
        index_series(t, "multi-mesh", [y for y in years if y >= 2009], design, tau, cv, nets, draw)
    else:
        index_series(t, "multi-mesh", years, design, tau, cv, nets, draw)
    for year in stock.mark_years:
        mark_recapture(t, year, draw)
    if stock.evidence == "rich":
        effort_series(t, draw)


def mark_recapture(t, year, draw):
    cv = draw.choice((0.18, 0.22))
    value = t.capacity[year] * t.fraction(year, 0.4) * math.exp(draw.gauss(0, cv))
    t.surveys.append(row_of(
        t.stock, year=year, series="tagging", time_of_year=0.4, kind="biomass", value=sig(value, 3), cv=cv, nets="",
        design="tagged in April, recaptured in the commercial catch", unit="t", source=f"tagging study {year}"))


def effort_series(t, draw):
    usual = 900 + 90 * math.sqrt(LAKE[t.stock.lake].area)  # net-nights at FMSY
    q = t.fmsy / round(usual, -2)
    t.series.append(("net-nights", "effort", q, 0.15))
    for year in t.years:
        if year not in t.stock.closed:
            t.effort.append(row_of(
                t.stock, year=year, series="net-nights", effort=sig(t.rate[year] / q * math.exp(draw.gauss(0, 0.15)), 3),
                unit="net-nights", source=f"net books {year}"))


SECTOR_CV = {"subsistence": 0.3, "angling": 0.35, "other party": 0.2, "unlawful": 0.5}
SECTOR_SOURCE = {"subsistence": "household survey", "angling": "creel survey", "other party": "letter of the neighbour",
                 "unlawful": "wardens' estimate"}


def catch_rows(t):
    """Reported catches; the commercial ones of 2024 and 2025 are set later from the landings."""
    stock, draw, rows = t.stock, rng("catches", *t.stock.id), []
    if stock.evidence == "lake-only":
        return rows
    cv = {"rich": 0.1, "gappy": 0.15, "catch-only": ""}[stock.evidence]
    for year in t.years:
        if year in stock.closed or year in stock.catch_gaps:
            continue
        for sector, share in [("commercial", stock.commercial_share), *stock.others.items()]:
            commercial = sector == "commercial"
            sd = (cv or 0.2) if commercial else SECTOR_CV[sector]
            reported = stock.reported if commercial else 1
            value = t.catch[year] * share * reported * math.exp(draw.gauss(0, sd))
            source = (f"landing slips {year}" if year >= 2004 else f"yearly ledger {year}") if commercial \
                else f"{SECTOR_SOURCE[sector]} {year}"
            rows.append(row_of(
                stock, year=year, sector=sector, catch_t=sig(value, 3), cv=cv if commercial else sd,
                reported_fraction=reported if reported < 1 else "", source=source))
    return rows


# ---------------------------------------------------------------------------------------------- limits

ORDINANCE = "Invented Fisheries Ordinance, section 12"
REASONS = {
    "comfortable": "Index and catches steady; kept well below what the stock has borne",
    "near the fold": "Close to the largest lasting catch at the users' request; to be reviewed within the year",
    "limit above MSY": "Set on the average catch of the good years; to be reviewed",
    "below tipping biomass": "Carried over; the fall of the survey index was not yet in the working",
    "just under tipping biomass": "Carried over from the season before",
    "closed, recovering": "Closed until the stock has rebuilt",
}
MEASURES = {"spring": "Mesh at least 45 mm; no nets 10 April to 15 May",
            "autumn": "Mesh at least 40 mm; no nets on spawning grounds 1 October to 30 November",
            "winter": "No nets under ice in February"}


def limit_rows(t, effort_2025):
    stock = t.stock
    measures = MEASURES[SPECIES[stock.species].spawns]
    base = {"unit": "t", "legal_basis": ORDINANCE, "measures": measures, "reason": REASONS.get(stock.case, "")}
    rows = []
    for season in (2024, 2025, 2026):
        row = row_of(stock, season=season, issued_on=f"{season - 1}-12-{8 + season % 5:02d}", kind="catch",
                     valid_from=f"{season}-01-01", valid_to=f"{season}-12-31", **base)
        if stock.id == ("lurrow-tarn", "FPE"):
            row.update(kind="measures only", amount="", unit="", set_aside_t="",
                       reason="Nothing known but the lake itself; measures until a survey")
        elif stock.closed:
            row.update(amount="0", set_aside_t="0")
        elif not stock.limit:
            continue
        elif stock.effort_limit:
            row.update(kind="effort", amount=sig(effort_2025 * 1.1, 2), unit="net-nights", set_aside_t="",
                       reason="Effort is counted well here; nets are limited, not fish")
        else:
            earlier = season < NOW and "tipping" not in stock.case
            wanted = 0.55 * (t.catch[2024] + t.catch[2025]) if earlier else stock.limit * t.msy
            amount = sig(wanted, 2)
            row.update(amount=amount, set_aside_t=sig(float(amount) * (1 - stock.commercial_share), 2))
        rows.append(row)
    return rows


# ---------------------------------------------------------------------------------------------- landings

MONTHS = (0.30, 0.30, 0.35, 0.60, 1.10, 1.30, 1.10, 1.00, 1.30, 1.20, 0.60, 0.30)
REST = {"spring": {4: 0.25, 5: 0.5}, "autumn": {10: 0.3, 11: 0.15}, "winter": {2: 0.2}}
PLACES = ("north jetty", "old slip", "ferry ramp", "mill landing", "stone quay")


def days_of(season, until):
    first = dt.date(season, 1, 1)
    return [first + dt.timedelta(d) for d in range((until - first).days + 1)]


def activity(day, species):
    return MONTHS[day.month - 1] * REST[SPECIES[species].spawns].get(day.month, 1)


def factor(species, presentation, day):
    fit = [c for c in CONVERSIONS if c[0] == species and c[1] == presentation and c[2] <= day.isoformat()]
    return fit[-1][3] if fit else 1.0


def trips(lake, season, count, draw):
    """(day, cooperative) of each trip, in order of days; the silent cooperative's later slips never came."""
    until = LAST_DAY if season == NOW else dt.date(season, 12, 28)
    days, coops = days_of(season, until), list(lake.rights)
    weights = [MONTHS[d.month - 1] for d in days]
    found = [(d, draw.choices(coops, [lake.rights[c] for c in coops])[0]) for d in draw.choices(days, weights, k=count)]
    return sorted(trip for trip in found if not (trip[1] == SILENT and trip[0] >= SILENT_FROM))


def presentation_of(species, draw):
    presentation, often = LANDED_AS.get(species, ("", 0))
    return presentation if draw.random() < often else ""


def nets_by_gear(targets, effort):
    """Net-nights of the season by gear: those of the stock whose effort is known, else 2.5 kg to each."""
    nets = {}
    for species in sorted(targets, key=lambda s: s not in effort):
        gear = SPECIES[species].gear
        nets.setdefault(gear, effort.get(species, targets[species] * 1000 / 2.5))
    return nets


def landings_of_lake(lake, season, targets, effort):
    """Landings of one water body in one season.

    targets: species -> live tonnes to be logged; effort: species -> net-nights of the season, where known.
    """
    draw, rows = rng("landings", lake.code, season), []
    total = sum(targets.values())
    planned = round(min(105, 24 + 11 * math.sqrt(total)) * (0.93 if season == NOW else 1))
    voyages = trips(lake, season, planned, draw)
    quiet = len(voyages) / planned  # what is left after slips that never came
    weights = {s: [0 if draw.random() < 0.15 and len(targets) > 1 else activity(d, s) * math.exp(draw.gauss(0, 0.45))
                   for d, _ in voyages] for s in targets}
    nights = [draw.choice((1, 1, 1, 2, 2, 3)) for _ in voyages]
    per_night = {gear: nets * quiet / sum(nights) for gear, nets in nets_by_gear(targets, effort).items()}
    for i, (day, coop) in enumerate(voyages):
        slip = f"{coop[0].upper()}{season % 100}-{lake.code[:3].upper()}{i + 1:03d}"
        busy = math.exp(draw.gauss(0, 0.25))
        place = draw.choice(PLACES)
        for species, target in targets.items():
            live = 1000 * target * quiet * weights[species][i] / sum(weights[species])
            presentation = presentation_of(species, draw)
            counted = draw.random() < 0.15
            weight = live / factor(species, presentation, day)
            gear = SPECIES[species].gear
            if live <= 0:
                continue
            rows.append(landing(
                day, lake.code, species, coop, weight, slip=slip, gear=gear,
                nets=max(1, round(per_night[gear] * busy)), nights=nights[i], presentation=presentation, place=place,
                number=max(1, round(live / SPECIES[species].weight)) if counted and presentation != "fillet" else ""))
    return rows


def landing(day, lake, species, coop, weight, **more):
    row = {column: "" for column in COLUMNS["landings"].split()}
    row.update(date=day.isoformat(), water_body=lake, species=species, cooperative=coop, sector="commercial",
               fate="kept", weight_kg=f"{max(0.1, round(weight, 1)):.1f}")
    row.update(more)
    return row


def odd_landings():
    """What no target asks for: thrown back, protected, seized, mixed, sampled."""
    day = dt.date
    return [
        landing(day(2024, 6, 11), "skelder-water", "FPE", "nimber-netters", 14, gear="gill net", fate="discarded",
                note="spoilt in the net"),
        landing(day(2025, 5, 6), "yaffin-lake", "FPP", "ostren-boats", 22.5, gear="gill net", fate="released",
                number=19, note="below the size limit"),
        landing(day(2025, 7, 2), "thavick-water", "ACH", "vessin-lines", 3.2, gear="gill net", fate="released",
                number=8, note="closed stock, released alive"),
        landing(day(2026, 5, 19), "yaffin-lake", "FPP", "ostren-boats", 31, gear="gill net", fate="released",
                number=27, note="below the size limit"),
        landing(day(2026, 6, 3), "rauvin-lake", "HUC", "vessin-lines", 6.5, gear="gill net", fate="released",
                number=1, note="protected, released alive"),
        landing(day(2026, 9, 15), "izzle-water", "HUC", "vessin-lines", 4.1, gear="gill net", fate="released",
                number=1, note="protected, released alive"),
        landing(day(2026, 6, 24), "thavick-water", "ACH", "vessin-lines", 5.6, gear="gill net", fate="released",
                number=13, note="closed stock, released alive"),
        landing(day(2026, 7, 7), "skelder-water", "FPE", "nimber-netters", 18, gear="gill net", fate="discarded",
                note="spoilt in the net"),
        landing(day(2026, 7, 21), "drunnock-lake", "FPE", "nimber-netters", 9.5, gear="gill net", fate="discarded",
                note="undersized"),
        landing(day(2026, 8, 13), "pellowin-lake", "PLN", "", 46, gear="gill net", sector="unlawful", fate="seized",
                note="unmarked nets lifted by wardens"),
        landing(day(2026, 8, 19), "skelder-water", "mixed", "nimber-netters", 37.5, gear="gill net", nets=12, nights=1,
                note="box not sorted"),
        landing(day(2026, 9, 2), "yaffin-lake", "mixed", "ostren-boats", 120, gear="gill net", nets=30, nights=1,
                note="box not sorted"),
        landing(day(2026, 9, 9), "skelder-water", "FPE", "", 21.4, gear="survey nets", sector="research", number=97,
                note="survey sample"),
        landing(day(2026, 7, 28), "hesquil-lagoon", "FRO", "", 16, gear="fyke net", sector="subsistence"),
    ]


def logged_targets(truths, catches, limits):
    """Live tonnes to be logged: (season, lake) -> species -> tonnes."""
    targets = {}
    for t in truths:
        stock = t.stock
        if stock.evidence == "lake-only" or stock.closed:
            continue
        reported = {row["year"]: float(row["catch_t"]) for row in catches
                    if (row["water_body"], row["species"], row["sector"]) == (*stock.id, "commercial")}
        limit = [row for row in limits
                 if (row["water_body"], row["species"], row["season"], row["kind"]) == (*stock.id, NOW, "catch")]
        allowed = reported[LAST]
        if limit:
            allowed = (float(limit[0]["amount"]) - float(limit[0]["set_aside_t"])) * stock.reported
        for season, tonnes in ((2024, reported[2024]), (2025, reported[2025]), (NOW, allowed * stock.uptake)):
            targets.setdefault((season, stock.lake), {})[stock.species] = tonnes
    return targets


def all_landings(truths, catches, limits):
    effort = {}
    for row in (row for t in truths for row in t.effort):
        effort.setdefault((row["water_body"], row["year"]), {})[row["species"]] = float(row["effort"])
    rows = odd_landings()
    for (season, lake), targets in sorted(logged_targets(truths, catches, limits).items()):
        part = 0.85 if season == NOW else 1  # of the season gone by
        nets = {species: e * part for species, e in effort.get((lake, min(season, LAST)), {}).items()}
        rows += landings_of_lake(LAKE[lake], season, targets, nets)
    rows.sort(key=lambda row: (row["date"], row["water_body"], row["slip"], row["species"]))
    counters = {}
    for row in rows:
        season = row["date"][:4]
        counters[season] = counters.get(season, 0) + 1
        row["key"] = f"demo-{season}-{counters[season]:06d}"
    return rows


def settle_catches(catches, landings):
    """The commercial catch of 2024 and 2025 is what the log adds up to, in live weight, to four digits."""
    sums = {}
    for row in landings:
        if row["sector"] == "commercial" and row["fate"] == "kept":
            day = dt.date.fromisoformat(row["date"])
            key = row["water_body"], row["species"], day.year
            live = float(row["weight_kg"]) * factor(row["species"], row["presentation"], day) / 1000
            sums[key] = sums.get(key, 0) + live
    for row in catches:
        key = row["water_body"], row["species"], row["year"]
        if row["sector"] == "commercial" and row["year"] in (2024, 2025):
            row["catch_t"] = sig(sums[key], 4)


# ---------------------------------------------------------------------------------------------- the other tables


def water_body_rows():
    for lake in LAKES:
        yield {"code": lake.code, "name": lake.name, "district": lake.district, "kind": lake.kind,
               "area_ha": sig(lake.area, 5), "mean_depth_m": lake.depth, "max_depth_m": lake.deepest,
               "elevation_m": lake.elevation, "dissolved_solids_mg_l": lake.solids if lake.known else "",
               "conductivity_us_cm": round(lake.solids / 0.65) if lake.known else "",
               "mean_air_temperature_c": lake.air if lake.known or lake.code == "obbery-tarn" else "",
               "note": lake.note}


def stock_rows():
    for stock in STOCKS:
        species, known = SPECIES[stock.species], stock.life_history
        yield row_of(
            stock, local_name=species.name, recruitment="mixed" if stock.mixed else "natural",
            productivity=species.productivity, max_age_years=species.age if known else "",
            growth_k_per_year=species.growth if known else "", growth_linf_cm=species.linf if known else "",
            mean_weight_kg=species.weight, share_of_lake_yield=stock.share, price_per_kg=species.price,
            effort_cost=2.4 if stock.evidence == "rich" else "", note="")


def event_rows():
    events = []
    lake, year, date, (low, likely, high), _ = KILL
    events.append({"water_body": lake, "year": year, "date": date, "kind": "fish kill", "low": low, "likely": likely,
                   "high": high, "source": "shore count after ice-out 2013"})
    for lake, species, years, number, grams, survival, delay, weight in STOCKING:
        for year in years:
            events.append({"water_body": lake, "species": species, "year": year, "date": f"{year}-05-20",
                           "kind": "stocking", "stage": "fingerling", "number": number, "mean_weight_g": grams,
                           "survival": survival, "delay_years": delay, "recruit_weight_kg": weight,
                           "source": f"stocking permit {year}"})
    for t in TRUTHS:
        for year in t.stock.closed:
            likely = sig(0.01 * t.msy, 1)
            events.append(row_of(t.stock, year=year, date=f"{year}-01-01", kind="closure", low=0, likely=likely,
                                 high=sig(3 * float(likely), 1), source=f"closing order {year}"))
    events.sort(key=lambda e: (e["year"], e["water_body"]))
    return [{"key": f"event-{i + 1:03d}", **event} for i, event in enumerate(events)]


def prior_rows():
    draw, by_id = rng("priors"), {t.stock.id: t for t in TRUTHS}

    def prior(lake, species, parameter, median, log_sd, reason, series=""):
        return row_of(by_id[lake, species].stock, parameter=parameter, series=series, median=median, log_sd=log_sd,
                      reason=reason)

    def about(x, sd):
        return sig(x * math.exp(draw.gauss(0, sd)), 2)

    yaffin = by_id["yaffin-lake", "FVE"]
    return [
        prior("nettigan-water", "FPP", "biomass_fraction_at_start", 0.45, 0.25,
              "Heavily fished in the years before the records begin"),
        prior("thavick-water", "ACH", "fmsy", about(by_id["thavick-water", "ACH"].fmsy, 0.2), 0.3,
              "Slow growth known from scale readings of the 1990s"),
        prior("zellock-lake", "SME", "process_sd", 0.15, 0.3, "Smelt numbers swing with the ice; wider than usual"),
        prior("yaffin-lake", "FVE", "shape", 0.6, 0.4, "Vendace recover fast from low numbers; shape left open"),
        prior("yaffin-lake", "FVE", "msy_t", about(yaffin.msy, 0.25), 0.4, "Hauls of the neighbouring bays, rough"),
        prior("orlow-tarn", "ACH", "observation_sd", 0.35, 0.3, "Few nets in a small tarn", "multi-mesh"),
    ]


def right_rows():
    for stock in STOCKS:
        for coop, percent in LAKE[stock.lake].rights.items():
            yield row_of(stock, cooperative=coop, share_percent=percent)


def package():
    def schema(table):
        required = set((KEYS[table] + " " + REQUIRED.get(table, "")).split()) - {"population", "series", "time_of_year"}
        fields = []
        for column in COLUMNS[table].split():
            kind = "string" if column in TEXTS else "integer" if column in WHOLE else "date" if column in DATES \
                else "number"
            fields.append({"name": column, "type": kind,
                           **({"constraints": {"required": True}} if column in required else {})})
        return {"fields": fields, "primaryKey": KEYS[table].split()}

    return {
        "$schema": "https://datapackage.org/profiles/2.0/datapackage.json",
        "name": "demonstration-region",
        "title": "INVENTED DATA: the demonstration region",
        "description": "Simulated lakes, stocks, catches, surveys, limits and landings of a region that does not exist. "
        "Not to be used as evidence about any real water. Made by src/test/reference/demo_region.py.",
        "resources": [{"name": table, "path": f"{table}.csv", "type": "table", "format": "csv",
                       "mediatype": "text/csv", "encoding": "utf-8", "schema": schema(table)} for table in COLUMNS],
    }


# ---------------------------------------------------------------------------------------------- truth and output


def truth_rows(limits):
    limit = {(row["water_body"], row["species"]): float(row["amount"]) for row in limits
             if row["season"] == NOW and row["kind"] == "catch"}
    for t in TRUTHS:
        s, held = t.stock, limit.get(t.stock.id)
        tipping = None
        if held is not None and s.n == 1:
            tipping = tipping_fraction(held / t.msy)
        yield row_of(
            s, evidence=s.evidence, case=s.case, shape_n=s.n, r_per_year=sig(t.r, 6), k_t=sig(t.k, 6),
            msy_t=sig(t.msy, 6), fmsy_per_year=sig(t.fmsy, 6), process_sd=s.process_sd,
            biomass_2026_t=sig(t.biomass[NOW], 6), b_over_bmsy_2026=sig(t.standing_biomass, 4),
            limit_2026_t="" if held is None else sig(held, 6),
            tipping_biomass_2026_t="" if tipping is None else sig(tipping * t.bmsy, 6))


def state_rows():
    for t in TRUTHS:
        for year in t.years + [NOW]:
            yield row_of(
                t.stock, year=year, biomass_t=sig(t.biomass[year], 6), capacity_t=sig(t.capacity[year], 6),
                harvest_rate_per_year=sig(t.rate[year], 6) if year in t.rate else "",
                catch_t=sig(t.catch[year], 6) if year in t.catch else "")


def series_rows():
    for t in TRUTHS:
        for name, kind, q, sd in t.series:
            yield row_of(t.stock, series=name, kind=kind, catchability=f"{q:.6g}", sd=sd)


def write(path, columns, rows):
    with open(path, "w", encoding="utf-8", newline="") as out:
        writer = csv.DictWriter(out, columns, restval="", lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)


def write_truth(folder, limits):
    stock = ["water_body", "species", "population"]
    write(folder / "demo_truth.csv", stock + [
        "evidence", "case", "shape_n", "r_per_year", "k_t", "msy_t", "fmsy_per_year", "process_sd", "biomass_2026_t",
        "b_over_bmsy_2026", "limit_2026_t", "tipping_biomass_2026_t"], truth_rows(limits))
    write(folder / "demo_truth_states.csv", stock + [
        "year", "biomass_t", "capacity_t", "harvest_rate_per_year", "catch_t"], state_rows())
    write(folder / "demo_truth_series.csv", stock + ["series", "kind", "catchability", "sd"], series_rows())


def report(limits, landings):
    print(f"{'stock':26}{'evidence':12}{'case':28}{'B/BMSY':>7}{'MSY t':>8}{'kg/ha':>7}{'FMSY':>6}{'lim/MSY':>8}"
          f"{'tip':>6}{'C25/MSY':>8}")
    for t, row in zip(TRUTHS, truth_rows(limits)):
        held = row["limit_2026_t"]
        ratio = float(held) / t.msy if held else None
        tip = tipping_fraction(ratio) if held and t.stock.n == 1 else None
        print(f"{'/'.join(t.stock.id):26}{t.stock.evidence:12}{t.stock.case:28}{t.standing_biomass:7.2f}{t.msy:8.2f}"
              f"{1000 * t.msy / LAKE[t.stock.lake].area:7.2f}{t.fmsy:6.2f}"
              f"{'' if ratio is None else format(ratio, '.2f'):>8}{'' if tip is None else format(tip, '.2f'):>6}"
              f"{t.catch[LAST] / t.msy:8.2f}")
    allowed = sum(float(r["amount"]) for r in limits if r["season"] == NOW and r["kind"] == "catch")
    print(f"allowed in {NOW}: {allowed:.0f} t; landings: {len(landings)}")


def main():
    parser = argparse.ArgumentParser(description="Writes the invented demonstration region.")
    parser.add_argument("--out", type=Path, default=Path("."), help="root to write under (default: here)")
    root = parser.parse_args().out
    seed, truth = root / "db-seed", root / "src/test/resources/reference"
    for folder in (seed, truth):
        folder.mkdir(parents=True, exist_ok=True)
    TRUTHS.extend(course(stock) for stock in STOCKS)
    catches = [row for t in TRUTHS for row in catch_rows(t)]
    limits = [row for t in TRUTHS for row in limit_rows(t, float(t.effort[-1]["effort"]) if t.effort else 0)]
    landings = all_landings(TRUTHS, catches, limits)
    settle_catches(catches, landings)
    tables = {
        "water-bodies": water_body_rows(), "stocks": stock_rows(),
        "cooperatives": [dict(zip(("code", "name", "note"), c)) for c in COOPERATIVES], "rights": right_rows(),
        "catches": catches, "effort": [row for t in TRUTHS for row in t.effort],
        "surveys": [row for t in TRUTHS for row in t.surveys], "events": event_rows(),
        "areas": [{"water_body": lake.code, "year": year, "area_ha": sig(area, 5)}
                  for lake in LAKES for year, area in areas_of(lake).items()],
        "priors": prior_rows(), "limits": limits,
        "conversions": [dict(zip(("species", "presentation", "valid_from", "factor"), c)) for c in CONVERSIONS],
        "landings": landings,
    }
    for table, columns in COLUMNS.items():
        write(seed / f"{table}.csv", columns.split(), tables[table])
    (seed / "datapackage.json").write_text(json.dumps(package(), indent=1) + "\n", encoding="utf-8", newline="\n")
    write_truth(truth, limits)
    report(limits, landings)


TRUTHS = []

if __name__ == "__main__":
    main()
