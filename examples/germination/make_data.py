"""Writes dishes.csv of the germination example. Every number is invented.

    python3 examples/germination/make_data.py

Batches of one seed lot went to several laboratories; each laboratory sowed two or three dishes of each batch, on plain paper or on
paper that had been chilled first, and counted the seeds that had germinated. The constants below are what a good fit should find
again, within its intervals. The seed is fixed: the file is the same byte for byte each time.
"""

import csv
import math
import pathlib

TYPICAL_LOG_ODDS = 1.1  # about three seeds in four
CHILL_EFFECT = 0.6  # on the log-odds scale
BATCH_SD = 0.5
LABORATORY_SD = 0.3
SEED = 771

BATCHES = ["B01", "B02", "B03", "B04", "B05", "B06", "B07", "B08", "B09", "B10", "B11", "B12"]
LABORATORIES = ["Harbour", "Mill Road", "Old Dairy", "Quarry", "Station"]


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


def make_dishes(draw):
    """The rows: laboratory, batch, dish, chilled (0 or 1), seeds sown, seeds germinated."""
    batch_effect = {batch: draw.normal(0.0, BATCH_SD) for batch in BATCHES}
    laboratory_effect = {laboratory: draw.normal(0.0, LABORATORY_SD) for laboratory in LABORATORIES}
    rows = []
    for laboratory in LABORATORIES:
        for batch in BATCHES:
            # Not every laboratory received every batch.
            if draw.fraction() < 0.2:
                continue
            for dish in range(1, 3 + (draw.fraction() < 0.4)):
                chilled = dish % 2
                log_odds = TYPICAL_LOG_ODDS + CHILL_EFFECT * chilled + batch_effect[batch] + laboratory_effect[laboratory]
                chance = 1.0 / (1.0 + math.exp(-log_odds))
                sown = 25 if draw.fraction() < 0.8 else 20
                germinated = sum(draw.fraction() < chance for _ in range(sown))
                rows.append((laboratory, batch, dish, chilled, sown, germinated))
    return rows


def main():
    """The table, beside this script."""
    path = pathlib.Path(__file__).resolve().parent / "dishes.csv"
    with open(path, "w", newline="", encoding="utf-8") as file:
        table = csv.writer(file, lineterminator="\n")
        table.writerow(["Laboratory", "Batch", "Dish", "Chilled", "Sown", "Germinated"])
        table.writerows(make_dishes(Generator(SEED)))


if __name__ == "__main__":
    main()
