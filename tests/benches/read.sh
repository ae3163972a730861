#!/bin/sh
# Times stook and polars on one table in one run and prints the ratio (stook with 2 threads; below 1 is faster).
# Needs python3 with venv and a way to PyPI; everything it makes stays in target/read.
set -eu
cd "$(dirname "$0")/../.."
place=target/read
mkdir -p "$place"
[ -x "$place/venv/bin/python" ] || python3 -m venv "$place/venv"
"$place/venv/bin/pip" install --quiet polars
table=$PWD/$place/harvest.csv

cargo bench --quiet -p stook-tests --bench read -- "$table" | tee "$place/stook.txt"
POLARS_MAX_THREADS=2 "$place/venv/bin/python" tests/benches/read_polars.py "$table" | tee "$place/polars.txt"
ours=$(sed -n 's/^stook 2 threads: \([0-9.]*\) s.*/\1/p' "$place/stook.txt")
theirs=$(sed -n 's/^polars .*: \([0-9.]*\) s$/\1/p' "$place/polars.txt" | sort -n | head -n 1)
echo "ratio: $(awk "BEGIN { printf \"%.2f\", $ours / $theirs }")"
