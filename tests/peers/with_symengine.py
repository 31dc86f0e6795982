"""Equations of motion with SymEngine: expressions with sines and cosines, expanded."""

import workload

try:
    import symengine
except ImportError:
    workload.missing("symengine")


class Expressions:
    """Sines and cosines of sums of coordinates."""

    def __init__(self, system, brute):
        every = range(1, system.links + 1)
        self.brute = brute
        self.coordinates, self.velocities, self.accelerations = (
            [symengine.Symbol(f"{kind}{k}") for k in every] for kind in ("q", "v", "w")
        )
        angles = [symengine.Add(*(self.coordinates[j] for j in angle)) for angle in system.angles]
        self.sines, self.cosines = map(symengine.sin, angles), map(symengine.cos, angles)
        self.sines, self.cosines = list(self.sines), list(self.cosines)
        self.rates = [symengine.Add(*(self.velocities[j] for j in angle)) for angle in system.angles]
        self.squares = {s**2: 1 - c**2 for s, c in zip(self.sines, self.cosines)}

    def number(self, value):
        return symengine.Integer(value)

    def symbol(self, name):
        return symengine.Symbol(name)

    def sine(self, k):
        return self.sines[k]

    def cosine(self, k):
        return self.cosines[k]

    def rate(self, k):
        return self.rates[k]

    def canonical(self, p):
        return symengine.expand(symengine.expand(p).subs(self.squares))

    def between(self, p):
        return p if self.brute else self.canonical(p)

    def velocity(self, p):
        return symengine.Add(*(p.diff(q) * v for q, v in zip(self.coordinates, self.velocities)))

    def total_rate(self, p):
        by_velocity = (p.diff(v) * w for v, w in zip(self.velocities, self.accelerations))
        return symengine.Add(self.velocity(p), *by_velocity)

    def by_velocity(self, p, j):
        return p.diff(self.velocities[j])

    def by_coordinate(self, p, j):
        return p.diff(self.coordinates[j])

    def terms(self, p):
        if p == 0:
            return 0
        return len(p.args) if isinstance(p, symengine.Add) else 1


workload.race(Expressions)
