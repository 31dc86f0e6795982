// The mechanical systems of the race for peers in C++; see `workload.py`, which says the same in Python.
//
// An algebra has a type `Value` with +, - and *, and the functions named at the head of `workload.py`.
#pragma once

#include <array>
#include <chrono>
#include <cstdio>
#include <cstdlib>
#include <fstream>
#include <map>
#include <sstream>
#include <string>
#include <vector>

struct System {
    std::string kind, axes;
    int links = 0;
    bool general = false;
    // Which coordinates each base angle is the sum of.
    std::vector<std::vector<int>> angles;

    explicit System(const std::string &text) {
        std::istringstream words(text.substr(0, text.find(',')));
        words >> kind >> links;
        general = text.find("every offset nonzero") != std::string::npos;
        bool arm = kind == "arm";
        if ((!arm && kind != "abs" && kind != "rel") || links < 1 || (arm && links > 6)) {
            std::fprintf(stderr, "`%s` is no case of the race\n", text.c_str());
            std::exit(2);
        }
        if (arm) axes = general ? "zyxzyx" : "zyyxyx";
        for (int link = 0; link < links; ++link) {
            bool starts = kind == "abs" || link == 0 || (arm && axes[link] != axes[link - 1]);
            angles.push_back(starts ? std::vector<int>{} : angles.back());
            angles.back().push_back(link);
        }
    }

    // The link from which the base angle of this link is measured; -1 is the ground.
    int base(int link) const { return angles[link].front() - 1; }

    // For each link the names of the vector from its joint to the next; an empty name stands for zero.
    std::vector<std::array<std::string, 3>> offsets() const {
        std::vector<std::array<std::string, 3>> names;
        if (kind != "arm") return names;
        if (!general) names = {{"", "", "d1"}, {"a2", "d2", ""}, {"a3", "", ""}};
        names.resize(links - 1);
        for (int link = 0; general && link + 1 < links; ++link)
            for (int i = 0; i < 3; ++i)
                names[link][i] = std::string("b") + "xyz"[i] + std::to_string(link + 2);
        return names;
    }

    std::vector<std::string> constants() const {
        std::vector<std::string> names = {"g"}, each = {"m", "l"};
        if (kind == "arm") each = {"m", "cx", "cy", "cz", "Ixx", "Iyy", "Izz", "Ixy", "Ixz", "Iyz"};
        for (int link = 1; link <= links; ++link)
            for (const auto &name : each) names.push_back(name + std::to_string(link));
        for (const auto &offset : offsets())
            for (const auto &name : offset)
                if (!name.empty()) names.push_back(name);
        return names;
    }
};

template <class Value> using Vector = std::array<Value, 3>;
template <class Value> using Matrix = std::array<Vector<Value>, 3>;
// Twice the kinetic and twice the potential energy.
template <class Value> struct Energies {
    Value kinetic, potential;
};

