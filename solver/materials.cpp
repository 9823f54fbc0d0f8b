#include "solver/materials.hpp"

#include <algorithm>
#include <array>
#include <limits>

namespace panelwright::solver {

namespace {

// [read as quoted]: seen in public lists that quote the book. [memory]: recalled from handbooks, not read
// again.
constexpr std::string_view pozar = "D. M. Pozar, Microwave Engineering, App. F [read as quoted]";
constexpr std::string_view recalled = "handbook value from memory [memory, high]";

// Steel and tinplate. Low-carbon steel conducts about 7e6 S/m and keeps a relative permeability of some tens
// near 1 GHz (70 taken), so that sqrt(pi f mu / sigma) is that of a non-magnetic metal of 7e6 / 70 = 1e5 S/m.
// On tinplate a coat of 1 µm tin (8.7e6 S/m, 0.115 ohm a square, skin depth 5.4 um at 1 GHz) lies in parallel
// with that steel (0.199 (1 + j) ohm a square): together 0.0856 ohm a square, the surface resistance of 5.4e5
// S/m.
constexpr std::string_view estimated = "estimated from memory [memory, low]; used by no test";

constexpr std::array<Metal, 13> table = {{
    {"perfect", std::numeric_limits<double>::infinity(), "a metal without loss", "definition"},
    {"silver", 6.173e7, "", pozar},
    {"copper", 5.813e7, "", pozar},
    {"gold", 4.098e7, "", pozar},
    {"aluminium", 3.816e7, "pure; sheet alloys have 2e7 to 3.5e7 S/m", pozar},
    {"brass", 2.564e7, "varies from 1.5e7 to 2.6e7 S/m with the alloy; give conductivity where it matters",
     pozar},
    {"galvanised", 1.69e7, "the zinc coat, from 7 µm up thicker than its skin depth above 400 MHz", recalled},
    {"bronze", 1.00e7, "", pozar},
    {"tin", 8.7e6, "massive, or a coat of 10 µm and more", recalled},
    {"solder", 7.0e6, "tin-lead", pozar},
    {"stainless", 1.1e6, "austenitic, not magnetic", pozar},
    {"tinplate", 5.4e5,
     "the coat of about 1 µm tin is thinner than a skin depth: near 1 GHz three quarters of the current run "
     "in the tin "
     "and the rest in the magnetic steel under it; good to a factor of three; give conductivity where it "
     "matters",
     estimated},
    {"steel", 1.0e5, "low-carbon steel, bare, magnetic; good to a factor of three", estimated},
}};

}  // namespace

std::span<const Metal> metals() {
    return table;
}

std::optional<Metal> find_metal(std::string_view name) {
    const auto metal = std::ranges::find(table, name, &Metal::name);
    if (metal == table.end()) return std::nullopt;
    return *metal;
}

}  // namespace panelwright::solver
