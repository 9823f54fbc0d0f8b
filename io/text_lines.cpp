#include "io/text_lines.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>

namespace panelwright::io {

TextLines::TextLines(const std::filesystem::path& path) : name_(path.string()), text_(read_file(path)) {
    constexpr std::string_view byte_order_mark = "\xEF\xBB\xBF";
    if (text_.starts_with(byte_order_mark)) position_ = byte_order_mark.size();
}

std::optional<std::string_view> TextLines::next() {
    if (position_ >= text_.size()) return std::nullopt;
    const std::size_t end = std::min(text_.find('\n', position_), text_.size());
    std::string_view line = std::string_view(text_).substr(position_, end - position_);
    if (line.ends_with('\r')) line.remove_suffix(1);
    position_ = end + 1;
    ++line_;
    return line;
}

FileError TextLines::error(std::string_view what) const {
    return FileError(fmt::format("{}:{}: {}", name_, line_, what));
}

std::string_view trimmed(std::string_view text) {
    constexpr std::string_view blanks = " \t";
    const std::size_t first = text.find_first_not_of(blanks);
    if (first == std::string_view::npos) return {};
    return text.substr(first, text.find_last_not_of(blanks) - first + 1);
}

std::optional<double> finite_number(std::string_view text) {
    if (text.starts_with('+')) {
        text.remove_prefix(1);
        if (text.starts_with('-')) return std::nullopt;
    }
    double value = 0.0;
    const auto [end, status] = std::from_chars(text.data(), text.data() + text.size(), value);
    if (status != std::errc{} || end != text.data() + text.size() || !std::isfinite(value))
        return std::nullopt;
    return value;
}

}  // namespace panelwright::io
