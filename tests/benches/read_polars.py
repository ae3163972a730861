"""Times polars on the table of read.rs: the general-purpose reader that stook is held against.

python read_polars.py FILE: labels read as text and as categories, best of three each.
"""

import sys
import time

import polars

LABELS_AS = {"text": polars.String, "categories": polars.Categorical}


def best_of_three(path: str, kind) -> float:
    schema = {"apiary": kind, "hive": kind, "honey": polars.Float64}
    best = float("inf")
    for _ in range(3):
        start = time.perf_counter()
        table = polars.read_csv(path, schema=schema)
        best = min(best, time.perf_counter() - start)
        assert table.height == 10_000_000
    return best


for name, kind in LABELS_AS.items():
    print(f"polars {polars.__version__} labels as {name}: {best_of_three(sys.argv[1], kind):.3f} s", flush=True)
