#include "io/pattern_csv.hpp"

#include <fmt/format.h>

#include <array>
#include <iterator>
#include <stdexcept>

#include "io/degrees.hpp"
#include "io/text_lines.hpp"

namespace panelwright::io {
namespace {

constexpr std::string_view header =
    "frequency_hz,theta_deg,phi_deg,e_theta_re_v,e_theta_im_v,e_phi_re_v,e_phi_im_v,gain_dbi";

constexpr std::string_view preamble =
    "# far field of a patch antenna over a reflector, every direction, one a row; theta runs outside, phi "
    "inside\n"
    "# frame: right-handed; z = outward normal, from the reflector to the patch (boresight); x = the patch's "
    "resonant\n"
    "#   length, y = its width; origin on the reflector's upper face under the patch centre\n"
    "# angles: theta from +z, 0 to 180; phi from +x towards +y, 0 to below 360; E-plane = phi 0 and 180, "
    "H-plane = phi\n"
    "#   90 and 270\n"
    "# time factor: exp(+j omega t); phasors are peak values\n"
    "# e_theta, e_phi: components of r exp(+jkr) E in volts, real (re) and imaginary (im) part, for 1 W "
    "accepted at\n"
    "#   the port; not normalised\n"
    "# gain: intensity over the mean that the accepted power would give, without mismatch (IEEE Std 145), "
    "both\n"
    "#   polarisations together, in dBi; what lies below -200 stands as -200\n";

using Row = std::array<double, 8>;

/// `text` on one line.
std::string one_line(std::string text) {
    for (char& c : text) {
        if (c == '\n' || c == '\r') c = ' ';
    }
    return text;
}

/// (T, Q) rows of one pattern. Fields and gain change in every row, angles do not: they are formatted once.
void append_pattern(fmt::memory_buffer& text, const solver::FarField& field, const solver::RealGrid& gain) {
    std::vector<std::string> phi;
    for (const double angle : field.phi) phi.push_back(fmt::format("{}", degrees(angle)));
    const std::string frequency = fmt::format("{}", field.frequency);
    const auto out = std::back_inserter(text);
    for (std::size_t t = 0; t < field.theta.size(); ++t) {
        const std::string start = fmt::format("{},{}", frequency, degrees(field.theta[t]));
        for (std::size_t q = 0; q < field.phi.size(); ++q) {
            const auto row = static_cast<Eigen::Index>(t);
            const auto column = static_cast<Eigen::Index>(q);
            const solver::Complex e_theta = field.e_theta(row, column);
            const solver::Complex e_phi = field.e_phi(row, column);
            fmt::format_to(out, "{},{},{:.12e},{:.12e},{:.12e},{:.12e},{:.12g}\n", start, phi[q],
                           e_theta.real(), e_theta.imag(), e_phi.real(), e_phi.imag(), gain(row, column));
        }
    }
}

Row parse_row(std::string_view line, const TextLines& lines) {
    Row row{};
    std::size_t count = 0;
    for (std::string_view rest = line;; ++count) {
        const std::size_t end = std::min(rest.find(','), rest.size());
        const std::string_view cell = trimmed(rest.substr(0, end));
        if (count < row.size()) {
            const std::optional<double> value = finite_number(cell);
            if (!value) throw lines.error(fmt::format("'{}' is not a number", cell));
            row[count] = *value;
        }
        if (end == rest.size()) break;
        rest.remove_prefix(end + 1);
    }
    if (++count != row.size()) {
        throw lines.error(fmt::format("{} columns found; every row has {}", count, row.size()));
    }
    return row;
}

double radians(double degrees) {
    return degrees * (solver::pi / 180.0);
}

/// Length of the first run of rows with one theta.
std::size_t run_length(const std::vector<Row>& rows) {
    std::size_t length = 0;
    while (length < rows.size() && rows[length][1] == rows.front()[1]) ++length;
    return length;
}

/// The grid that `rows` fill, theta outer; nothing where they do not.
std::optional<solver::FarField> grid(const std::vector<Row>& rows) {
    const std::size_t columns = run_length(rows);
    if (rows.size() % columns != 0) return std::nullopt;
    solver::FarField field;
    field.frequency = rows.front()[0];
    for (std::size_t q = 0; q < columns; ++q) field.phi.push_back(radians(rows[q][2]));
    for (std::size_t i = 0; i < rows.size(); i += columns) field.theta.push_back(radians(rows[i][1]));
    field.e_theta.resize(static_cast<Eigen::Index>(field.theta.size()), static_cast<Eigen::Index>(columns));
    field.e_phi.resize(field.e_theta.rows(), field.e_theta.cols());
    for (std::size_t i = 0; i < rows.size(); ++i) {
        const std::size_t q = i % columns;
        const Row& row = rows[i];
        if (row[1] != rows[i - q][1] || row[2] != rows[q][2]) return std::nullopt;
        if (q > 0 && !(row[2] > rows[i - 1][2])) return std::nullopt;
        if (i >= columns && !(row[1] > rows[i - columns][1])) return std::nullopt;
        field.e_theta.data()[i] = {row[3], row[4]};
        field.e_phi.data()[i] = {row[5], row[6]};
    }
    return field;
}

}  // namespace

void write_pattern_csv(const std::filesystem::path& path, const std::vector<solver::FarField>& patterns,
                       const std::vector<solver::Powers>& powers, const std::string& title) {
    if (patterns.size() != powers.size())
        throw std::invalid_argument("the powers of every pattern are needed");
    fmt::memory_buffer text;
    fmt::format_to(std::back_inserter(text), "# {}\n{}{}\n", one_line(title), preamble, header);
    for (std::size_t p = 0; p < patterns.size(); ++p) {
        append_pattern(text, patterns[p], solver::gain_dbi(patterns[p], powers[p].accepted));
    }
    write_file(path, {text.data(), text.size()});
}

std::vector<solver::FarField> read_pattern_csv(const std::filesystem::path& path) {
    TextLines lines(path);
    std::optional<std::string_view> line = lines.next();
    while (line && line->starts_with('#')) line = lines.next();
    if (!line) throw FileError(fmt::format("{}: the header row is missing", path.string()));
    if (*line != header) throw lines.error(fmt::format("the header row must be {}", header));
    std::vector<solver::FarField> patterns;
    std::vector<Row> rows;
    const auto finish = [&] {
        if (rows.empty()) return;
        std::optional<solver::FarField> field = grid(rows);
        if (!field) {
            throw lines.error(fmt::format(
                "the rows of {} Hz that end here do not fill a grid of theta and phi", rows.front()[0]));
        }
        patterns.push_back(*std::move(field));
        rows.clear();
    };
    while ((line = lines.next())) {
        const Row row = parse_row(*line, lines);
        if (!rows.empty() && row[0] != rows.front()[0]) finish();
        rows.push_back(row);
    }
    finish();
    if (patterns.empty()) throw FileError(fmt::format("{}: there are no rows", path.string()));
    return patterns;
}

}  // namespace panelwright::io
