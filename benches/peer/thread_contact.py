"""A single round joint with scikit-fem and SciPy: uniform or rigid head, nut or thread, sliding or stuck faces.

Nine-node elements (ElementQuad2) for both plates on a graded tensor grid, contact by a penalty at the Gauss points
of the interface and an active set over them. A thread is uniform shear on the wall of the lower hole over a length
from the faying face. Lower plate from -t2 to 0, upper one from 0 to t1.

Reads one JSON object on standard input: hole, bearing, rim, thickness (two), modulus (two), poisson, thread (length
or null), head ("uniform" or "rigid"), faces ("frictionless" or "stuck"), rings, far, size; lengths in mm, stresses in
MPa. Prints one: shares of the force inside each of the rings, radius of 95 % of it, radius where the faces part, gap at each far
radius in µm for 1 kN.
"""
import json
import sys

import numpy as np
from scipy.sparse import bmat, coo_matrix, csr_matrix, diags
from scipy.sparse.linalg import splu
from skfem import (Basis, BilinearForm, ElementLineP2, ElementQuad2, ElementVector, FacetBasis, LinearForm,
                   MeshLine, MeshQuad)

from round_contact import elasticity, graded, ring_load, ring_mass

FORCE = 1000.0


@BilinearForm
def touching_mass(u, v, w):
    return 2 * np.pi * w.x[0] * w.on * u * v


@LinearForm
def axial_pull(v, w):
    return 2 * np.pi * w.x[0] * v[1]


def joined(marks):
    """Lines through all marks, each a place, the spacing there and the widest spacing up to the next."""
    parts = [graded(a, b, p, q, widest) for (a, p, widest), (b, q, _) in zip(marks, marks[1:])]
    return np.concatenate([parts[0]] + [part[1:] for part in parts[1:]])


class Plate:
    """One plate on its grid, with its stiffness and the degrees of freedom of its two faces."""

    def __init__(self, radii, heights, faying, modulus, nu):
        self.basis = Basis(MeshQuad.init_tensor(radii, heights), ElementVector(ElementQuad2()), intorder=4)
        self.stiffness = modulus * elasticity.assemble(self.basis, lam=nu / (1 + nu) / (1 - 2 * nu), mu=0.5 / (1 + nu))
        outer = heights[-1] if faying == heights[0] else heights[0]
        self.face = {name: self.row(faying, name) for name in ("u^1", "u^2")}
        self.outer = self.row(outer, "u^2")

    def row(self, height, name):
        places = self.basis.get_dofs(lambda x: np.isclose(x[1], height, atol=1e-9)).all(name)
        return places[np.argsort(self.basis.doflocs[0, places])]


