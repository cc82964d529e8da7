#!/usr/bin/env python3
"""A rectangular room with one absorber patch, by finite elements.

Prints patch.json, which TestFiniteElement reads: the poles of the room, bare and
treated, and the levels at two seats, bare and treated, once between rigid walls
and once between absorbing ones.

    python3 patch.py > patch.json        (about 20 minutes on one core, 3.5 GB)

Needs the general-purpose finite-element library GetFEM 5.4.2 with NumPy and
SciPy: Debian's packages python3-getfem, python3-numpy and python3-scipy.

THE PROBLEM. Time factor exp(+j*omega*t), k = omega/c. In the room, with a point
source that makes 1/(4*pi*r) in the free field,

    laplace(p) + k^2 p = -delta(x - x_s)

A wall of specific admittance beta = rho*c*v_n/p, v_n into the wall, has by
Euler's equation dp/dn = -j*omega*rho*v_n = -j*k*beta*p, n out of the room. The
absorber does not remove the wall behind it: over its patch the volume velocity U
that it takes, uniform over its area A, comes on top,

    dp/dn = -j*k*beta*p - j*omega*rho*U/A

and it is driven by the mean pressure on the patch: mean(p) = Z*U with
Z = R + j*omega*M + K/(j*omega).

THE WEAK FORM. With a test function v,

    (grad p, grad v) - k^2 (p, v) + j*k sum_w beta_w <p, v>_w
        + j*omega*rho*U*mean(v) = v(x_s)

Let s = j*k and U = j*omega*W/(rho*c^2), so that j*omega*rho*U = s^2*W, and let u
be the vector of the means of the basis functions over the patch. Then

    [ S + s*B + s^2*Q      s^2*u ] [p]   [basis functions at x_s]
    [      -u^T            z(s)  ] [W] = [           0          ]

    z(s) = (K + s*c*R + s^2*c^2*M)/(rho*c^2)

is quadratic in s. Its eigenvalues are the treated room's poles, omega = -j*c*s:
found by linearising and Arnoldi's method with one shift and one factorisation,
without starting values, so that it is known how many there are. The levels are
20 log10(4*pi*|p|) at the seats: re the free field at 1 m.

THE MESH. Cubic hexahedra, lines on the patch's edges. The velocity jumps there,
which leaves r*log(r) in the pressure: cells are graded towards the edges and
towards the wall that carries the patch. Three meshes, the numbers of their cells
as n = 1, 2, 3, show the convergence, and one of quadratic hexahedra checks the
elements; 'fromFinest' tells how far each is from the finest of cubic ones, whose
results are given as they are, not extrapolated. From n = 1 over 2 to 3 the
treated poles' frequencies move by 0.044 % and 0.003 %, about as n^-4, which
leaves some 0.001 % at n = 3.

TWO SETS OF WALLS. Between rigid walls the room is the sum of its modes exactly,
and what is compared is the absorber in the room and nothing else. Absorbing walls
also couple the modes with one another, to first order in beta, which a room that
is diagonal in its modes leaves out: the bare room's poles do not show it (there it
is of second order), the treated room's decay does, since its waves are mixtures of
bare modes.
"""

import json
import math
import sys

import getfem
import numpy as np
import scipy
import scipy.sparse as sp
import scipy.sparse.linalg as sl

C, RHO = 343.0, 1.2  # m/s, kg/m^3; the air does not attenuate
SIZE = (3.2, 2.3, 2.1)  # m
# Random-incidence coefficients of the walls x=0, x=L, y=0, y=W, z=0, z=H and the
# admittances that belong to them by London's law for a real impedance.
RIGID = {"name": "rigid", "alpha": (0.0,) * 6, "beta": (0.0,) * 6}
ABSORBING = {
    "name": "absorbing",
    "alpha": (0.02, 0.025, 0.03, 0.015, 0.035, 0.018),
    "beta": (
        0.002572347148423396,
        0.003234622432170002,
        0.0039039837258929145,
        0.00191734776494481,
        0.0045802948271410392,
        0.0023094612295395524,
    ),
}
# The absorber on the wall x=L: from, to along y and z.
PATCH = ((0.2, 0.8), (0.15, 0.65))
RESISTANCE, MASS, STIFFNESS = 60.0, 1.0, 2.5e5  # Pa s/m^3, kg/m^4, Pa/m^3
SOURCE = (0.7, 0.6, 0.5)
SEATS = ((2.2, 1.5, 1.3), (2.7, 1.0, 0.9))
FREQUENCIES = (40, 47.4, 55, 60.5, 70, 82, 96, 113, 140, 150)  # Hz
LOWEST, HIGHEST = 35.0, 125.0  # Hz, of the poles
MIDDLE = 85.0  # Hz, the shift
RUNS = ((3, 1), (3, 2), (3, 3), (2, 4))  # degree of the elements, parts n


