"""Equations of motion with FLINT from Python: polynomials over the integers modulo s^2 + c^2 = 1."""

import workload

try:
    from flint import Ordering, fmpz_mpoly_ctx
except ImportError:
    workload.missing("python-flint")


class Polynomials:
    """Sines, cosines, rates and constants as variables of one ring."""

    def __init__(self, system, brute):
        every = range(system.links)
        # Sines come first, so that division by s^2 + c^2 - 1 replaces their squares.
        names = [f"{kind}{k + 1}" for kind in ("sin", "cos", "v", "w") for k in every] + system.constants()
        context = fmpz_mpoly_ctx.get(names, Ordering.lex)
        self.variables = dict(zip(names, context.gens()))
        self.number, self.brute = context.constant, brute
        self.sines, self.cosines, self.velocities, self.accelerations = (
            [self.variables[f"{kind}{k + 1}"] for k in every] for kind in ("sin", "cos", "v", "w")
        )
        self.angles = system.angles
        self.rates = [sum((self.velocities[j] for j in angle), self.number(0)) for angle in system.angles]
        self.relations = [s * s + c * c - 1 for s, c in zip(self.sines, self.cosines)]

    def symbol(self, name):
        return self.variables[name]

    def sine(self, k):
        return self.sines[k]

    def cosine(self, k):
        return self.cosines[k]

    def rate(self, k):
        return self.rates[k]

    def canonical(self, p):
        for exponent, relation in zip(p.degrees(), self.relations):
            if exponent > 1:
                p = divmod(p, relation)[1]
        return p

    def between(self, p):
        return p if self.brute else self.canonical(p)

    def by_angle(self, p, k):
        by_sine, by_cosine = p.derivative(f"sin{k + 1}"), p.derivative(f"cos{k + 1}")
        return by_sine * self.cosines[k] - by_cosine * self.sines[k]

    def velocity(self, p):
        return sum((self.by_angle(p, k) * rate for k, rate in enumerate(self.rates)), self.number(0))

    def total_rate(self, p):
        rate = self.velocity(p)
        for j, acceleration in enumerate(self.accelerations):
            rate += p.derivative(f"v{j + 1}") * acceleration
        return rate

    def by_velocity(self, p, j):
        return p.derivative(f"v{j + 1}")

    def by_coordinate(self, p, j):
        parts = (self.by_angle(p, k) for k, angle in enumerate(self.angles) if j in angle)
        return sum(parts, self.number(0))

    def terms(self, p):
        return len(p)


workload.race(Polynomials)
