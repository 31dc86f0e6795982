// Equations of motion with FLINT: polynomials over the integers modulo s^2 + c^2 = 1.

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

    Polynomial canonical(Polynomial p) const {
        for (int k = 0; k < links; ++k) {
            if (fmpz_mpoly_degree_si(p.raw, k, ring) < 2) continue;
            Polynomial quotient, rest;
            fmpz_mpoly_divrem(quotient.raw, rest.raw, p.raw, relations[k].raw, ring);
            p = std::move(rest);
        }
        return p;
    }
    Polynomial between(const Polynomial &p) const { return brute ? p : canonical(p); }

    Polynomial velocity(const Polynomial &p) const {
        Polynomial sum;
        for (int k = 0; k < links; ++k) sum += by_angle(p, k) * rates[k];
        return sum;
    }
    Polynomial total_rate(const Polynomial &p) const {
        Polynomial sum = velocity(p);
        for (int j = 0; j < links; ++j) sum += by_velocity(p, j) * variable(3 * links + j);
        return sum;
    }
    Polynomial by_velocity(const Polynomial &p, int j) const { return p.derivative(2 * links + j); }
    Polynomial by_coordinate(const Polynomial &p, int j) const {
        Polynomial sum;
        for (int k = 0; k < links; ++k)
            for (int part : angles[k])
                if (part == j) sum += by_angle(p, k);
        return sum;
    }
    std::size_t terms(const Polynomial &p) const { return fmpz_mpoly_length(p.raw, ring); }

  private:
    Polynomial variable(int place) const {
        Polynomial generator;
        fmpz_mpoly_gen(generator.raw, place, ring);
        return generator;
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
