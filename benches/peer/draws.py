"""The draws of a bare joint in vacuum in vectorised NumPy: same inputs, same laws, same surfaces.

Reads one job from standard input and prints one JSON object: the resistances at the given points, and
the times of drawing and evaluating so many joints with their quantiles.
"""

import json
import sys
import time

import numpy as np
from scipy.special import ndtri
from scipy.stats import qmc

job = json.load(sys.stdin)
names = job["inputs"]
meets, field, bolt = job["tables"]["meets"], job["tables"]["field"], job["fastener"]
assert len(meets["faces"]) == 1, "one interface"
gauge = field["gauge"]
nodes = field["surfaces"]["nodes"]
node_force = np.array([node["force"] for node in nodes])
centre = np.array([node["centre"] for node in nodes], dtype=float)[:, :7]
along = np.array([node["along"] for node in nodes], dtype=float)[:, :, :, :7]
twist = np.array(field["surfaces"]["twist"], dtype=float)[:, :7]
read0 = np.array(field["read"], dtype=float)
start = field["from"]
bounds = field["bounds"]


def between(ends, place):
    low, high = ends
    return 1.0 + place * np.where(place < 0.0, 1.0 - low, high - 1.0)


def banded(band, place):
    low, nominal, high = band
    return nominal + place * np.where(place < 0.0, nominal - low, high - nominal)


def even(u):
    return 2.0 * u - 1.0


