"""The peer of the ring sum: the same rings, cone shape and laws, vectorised in NumPy.

Reads one JSON object on standard input (written by benches/side_by_side.rs), prints one JSON object:
the sums of the first and the last evaluation and the seconds of every run.
"""
import json
import sys
import time

import numpy as np
from scipy.special import erfcinv


def conductance(pressure, law):
    """Elastic-plastic solid spots (Sridhar & Yovanovich 1996, exact Gaussian form), W/(m² K)."""
    lam = np.sqrt(2.0) * erfcinv(2.0 * pressure / (law["f"] * law["hardness"]))
    relative = pressure / law["hardness"]
    closure = 1.0 - np.sqrt(relative)
    return law["open"] + law["front"] * np.exp(-0.5 * lam * lam) / (closure * np.sqrt(closure))


def ring_sums(forces, rings, law):
    """Ring sum of every force, W/K; the field is built anew for every force, not scaled from one."""
    radius, area, cone = rings["radius"], rings["area"], rings["cone"]
    x = (radius - cone["hole"]) / (cone["edge"] - cone["hole"])
    total = np.empty(len(forces))
    block = 500                                   # keeps a block of the table in cache
    for start in range(0, len(forces), block):
        force = forces[start:start + block, None]
        place = np.broadcast_to(x, (len(force), len(x))).copy()
        shape = np.power(1.0 - np.power(place, cone["alpha"]), cone["beta"])
        pressure = cone["peak_per_force"] * force * shape
        total[start:start + block] = conductance(pressure, law) @ area
    return total


def main():
    job = json.load(sys.stdin)
    rings = {
        "radius": np.array(job["rings"]["radius"]),
        "area": np.array(job["rings"]["area"]),
        "cone": job["rings"]["cone"],
    }
    forces = np.array(job["forces"])
    seconds = []
    for _ in range(job["runs"]):
        start = time.perf_counter()
        sums = ring_sums(forces, rings, job["law"])
        seconds.append(time.perf_counter() - start)
    json.dump({"first": sums[0], "last": sums[-1], "seconds": seconds}, sys.stdout)


if __name__ == "__main__":
    main()
