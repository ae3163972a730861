"""Writes harvest.csv and weather.csv of the honey example. Every number is invented.

There is no such co-operative: the apiaries, hives, seasons, weights and rainfalls come out of the small random generator
below, with a fixed seed. Run it again and the two files are the same byte for byte, with any Python from 3.8 on.

    python3 examples/honey/make_data.py

The constants below are the values that the numbers are made from: what a good fit should find again, within its intervals.
"""

import csv
import pathlib

GRAND_MEAN = 24.0  # kg of honey from a hive in a season
SEASON_SD = 4.0  # kg, from one season to another, over all apiaries, rain apart
APIARY_SD = 3.0  # kg, from one apiary to another
HIVE_SD = 1.5  # kg, from one hive to another of the same apiary
RESIDUAL_SD = 4.0  # kg, everything else
RAIN_SLOPE = -0.02  # kg lost for each mm of rain from May to July
RAIN_MEAN = 210.0  # mm
RAIN_SD = 45.0  # mm
GAP = 0.05  # share of weighings that nobody wrote down
DEATH = 0.07  # chance that a hive does not live through a winter
SEED = 20160501

SEASONS = range(2016, 2024)
# Name, hives, first season.
APIARIES = [
    ("Alder Bank", 8, 2016),
    ("Beacon Field", 6, 2016),
    ("Clover End", 9, 2016),
    ("Dry Dyke", 5, 2016),
    ("Elder Lane", 7, 2016),
    ("Ferny Brake", 4, 2017),
    ("Gorse Hill", 8, 2017),
    ("Heath", 6, 2018),
    ("Ivy Mill", 9, 2020),
]


class Generator:
    """A 64-bit congruential generator (multiplier and increment: Knuth 1998, section 3.3.4, line 26), high bits only.

    Whole numbers and exactly rounded sums, so that every Python gives the same draws.
    """

    def __init__(self, seed):
        self.state = seed

    def fraction(self):
        """A uniform draw from 0 (included) to 1 (excluded)."""
        self.state = (6364136223846793005 * self.state + 1442695040888963407) % 2**64
        return (self.state >> 32) / 2**32

    def normal(self, mean, sd):
        """A draw that is near enough to a normal: twelve uniform draws added up, which needs no logarithm."""
        return mean + sd * (sum(self.fraction() for _ in range(12)) - 6.0)


def make_weather(draw):
    """Rain from May to July by season, in mm."""
    return {season: round(draw.normal(RAIN_MEAN, RAIN_SD)) for season in SEASONS}


def make_harvest(draw, weather):
    """The rows of the harvest book: season, apiary, hive, honey or nothing, remark."""
    season_effect = {s: draw.normal(0.0, SEASON_SD) + RAIN_SLOPE * (weather[s] - RAIN_MEAN) for s in SEASONS}
    rows = []
    for apiary, hives, first in APIARIES:
        apiary_effect = draw.normal(0.0, APIARY_SD)
        for hive in range(1, hives + 1):
            hive_effect = draw.normal(0.0, HIVE_SD)
            for season in range(first, SEASONS[-1] + 1):
                expected = GRAND_MEAN + season_effect[season] + apiary_effect + hive_effect
                honey = max(0.5, draw.normal(expected, RESIDUAL_SD))
                gap = draw.fraction() < GAP
                remark = "not weighed, moved to the heather" if gap else ""
                rows.append((season, apiary, hive, "" if gap else f"{honey:.1f}", remark))
                if draw.fraction() < DEATH:
                    break
    # The book is kept by season.
    return sorted(rows, key=lambda row: (row[0], row[1], row[2]))


def write(path, headings, rows):
    """One table, with line feeds on every system."""
    with open(path, "w", newline="", encoding="utf-8") as file:
        table = csv.writer(file, lineterminator="\n")
        table.writerow(headings)
        table.writerows(rows)


def main():
    """Both tables, beside this script."""
    folder = pathlib.Path(__file__).resolve().parent
    draw = Generator(SEED)
    weather = make_weather(draw)
    harvest = make_harvest(draw, weather)
    write(folder / "weather.csv", ["Season", "Rain May-July (mm)"], weather.items())
    write(folder / "harvest.csv", ["Season", "Apiary", "Hive", "Honey (kg)", "Remark"], harvest)


if __name__ == "__main__":
    main()
