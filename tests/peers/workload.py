"""The mechanical systems of the race, built from any algebra that adds, multiplies and differentiates.

The same systems stand in `workload.hpp` for the programs in C++ and in `tests/src/race/workload.rs`
for ours. Both energies are doubled, so that no fraction occurs; that changes no number of terms.

An algebra has `number`, `symbol`, `cosine(k)`, `sine(k)` and `rate(k)` of base angle `k`, `velocity(p)`
of a position, `between(p)` for what it does with intermediate results, `by_velocity(p, j)`,
`by_coordinate(p, j)`, `total_rate(p)`, `canonical(p)` and `terms(p)`. It is made from a `System`.
"""

import json
import sys
import time

MOST_RUNS = 5
SECONDS = 2.0


class System:
    """The names of one case, and which coordinates each base angle is the sum of."""

    def __init__(self, case):
        words = case.replace(",", " ").split()
        self.kind, self.links = words[0], int(words[1])
        self.general = words[2:] == ["every", "offset", "nonzero"]
        if self.kind not in ("abs", "rel", "arm") or (words[2:] and not self.general):
            raise SystemExit(f"`{case}` is no case of the race")
        if self.links < 1 or (self.kind == "arm" and self.links > 6):
            raise SystemExit(f"`{case}` has a number of links that is not in the race")
        self.axes = ("zyxzyx" if self.general else "zyyxyx") if self.kind == "arm" else ""
        self.angles = [self._angle(link) for link in range(self.links)]

    def _starts_run(self, link):
        """Whether a joint's axis is not parallel to the one before it."""
        if self.kind == "rel":
            return link == 0
        return self.kind == "abs" or link == 0 or self.axes[link] != self.axes[link - 1]

    def _angle(self, link):
        """Angles add up along joints whose axes are parallel: that is the basis with the fewest terms."""
        return [link] if self._starts_run(link) else self._angle(link - 1) + [link]

    def base(self, link):
        """The link from which the base angle of this link is measured; -1 is the ground."""
        return self.angles[link][0] - 1

    def constants(self):
        """The names of all constants."""
        if self.kind != "arm":
            each = ["m", "l"]
        else:
            each = ["m", "cx", "cy", "cz", "Ixx", "Iyy", "Izz", "Ixy", "Ixz", "Iyz"]
        names = ["g"] + [f"{name}{link + 1}" for link in range(self.links) for name in each]
        return names + [name for offset in self.offsets() for name in offset if name]

    def offsets(self):
        """For each link the names of the vector from its joint to the next; none stands for zero."""
        if self.kind != "arm":
            return []
        if self.general:
            return [[f"b{axis}{link + 2}" for axis in "xyz"] for link in range(self.links - 1)]
        names = [[None, None, "d1"], ["a2", "d2", None], ["a3", None, None]]
        return (names + [[None] * 3] * 3)[: self.links - 1]


def energies(system, algebra):
    """Twice the kinetic and twice the potential energy."""
    return (arm if system.kind == "arm" else chain)(system, algebra)


def chain(system, algebra):
    """A planar chain of point masses on massless rods, hanging from the ground."""
    across, height, kinetic, potential = (algebra.number(0) for _ in range(4))
    gravity = algebra.symbol("g")
    for link in range(system.links):
        mass, length = algebra.symbol(f"m{link + 1}"), algebra.symbol(f"l{link + 1}")
        across = across + length * algebra.sine(link)
        height = height - length * algebra.cosine(link)
        u, v = algebra.velocity(across), algebra.velocity(height)
        kinetic = kinetic + mass * algebra.between(u * u + v * v)
        potential = potential + algebra.number(2) * mass * gravity * height
    return kinetic, potential


