#include "solver/materials.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <set>
#include <string_view>

namespace panelwright::solver {
namespace {

TEST(Metals, HaveTheHandbooksConductivities) {
    // D. M. Pozar, Microwave Engineering, App. F [read as quoted].
    EXPECT_EQ(find_metal("silver")->conductivity, 6.173e7);
    EXPECT_EQ(find_metal("copper")->conductivity, 5.813e7);
    EXPECT_EQ(find_metal("gold")->conductivity, 4.098e7);
    EXPECT_EQ(find_metal("aluminium")->conductivity, 3.816e7);
    EXPECT_EQ(find_metal("brass")->conductivity, 2.564e7);
    EXPECT_EQ(find_metal("bronze")->conductivity, 1.00e7);
    EXPECT_EQ(find_metal("stainless")->conductivity, 1.1e6);
    EXPECT_TRUE(std::isinf(find_metal("perfect")->conductivity));
    EXPECT_FALSE(find_metal("unobtainium").has_value());
    EXPECT_FALSE(find_metal("").has_value());
}

TEST(Metals, AreListedFromTheBestConductorDownWithTheirSource) {
    std::set<std::string_view> names;
    double last = INFINITY;
    for (const Metal& metal : metals()) {
        EXPECT_TRUE(names.insert(metal.name).second);
        EXPECT_FALSE(metal.source.empty()) << metal.name;
        EXPECT_GT(metal.conductivity, 0.0);
        EXPECT_LE(metal.conductivity, last) << metal.name;
        last = metal.conductivity;
    }
}

}  // namespace
}  // namespace panelwright::solver
