#include "io/touchstone.hpp"

#include <fmt/format.h>

#include <cmath>
#include <complex>
#include <iterator>
#include <stdexcept>

#include "io/text_lines.hpp"
#include "solver/constants.hpp"

namespace panelwright::io {
namespace {

using solver::Complex;

enum class Format { real_imaginary, magnitude_angle, decibel_angle };

/// The option line, with the defaults of the Touchstone File Format Specification, version 1.1 (IBIS Open
/// Forum, 2002), section "Option line".
struct Options {
    double unit = 1e9;  ///< [Hz]
    Format format = Format::magnitude_angle;
    double reference = 50.0;  ///< [ohm]
};

void require_one_port(const OnePort& data) {
    if (data.frequency.size() != data.s11.size()) {
        throw std::invalid_argument("a one-port needs one reflection coefficient a frequency");
    }
    if (!(data.reference > 0.0) || !std::isfinite(data.reference)) {
        throw std::invalid_argument("the reference impedance must be positive and finite");
    }
    for (std::size_t i = 0; i < data.frequency.size(); ++i) {
        if (!std::isfinite(data.frequency[i]) || !std::isfinite(data.s11[i].real()) ||
            !std::isfinite(data.s11[i].imag())) {
            throw std::invalid_argument("network data must be finite");
        }
        if (i > 0 && !(data.frequency[i] > data.frequency[i - 1])) {
            throw std::invalid_argument("the frequencies of a one-port must rise");
        }
    }
}

/// `text` in printable ASCII, '?' for every other character, line ends kept.
std::string ascii(const std::string& text) {
    std::string result;
    for (const char c : text) {
        const auto byte = static_cast<unsigned char>(c);
        constexpr unsigned continuation = 0x80;  // 10xxxxxx: a further byte of a character already replaced
        if ((byte & 0xC0U) == continuation) continue;
        result += (byte >= 0x20 && byte < 0x7F) || c == '\n' ? c : '?';
    }
    return result;
}

std::string upper(std::string_view text) {
    std::string result(text);
    for (char& c : result) {
        if (c >= 'a' && c <= 'z') c = static_cast<char>(c - 'a' + 'A');
    }
    return result;
}

std::vector<std::string_view> words(std::string_view line) {
    std::vector<std::string_view> result;
    for (line = trimmed(line); !line.empty(); line = trimmed(line)) {
        const std::size_t end = std::min(line.find_first_of(" \t"), line.size());
        result.push_back(line.substr(0, end));
        line.remove_prefix(end);
    }
    return result;
}

/// The option line after its '#'.
Options parse_options(std::string_view line, const TextLines& lines) {
    Options options;
    const std::vector<std::string_view> parts = words(line);
    for (std::size_t i = 0; i < parts.size(); ++i) {
        const std::string word = upper(parts[i]);
        if (word == "HZ")
            options.unit = 1.0;
        else if (word == "KHZ")
            options.unit = 1e3;
        else if (word == "MHZ")
            options.unit = 1e6;
        else if (word == "GHZ")
            options.unit = 1e9;
        else if (word == "RI")
            options.format = Format::real_imaginary;
        else if (word == "MA")
            options.format = Format::magnitude_angle;
        else if (word == "DB")
            options.format = Format::decibel_angle;
        else if (word == "R") {
            const std::optional<double> value =
                i + 1 < parts.size() ? finite_number(parts[++i]) : std::nullopt;
            if (!value || !(*value > 0.0)) throw lines.error("R needs a positive number of ohms behind it");
            options.reference = *value;
        } else if (word == "Y" || word == "Z" || word == "G" || word == "H") {
            throw lines.error(fmt::format("{} parameters are not read, only S", word));
        } else if (word != "S") {
            throw lines.error(
                fmt::format("'{}' is no part of an option line: allowed are Hz, kHz, MHz, GHz, S, RI, "
                            "MA, DB and R with a number",
                            parts[i]));
        }
    }
    return options;
}

Complex reflection(double first, double second, Format format) {
    if (format == Format::real_imaginary) return {first, second};
    const double magnitude = format == Format::decibel_angle ? std::pow(10.0, first / 20.0) : first;
    const double angle = second * solver::pi / 180.0;
    return {magnitude * std::cos(angle), magnitude * std::sin(angle)};
}

void append_row(OnePort& data, std::string_view line, const Options& options, const TextLines& lines) {
    const std::vector<std::string_view> parts = words(line);
    if (parts.size() != 3) {
        throw lines.error(
            fmt::format("{} numbers found; a one-port has three in every line: the frequency and two for S11",
                        parts.size()));
    }
    double values[3];
    for (std::size_t i = 0; i < 3; ++i) {
        const std::optional<double> value = finite_number(parts[i]);
        if (!value) throw lines.error(fmt::format("'{}' is not a number", parts[i]));
        values[i] = *value;
    }
    const double frequency = values[0] * options.unit;
    if (frequency < 0.0) throw lines.error("the frequency is negative");
    if (!data.frequency.empty() && !(frequency > data.frequency.back())) {
        throw lines.error("the frequency does not rise from the line before");
    }
    data.frequency.push_back(frequency);
    data.s11.push_back(reflection(values[1], values[2], options.format));
}

}  // namespace

void write_touchstone(const std::filesystem::path& path, const OnePort& data, const std::string& comment) {
    require_one_port(data);
    fmt::memory_buffer text;
    const auto out = std::back_inserter(text);
    const std::string plain = ascii(comment);
    for (std::string_view rest = plain; !rest.empty();) {
        const std::size_t end = std::min(rest.find('\n'), rest.size());
        fmt::format_to(out, "! {}\n", rest.substr(0, end));
        rest.remove_prefix(std::min(end + 1, rest.size()));
    }
    fmt::format_to(out, "# Hz S RI R {}\n", data.reference);
    for (std::size_t i = 0; i < data.frequency.size(); ++i) {
        fmt::format_to(out, "{} {} {}\n", data.frequency[i], data.s11[i].real(), data.s11[i].imag());
    }
    write_file(path, {text.data(), text.size()});
}

OnePort read_touchstone(const std::filesystem::path& path) {
    TextLines lines(path);
    std::optional<Options> options;
    OnePort data;
    while (const std::optional<std::string_view> whole = lines.next()) {
        const std::string_view line = trimmed(whole->substr(0, whole->find('!')));
        if (line.empty()) continue;
        if (line.starts_with('[')) throw lines.error("this is a keyword of version 2; version 1.x is read");
        if (line.starts_with('#')) {
            if (!options) options = parse_options(line.substr(1), lines);
        } else if (!options) {
            throw lines.error("the option line, beginning with #, is missing above the data");
        } else {
            append_row(data, line, *options, lines);
        }
    }
    if (!options)
        throw FileError(fmt::format("{}: the option line, beginning with #, is missing", path.string()));
    if (data.frequency.empty()) throw FileError(fmt::format("{}: there are no data", path.string()));
    data.reference = options->reference;
    return data;
}

}  // namespace panelwright::io