def graded(start, end, parts, fine_start, fine_end, power=1.7):
    """Points from start (left out) to end, fine at either end or at both."""
    t = np.linspace(0, 1, parts + 1)
    if fine_start and fine_end:
        t = np.where(t < 0.5, 0.5 * (2 * t) ** power, 1 - 0.5 * (2 - 2 * t) ** power)
    elif fine_start:
        t = t**power
    elif fine_end:
        t = 1 - (1 - t) ** power
    return (start + (end - start) * t)[1:]


def lines(n):
    """Mesh lines along the three axes."""
    near = SIZE[0] - 0.8
    axes = [np.concatenate([[0.0], graded(0, near, 2 * n, False, False), graded(near, SIZE[0], 2 * n, False, True)])]
    for axis, (low, high) in ((1, PATCH[0]), (2, PATCH[1])):
        axes.append(
            np.concatenate(
                [
                    [0.0],
                    graded(0, low, n, False, True),
                    graded(low, high, 2 * n, True, True),
                    graded(high, SIZE[axis], 2 * n, True, False),
                ]
            )
        )
    return axes


def csc(matrix):
    """A matrix of the library as one of SciPy."""
    matrix.to_csc()
    columns, rows = matrix.csc_ind()
    return sp.csc_matrix((matrix.csc_val(), rows, columns), shape=matrix.size())


