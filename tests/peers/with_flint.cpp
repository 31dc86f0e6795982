// Equations of motion with FLINT: polynomials over the integers modulo s^2 + c^2 = 1.

#include <algorithm>

#include <flint/fmpz_mpoly.h>

#include "workload.hpp"

// The ring of the present run. FLINT asks for it in every call.
static fmpz_mpoly_ctx_t ring;

class Polynomial {
  public:
    fmpz_mpoly_t raw;

    Polynomial() { fmpz_mpoly_init(raw, ring); }
    Polynomial(const Polynomial &other) : Polynomial() { fmpz_mpoly_set(raw, other.raw, ring); }
    Polynomial(Polynomial &&other) noexcept : Polynomial() { fmpz_mpoly_swap(raw, other.raw, ring); }
    Polynomial &operator=(Polynomial other) {
        fmpz_mpoly_swap(raw, other.raw, ring);
        return *this;
    }
    ~Polynomial() { fmpz_mpoly_clear(raw, ring); }

    Polynomial &operator+=(const Polynomial &other) {
        fmpz_mpoly_add(raw, raw, other.raw, ring);
        return *this;
    }
    friend Polynomial operator+(Polynomial a, const Polynomial &b) { return a += b; }
    friend Polynomial operator-(const Polynomial &a, const Polynomial &b) {
        Polynomial difference;
        fmpz_mpoly_sub(difference.raw, a.raw, b.raw, ring);
        return difference;
    }
    friend Polynomial operator*(const Polynomial &a, const Polynomial &b) {
        Polynomial product;
        fmpz_mpoly_mul(product.raw, a.raw, b.raw, ring);
        return product;
    }
    Polynomial derivative(int variable) const {
        Polynomial result;
        fmpz_mpoly_derivative(result.raw, raw, variable, ring);
        return result;
    }
};

// The sum by halves, so that long sums are not copied once for each part.
static Polynomial total(std::vector<Polynomial> parts) {
    if (parts.empty()) return Polynomial();
    for (std::size_t step = 1; step < parts.size(); step *= 2)
        for (std::size_t place = 0; place + step < parts.size(); place += 2 * step)
            parts[place] += parts[place + step];
    return std::move(parts.front());
}

// Sines, cosines, rates and constants as variables of one ring.
class Polynomials {
  public:
    using Value = Polynomial;

    Polynomials(const System &system, bool brute)
        : links(system.links), brute(brute), angles(system.angles), names(system.constants()) {
        // Sines come first, so that division by s^2 + c^2 - 1 replaces their squares.
        fmpz_mpoly_ctx_init(ring, 4 * links + names.size(), ORD_LEX);
        for (const auto &angle : angles) {
            Polynomial sum;
            for (int j : angle) sum += variable(2 * links + j);
            rates.push_back(sum);
        }
        for (int k = 0; k < links; ++k)
            relations.push_back(sine(k) * sine(k) + cosine(k) * cosine(k) - number(1));
    }
    ~Polynomials() {
        relations.clear();
        rates.clear();
        fmpz_mpoly_ctx_clear(ring);
    }

    Polynomial number(int value) const {
        Polynomial constant;
        fmpz_mpoly_set_si(constant.raw, value, ring);
        return constant;
    }
    Polynomial symbol(const std::string &name) const {
        for (std::size_t place = 0; place < names.size(); ++place)
            if (names[place] == name) return variable(4 * links + place);
        std::fprintf(stderr, "the constant `%s` is not declared\n", name.c_str());
        std::exit(2);
    }
    Polynomial sine(int k) const { return variable(k); }
    Polynomial cosine(int k) const { return variable(links + k); }
    Polynomial rate(int k) const { return rates[k]; }

    // Divided by all relations that apply at once: that was faster than by one after the other.
    Polynomial canonical(const Polynomial &p) {
        std::vector<fmpz_mpoly_struct *> divisors;
        for (int k = 0; k < links; ++k)
            if (fmpz_mpoly_degree_si(p.raw, k, ring) > 1) divisors.push_back(relations[k].raw);
        if (divisors.empty()) return p;
        std::vector<Polynomial> quotients(divisors.size());
        std::vector<fmpz_mpoly_struct *> places;
        for (auto &quotient : quotients) places.push_back(quotient.raw);
        Polynomial rest;
        fmpz_mpoly_divrem_ideal(places.data(), rest.raw, p.raw, divisors.data(), divisors.size(), ring);
        return rest;
    }
    Polynomial between(const Polynomial &p) { return brute ? p : canonical(p); }

    Polynomial velocity(const Polynomial &p) const { return total(changes(p)); }
    Polynomial total_rate(const Polynomial &p) const {
        std::vector<Polynomial> parts = changes(p);
        for (int j = 0; j < links; ++j) parts.push_back(by_velocity(p, j) * variable(3 * links + j));
        return total(std::move(parts));
    }
    Polynomial by_velocity(const Polynomial &p, int j) const { return p.derivative(2 * links + j); }
    Polynomial by_coordinate(const Polynomial &p, int j) const {
        std::vector<Polynomial> parts;
        for (int k = 0; k < links; ++k)
            if (std::count(angles[k].begin(), angles[k].end(), j)) parts.push_back(by_angle(p, k));
        return total(std::move(parts));
    }
    std::size_t terms(const Polynomial &p) const { return fmpz_mpoly_length(p.raw, ring); }

  private:
    Polynomial variable(int place) const {
        Polynomial generator;
        fmpz_mpoly_gen(generator.raw, place, ring);
        return generator;
    }
    // What each base angle contributes to the rate of a function of the angles.
    std::vector<Polynomial> changes(const Polynomial &p) const {
        std::vector<Polynomial> parts;
        for (int k = 0; k < links; ++k) parts.push_back(by_angle(p, k) * rates[k]);
        return parts;
    }
    Polynomial by_angle(const Polynomial &p, int k) const {
        return p.derivative(k) * cosine(k) - p.derivative(links + k) * sine(k);
    }

    int links;
    bool brute;
    std::vector<std::vector<int>> angles;
    std::vector<std::string> names;
    std::vector<Polynomial> rates, relations;
};

int main(int count, char **arguments) { return race<Polynomials>(count, arguments); }