def resistances(u):
    """The seven readings of every draw; `u` has one row of coordinates for each input."""
    at = dict(zip(names, u))
    zero = 0.0
    place = lambda name: even(at[name]) if name in at else zero
    normal = lambda name: ndtri(at[name]) if name in at else zero
    friction, tool = place("friction"), place("torque tool")
    loss = at.get("settling and relaxation", zero)
    # Torque to force.
    thread, head = banded(bolt["thread"], friction), banded(bolt["head"], friction)
    lever = (bolt["pitch"] / (2 * np.pi) + 0.5773502691896258 * thread * bolt["pitch_diameter"]
             + head * bolt["friction_radius"])
    assembly = np.maximum((bolt["torque"] * (1 + bolt["tolerance"] * tool) - bolt["running"]) / lever, 0.0)
    losses = meets["losses"][0]
    service = np.maximum(assembly * (1 - loss * losses["relaxation"]) * (1 - loss * losses["interaction"]) - loss * losses["settling"]
                         + losses["temperature"], 0.0)
    force = np.log(bolt["bolts"] * service / gauge["force"])
    # Faces to conductance at the pressure of the gauge.
    sides = meets["faces"][0]["sides"]
    conducting = [place("conductivity of the warm plate"), place("conductivity of the cold plate")]
    k = [side["conductivity"]["value"] * between(side["conductivity"]["bounds"], where) * side["below_spots"]
         for side, where in zip(sides, conducting)]
    sigma = np.hypot(banded(sides[0]["roughness"], place("roughness of the warm face")),
                     banded(sides[1]["roughness"], place("roughness of the cold face")))
    slope = np.hypot(sides[0]["slope"] * sides[0]["slope_factor"] ** normal("asperity slope of the warm face"),
                     sides[1]["slope"] * sides[1]["slope_factor"] ** normal("asperity slope of the cold face"))
    modulus = 1.0 / sum((1 - side["poisson"] ** 2) / side["youngs_modulus"] for side in sides)
    pressure = gauge["faces"][0]["pressure"]
    hard = place("hardness of the faces")
    hardness = []
    for side in sides:
        factor = between(side["hardness_bounds"], hard)
        own = side["hardness"]
        if "meyer" in own:
            hardness.append(own["meyer"] * factor)
        else:
            power = 1.0 / (1.0 + 0.071 * own["c2"])
            diagonal = 1.62 * sigma * 1e6 / slope
            hardness.append((own["c1"] * factor * diagonal ** own["c2"]) ** power * pressure ** (1.0 - power))
    softer = np.minimum(hardness[0], hardness[1])
    strain = 1.67 * modulus * slope * 2.76 / softer
    part = np.hypot(6.5, strain) / strain
    area = part / (1.0 + (13.0 / strain) ** 1.2) ** (1 / 1.2)
    touching = pressure * part / softer
    overlap = touching / area
    touching = np.where(overlap > 0.5, touching * 0.5 / overlap, touching)
    separation = ndtri(np.minimum(overlap, 0.5))
    open_ = 1.0 - np.sqrt(touching)
    spots = np.exp(-0.5 * separation * separation) / (2 * np.sqrt(2 * np.pi) * open_ * np.sqrt(open_))
    law = meets["faces"][0]["law_factor"] ** normal("law of the solid spots")
    mean = 2.0 / (1.0 / k[0] + 1.0 / k[1])
    # Radiation stands beside the spots and is all there is where the faces are parted.
    h = law * mean * slope / sigma * np.sqrt(area) * spots + gauge["faces"][0]["parted"]
    plates = [plate["value"] * between(plate["bounds"], where) for plate, where in zip(meets["plates"], conducting)]
    x = [np.log(h / gauge["faces"][0]["touching"]), np.zeros_like(force),
         np.log(plates[0] / gauge["conductivity"][0]), np.log(plates[1] / gauge["conductivity"][1])]
    # Surfaces: a parabola over the three nearest forces.
    held = np.clip(force, node_force[0], node_force[-1])
    nearest = np.argmin(np.abs(node_force[:, None] - held), axis=0)
    first = np.clip(nearest, 1, len(node_force) - 2) - 1
    a, b, c = node_force[first], node_force[first + 1], node_force[first + 2]
    weights = [(held - b) * (held - c) / ((a - b) * (a - c)),
               (held - a) * (held - c) / ((b - a) * (b - c)),
               (held - a) * (held - b) / ((c - a) * (c - b))]
    read = []
    for reading in range(7):
        total = np.zeros_like(force)
        for step, weight in enumerate(weights):
            own = centre[first + step, reading]
            for variable, value in enumerate(x):
                own = own + value * (along[first + step, variable, 0, reading]
                                     + along[first + step, variable, 1, reading] * value)
            total += weight * own
        pair = 0
        for one in range(4):
            for other in range(one + 1, 4):
                total += twist[pair, reading] * x[one] * x[other]
                pair += 1
        read.append(total - read0[reading])
    contact0, node0, added0, sink0, perfect0, hottest0, drop0 = start
    perfect = perfect0 * np.exp(read[1])
    added = added0 * np.exp(read[2])
    sink = perfect + added
    share = lambda value, moved: (value / sink0 + moved) * sink
    node, drop, hottest = share(node0, read[3]), share(drop0, read[4]), share(hottest0, read[5])
    # Form and flatness.
    at_force = np.array([each["force"] for each in bounds])
    ends = lambda kind, end: np.interp(force, at_force, [each[kind][end] for each in bounds])
    form = between((ends("form", 0), ends("form", 1)), place("rigid head, stuck faces, asperity give"))
    if "flatness, convex or concave" in at:
        form = form * between((ends("bent", 0), ends("bent", 1)), place("flatness, convex or concave"))
    moved = added * form - added
    return np.array([contact0 * np.exp(-read[0]), node + moved, added * form, sink + moved, perfect,
                     hottest + moved, drop * form])


points = np.array(job["points"]).T.copy()
found = resistances(points)
seconds = []
for run in range(job["runs"]):
    begin = time.perf_counter()
    sobol = qmc.Sobol(len(names), scramble=True, rng=run)
    u = np.ascontiguousarray(sobol.random(job["draws"]).T)
    np.clip(u, 1e-12, 1.0 - 1e-12, out=u)
    quantiles = np.quantile(resistances(u), [0.05, 0.95], axis=1)
    seconds.append(time.perf_counter() - begin)
json.dump({"found": found.T.tolist(), "seconds": seconds, "quantiles": quantiles.tolist()}, sys.stdout)