class Model:
    def __init__(self, degree, n):
        axes = lines(n)
        mesh = getfem.Mesh("cartesian", *axes)
        fem = getfem.MeshFem(mesh, 1)
        fem.set_fem(getfem.Fem(f"FEM_QK(3,{degree})"))
        method = getfem.MeshIm(mesh, getfem.Integ(f"IM_GAUSS_PARALLELEPIPED(3,{2 * degree})"))
        self.cells = [len(a) - 1 for a in axes]
        self.degree = degree
        self.size = fem.nbdof()
        nothing = np.zeros(self.size)

        def matrix(form, region=-1):
            return csc(getfem.asm_generic(method, 2, form, region, "p", 1, fem, nothing))

        self.stiffness = matrix("Grad_p.Grad_Test_p")
        self.mass = matrix("p*Test_p")

        # Outer faces by wall, 1 to 6; those of the patch are region 7.
        outer = mesh.outer_faces()
        walls = [[] for _ in range(6)]
        patch = []
        for face in outer.T:
            points = mesh.pts_from_cvid([int(face[0])])[0][:, self.corners(mesh, face)]
            for w in range(6):
                at = SIZE[w // 2] if w % 2 else 0.0
                if np.all(np.abs(points[w // 2] - at) < 1e-9):
                    walls[w].append(face)
                    if w == 1 and all(
                        low - 1e-9 < points[axis].mean() < high + 1e-9 for axis, (low, high) in ((1, PATCH[0]), (2, PATCH[1]))
                    ):
                        patch.append(face)
        self.walls = []  # the walls' matrices
        for w, faces in enumerate(walls):
            mesh.set_region(w + 1, np.array(faces).T)
            self.walls.append(matrix("p*Test_p", w + 1))
            i, j = [a for a in range(3) if a != w // 2]
            assert abs(self.walls[w].sum() - SIZE[i] * SIZE[j]) < 1e-9
        assert sum(len(f) for f in walls) == outer.shape[1]
        mesh.set_region(7, np.array(patch).T)
        area = (PATCH[0][1] - PATCH[0][0]) * (PATCH[1][1] - PATCH[1][0])
        self.means = np.ravel(getfem.asm_generic(method, 1, "Test_p", 7, "p", 1, fem, nothing)) / area
        assert abs(self.means.sum() - 1) < 1e-9

        # Rows of basis functions at the source and the seats.
        points = np.array([SOURCE, *SEATS]).T
        at = csc(getfem.asm_interpolation_matrix(fem, points)).toarray()
        assert np.allclose(at.sum(axis=1), 1)
        self.source, self.seats = at[0], at[1:]

    @staticmethod
    def corners(mesh, face):
        """Which of a cell's points lie on a face."""
        ids, index = mesh.pid_from_cvid([int(face[0])])
        on = mesh.pid_in_faces(np.array(face, dtype=np.int32).reshape(2, 1))
        return np.isin(ids, on)


class Room:
    """The model with one set of walls, with the absorber or without."""

    def __init__(self, model, beta, treated):
        self.model = model
        admittance = sum(b * w for b, w in zip(beta, model.walls, strict=True))
        if treated:
            u = sp.csc_matrix(model.means.reshape(-1, 1))
            corner = lambda v: sp.csc_matrix([[v / (RHO * C * C)]])
            self.terms = [
                sp.bmat([[model.stiffness, None], [-u.T, corner(STIFFNESS)]], format="csc"),
                sp.block_diag([admittance, corner(C * RESISTANCE)], format="csc"),
                sp.bmat([[model.mass, u], [None, corner(C * C * MASS)]], format="csc"),
            ]
        else:
            self.terms = [model.stiffness, admittance.tocsc(), model.mass]
        self.shift = 2j * math.pi * MIDDLE / C
        self.lu = sl.splu(self.at(self.shift), permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.01, options={"SymmetricMode": True})

    def at(self, s):
        return (self.terms[0] + s * self.terms[1] + s * s * self.terms[2]).tocsc()

    def poles(self):
        """Natural frequency in Hz and decay constant in 1/s of every pole from
        LOWEST to HIGHEST."""
        size = self.lu.shape[0]
        _, c1, c2 = self.terms

        # (A - shift*B) z = B y with z = (x, s x).
        def apply(y):
            y1, y2 = y[:size], y[size:]
            z1 = -self.lu.solve(c2 @ (y2 + self.shift * y1) + c1 @ y1)
            return np.concatenate([z1, y1 + self.shift * z1])

        count = 20
        operator = sl.LinearOperator((2 * size, 2 * size), matvec=apply, dtype=complex)
        start = np.ones(2 * size, dtype=complex)
        theta, vectors = sl.eigs(operator, k=count, ncv=3 * count, which="LM", v0=start, tol=1e-13)
        s = self.shift + 1 / theta
        # Every pole within the farthest one found is among them: that circle must
        # hold the whole stretch that is reported.
        reach = np.abs(s - self.shift).max() * C / (2 * math.pi)
        assert reach > max(HIGHEST - MIDDLE, MIDDLE - LOWEST)
        found = []
        for i, value in enumerate(s):
            omega = -1j * C * value
            hz = abs(omega) / (2 * math.pi)
            if omega.real <= 0 or not LOWEST <= hz <= HIGHEST:
                continue
            x = vectors[:size, i]
            matrix = self.at(value)
            scale = abs(matrix).max() * np.abs(x).max()
            assert np.abs(matrix @ x).max() < 1e-8 * scale
            found.append((hz, omega.imag))
        return sorted(found)

    def levels(self):
        """Levels in dB, [seat][frequency]."""
        model = self.model
        right = np.zeros(self.lu.shape[0], dtype=complex)
        right[: model.size] = model.source
        levels = np.empty((len(SEATS), len(FREQUENCIES)))
        preconditioner = sl.LinearOperator(self.lu.shape, matvec=self.lu.solve, dtype=complex)
        for i, hz in enumerate(FREQUENCIES):
            matrix = self.at(2j * math.pi * hz / C)
            p, _ = sl.gmres(matrix, right, M=preconditioner, tol=1e-11, restart=120, maxiter=3)
            assert np.linalg.norm(matrix @ p - right) < 1e-8 * np.linalg.norm(right)
            levels[:, i] = 20 * np.log10(4 * math.pi * np.abs(model.seats @ p[: model.size]))
        return levels


def solve(model, walls):
    """What is compared, of one mesh with one set of walls."""
    found = {}
    for name, treated in (("bare", False), ("treated", True)):
        room = Room(model, walls["beta"], treated)
        found[name] = {
            "poles": [{"hz": hz, "decay": decay} for hz, decay in room.poles()],
            "levels": room.levels().tolist(),
        }
        del room  # before the next one is factorised
    return found


def apart(a, b):
    """Greatest differences of two meshes' results."""
    difference = {}
    for name in ("bare", "treated"):
        pairs = list(zip(a[name]["poles"], b[name]["poles"], strict=True))
        difference[name] = {
            "hzPercent": max(100 * abs(p["hz"] / q["hz"] - 1) for p, q in pairs),
            # Between rigid walls the bare room's decay is rounding.
            "decayPercent": max((100 * abs(p["decay"] / q["decay"] - 1) for p, q in pairs if abs(q["decay"]) > 1e-6), default=0),
            "dB": np.abs(np.subtract(a[name]["levels"], b[name]["levels"])).max(),
        }
    return difference


def main():
    meshes, cases = [], [dict(RIGID), dict(ABSORBING)]
    results = []
    for degree, n in RUNS:
        model = Model(degree, n)
        meshes.append({"degree": degree, "parts": n, "cells": model.cells, "unknowns": model.size})
        results.append([solve(model, walls) for walls in cases])
        for walls, found in zip(cases, results[-1]):
            print(degree, n, model.size, walls["name"], [round(p["hz"], 5) for p in found["treated"]["poles"]], file=sys.stderr)

    finest = max(i for i, (degree, _) in enumerate(RUNS) if degree == 3)
    for at, walls in enumerate(cases):
        walls |= results[finest][at]
        walls["fromFinest"] = [apart(r[at], results[finest][at]) for r in results]
    result = {
        "about": "Finite elements: made by patch.py, see there",
        "library": f"GetFEM {getfem.getfem_env('version')}, NumPy {np.__version__}, SciPy {scipy.__version__}",
        "speedOfSound": C,
        "density": RHO,
        "size": SIZE,
        "patch": PATCH,
        "resistance": RESISTANCE,
        "mass": MASS,
        "stiffness": STIFFNESS,
        "source": SOURCE,
        "seats": SEATS,
        "highestHz": HIGHEST,
        "hz": FREQUENCIES,
        "meshes": meshes,
        "cases": cases,
    }
    print(json.dumps(result, indent=1))


if __name__ == "__main__":
    main()
