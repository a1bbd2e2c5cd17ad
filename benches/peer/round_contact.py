"""The peer of the round contact: the same problem with scikit-fem and SciPy.

Nine-node elements (ElementQuad2) on a graded tensor grid, pressure as hats on the grid lines, the plate condensed
to its interface by one sparse factorisation, active set on the condensed problem, contact edge from p² behind it,
new grid until the edge stays put. Equal plates: one plate is factorised and counted twice, as our side does too.

Reads one JSON object on standard input (written by benches/round.rs), prints one JSON object: the contact radius,
the number of radial lines and the seconds of every run.
"""
import json
import sys
import time

import numpy as np
from scipy.sparse.linalg import splu
from skfem import (Basis, BilinearForm, ElementLineP1, ElementLineP2, ElementQuad2, ElementVector, LinearForm,
                   MeshLine, MeshQuad)
from skfem.helpers import grad


@BilinearForm
def elasticity(u, v, w):
    r, lam, mu = w.x[0], w.lam, w.mu
    du, dv = grad(u), grad(v)
    trace = du[0, 0] + du[1, 1] + u[0] / r
    shear = (du[0, 1] + du[1, 0]) * (dv[0, 1] + dv[1, 0])
    normal = du[0, 0] * dv[0, 0] + du[1, 1] * dv[1, 1] + u[0] * v[0] / r**2
    return 2 * np.pi * r * (lam * trace * (dv[0, 0] + dv[1, 1] + v[0] / r) + mu * (2 * normal + shear))


@BilinearForm
def ring_mass(u, v, w):
    return 2 * np.pi * w.x[0] * u * v


@LinearForm
def ring_load(v, w):
    return 2 * np.pi * w.x[0] * v


def graded(start, end, at_start, at_end, widest):
    """Lines from start to end, spacing at_start and at_end there, growing by 1.3 up to widest."""
    steps, spacing = ([], []), [min(at_start, widest), min(at_end, widest)]
    while not sum(map(sum, steps)) or sum(map(sum, steps)) + 0.5 * min(spacing) < end - start:
        side = int(spacing[1] < spacing[0])
        steps[side].append(spacing[side])
        spacing[side] = min(1.3 * spacing[side], widest)
    lines = np.cumsum([0.0] + steps[0] + steps[1][::-1])
    return start + lines * (end - start) / lines[-1]


def grid(job, edge, size):
    """Radial lines through hole, head edge, contact edge and rim; axial lines."""
    marks = [(job["hole"], 0.06), (1.0, 0.03), (edge, 0.006), (job["rim"], 0.9)]
    parts = [graded(a, b, size * p, size * q, size * (0.12 if b <= edge else 0.9))
             for (a, p), (b, q) in zip(marks, marks[1:])]
    radii = np.concatenate([parts[0]] + [part[1:] for part in parts[1:]])
    return radii, graded(0.0, job["thickness"], size * 0.02, size * 0.1, 0.34 * job["thickness"])


def contact(job, edge, size):
    """Pressure on the radial lines for mean head pressure 1."""
    radii, heights = grid(job, edge, size)
    mesh = MeshQuad.init_tensor(radii, heights)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=4)
    nu = job["poisson"]
    stiffness = elasticity.assemble(basis, lam=nu / (1 + nu) / (1 - 2 * nu), mu=0.5 / (1 + nu))

    line = Basis(MeshLine(radii), ElementLineP2(), intorder=5)
    hats = line.with_element(ElementLineP1())
    coupling = ring_mass.assemble(line, hats).toarray()
    weight = ring_load.assemble(hats)
    hats_at, trace_at = np.argsort(hats.doflocs[0]), np.argsort(line.doflocs[0])
    coupling, weight = coupling[hats_at][:, trace_at], weight[hats_at]
    middle = radii < 1.0 - 1e-9
    head_line = Basis(MeshLine(radii[:middle.sum() + 1]), ElementLineP2(), intorder=5)
    head = ring_load.assemble(head_line)[np.argsort(head_line.doflocs[0])]

    def axial(height):
        places = basis.get_dofs(lambda x: np.isclose(x[1], height)).all("u^2")
        return places[np.argsort(basis.doflocs[0, places])]

    foot, top = axial(0.0), axial(job["thickness"])
    free = np.setdiff1d(np.arange(basis.N), top[:1])
    loads = np.zeros((basis.N, len(radii) + 1))
    loads[foot, :-1] = coupling.T
    loads[top[:len(head)], -1] = -head
    factor = splu(stiffness[free][:, free].tocsc(), permc_spec="MMD_AT_PLUS_A", options={"SymmetricMode": True})
    moved = np.zeros_like(loads)
    moved[free] = factor.solve(loads[free])
    compliance = 2 * loads[:, :-1].T @ moved
    matrix, offset = compliance[:, :-1], compliance[:, -1]
    return radii, active_set(matrix, offset, (weight, head.sum()), radii < edge)


def active_set(matrix, offset, total, active):
    """x ≥ 0, y = A x + g + m δ ≥ 0, x y = 0, m x = F."""
    weight, force = total
    for _ in range(60):
        chosen = np.flatnonzero(active)
        system = np.zeros((len(chosen) + 1, len(chosen) + 1))
        system[:-1, :-1] = matrix[np.ix_(chosen, chosen)]
        system[-1, :-1] = system[:-1, -1] = weight[chosen]
        solved = np.linalg.solve(system, np.append(-offset[chosen], force))
        pressure = np.zeros(len(weight))
        pressure[chosen] = solved[:-1]
        gap = matrix @ pressure + offset + weight * solved[-1]
        wrong = np.where(active, pressure < 0, gap < -1e-12 * np.abs(gap).max())
        if not wrong.any():
            return pressure
        active = active ^ wrong
    raise RuntimeError("the active set did not settle")


def contact_edge(radii, pressure, reach):
    """Where a cubic through p² behind the edge crosses zero."""
    last = np.flatnonzero(pressure > 0)[-1]
    end = radii[last + 1]
    chosen = np.flatnonzero((radii > end - reach) & (np.arange(len(radii)) < last - 1))
    fit = np.polyfit(radii[chosen] - end, pressure[chosen] ** 2, min(3, len(chosen) - 2))
    roots = np.roots(fit)
    real = roots[np.abs(roots.imag) < 1e-9].real
    return end + real[np.argmin(np.abs(real))]


def solve(job):
    edge = 1.0 + 0.44 * job["thickness"]
    for attempt in range(9):
        radii, pressure = contact(job, edge, job["size"] * (1.8 if attempt == 0 else 1.0))
        found = contact_edge(radii, pressure, 0.25 * min(job["thickness"], 1.0))
        if attempt > 0 and abs(found - edge) < 0.25 * job["tolerance"]:
            return found, len(radii)
        edge = found
    raise RuntimeError("the edge did not settle")


def main():
    job = json.load(sys.stdin)
    seconds = []
    for _ in range(job["runs"]):
        start = time.perf_counter()
        edge, lines = solve(job)
        seconds.append(time.perf_counter() - start)
    json.dump({"contact_radius": edge, "lines": lines, "seconds": seconds}, sys.stdout)


if __name__ == "__main__":
    main()
