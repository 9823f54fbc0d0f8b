/// Case files for the tests of the command line.
#pragma once

#include <string>

namespace panelwright::test {

/// A small valid case: few band points, quick.
inline std::string small_case() {
    return R"(title = "Gauge under test"

[band]
from = "840 MHz"
to = "900 MHz"
points = 7

[patch]
length = "147 mm"
width = "165 mm"

[spacer]
height = "15 mm"

[feed]
kind = "probe"
x = "-38 mm"
y = "0 mm"
diameter = "2 mm"

[reflector]
length = "220 mm"
width = "260 mm"

[solve]
methods = ["aperture"]
accuracy = "quick"
)";
}

/// `small_case` as a study over the reflector's sides: `designs` of them, 2 mm apart.
inline std::string small_study(int designs) {
    return small_case() +
           "\n[[vary]]\nkeys = [\"reflector.length\", \"reflector.width\"]\nfrom = \"200 mm\"\nto = \"" +
           std::to_string(200 + 2 * (designs - 1)) + " mm\"\nstep = \"2 mm\"\n";
}

/// `small_case` with four feed positions, the third of them outside the patch.
inline std::string study_with_a_bad_design() {
    return small_case() +
           "\n[[vary]]\nkeys = [\"feed.x\"]\nvalues = [\"-40 mm\", \"-36 mm\", \"-120 mm\", \"-3.2 cm\"]\n";
}

/// Blocks of `count` thin posts in rows of ten under the patch of `small_case`, off its feed.
inline std::string many_posts(int count) {
    std::string text;
    for (int n = 0; n < count; ++n) {
        text += "\n[[post]]\nx = \"" + std::to_string(-60 + 12 * (n % 10)) + " mm\"\ny = \"" +
                std::to_string(20 + 10 * (n / 10)) + " mm\"\ndiameter = \"1 mm\"\n";
    }
    return text;
}

/// `text` with the first `before` replaced by `after`.
inline std::string with(std::string text, const std::string& before, const std::string& after) {
    const std::size_t place = text.find(before);
    return place == std::string::npos ? text : text.replace(place, before.size(), after);
}

}  // namespace panelwright::test
