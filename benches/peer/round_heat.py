"""The peer of the round heat: the same problem with scikit-fem and SciPy.

Nine-node elements (ElementQuad2) on a graded tensor grid with a line at the contact edge, both plates and the
conductance between them in one sparse matrix, one factorisation. The conductance follows from our side's pressure, straight
between the lines of its contact.

Reads one JSON object on standard input (written by benches/round.rs), prints one JSON object: source to sink, the
number of unknowns and the seconds of every run.
"""
import json
import sys
import time

import numpy as np
from scipy.sparse import block_diag, csr_matrix
from scipy.sparse.linalg import splu
from skfem import Basis, BilinearForm, ElementLineP2, ElementQuad2, MeshLine, MeshQuad
from skfem.helpers import dot, grad

from round_contact import graded


@BilinearForm
def conduction(u, v, w):
    return 2 * np.pi * w.x[0] * dot(grad(u), grad(v))


@BilinearForm
def crossing(u, v, w):
    return 2 * np.pi * w.x[0] * w.conductance * u * v


def grid(job):
    """Radial lines through hole, head edge, contact edge and rim; axial lines."""
    size = job["size"]
    marks = [(job["hole"], 0.15), (1.0, 0.15), (job["edge"], 0.03), (job["rim"], 0.9)]
    parts = [graded(a, b, size * p, size * q, size * (0.15 if b <= job["edge"] else 0.9))
             for (a, p), (b, q) in zip(marks, marks[1:])]
    radii = np.concatenate([parts[0]] + [part[1:] for part in parts[1:]])
    return radii, graded(0.0, job["thickness"], size * 0.03, size * 0.3, 0.34 * job["thickness"])


def solve(job):
    radii, heights = grid(job)
    basis = Basis(MeshQuad.init_tensor(radii, heights), ElementQuad2(), intorder=4)
    plate = conduction.assemble(basis)
    line = Basis(MeshLine(radii), ElementLineP2(), intorder=8)
    points = line.global_coordinates()[0]
    local = job["biot"] * np.interp(points, job["radii"], job["pressure"]) ** 0.95
    between = crossing.assemble(line, conductance=local).tocoo()

    def along(height):
        places = basis.get_dofs(lambda x: np.isclose(x[1], height)).all()
        return places[np.argsort(basis.doflocs[0, places])]

    order = np.argsort(np.argsort(line.doflocs[0]))
    foot, outer = along(0.0)[order], along(job["thickness"])
    both = [(0, 0, 1), (0, basis.N, -1), (basis.N, 0, -1), (basis.N, basis.N, 1)]
    rows = np.concatenate([foot[between.row] + i for i, _, _ in both])
    columns = np.concatenate([foot[between.col] + j for _, j, _ in both])
    values = np.concatenate([between.data * sign for _, _, sign in both])
    matrix = (block_diag([plate, plate]) + csr_matrix((values, (rows, columns)), shape=(2 * basis.N,) * 2)).tocsr()
    temperature = np.zeros(2 * basis.N)
    temperature[outer] = 1.0
    free = np.setdiff1d(np.arange(2 * basis.N), np.concatenate([outer, outer + basis.N]))
    factor = splu(matrix[free][:, free].tocsc(), permc_spec="MMD_AT_PLUS_A", options={"SymmetricMode": True})
    temperature[free] = factor.solve(-(matrix[free] @ temperature))
    return 1.0 / (matrix @ temperature)[outer].sum(), len(temperature)


def main():
    job = json.load(sys.stdin)
    seconds = []
    for _ in range(job["runs"]):
        start = time.perf_counter()
        resistance, unknowns = solve(job)
        seconds.append(time.perf_counter() - start)
    json.dump({"resistance": resistance, "unknowns": unknowns, "seconds": seconds}, sys.stdout)


if __name__ == "__main__":
    main()
