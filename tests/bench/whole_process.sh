#!/usr/bin/env bash
# Whole-process time and memory of the program: one design, and a study of 1,000 reflector sizes.
# Usage: tests/bench/whole_process.sh PROGRAM   (needs /usr/bin/time, Debian package "time")
set -euo pipefail
program=$(realpath "${1:?usage: whole_process.sh PROGRAM}")
folder=$(mktemp -d)
trap 'rm -rf "$folder"' EXIT
cd "$folder"

case_file() {  # case_file POINTS
    cat <<TOML
title = "Whole-process timing"
[band]
from = "2.3 GHz"
to = "2.6 GHz"
points = $1
pattern_at = ["2.44 GHz"]
[patch]
length = "54 mm"
width = "64 mm"
[spacer]
height = "5 mm"
[feed]
kind = "probe"
x = "-13 mm"
diameter = "0.8 mm"
[reflector]
length = "150 mm"
width = "150 mm"
TOML
}

case_file 61 >one.toml
{
    case_file 61
    cat <<TOML
[[vary]]
keys = ["reflector.length", "reflector.width"]
from = "80 mm"
to = "309.77 mm"
step = "0.23 mm"
TOML
} >study.toml

echo "one design, 61 band points, one pattern at 2 degrees (five runs):"
for _ in 1 2 3 4 5; do
    rm -rf one-results
    /usr/bin/time -f "  %e s wall, %U s user, %M kB" "$program" run one.toml >/dev/null 2>log || cat log
    tail -1 log
done
echo "study of 1,000 reflector sizes, 0.65 to 2.5 wavelengths:"
for _ in 1 2; do
    rm -rf study-results
    /usr/bin/time -f "  %e s wall, %U s user, %M kB" "$program" run study.toml >/dev/null 2>log || cat log
    tail -1 log
    ls study-results/designs | wc -l | sed 's/^/  files: /'
done