def solved(job):
    a, b, rim, size = job["hole"], job["bearing"], job["rim"], job["size"]
    t1, t2 = job["thickness"]
    fine = 0.03 * size
    far = min(b + 1.2 * min(t1, t2), 0.8 * rim)
    radii = joined([(a, fine, 3 * fine), (b, fine, 3 * fine), (far, 3 * fine, 1.0), (rim, 1.0, 1.0)])
    up = joined([(0.0, fine, 0.25 * t1), (t1, 2 * fine, 0)])
    length = job["thread"]
    end = [(length, 2 * fine, 0.2 * t2)] if length and length < t2 else []
    marks = [(0.0, fine, 0.2 * t2)] + end + [(t2, 2 * fine, 0)]
    down = -joined(marks)[::-1]
    upper = Plate(radii, up, 0.0, job["modulus"][0], job["poisson"])
    lower = Plate(radii, down, 0.0, job["modulus"][1], job["poisson"])
    line = Basis(MeshLine(radii), ElementLineP2(), intorder=5)
    along = np.argsort(line.doflocs[0])
    order = np.empty_like(along)
    order[along] = np.arange(len(along))
    n1, n2 = upper.basis.N, lower.basis.N
    heads = 2 if job["head"] == "rigid" else 0
    size_all = n1 + n2 + heads

    def pick(places):
        """Values of a trace, in the order of the line basis, from all unknowns."""
        return csr_matrix((np.ones(len(places)), (np.arange(len(places)), places[order])), (len(places), size_all))

    apart = pick(upper.face["u^2"]) - pick(lower.face["u^2"] + n1)
    aside = pick(upper.face["u^1"]) - pick(lower.face["u^1"] + n1)
    load = np.zeros(size_all)
    head_line = ring_load.assemble(Basis(MeshLine(radii[radii < b + 1e-9]), ElementLineP2(), intorder=5))
    seat = Basis(MeshLine(radii[radii < b + 1e-9]), ElementLineP2(), intorder=5)
    seat_order = np.argsort(seat.doflocs[0])
    area = head_line.sum()
    seats = []
    for plate, shift, sign, head in ((upper, 0, -1.0, 0), (lower, n1, 1.0, 1)):
        if head == 1 and length:
            wall = FacetBasis(lower.basis.mesh, lower.basis.elem, intorder=4, facets=lower.basis.mesh.facets_satisfying(
                lambda x: np.isclose(x[0], a) & (x[1] > -length - 1e-9)))
            load[n1:n1 + n2] += axial_pull.assemble(wall) * FORCE / (2 * np.pi * a * length)
            continue
        at = plate.outer[:len(seat_order)] + shift
        if not heads:
            load[at] += sign * FORCE * head_line[seat_order] / area
        else:
            unknown = n1 + n2 + head
            load[unknown] += sign * FORCE
            places = np.empty_like(seat_order)
            places[seat_order] = at
            touch = csr_matrix((np.ones(len(at)), (np.arange(len(at)), places)), (len(at), size_all))
            rigid = coo_matrix((np.ones(len(at)), (np.arange(len(at)), np.full(len(at), unknown))), (len(at), size_all))
            seats.append((sign * (touch - rigid.tocsr())))
    ground = diags(np.full(size_all, 1e-9 * job["modulus"][0]))
    springs = bmat([[upper.stiffness, None], [None, lower.stiffness]])
    springs.resize(size_all, size_all)
    kappa = 1e7
    pairs = [(line, apart)] + [(seat, touch) for touch in seats]
    on = [np.ones_like(basis.global_coordinates().value[0]) for basis, _ in pairs]
    on[0] = (line.global_coordinates().value[0] < b + 0.5 * min(t1, t2)).astype(float)
    for _ in range(60):
        matrix = springs + ground
        for (basis, gap), touching in zip(pairs, on):
            matrix = matrix + gap.T @ (kappa * touching_mass.assemble(basis, on=touching)) @ gap
        if job["faces"] == "stuck":
            matrix = matrix + aside.T @ (0.1 * kappa * touching_mass.assemble(line, on=on[0])) @ aside
        found = splu(matrix.tocsc(), permc_spec="MMD_AT_PLUS_A", options=dict(SymmetricMode=True)).solve(load)
        gaps = [basis.interpolate(gap @ found).value for basis, gap in pairs]
        new = [(gap < 0).astype(float) for gap in gaps]
        changed = sum(int(np.abs(x - y).sum()) for x, y in zip(on, new))
        if changed == 0:
            break
        on = new
    gauss = line.global_coordinates().value[0]
    force = 2 * np.pi * gauss * kappa * np.maximum(-gaps[0], 0) * line.dx
    r, f = radii, np.append(0.0, np.cumsum(force.sum(axis=1)))
    gap_at = (apart @ found)[along]
    places = line.doflocs[0][along]
    return {"rings": [float(np.interp(ring, r, f) / FORCE) for ring in job["rings"]],
            "balance": float(f[-1] / FORCE - 1), "changed": changed, "unknowns": int(size_all),
            "held": float(np.interp(0.95, f / f[-1], r)), "edge": float(gauss[on[0] > 0].max()),
            "far_gap_um": [float(1e3 * np.interp(x, places, gap_at)) for x in job["far"]]}


if __name__ == "__main__":
    print(json.dumps(solved(json.load(sys.stdin))))