template <class Value> Value dot(const Vector<Value> &a, const Vector<Value> &b) {
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

template <class Value> Vector<Value> column(const Matrix<Value> &matrix, int j) {
    return {matrix[0][j], matrix[1][j], matrix[2][j]};
}

// A planar chain of point masses on massless rods, hanging from the ground.
template <class Algebra> auto chain(const System &system, Algebra &algebra) {
    using Value = typename Algebra::Value;
    Value across = algebra.number(0), height = across, gravity = algebra.symbol("g");
    Energies<Value> sum{across, across};
    for (int link = 0; link < system.links; ++link) {
        std::string place = std::to_string(link + 1);
        Value mass = algebra.symbol("m" + place), length = algebra.symbol("l" + place);
        across = across + length * algebra.sine(link);
        height = height - length * algebra.cosine(link);
        Value u = algebra.velocity(across), v = algebra.velocity(height);
        sum.kinetic = sum.kinetic + mass * algebra.between(u * u + v * v);
        sum.potential = sum.potential + algebra.number(2) * mass * gravity * height;
    }
    return sum;
}

// A serial arm of rigid links, each with any mass centre and any inertia matrix.
template <class Algebra> auto arm(const System &system, Algebra &algebra) {
    using Value = typename Algebra::Value;
    const std::string letters = "xyz";
    const Value zero = algebra.number(0), one = algebra.number(1), two = algebra.number(2);
    // Orientation and angular velocity, in the link's own frame, of each link; the ground stands at -1.
    std::map<int, Matrix<Value>> orientations;
    std::map<int, Vector<Value>> spins;
    orientations[-1] = {{{one, zero, zero}, {zero, one, zero}, {zero, zero, one}}};
    spins[-1] = {zero, zero, zero};
    Vector<Value> joint = {zero, zero, zero};
    Energies<Value> sum{zero, zero};
    auto offsets = system.offsets();
    for (int link = 0; link < system.links; ++link) {
        int axis = letters.find(system.axes[link]), second = (axis + 1) % 3, third = (axis + 2) % 3;
        Value sine = algebra.sine(link), cosine = algebra.cosine(link);
        Matrix<Value> turn, orientation;
        for (auto &row : turn) row = {zero, zero, zero};
        turn[axis][axis] = one;
        turn[second][second] = turn[third][third] = cosine;
        turn[third][second] = sine;
        turn[second][third] = zero - sine;
        Vector<Value> spin;
        for (int j = 0; j < 3; ++j) {
            for (int i = 0; i < 3; ++i)
                orientation[i][j] = algebra.between(dot(orientations[system.base(link)][i], column(turn, j)));
            spin[j] = dot(column(turn, j), spins[system.base(link)]);
        }
        spin[axis] = spin[axis] + algebra.rate(link);
        for (auto &part : spin) part = algebra.between(part);
        orientations[link] = orientation;
        spins[link] = spin;

        std::string number = std::to_string(link + 1);
        Value mass = algebra.symbol("m" + number);
        Vector<Value> centre, place, velocity;
        for (int i = 0; i < 3; ++i) centre[i] = algebra.symbol(std::string("c") + letters[i] + number);
        for (int i = 0; i < 3; ++i) {
            place[i] = algebra.between(joint[i] + dot(orientation[i], centre));
            velocity[i] = algebra.velocity(place[i]);
        }
        sum.kinetic = sum.kinetic + mass * algebra.between(dot(velocity, velocity));
        for (int i = 0; i < 3; ++i)
            for (int j = i; j < 3; ++j) {
                Value inertia = algebra.symbol(std::string("I") + letters[i] + letters[j] + number);
                sum.kinetic = sum.kinetic + (i == j ? one : two) * inertia * algebra.between(spin[i] * spin[j]);
            }
        sum.potential = sum.potential + two * mass * algebra.symbol("g") * place[2];
        if (link >= static_cast<int>(offsets.size())) continue;
        Vector<Value> offset;
        for (int i = 0; i < 3; ++i)
            offset[i] = offsets[link][i].empty() ? zero : algebra.symbol(offsets[link][i]);
        for (int i = 0; i < 3; ++i) joint[i] = algebra.between(joint[i] + dot(orientation[i], offset));
    }
    return sum;
}

// The number of terms of d/dt(dT/dv) - dT/dq + dV/dq for all coordinates, in canonical form.
template <class Algebra> std::size_t terms_of_equations(const System &system, Algebra &algebra) {
    using Value = typename Algebra::Value;
    auto energies = system.kind == "arm" ? arm(system, algebra) : chain(system, algebra);
    Value kinetic = algebra.between(energies.kinetic), potential = algebra.between(energies.potential);
    Value lagrangian = kinetic - potential;
    std::vector<Value> equations;
    std::size_t terms = 0;
    for (int j = 0; j < system.links; ++j) {
        Value rate = algebra.total_rate(algebra.by_velocity(kinetic, j));
        equations.push_back(algebra.canonical(rate - algebra.by_coordinate(lagrangian, j)));
        terms += algebra.terms(equations.back());
    }
    return terms;
}

// The most memory that this process had in use, in MB as JSON.
inline std::string peak() {
    std::ifstream status("/proc/self/status");
    for (std::string line; std::getline(status, line);)
        if (line.rfind("VmHWM:", 0) == 0) return std::to_string(std::atof(line.c_str() + 6) / 1024);
    return "null";
}

// Derives the equations of the case in the arguments, prints the shortest time, the terms and the memory.
template <class Algebra> int race(int count, char **arguments) {
    const std::string route = count > 2 ? arguments[2] : "reduced";
    if (count < 2 || (route != "reduced" && route != "brute")) {
        std::fprintf(stderr, "usage: %s 'rel 10' [reduced|brute]\n", arguments[0]);
        return 2;
    }
    const int most_runs = 5;
    const double most_seconds = 2;
    using Clock = std::chrono::steady_clock;
    auto seconds_since = [](Clock::time_point start) {
        return std::chrono::duration<double>(Clock::now() - start).count();
    };
    auto begin = Clock::now();
    double best = 1e300;
    std::size_t terms = 0;
    for (int run = 0; run < most_runs && seconds_since(begin) < most_seconds; ++run) {
        auto start = Clock::now();
        System system(arguments[1]);
        Algebra algebra(system, route == "brute");
        terms = terms_of_equations(system, algebra);
        best = std::min(best, seconds_since(start));
    }
    std::printf("{\"ms\": %.6f, \"terms\": %zu, \"mb\": %s}\n", best * 1e3, terms, peak().c_str());
    return 0;
}
