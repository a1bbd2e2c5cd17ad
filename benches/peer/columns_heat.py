"""The peer of the heat through the columns: the same two plates with scikit-fem hexahedra and SciPy.

Tensor grids on the lines that our side uses or coarser ones, holes as cells of less conductivity as on our side,
linear elements in three layers or quadratic ones in one layer through each plate, lumped contact between the faces;
conjugate gradients with the diagonal, and a sparse factorisation where it is faster. Times are those of mesh,
matrices and solution together.

Reads one JSON object on standard input (written by benches/columns_heat.rs), prints one JSON object.
"""
import json
import sys
import time

import numpy as np
from scipy.sparse import bmat, coo_matrix, diags
from scipy.sparse.linalg import cg, splu
from skfem import Basis, BilinearForm, ElementHex1, ElementHex2, FacetBasis, LinearForm, MeshHex
from skfem.helpers import dot, grad


@BilinearForm
def conduction(u, v, w):
    return w.k * dot(grad(u), grad(v))


@BilinearForm
def film(u, v, w):
    return w.h * u * v


@LinearForm
def flux(v, w):
    return w.q * v


@LinearForm
def area(v, w):
    return w.s * v


def facet_shares(mesh, shares, facets):
    return shares[mesh.f2t[0][facets]]


def solve(job, grid, element, layers, direct):
    lines = np.array(grid["x"])
    z = np.linspace(0.0, job["thickness"], layers + 1)
    mesh = MeshHex.init_tensor(lines, lines, z)
    centre = mesh.p[:, mesh.t].mean(axis=1)
    i, j = (np.searchsorted(lines, centre[axis]) - 1 for axis in (0, 1))
    shares = np.maximum(np.array(grid["shares"]), 1e-4)[i * (len(lines) - 1) + j]
    basis = Basis(mesh, element)
    ones = np.ones(basis.X.shape[1])
    plate = conduction.assemble(basis, k=job["conductivity"] * np.outer(shares, ones))
    low = mesh.facets_satisfying(lambda x: np.isclose(x[2], 0.0))
    high = mesh.facets_satisfying(lambda x: np.isclose(x[2], job["thickness"]))
    below, above = (FacetBasis(mesh, element, facets=facets) for facets in (low, high))
    columns = np.ones(below.X.shape[1])
    solid = [np.outer(facet_shares(mesh, shares, facets), columns) for facets in (low, high)]
    sink = film.assemble(below, h=job["film"] * solid[0])
    points = above.global_coordinates().value
    heated = (np.abs(points[0]) <= job["source"]) & (np.abs(points[1]) <= job["source"])
    load = flux.assemble(above, q=heated.astype(float))
    load /= load.sum()
    # Lumped contact: the face nodes of both plates stand in the same order.
    faces = [basis.get_dofs(facets).all() for facets in (low, high)]
    places = [basis.doflocs[:, face] for face in faces]
    order = [np.lexsort(np.round(place[:2], 9)) for place in places]
    faces = [face[o] for face, o in zip(faces, order)]
    x, y = basis.doflocs[:2, faces[0]]
    r = np.hypot(np.abs(x) - job["bolt"], np.abs(y) - job["bolt"])
    part = np.clip((r - job["hole"]) / (job["edge"] - job["hole"]), 0.0, 1.0)
    local = job["contact"] * (1 - part**2) + job["gas"]
    tie = local * area.assemble(below, s=solid[0])[faces[0]]
    n = basis.N
    diagonal = [np.zeros(n), np.zeros(n)]
    diagonal[0][faces[0]] = tie
    diagonal[1][faces[1]] = tie
    cross = coo_matrix((-tie, (faces[0], faces[1])), shape=(n, n))
    matrix = bmat([[plate + diags(diagonal[0]), cross], [cross.T, plate + sink + diags(diagonal[1])]]).tocsc()
    rhs = np.concatenate([load, np.zeros(n)])
    if direct:
        rise = splu(matrix).solve(rhs)
    else:
        inverse = diags(1.0 / matrix.diagonal())
        rise, info = cg(matrix.tocsr(), rhs, rtol=1e-8, M=inverse, maxiter=20000)
        assert info == 0
    wetted = np.concatenate([np.zeros(n), sink.T @ np.ones(n)])
    return load @ rise[:n] - wetted @ rise / wetted.sum(), 2 * n


def main():
    job = json.load(sys.stdin)
    rows = []
    for grid in job["grids"]:
        for name, element, layers in (("linear, 3 layers", ElementHex1(), 3), ("quadratic, 1 layer", ElementHex2(), 1)):
            best = None
            for solver, direct in (("CG", False), ("LU", True)):
                seconds = []
                for _ in range(job["runs"]):
                    start = time.perf_counter()
                    resistance, unknowns = solve(job, grid, element, layers, direct)
                    seconds.append(time.perf_counter() - start)
                    if seconds[-1] > 20:
                        break
                row = {"name": f"{grid['fine']} {name}, {solver}", "resistance": float(resistance), "unknowns": int(unknowns), "seconds": seconds}
                if best is None or min(seconds) < min(best["seconds"]):
                    best = row
            rows.append(best)
    json.dump({"rows": rows}, sys.stdout)


main()