def arm(system, algebra):
    """A serial arm of rigid links, each with any mass centre and any inertia matrix."""
    zero, one = algebra.number(0), algebra.number(1)
    identity = [[one if i == j else zero for j in range(3)] for i in range(3)]
    # Orientation and angular velocity, in the link's own frame, of each link; the ground stands at -1.
    orientations, spins = {-1: identity}, {-1: [zero] * 3}
    joint = [zero] * 3
    kinetic, potential = zero, zero
    offsets = system.offsets()
    for link in range(system.links):
        axis, base = "xyz".index(system.axes[link]), system.base(link)
        turn = rotation(axis, algebra.cosine(link), algebra.sine(link), zero, one)
        orientation = [[algebra.between(dot(row, column)) for column in zip(*turn)] for row in orientations[base]]
        spin = [dot(column, spins[base]) for column in zip(*turn)]
        spin[axis] = spin[axis] + algebra.rate(link)
        spin = [algebra.between(part) for part in spin]
        orientations[link], spins[link] = orientation, spin

        mass, *centre = (algebra.symbol(f"{name}{link + 1}") for name in ("m", "cx", "cy", "cz"))
        place = [algebra.between(start + dot(row, centre)) for start, row in zip(joint, orientation)]
        velocity = [algebra.velocity(part) for part in place]
        kinetic = kinetic + mass * algebra.between(dot(velocity, velocity))
        for i, first in enumerate("xyz"):
            for j, second in list(enumerate("xyz"))[i:]:
                inertia = algebra.number(1 if i == j else 2) * algebra.symbol(f"I{first}{second}{link + 1}")
                kinetic = kinetic + inertia * algebra.between(spin[i] * spin[j])
        potential = potential + algebra.number(2) * mass * algebra.symbol("g") * place[2]
        if link < len(offsets):
            offset = [algebra.symbol(name) if name else zero for name in offsets[link]]
            joint = [algebra.between(start + dot(row, offset)) for start, row in zip(joint, orientation)]
    return kinetic, potential


def rotation(axis, cosine, sine, zero, one):
    """The matrix of a rotation about a coordinate axis."""
    second, third = (axis + 1) % 3, (axis + 2) % 3
    matrix = [[zero] * 3 for _ in range(3)]
    matrix[axis][axis] = one
    matrix[second][second] = matrix[third][third] = cosine
    matrix[third][second], matrix[second][third] = sine, -sine
    return matrix


def dot(a, b):
    """The scalar product."""
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def equations(system, algebra):
    """d/dt(dT/dv) - dT/dq + dV/dq for each coordinate, in canonical form."""
    kinetic, potential = energies(system, algebra)
    kinetic, potential = algebra.between(kinetic), algebra.between(potential)
    lagrangian = kinetic - potential
    return [
        algebra.canonical(
            algebra.total_rate(algebra.by_velocity(kinetic, j)) - algebra.by_coordinate(lagrangian, j)
        )
        for j in range(system.links)
    ]


def peak():
    """The most memory that this process had in use, in MB; none where the system does not say."""
    try:
        with open("/proc/self/status", encoding="ascii") as status:
            kilobytes = [int(line.split()[1]) for line in status if line.startswith("VmHWM:")]
            return kilobytes[0] / 1024
    except (OSError, IndexError):
        return None


def race(make_algebra):
    """Derives the equations of the case in the arguments, prints the shortest time, the terms and the memory.

    The first argument is the case, the second `reduced` (the default) or `brute`.
    """
    case = sys.argv[1] if len(sys.argv) > 1 else ""
    route = sys.argv[2] if len(sys.argv) > 2 else "reduced"
    if len(case.split()) < 2 or route not in ("reduced", "brute"):
        raise SystemExit(f"usage: {sys.argv[0]} 'rel 10' [reduced|brute]")
    begin, best, terms = time.perf_counter(), float("inf"), 0
    for _ in range(MOST_RUNS):
        start = time.perf_counter()
        system = System(case)
        algebra = make_algebra(system, route == "brute")
        terms = sum(algebra.terms(equation) for equation in equations(system, algebra))
        now = time.perf_counter()
        best = min(best, now - start)
        if now - begin > SECONDS:
            break
    print(json.dumps({"ms": best * 1e3, "terms": terms, "mb": peak()}))


def missing(library):
    """Says that a library is not installed, which is no failure of the race."""
    print(json.dumps({"missing": library}))
    raise SystemExit(0)
