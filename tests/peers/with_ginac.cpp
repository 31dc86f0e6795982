// Equations of motion with GiNaC: expressions with sines and cosines, expanded.

#include <ginac/ginac.h>

#include "workload.hpp"

// Sines and cosines of sums of coordinates.
class Expressions {
  public:
    using Value = GiNaC::ex;

    Expressions(const System &system, bool brute) : brute(brute) {
        for (int k = 1; k <= system.links; ++k) {
            coordinates.emplace_back("q" + std::to_string(k));
            velocities.emplace_back("v" + std::to_string(k));
            accelerations.emplace_back("w" + std::to_string(k));
        }
        for (const auto &angle : system.angles) {
            Value sum = 0, rate = 0;
            for (int j : angle) {
                sum += coordinates[j];
                rate += velocities[j];
            }
            angles.push_back(sum);
            rates.push_back(rate);
            squares[pow(GiNaC::sin(sum), 2)] = 1 - pow(GiNaC::cos(sum), 2);
        }
        for (const auto &name : system.constants()) constants.emplace(name, GiNaC::symbol(name));
    }

    Value number(int value) const { return value; }
    Value symbol(const std::string &name) const { return constants.at(name); }
    Value sine(int k) const { return GiNaC::sin(angles[k]); }
    Value cosine(int k) const { return GiNaC::cos(angles[k]); }
    Value rate(int k) const { return rates[k]; }

    Value canonical(const Value &p) const {
        return p.expand().subs(squares, GiNaC::subs_options::no_pattern).expand();
    }
    Value between(const Value &p) const { return brute ? p : canonical(p); }

    Value velocity(const Value &p) const {
        Value rate = 0;
        for (std::size_t j = 0; j < coordinates.size(); ++j) rate += p.diff(coordinates[j]) * velocities[j];
        return rate;
    }
    Value total_rate(const Value &p) const {
        Value rate = velocity(p);
        for (std::size_t j = 0; j < velocities.size(); ++j) rate += p.diff(velocities[j]) * accelerations[j];
        return rate;
    }
    Value by_velocity(const Value &p, int j) const { return p.diff(velocities[j]); }
    Value by_coordinate(const Value &p, int j) const { return p.diff(coordinates[j]); }

    std::size_t terms(const Value &p) const {
        if (p.is_zero()) return 0;
        return GiNaC::is_a<GiNaC::add>(p) ? p.nops() : 1;
    }

  private:
    bool brute;
    std::vector<GiNaC::symbol> coordinates, velocities, accelerations;
    std::vector<Value> angles, rates;
    std::map<std::string, GiNaC::symbol> constants;
    GiNaC::exmap squares;
};

int main(int count, char **arguments) { return race<Expressions>(count, arguments); }
