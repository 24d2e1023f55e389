"""A million Monte Carlo trials of the energy in a solenoid, vectorised in numpy and scipy, for monte-carlo.bench.ts.

Reads {"trials", "repetitions", "turns", "diameter_m": [value, u], "length_m": [value, u], "current_A": [value, u]}
from standard input; writes times in milliseconds, wall and processor, and the result to standard output. Each
repetition is timed from drawing the inputs to both 95 % coverage intervals, as on the other side.
"""

import json
import sys
import time

import numpy as np
from scipy.special import ellipe, ellipk

MU0 = 1.25663706127e-6


def energies(rng, request):
    trials = request["trials"]
    diameter = rng.normal(*request["diameter_m"], trials)
    length = rng.normal(*request["length_m"], trials)
    current = rng.normal(*request["current_A"], trials)
    # Lorenz's current sheet: L = µ0 N² / (3 l²) · (√(d² + l²)·(l² (K − E) + d² E) − d³), modulus² = d²/(d² + l²).
    d2 = diameter * diameter
    l2 = length * length
    diagonal = np.sqrt(d2 + l2)
    m = d2 / (d2 + l2)
    first = ellipk(m)
    second = ellipe(m)
    inductance = (
        MU0 * request["turns"] ** 2 / (3 * l2)
        * (diagonal * (l2 * (first - second) + d2 * second) - d2 * diameter)
    )
    return 0.5 * inductance * current * current


def summary(samples, coverage=0.95):
    # JCGM 101 7.6 and 7.7
    mean = samples.mean()
    u = samples.std(ddof=1)
    ordered = np.sort(samples)
    inside = int(coverage * len(ordered) + 0.5)
    outside = len(ordered) - inside
    widths = ordered[inside:] - ordered[:outside]
    best = int(np.argmin(widths))
    middle = (outside + 1) // 2 - 1
    return dict(
        mean=mean,
        standardUncertainty=u,
        symmetric=[ordered[middle], ordered[middle + inside]],
        shortest=[ordered[best], ordered[best + inside]],
    )


def main():
    request = json.load(sys.stdin)
    rng = np.random.default_rng(1)
    milliseconds, processor = [], []
    for repetition in range(request["repetitions"] + 1):
        start, before = time.perf_counter(), time.process_time()
        result = summary(energies(rng, request))
        if repetition > 0:  # the first warms up
            milliseconds.append((time.perf_counter() - start) * 1e3)
            processor.append((time.process_time() - before) * 1e3)
    json.dump(dict(milliseconds=milliseconds, processorMilliseconds=processor, numpy=np.__version__, **result), sys.stdout)


main()
