"""Writes boards.csv of the mites example. Every number is invented.

    python3 examples/mites/make_data.py

A board under a hive catches the mites that fall; it stays in for a few days and is then counted. Hives stand in apiaries, some were
treated. The constants below are what a good fit should find again, within its intervals. The seed is fixed: the file is the
same byte for byte each time.
"""

import csv
import math
import pathlib

TYPICAL_LOG_FALL = 1.0  # log of mites a day: about 2.7
TREATED_EFFECT = -0.9  # a treated hive drops about four in ten of that
APIARY_SD = 0.6
SEED = 4031

# Name, hives.
APIARIES = [
    ("Alder Bank", 6),
    ("Beacon Field", 4),
    ("Clover End", 7),
    ("Dry Dyke", 3),
    ("Elder Lane", 5),
    ("Gorse Hill", 6),
    ("Heath", 4),
    ("Ivy Mill", 5),
]
COUNTS_PER_HIVE = 4


class Generator:
    """A 64-bit congruential generator (constants: Knuth 1998, section 3.3.4, line 26), high bits only."""

    def __init__(self, seed):
        self.state = seed

    def fraction(self):
        """A uniform draw from 0 (included) to 1 (excluded)."""
        self.state = (6364136223846793005 * self.state + 1442695040888963407) % 2**64
        return (self.state >> 32) / 2**32

    def normal(self, mean, sd):
        """Twelve uniform draws added up: near enough to a normal."""
        return mean + sd * (sum(self.fraction() for _ in range(12)) - 6.0)

    def poisson(self, mean):
        """Uniform draws multiplied until they fall below exp(-mean) (Knuth 1998, section 3.4.1)."""
        limit, product, count = math.exp(-mean), self.fraction(), 0
        while product > limit:
            product *= self.fraction()
            count += 1
        return count


def make_boards(draw):
    """The rows: apiary, hive, treated (0 or 1), days that the board stayed in, mites counted."""
    rows = []
    for apiary, hives in APIARIES:
        apiary_effect = draw.normal(0.0, APIARY_SD)
        for hive in range(1, hives + 1):
            treated = int(draw.fraction() < 0.5)
            for _ in range(COUNTS_PER_HIVE):
                days = 2 + int(4 * draw.fraction())
                fall = math.exp(TYPICAL_LOG_FALL + TREATED_EFFECT * treated + apiary_effect)
                rows.append((apiary, hive, treated, days, draw.poisson(fall * days)))
    return rows


def main():
    """The table, beside this script."""
    path = pathlib.Path(__file__).resolve().parent / "boards.csv"
    with open(path, "w", newline="", encoding="utf-8") as file:
        table = csv.writer(file, lineterminator="\n")
        table.writerow(["Apiary", "Hive", "Treated", "Days", "Mites"])
        table.writerows(make_boards(Generator(SEED)))


if __name__ == "__main__":
    main()
